/**
 * Turns the lines of one step into resolved statements.
 *
 * Knows: trees, names, amounts, tables.  Must not know: acidity, flasks, other steps' text.
 * Invariants:
 *  1. Depends only on the block, the definitions it mentions, and what it goes on from.   (tests/route/resolve.test.ts)
 *  2. Lines are relative to the step's first line.
 */
import { foldName } from '../tables/names.ts';
import type { Tables } from '../tables/tables.ts';
import type { Block } from './document.ts';
import { type Basis, doseOf, liquidVolume, molarMassOf, USUAL_CONCENTRATION, type Written } from './dose.ts';
import {
  type Named,
  type Need,
  rangeOf,
  resolveMixture,
  resolveName,
  rowSubstance,
  type Scope,
} from './names.ts';
import type {
  Amount,
  Definition,
  MixturePart,
  Range,
  Statement,
  Step,
  Substance,
  TextProblem,
  TransferStatement,
} from './plan.ts';
import { structureOf } from './structures.ts';
import type { AmountNode, LineTree, NameNode, SiteNode, Syntax } from './tree.ts';

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

type Addition = Extract<Syntax, { amounts: readonly AmountNode[] }>;
type Transfer = Extract<Syntax, { sites: readonly SiteNode[]; name: NameNode }>;
const UNKNOWN_BASIS: Basis = { mol: 0.001, mass: null };

/** A line between the two passes: names known, amounts not yet in mol. */
interface Draft {
  readonly tree: LineTree;
  readonly syntax: Syntax;
  readonly line: number;
  readonly named: Named | null;
  readonly parts: readonly MixturePart[];
  readonly written: Written;
  readonly amountRange: Range | null;
}

/** The step without its place in the document: `firstLine` is 0 and `contentKey` empty. */
export function resolveStep(block: Block, scope: StepScope): { step: Step; after: Before } {
  const problems: TextProblem[] = [];
  const head = block.lines[0]!.syntax;
  for (const [line, tree] of block.lines.entries()) {
    for (const { check, message, start, end } of tree.problems) {
      problems.push({ check, message, range: rangeOf(line, { start, end }) });
    }
  }
  const drafts = block.lines.flatMap((tree, line) => draft(tree, line, scope, problems));
  const { basis, reference } = basisOf(drafts, scope, problems);
  const statements = drafts.flatMap((each) => finish(each, basis, scope, problems));
  const opening = head?.keyword === 'step' ? head : null;
  const labelSpan = opening?.labelSpan ?? block.lines[0]!.span;
  problems.sort(
    (a, b) => a.range.start.line - b.range.start.line || a.range.start.character - b.range.start.character,
  );
  const step: Step = {
    label: opening?.label ?? '',
    title: opening?.title ?? null,
    firstLine: 0,
    lineCount: block.lines.length,
    range: rangeOf(0, block.lines[0]!.span),
    labelRange: rangeOf(0, labelSpan),
    continues: opening?.continues
      ? {
          label: opening.continues.label,
          layer: opening.continues.layer,
          range: rangeOf(0, opening.continues.span),
        }
      : null,
    statements,
    reference,
    referenceMol: basis.mol,
    problems,
    contentKey: '',
  };
  return { step, after: afterOf(step) };
}

function afterOf({ statements, reference, referenceMol }: Step): Before {
  let product = reference;
  let mol = referenceMol;
  for (const statement of statements) {
    if (statement.keyword !== 'convert') continue;
    product = statement.to[0]?.substance ?? product;
    mol *= statement.yield ?? 1;
  }
  return { product, mol };
}

const NEEDS: Readonly<Record<string, Need>> = {
  charge: 'warning',
  quench: 'warning',
  wash: 'warning',
  inert: 'none',
};

