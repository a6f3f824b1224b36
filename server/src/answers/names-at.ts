/**
 * What a name in a plan means, where it is defined, and every place that names the same thing.
 *
 * Knows: plans, trees.  Must not know: other open plans, the protocol; those who hold several ask each of them.
 * Ranges are absolute; a file of undefined is the plan's own.
 */

import { readSmiles } from '../chemistry/smiles.ts';
import { lineAt, type RouteDocument } from '../route/document.ts';
import { labelOccurrencesOf, nameAt, occurrencesOf } from '../route/places.ts';
import type { Compound, Position, Range, Substance } from '../route/plan.ts';
import type { LineTree } from '../route/tree.ts';
import { inLine, shiftRange, touches } from './ranges.ts';
import { stepAt } from './steps.ts';
import type { Analysed } from './types.ts';

/** Something that a plan names and that can be found, followed and renamed. */
export interface Target {
  readonly kind: 'compound' | 'label';
  readonly name: string;
  /** The place that was asked about. */
  readonly range: Range;
  /** Where a compound is defined. */
  readonly file: string | undefined;
}

export interface Definition {
  readonly file: string | undefined;
  readonly range: Range;
}

/** The compound or label at a place; null where there is none that the plan defines. */
export function targetAt(analysed: Analysed, position: Position): Target | null {
  const found = nameAt(analysed.plan.document, position);
  if (found === null) return null;
  if (found.kind === 'label') {
    return { kind: 'label', name: found.text, range: found.range, file: undefined };
  }
  const compound = compoundNamed(analysed, found.text);
  return compound && { kind: 'compound', name: found.text, range: found.range, file: compound.file };
}

/** The first compound of a name, which is the one that names stand for. */
export function compoundNamed({ plan }: Analysed, name: string): Compound | null {
  return plan.compounds.find((compound) => compound.name === name) ?? null;
}

/** Every place in one document that names the target. */
export function placesOf(document: RouteDocument, { kind, name }: Pick<Target, 'kind' | 'name'>): Range[] {
  return kind === 'label' ? labelOccurrencesOf(document, name) : occurrencesOf(document, name);
}

/** Where what is named at a place is defined: a compound, a step, the atom of a site, the file that is used. */
export function definitionAt(analysed: Analysed, position: Position): Definition | null {
  const tree = lineAt(analysed.plan.document, position.line);
  if (tree === null) return null;
  const site = siteAt(analysed, tree, position);
  if (site !== null) return site;
  const target = targetAt(analysed, position);
  if (target === null) return null;
  if (target.kind === 'compound') {
    const { file, nameRange } = compoundNamed(analysed, target.name)!;
    return { file, range: nameRange };
  }
  const step = analysed.plan.steps.find(({ label }) => label === target.name);
  return step === undefined ? null : { file: undefined, range: shiftRange(step.labelRange, step.firstLine) };
}

/** The substance at a place of a step's statement; null where there is none. */
export function substanceAt(analysed: Analysed, position: Position): Substance | null {
  const found = stepAt(analysed, position.line);
  if (found?.statement == null) return null;
  const within = { line: position.line - found.firstLine, character: position.character };
  return substancesOf(found.statement).find(({ range }) => touches(range, within)) ?? null;
}

/** Every substance that a statement names. */
export function substancesOf(
  statement: NonNullable<NonNullable<ReturnType<typeof stepAt>>['statement']>,
): Substance[] {
  switch (statement.keyword) {
    case 'solvent':
      return [...statement.parts.map(({ substance }) => substance), ...carriers(statement)];
    case 'convert':
      return [...statement.from, ...statement.to].map(({ substance }) => substance);
    case 'extract':
      return [statement.substance, statement.into];
    case 'charge':
    case 'base':
    case 'acid':
    case 'inert':
    case 'quench':
    case 'adjust':
    case 'wash':
      return [statement.substance, ...carriers(statement)];
    case 'deprotonate':
    case 'protonate':
    case 'keep':
    case 'isolate':
      return [statement.substance];
    default:
      return [];
  }
}

function carriers({
  amount,
}: {
  readonly amount: { readonly carriers: readonly { readonly solvent: Substance }[] };
}): Substance[] {
  return amount.carriers.map(({ solvent }) => solvent);
}

/** The atom behind a map number of `deprotonate`, `protonate` or `measured`. */
function siteAt(analysed: Analysed, { syntax }: LineTree, { line, character }: Position): Definition | null {
  if (syntax === null || !('sites' in syntax)) return null;
  const site = syntax.sites.find(({ start, end }) => start <= character && character <= end);
  if (site === undefined) return null;
  const compound =
    syntax.keyword === 'measured'
      ? compoundAbove(analysed, line)
      : syntax.name.kind === 'structure'
        ? null
        : compoundOf(analysed, line);
  if (compound === null) return null;
  const atom = readSmiles(compound.smiles).structure?.atoms.find(({ mapNumber }) => mapNumber === site.map);
  if (atom === undefined) return null;
  const { start } = compound.smilesRange;
  return {
    file: compound.file,
    range: inLine(start.line, {
      start: start.character + atom.span.start,
      end: start.character + atom.span.end,
    }),
  };
}

function compoundAbove({ plan }: Analysed, line: number): Compound | null {
  const above = plan.compounds.filter(
    ({ file, nameRange }) => file === undefined && nameRange.start.line < line,
  );
  return above.at(-1) ?? null;
}

function compoundOf(analysed: Analysed, line: number): Compound | null {
  const statement = stepAt(analysed, line)?.statement;
  if (statement == null || !('substance' in statement)) return null;
  const { compound } = statement.substance;
  return compound && compoundNamed(analysed, compound.name);
}
