/**
 * Finds out what a name stands for: a compound of the plan, a row of the tables, a structure, or nothing known.
 *
 * Knows: names, tables, declared compounds.  Must not know: amounts, flasks.
 * Invariant: a declared compound wins over the tables, exact and case-sensitive.     (tests/route/resolve.test.ts)
 */
import type { Span } from '../chemistry/molecule.ts';
import { type FoundName, lookUpName, nearestNames } from '../tables/names.ts';
import type { ReagentRow, SolventRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import { DISSOLVED, SATURATED } from './amounts.ts';
import type { Definition, MixturePart, Range, Substance, TextProblem } from './plan.ts';
import { structureOf, substanceKey } from './structures.ts';
import type { NameNode, Word } from './tree.ts';
import { leadingNumber, numberOf, type Quantity, quantityOf } from './units.ts';

/** A mixture of more parts is taken for a name that nobody knows. */
const MOST_PARTS = 12;

/** What names are looked up in, and the line they stand in. */
export interface Scope {
  readonly tables: Tables;
  readonly declared: ReadonlyMap<string, Definition>;
  readonly line: number;
  readonly problems: TextProblem[];
}

/** How much a name has to be known where it stands. */
export type Need = 'error' | 'warning' | 'none';

export interface Named {
  readonly substance: Substance;
  readonly strength: { readonly quantity: Quantity | null; readonly saturated: boolean } | null;
}

/** A range in one line. */
export function rangeOf(line: number, { start, end }: Span): Range {
  return { start: { line, character: start }, end: { line, character: end } };
}

/** What a name stands for; problems go to the scope. */
export function resolveName(node: NameNode, scope: Scope, need: Need): Named {
  if (node.kind === 'structure') return { substance: bareStructure(node, scope), strength: null };
  const exact = scope.declared.get(node.kind === 'string' ? node.text : node.words[0]!.text);
  if (exact !== undefined) {
    const used = node.kind === 'string' ? node : node.words[0]!;
    leftOver(node, 1, scope);
    return { substance: compound(exact, rangeOf(scope.line, used)), strength: node.strength };
  }
  return node.kind === 'string' ? quoted(node, scope, need) : unquoted(node, scope, need);
}

/** The parts of a solvent: one substance, or a mixture of names around `/` once the whole name is not known. */
export function resolveMixture(
  node: NameNode,
  ratio: readonly number[] | null,
  scope: Scope,
  need: Need = 'error',
): { parts: MixturePart[]; strength: Named['strength'] } {
  const whole = lookUpName(scope.tables, textsOf(node.words));
  const split = node.kind !== 'structure' && node.text.includes('/') && whole?.length !== node.words.length;
  if (!split || scope.declared.has(node.kind === 'string' ? node.text : node.words[0]!.text)) {
    const { substance, strength } = resolveName(node, scope, need);
    return { parts: [{ substance: asSolvent(substance, scope.tables), share: 1 }], strength };
  }
  const pieces = piecesOf(node);
  if (MOST_PARTS < pieces.length) {
    return {
      parts: [{ substance: unknown(node, rangeOf(scope.line, node), scope, need), share: 1 }],
      strength: null,
    };
  }
  const shares = ratio?.length === pieces.length ? ratio : pieces.map(() => 1);
  if (ratio !== null && ratio.length !== pieces.length) {
    scope.problems.push({
      check: 'unreadable-line',
      message: `This mixture has ${pieces.length} parts and a ratio of ${ratio.length}; equal parts are assumed.`,
      range: rangeOf(scope.line, node),
    });
  }
  const total = shares.reduce((sum, share) => sum + share, 0);
  const parts = pieces.map((piece, index) => ({
    substance: asSolvent(resolveName(piece, scope, need).substance, scope.tables),
    share: shares[index]! / total,
  }));
  return { parts, strength: node.strength };
}

/** What stands where a solvent does is one: compounds and structures are looked up among the solvents by their key. */
export function asSolvent(substance: Substance, tables: Tables): Substance {
  if (substance.solvent !== null)
    return substance.kind === 'reagent' ? { ...substance, kind: 'solvent' } : substance;
  if (substance.smiles === null) return substance;
  const key = substanceKey(substance.smiles);
  return { ...substance, solvent: (key === null ? undefined : tables.solventByKey.get(key)) ?? null };
}

function bareStructure({ text, inner, start, end }: NameNode, { tables, line, problems }: Scope): Substance {
  const { problem } = structureOf(text);
  if (problem !== null) {
    const span = { start: inner.start + problem.span.start, end: inner.start + problem.span.end };
    problems.push({ check: problem.check, message: problem.message, range: rangeOf(line, span) });
  }
  const key = problem === null ? substanceKey(text) : null;
  return {
    kind: 'structure',
    name: text,
    smiles: text,
    compound: null,
    reagent: (key === null ? undefined : tables.reagentByKey.get(key)) ?? null,
    solvent: (key === null ? undefined : tables.solventByKey.get(key)) ?? null,
    range: rangeOf(line, { start, end }),
    structureRange: rangeOf(line, inner),
  };
}

function compound(definition: Definition, range: Range): Substance {
  return {
    kind: 'compound',
    name: definition.name,
    smiles: definition.smiles,
    compound: definition,
    reagent: null,
    solvent: null,
    range,
    structureRange: null,
  };
}

/** A row found under a name, as a substance. */
export function rowSubstance(
  name: string,
  reagent: ReagentRow | null,
  solvent: SolventRow | null,
  range: Range,
): Substance {
  return {
    kind: reagent !== null ? 'reagent' : 'solvent',
    name,
    smiles: reagent?.smiles ?? solvent?.smiles ?? null,
    compound: null,
    reagent,
    solvent,
    range,
    structureRange: null,
  };
}

/** All words of a quoted name belong to it, save a strength in front. */
function quoted(node: NameNode, scope: Scope, need: Need): Named {
  const range = rangeOf(scope.line, node);
  const whole = lookUpName(scope.tables, textsOf(node.words));
  if (whole !== null && whole.length === node.words.length) {
    const saturated = SATURATED.has(node.words[0]!.text);
    const strength = saturated ? { quantity: null, saturated } : null;
    return { substance: rowSubstance(node.text, whole.reagent, whole.solvent, range), strength };
  }
  const { words, strength } = withoutStrength(node.words);
  const rest = lookUpName(scope.tables, textsOf(words));
  if (rest !== null && rest.length === words.length) {
    const name = textsOf(words).join(' ');
    return { substance: rowSubstance(name, rest.reagent, rest.solvent, range), strength };
  }
  return { substance: unknown(node, range, scope, need), strength };
}

function unquoted(node: NameNode, scope: Scope, need: Need): Named {
  const found: FoundName | null = lookUpName(scope.tables, textsOf(node.words));
  if (found === null) {
    return { substance: unknown(node, rangeOf(scope.line, node), scope, need), strength: node.strength };
  }
  const used = node.words.slice(0, found.length);
  const span = { start: node.start, end: used.at(-1)!.end };
  leftOver(node, found.length, scope);
  const substance = rowSubstance(
    textsOf(used).join(' '),
    found.reagent,
    found.solvent,
    rangeOf(scope.line, span),
  );
  return { substance, strength: node.strength };
}

function withoutStrength(words: readonly Word[]): { words: readonly Word[]; strength: Named['strength'] } {
  const first = words[0]?.text ?? '';
  if (words.length < 2) return { words, strength: null };
  if (SATURATED.has(first) || DISSOLVED.has(first)) {
    const rest = words.slice(1);
    const used = 1 < rest.length && DISSOLVED.has(rest[0]!.text) ? rest.slice(1) : rest;
    return { words: used, strength: { quantity: null, saturated: SATURATED.has(first) } };
  }
  const length = leadingNumber(first);
  if (length === 0) return { words, strength: null };
  const attached = length < first.length;
  const unit = attached ? first.slice(length) : words[1]!.text;
  const quantity = quantityOf(numberOf(first.slice(0, length)), unit);
  const rest = words.slice(attached ? 1 : 2);
  const sound = quantity !== null && 0 < quantity.value && Number.isFinite(quantity.value);
  if (!sound || rest.length === 0 || !['molarity', 'mass-share', 'percent'].includes(quantity.dimension)) {
    return { words, strength: null };
  }
  const dimension = quantity.dimension === 'percent' ? 'mass-share' : quantity.dimension;
  return { words: rest, strength: { quantity: { ...quantity, dimension }, saturated: false } };
}

function unknown(node: NameNode, range: Range, { tables, problems }: Scope, need: Need): Substance {
  if (need !== 'none') {
    const near = nearestNames(tables, node.text.slice(0, 80));
    const offer =
      near.length === 0 ? 'declare it, write <SMILES>, or say inert' : `did you mean ${near.join(' or ')}?`;
    const shown = 60 < node.text.length ? `${node.text.slice(0, 60)}…` : node.text;
    problems.push({
      check: 'unknown-name',
      message: `“${shown}” is neither a compound of this plan nor in the tables; ${offer}${near.length === 0 ? '.' : ''}`,
      severity: need,
      range,
    });
  }
  return {
    kind: 'unknown',
    name: node.text,
    smiles: null,
    compound: null,
    reagent: null,
    solvent: null,
    range,
    structureRange: null,
  };
}

/** Reports the words between a name and its first amount that belong to neither. */
function leftOver({ kind, words }: NameNode, used: number, { problems, line }: Scope): void {
  if (kind !== 'words' || words.length <= used) return;
  const span = { start: words[used]!.start, end: words.at(-1)!.end };
  problems.push({
    check: 'unreadable-line',
    message: 'This is neither part of a known name nor an amount; it is left out.',
    range: rangeOf(line, span),
  });
}

function piecesOf(node: NameNode): NameNode[] {
  const pieces: NameNode[] = [];
  let at = 0;
  for (const part of node.text.split('/')) {
    const trimmed = part.trim();
    const start = node.inner.start + at + (part.length - part.trimStart().length);
    at += part.length + 1;
    const span = { start, end: start + trimmed.length };
    const words = [...trimmed.matchAll(/\S+/g)].map(({ 0: text, index }) => ({
      text,
      start: start + index,
      end: start + index + text.length,
    }));
    if (words.length === 0) words.push({ text: '', ...span });
    pieces.push({ kind: 'words', text: trimmed, inner: span, words, strength: null, ...span });
  }
  return pieces;
}

function textsOf(words: readonly Word[]): string[] {
  return words.map(({ text }) => text);
}