function draft(
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
function basisOf(
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

function finish(each: Draft, basis: Basis, stepScope: StepScope, problems: TextProblem[]): Statement[] {
  const { tree, syntax, line, named, parts } = each;
  const { tables, declared } = stepScope;
  const scope: Scope = { tables, declared, line, problems };
  const at = { range: rangeOf(line, tree.span), keywordRange: rangeOf(line, tree.keyword ?? tree.span) };
  const usual = basis.mol / (stepScope.concentration ?? USUAL_CONCENTRATION);
  switch (syntax.keyword) {
    case 'solvent':
      return [{ ...at, keyword: 'solvent', parts, amount: liquidAmount(each, parts, basis, usual) }];
    case 'charge':
    case 'base':
    case 'acid':
    case 'inert':
    case 'quench': {
      const { keyword } = syntax;
      const { substance } = named!;
      return [{ ...at, keyword, substance, amount: addedAmount(each, syntax, basis, scope, usual) }];
    }
    case 'wash': {
      const { substance } = named!;
      return [{ ...at, keyword: 'wash', substance, amount: addedAmount(each, syntax, basis, scope, usual) }];
    }
    case 'adjust': {
      const amount = addedAmount(each, syntax, basis, scope, usual);
      const pHRange = rangeOf(line, syntax.pHSpan);
      return [{ ...at, keyword: 'adjust', pH: syntax.pH, pHRange, substance: named!.substance, amount }];
    }
    case 'extract': {
      const amount = liquidAmount(each, parts, basis, usual);
      return [{ ...at, keyword: 'extract', substance: named!.substance, into: parts[0]!.substance, amount }];
    }
    case 'deprotonate':
    case 'protonate': {
      const sites = sitesOf(syntax, named!.substance, scope);
      return [{ ...at, keyword: syntax.keyword, substance: named!.substance, sites }];
    }
    case 'convert': {
      const side = (list: typeof syntax.from) =>
        list.map(({ name, count }) => ({ substance: resolveName(name, scope, 'error').substance, count }));
      return [
        { ...at, keyword: 'convert', from: side(syntax.from), to: side(syntax.to), yield: syntax.yield },
      ];
    }
    case 'temperature':
      return [{ ...at, keyword: 'temperature', from: syntax.from, to: syntax.to }];
    case 'keep':
      return [{ ...at, keyword: 'keep', substance: named!.substance, layer: syntax.layer }];
    case 'isolate': {
      const stateRange = rangeOf(line, syntax.stateSpan);
      return [{ ...at, keyword: 'isolate', substance: named!.substance, state: syntax.state, stateRange }];
    }
    case 'accept': {
      const checkRange = rangeOf(line, syntax.checkSpan);
      return [{ ...at, keyword: 'accept', check: syntax.check, checkRange, reason: syntax.reason }];
    }
    case 'note':
      return [{ ...at, keyword: 'note', text: syntax.text }];
    default:
      return [];
  }
}

/** Amount of a solvent or of the layer it forms. */
function liquidAmount(each: Draft, parts: readonly MixturePart[], basis: Basis, usual: number): Amount {
  const { written, amountRange: range } = each;
  const single = parts.length === 1 ? parts[0]!.substance : null;
  const volume = liquidVolume(single, written, basis);
  const mass = single === null ? null : molarMassOf(single);
  const density = single?.solvent?.density ?? null;
  const litres = volume ?? usual;
  const grams = density === null ? null : litres * 1000 * density;
  const mol = mass === null || grams === null ? null : grams / mass;
  return {
    mol,
    equiv: mol === null ? null : mol / basis.mol,
    volume: litres,
    mass: grams,
    portions: written.quantities.reduce((most, { portions }) => Math.max(most, portions), 1),
    qualifier: written.qualifier,
    assumed: volume === null,
    carriers: written.carriers,
    range,
  };
}

function addedAmount(each: Draft, syntax: Addition, basis: Basis, scope: Scope, usual: number): Amount {
  const { named, written, amountRange: range, line, tree } = each;
  const { substance } = named!;
  const { disagreement, stuck, ...dose } = doseOf(substance, written, basis, (name) =>
    solventNamed(name, substance, scope),
  );
  if (disagreement !== null) {
    const [one, other] = disagreement.map((mol) => millimol(mol));
    scope.problems.push({
      check: 'amounts-disagree',
      message: `These amounts of ${substance.name} are ${one} and ${other} mmol; they should agree within 5 %.`,
      range: range ?? rangeOf(line, tree.span),
    });
  }
  if (!dose.assumed) return { ...dose, range };
  if (syntax.keyword === 'adjust') {
    const carriers = dose.carriers.map(({ solvent }) => ({ solvent, volume: null }));
    return { ...dose, mol: null, equiv: null, mass: null, volume: null, carriers, range };
  }
  if (stuck && substance.kind !== 'unknown' && syntax.keyword === 'charge' && written.carriers.length === 0) {
    reportMissing(
      `The amount of ${substance.name} in mol cannot be worked out from this; write mmol or equiv.`,
      each,
      scope,
    );
  }
  const nothing = written.quantities.length === 0 && written.qualifier === null;
  const isLiquid = substance.solvent !== null && ['quench', 'wash'].includes(syntax.keyword);
  if (nothing && (isLiquid || syntax.keyword === 'wash'))
    return { ...liquidAmount(each, [{ substance, share: 1 }], basis, usual), range };
  if (nothing && ['charge', 'base', 'acid', 'quench'].includes(syntax.keyword)) {
    reportMissing(`No amount of ${substance.name} is written; 1 equiv is assumed.`, each, scope);
  }
  return { ...dose, range };
}

/** One finding a line: a bad amount or an unknown name has already been reported. */
function reportMissing(
  message: string,
  { named, tree, amountRange: range }: Draft,
  { problems }: Scope,
): void {
  const { substance } = named!;
  if (substance.kind === 'unknown' || tree.problems.length !== 0) return;
  problems.push({ check: 'missing-amount', message, range: range ?? substance.range });
}

/** Three significant figures, as a balance would give them. */
function millimol(mol: number): string {
  return String(Number((mol * 1000).toPrecision(3)));
}

function solventNamed(name: string, { range }: Substance, { tables }: Scope): Substance | null {
  const row = tables.solventByName.get(foldName(name)) ?? null;
  return row === null ? null : rowSubstance(name, null, row, range);
}

function sitesOf(
  { sites, name }: Transfer,
  substance: Substance,
  { problems, line }: Scope,
): TransferStatement['sites'] {
  if (substance.smiles === null) return [];
  const known = structureOf(substance.smiles);
  if (known.problem !== null) return [];
  return sites.flatMap(({ map, start, end }) => {
    const range = rangeOf(line, { start, end });
    const atoms = known.sites.get(map);
    if (atoms !== undefined) return [{ map, atoms, range }];
    const there = [...known.sites.keys()].map((number) => `:${number}`).join(', ');
    const offer = there === '' ? 'it has no numbered atoms' : `it has ${there}`;
    problems.push({
      check: 'site-not-found',
      message: `${name.text} has no atom with the number :${map}; ${offer}.`,
      range,
    });
    return [];
  });
}
