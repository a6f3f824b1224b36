/**
 * Puts a suggestion into a step: as statements, to be worked again, and as changes of the text.
 *
 * Knows: resolved steps.  Must not know: verdicts, findings.
 * Invariant: the text as edited reads as the step that was worked.   (tests/answers/suggest.test.ts)
 */
import type { Option } from '../flask/suggest.ts';
import type {
  AddStatement,
  Amount,
  Range,
  SolventStatement,
  Statement,
  Step,
  Substance,
  TransferStatement,
} from '../route/plan.ts';
import type { Edit } from './fix.ts';
import { inLine, shiftRange } from './ranges.ts';
import type { Analysed } from './types.ts';

/** A suggestion and what it takes the place of. */
export interface Swap {
  readonly option: Option;
  readonly step: Step;
  readonly transfer: TransferStatement;
  /** K, in force at the transfer as written. */
  readonly temperature: number;
  /** Statements of the bases (acids) that it replaces; empty where there was none. */
  readonly acting: readonly Statement[];
  readonly loses: boolean;
  /** There is no solvent yet. */
  readonly needsSolvent: boolean;
  /** mol of the site's compound for each mol of the compound that `equiv` refers to. */
  readonly perReference: number;
}

const ZERO_CELSIUS = 273.15;

/** The step with the suggestion in it. */
export function stepWith(swap: Swap): Step {
  const { step, transfer, option, acting, temperature } = swap;
  const at = step.statements.indexOf(transfer);
  const solvents = solventsBefore(swap);
  const statements = step.statements.flatMap((statement, place): Statement[] => {
    if (statement === solvents[0]) return [solventStatement(swap, solvents[0]!)];
    if (solvents.includes(statement as SolventStatement)) return [];
    if (statement === acting[0]) return [addStatement(swap, statement)];
    if (acting.includes(statement)) return [];
    if (place !== at) return [statement];
    const added = acting.length === 0 ? [addStatement(swap, transfer)] : [];
    const { range, keywordRange } = transfer;
    const to = option.temperature;
    const bath = swap.needsSolvent && option.solvent !== null ? [newSolvent(swap)] : [];
    const change: Statement[] =
      to === temperature ? [] : [{ keyword: 'temperature', from: to, to, range, keywordRange }];
    return [...added, ...bath, ...change, statement];
  });
  return { ...step, statements };
}

/** The changes of the text that take the suggestion. */
export function editsFor({ plan }: Analysed, firstLine: number, swap: Swap): Edit[] {
  const { option, transfer, acting, temperature, loses } = swap;
  const { reagent } = option;
  const taken = plan.compounds.some(({ name }) => name === reagent.name);
  const words = `${taken ? `<${reagent.smiles}>` : reagent.name} ${equivOf(swap)} equiv`;
  const edits: Edit[] = [];
  const lineOf = ({ range }: Statement) => firstLine + range.start.line;
  const indent = ' '.repeat(transfer.keywordRange.start.character);
  const before = (text: string) => {
    const line = lineOf(transfer);
    edits.push({ range: inLine(line, { start: 0, end: 0 }), text: `${indent}${text}\n` });
  };
  const drop = (statement: Statement) => {
    const line = lineOf(statement);
    edits.push({ range: { start: { line, character: 0 }, end: { line: line + 1, character: 0 } }, text: '' });
  };
  const [first, ...others] = acting;
  if (first === undefined) before(`${loses ? 'base' : 'acid'} ${words}`);
  else if ('substance' in first && 'amount' in first)
    edits.push({
      range: shiftRange(spanOf(first.substance.range, first.amount.range), firstLine),
      text: words,
    });
  for (const statement of others) drop(statement);
  const [solvent, ...more] = solventsBefore(swap);
  if (solvent === undefined && swap.needsSolvent && option.solvent !== null)
    before(`solvent ${option.solvent.name}`);
  if (solvent !== undefined && option.solvent !== null && !isSame(solvent, more, option)) {
    const parts = solvent.parts.map(({ substance }) => substance.range);
    // A mixture's ratio goes with it; a single solvent keeps its amount as written.
    const span =
      solvent.parts.length === 1 ? parts[0]! : spanOf(parts[0]!, solvent.amount.range ?? parts.at(-1)!);
    const { volume } = solvent.amount;
    const kept =
      solvent.parts.length === 1 || volume === null ? '' : ` ${Number((volume * 1000).toPrecision(4))} mL`;
    edits.push({ range: shiftRange(span, firstLine), text: `${option.solvent.name}${kept}` });
    for (const statement of more) drop(statement);
  }
  if (option.temperature !== temperature)
    before(`temperature ${String(Math.round(option.temperature - ZERO_CELSIUS)).replace('-', '−')} °C`);
  return edits;
}

/** As the text has it, to two places. */
function equivOf({ option, perReference }: Swap): number {
  return Number((option.equiv * perReference).toFixed(2));
}

function isSame(
  { parts }: SolventStatement,
  more: readonly SolventStatement[],
  { solvent }: Option,
): boolean {
  return more.length === 0 && parts.length === 1 && parts[0]!.substance.solvent?.name === solvent?.name;
}

/** The solvent lines before the transfer. */
function solventsBefore({ step, transfer, option }: Swap): SolventStatement[] {
  if (option.solvent === null) return [];
  return step.statements
    .slice(0, step.statements.indexOf(transfer))
    .filter((statement): statement is SolventStatement => statement.keyword === 'solvent');
}

function solventStatement({ option }: Swap, before: SolventStatement): SolventStatement {
  const solvent = option.solvent!;
  const substance: Substance = {
    kind: 'solvent',
    name: solvent.name,
    smiles: solvent.smiles,
    compound: null,
    reagent: null,
    solvent,
    range: before.parts[0]!.substance.range,
    structureRange: null,
  };
  return { ...before, parts: [{ substance, share: 1 }] };
}

/** A solvent of the usual volume. */
function newSolvent(swap: Swap): SolventStatement {
  const { range, keywordRange } = swap.transfer;
  const amount: Amount = { ...UNSAID, assumed: true };
  const part = { substance: { ...UNNAMED, range }, share: 1 };
  return solventStatement(swap, { keyword: 'solvent', parts: [part], amount, range, keywordRange });
}

const UNSAID: Amount = {
  mol: null,
  equiv: null,
  volume: null,
  mass: null,
  portions: 1,
  qualifier: null,
  assumed: false,
  carriers: [],
  range: null,
};
const UNNAMED = {
  kind: 'solvent',
  name: '',
  smiles: null,
  compound: null,
  reagent: null,
  solvent: null,
  structureRange: null,
} as const;

function addStatement(swap: Swap, { range, keywordRange }: Statement): AddStatement {
  const { option, loses, step } = swap;
  const { reagent } = option;
  const equiv = equivOf(swap);
  const substance: Substance = {
    kind: 'reagent',
    name: reagent.name,
    smiles: reagent.smiles,
    compound: null,
    reagent,
    solvent: null,
    range,
    structureRange: null,
  };
  const amount: Amount = { ...UNSAID, mol: equiv * step.referenceMol, equiv };
  return { keyword: loses ? 'base' : 'acid', substance, amount, range, keywordRange };
}

function spanOf(from: Range, to: Range | null): Range {
  return { start: from.start, end: to?.end ?? from.end };
}
