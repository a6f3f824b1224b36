/**
 * The first pass over a step: what each line names and writes, and the compound that equivalents refer to.
 *
 * Knows: trees, names, amounts as written, tables.  Must not know: acidity, flasks.
 * Lines are relative to the step's first line.
 */
import type { Tables } from '../tables/tables.ts';
import type { Block } from './document.ts';
import { type Basis, doseOf, molarMassOf, type Written } from './dose.ts';
import { type Named, type Need, rangeOf, resolveMixture, resolveName, type Scope } from './names.ts';
import type { Definition, MixturePart, Range, Substance, TextProblem } from './plan.ts';
import type { AmountNode, LineTree, Syntax } from './tree.ts';

/** What a step knows of the one it goes on from. */
export interface Before {
  readonly product: Substance | null;
  readonly mol: number;
}

export interface StepScope {
  readonly tables: Tables;
  readonly declared: ReadonlyMap<string, Definition>;
  /** Null for a new flask, and where the step to go on from is not there. */
  readonly before: Before | null;
  /** mol/L where no volume is written. */
  readonly concentration?: number;
}

const UNKNOWN_BASIS: Basis = { mol: 0.001, mass: null };

/** A line between the two passes: names known, amounts not yet in mol. */
export interface Draft {
  readonly tree: LineTree;
  readonly syntax: Syntax;
  readonly line: number;
  readonly named: Named | null;
  readonly parts: readonly MixturePart[];
  readonly written: Written;
  readonly amountRange: Range | null;
}

/** What each line of a step names and writes. */
export function draftsOf(block: Block, scope: StepScope, problems: TextProblem[]): Draft[] {
  return block.lines.flatMap((tree, line) => draftLine(tree, line, scope, problems));
}

const NEEDS: Readonly<Record<string, Need>> = {
  charge: 'warning',
  quench: 'warning',
  wash: 'warning',
  inert: 'none',
};

/** What one line names and writes; empty for lines that are no statement of a step. */
function draftLine(
  tree: LineTree,
  line: number,
  { tables, declared }: StepScope,
  problems: TextProblem[],
): Draft[] {
  const { syntax } = tree;
  if (syntax === null) return [];
  const scope: Scope = { tables, declared, line, problems };
  const nothing = {
    tree,
    syntax,
    line,
    named: null,
    parts: [],
    written: writtenOf([], null, scope),
    amountRange: null,
  };
  switch (syntax.keyword) {
    case 'solvent': {
      const { parts, strength } = resolveMixture(syntax.name, syntax.ratio, scope);
      const written = writtenOf(syntax.amounts, strength, scope);
      return [{ ...nothing, parts, written, amountRange: amountRange(line, syntax.amounts) }];
    }
    case 'charge':
    case 'base':
    case 'acid':
    case 'inert':
    case 'quench':
    case 'wash':
    case 'adjust': {
      const named = resolveName(syntax.name, scope, NEEDS[syntax.keyword] ?? 'error');
      const written = writtenOf(syntax.amounts, named.strength, scope);
      return [{ ...nothing, named, written, amountRange: amountRange(line, syntax.amounts) }];
    }
    case 'extract': {
      const named = resolveName(syntax.name, scope, 'error');
      const { parts } = resolveMixture(syntax.into, null, scope);
      const written = writtenOf(syntax.amounts, null, scope);
      return [{ ...nothing, named, parts, written, amountRange: amountRange(line, syntax.amounts) }];
    }
    case 'deprotonate':
    case 'protonate':
    case 'keep':
    case 'isolate':
      return [{ ...nothing, named: resolveName(syntax.name, scope, 'error') }];
    case 'convert':
    case 'temperature':
    case 'accept':
    case 'note':
      return [nothing];
    default:
      return [];
  }
}

function amountRange(line: number, amounts: readonly AmountNode[]): Range | null {
  const first = amounts[0];
  return first === undefined ? null : rangeOf(line, { start: first.start, end: amounts.at(-1)!.end });
}

