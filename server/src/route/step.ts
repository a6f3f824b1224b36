/**
 * Turns the lines of one step into resolved statements.
 *
 * Knows: trees, names, amounts, tables.  Must not know: acidity, flasks, other steps' text.
 * Invariants:
 *  1. Depends only on the block, the definitions it mentions, and what it goes on from.   (tests/route/resolve.test.ts)
 *  2. Lines are relative to the step's first line.
 */
import { foldName } from '../tables/fold-name.ts';
import type { Block } from './document.ts';
import { type Basis, doseOf, liquidVolume, molarMassOf, USUAL_CONCENTRATION } from './dose.ts';
import { type Before, basisOf, type Draft, draftsOf, type StepScope } from './draft.ts';
import { rangeOf, resolveName, rowSubstance, type Scope } from './names.ts';
import type {
  Amount,
  MixturePart,
  Statement,
  Step,
  Substance,
  TextProblem,
  TransferStatement,
} from './plan.ts';
import { structureOf } from './structures.ts';
import type { AmountNode, NameNode, SiteNode, Syntax } from './tree.ts';

type Addition = Extract<Syntax, { amounts: readonly AmountNode[] }>;
type Transfer = Extract<Syntax, { sites: readonly SiteNode[]; name: NameNode }>;

/** The step without its place in the document: `firstLine` is 0 and `contentKey` empty. */
export function resolveStep(block: Block, scope: StepScope): { step: Step; after: Before } {
  const problems: TextProblem[] = [];
  const head = block.lines[0]!.syntax;
  for (const [line, tree] of block.lines.entries()) {
    for (const { check, message, start, end } of tree.problems) {
      problems.push({ check, message, range: rangeOf(line, { start, end }) });
    }
  }
  const drafts = draftsOf(block, scope, problems);
  const { basis, reference } = basisOf(drafts, scope, problems);
  const statements = drafts.flatMap((each) => finish(each, basis, scope, problems));
  const opening = head?.keyword === 'step' ? head : null;
  const labelSpan = opening?.labelSpan ?? block.lines[0]!.span;
  const sound = oneOfALine(problems, block);
  sound.sort(
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
    problems: sound,
    contentKey: '',
  };
  return { step, after: afterOf(step) };
}

/** Where a bracket or quote is not closed, what is inside it can't be read either; that is one mistake. */
function oneOfALine(problems: readonly TextProblem[], { lines }: Block): TextProblem[] {
  return problems.filter(
    ({ check, range }) => check !== 'unreadable-structure' || lines[range.start.line]!.problems.length === 0,
  );
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
      return [
        {
          ...at,
          keyword: 'keep',
          substance: named!.substance,
          layer: syntax.layer,
          layerRange: rangeOf(line, syntax.layerSpan),
        },
      ];
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
  if (syntax.keyword === 'inert' && written.quantities.length === 0) {
    return { ...dose, mol: null, equiv: null, mass: null, range };
  }
  // How much is worked out from the pH; amount and volume stand for the strength alone.
  if (syntax.keyword === 'adjust') return { ...dose, equiv: null, mass: null, assumed: true, range };
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
  const distinct = [...new Map(sites.map((site) => [site.map, site])).values()];
  return distinct.flatMap(({ map, start, end }) => {
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
