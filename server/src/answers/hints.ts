/**
 * Figures that the analysis worked out, to be shown behind the words they belong to.
 *
 * Knows: analysed plans.  Must not know: the protocol, what the user wants to see.
 */
import type { AdjustFact, StepFacts, TransferFact } from '../checks/facts.ts';
import { lineAt } from '../route/document.ts';
import type { Range, Statement } from '../route/plan.ts';
import type { LineTree } from '../route/tree.ts';
import { amountOf, figure, oneDecimal, percent } from './figures.ts';
import { shiftRange } from './ranges.ts';
import type { Analysed } from './types.ts';

export type HintKind = 'amounts' | 'transfers' | 'pH';

export interface Hint {
  readonly kind: HintKind;
  /** Stands right behind the end of this. */
  readonly behind: Range;
  readonly text: string;
  readonly tooltip: string;
}

/** Hints of the lines from `first` to `last`, absolute. */
export function hintsIn(
  { plan, steps }: Analysed,
  { first, last }: { first: number; last: number },
  kinds: ReadonlySet<HintKind>,
): Hint[] {
  return plan.steps.flatMap((placed, index) => {
    const { firstLine, lineCount } = placed;
    if (firstLine + lineCount <= first || last < firstLine) return [];
    const { facts } = steps[index]!;
    const hints: Hint[] = [];
    for (const statement of placed.statements) {
      const line = firstLine + statement.range.start.line;
      if (line < first || last < line) continue;
      if (kinds.has('amounts')) hints.push(...amountHint(statement, lineAt(plan.document, line)));
      if (kinds.has('transfers')) hints.push(...transferHint(statement, facts.transfers));
      if (kinds.has('pH')) hints.push(...pHHint(statement, facts));
    }
    return hints.map((hint) => ({ ...hint, behind: shiftRange(hint.behind, firstLine) }));
  });
}

function amountHint(statement: Statement, tree: LineTree | null): Hint[] {
  if (!('amount' in statement) || statement.keyword === 'solvent' || statement.keyword === 'wash') return [];
  const { range, mol, equiv, assumed } = statement.amount;
  if (range === null || mol === null || assumed || tree === null || writtenInMol(tree)) return [];
  const share = equiv === null ? '' : `, ${figure(equiv)} equiv`;
  const text = `= ${amountOf(mol)}`;
  return [{ kind: 'amounts', behind: range, text, tooltip: `${amountOf(mol)}${share}` }];
}

/** What is written in mol needs no hint. */
function writtenInMol({ syntax }: LineTree): boolean {
  if (syntax === null || !('amounts' in syntax)) return false;
  return syntax.amounts.some((each) => each.kind === 'quantity' && each.quantity.dimension === 'substance');
}

function transferHint(statement: Statement, transfers: readonly TransferFact[]): Hint[] {
  const fact = transfers.find((transfer) => transfer.statement === statement);
  if (fact === undefined || fact.verdicts.length === 0) return [];
  const worst = fact.verdicts.reduce((low, each) => (each.extent < low.extent ? each : low));
  const logK = `log K ${oneDecimal(worst.logK)} ± ${oneDecimal(worst.sd)}`;
  return [
    {
      kind: 'transfers',
      behind: statement.range,
      text: `${logK}, ${percent(worst.extent)}`,
      tooltip: `${logK} on the ${worst.scale} scale; ${percent(worst.extent)} of the intended protons move at these amounts.`,
    },
  ];
}

function pHHint(statement: Statement, { moments, adjustments }: StepFacts): Hint[] {
  if (statement.keyword !== 'quench' && statement.keyword !== 'adjust') return [];
  const moment = moments.find((each) => each.statement === statement);
  const state = moment?.state();
  if (state === undefined || state.pH === null || !state.medium.aqueous) return [];
  return [
    {
      kind: 'pH',
      behind: statement.range,
      text: `pH ${oneDecimal(state.pH)}${needed(adjustments.find((each) => each.statement === statement))}`,
      tooltip: 'pH of the aqueous phase once the protons have come to rest.',
    },
  ];
}

/** " with 12 mmol, 2.4 mL": what brings the flask to the pH that is asked for. */
function needed(fact: AdjustFact | undefined): string {
  const mol = fact?.titration.mol ?? null;
  if (fact === undefined || mol === null || mol <= 0) return '';
  const volume = fact.volume === null ? '' : `, ${figure(1000 * fact.volume)} mL`;
  return ` with ${amountOf(mol)}${volume}`;
}