/** Sorts what is written into quantities, strength, and solvents that come along. */
function writtenOf(amounts: readonly AmountNode[], prefix: Named['strength'], scope: Scope): Written {
  const quantities: { quantity: Written['quantities'][number]['quantity']; portions: number }[] = [];
  const carriers: { solvent: Substance; volume: number | null }[] = [];
  let strength = prefix?.quantity ?? null;
  let saturated = prefix?.saturated ?? false;
  let qualifier: Written['qualifier'] = null;
  let medium: Substance | null = null;
  for (let at = 0; at < amounts.length; at++) {
    const node = amounts[at]!;
    if (node.kind === 'quantity') {
      if (['molarity', 'mass-share', 'mass-concentration'].includes(node.quantity.dimension))
        strength = node.quantity;
      else quantities.push({ quantity: node.quantity, portions: node.portions });
    } else if (node.kind === 'saturated') {
      saturated = true;
    } else if (node.kind === 'carrier') {
      const { parts } = resolveMixture(node.name, node.ratio, scope, 'warning');
      const before = amounts[at - 1];
      const dissolves =
        before?.kind === 'saturated' || (before?.kind === 'quantity' && before.quantity === strength);
      if (dissolves && parts.length === 1) {
        medium = parts[0]!.substance;
        continue;
      }
      const next = amounts[at + 1];
      const volume =
        next?.kind === 'quantity' && next.quantity.dimension === 'volume'
          ? next.quantity.value * next.portions
          : null;
      if (volume !== null) at++;
      for (const { substance, share } of parts) {
        carriers.push({ solvent: substance, volume: volume === null ? null : volume * share });
      }
    } else {
      qualifier = node.kind;
    }
  }
  return { quantities, qualifier, saturated, strength, medium, carriers };
}

/** The first charged compound of known mol; failing that any charge, then what the step goes on from, then 1 mmol. */
export function basisOf(
  drafts: readonly Draft[],
  { before }: StepScope,
  problems: TextProblem[],
): { basis: Basis; reference: Substance | null } {
  const charged = drafts.flatMap(({ syntax, named, written }) => {
    if (named === null || !['charge', 'base', 'acid'].includes(syntax.keyword)) return [];
    const { mol, assumed } = doseOf(named.substance, written, null, () => null);
    const own = isOwn(named.substance);
    return [
      { substance: named.substance, own, charge: syntax.keyword === 'charge', mol: assumed ? null : mol },
    ];
  });
  const known = charged.filter(({ mol }) => mol !== null);
  const found =
    known.find(({ own, charge }) => own && charge) ??
    known.find(({ charge }) => charge) ??
    known.find(({ own }) => own);
  if (found !== undefined)
    return { basis: basisFor(found.substance, found.mol!), reference: found.substance };
  if (before !== null) {
    return {
      basis: before.product === null ? { mol: before.mol, mass: null } : basisFor(before.product, before.mol),
      reference: before.product,
    };
  }
  if (known[0] !== undefined)
    return { basis: basisFor(known[0].substance, known[0].mol!), reference: known[0].substance };
  reportNoBasis(drafts, problems);
  const reference = (charged.find(({ own }) => own) ?? charged[0])?.substance ?? null;
  return { basis: reference === null ? UNKNOWN_BASIS : basisFor(reference, UNKNOWN_BASIS.mol), reference };
}

function isOwn({ kind }: Substance): boolean {
  return kind === 'compound' || kind === 'structure';
}

function basisFor(substance: Substance, mol: number): Basis {
  const mass = molarMassOf(substance);
  return { mol, mass: mass === null ? null : mass * mol };
}

/** `vol` and volumes need a real amount; equivalents alone hold at any scale and are left alone. */
function reportNoBasis(drafts: readonly Draft[], problems: TextProblem[]): void {
  const relative = (dimension: string) => ['equiv', 'mol-share', 'relative-volume'].includes(dimension);
  const needing = drafts.find(({ written }) =>
    written.quantities.some(({ quantity }) => relative(quantity.dimension)),
  );
  if (needing === undefined || needing.amountRange === null) return;
  problems.push({
    check: 'missing-amount',
    message:
      'No charged compound of this step has an amount in mmol, g or mL that this could refer to; 1 mmol is assumed.',
    severity: 'information',
    range: needing.amountRange,
  });
}
