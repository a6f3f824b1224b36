/**
 * Finds the step and the statement at a line of the document.
 *
 * Knows: plans.  Must not know: findings, the protocol.
 */
import type { Statement } from '../route/plan.ts';
import type { Analysed, AnalysedStep } from './types.ts';

export interface StepAt {
  readonly step: AnalysedStep;
  readonly firstLine: number;
  /** Null on the step's own line, blank lines and remarks. */
  readonly statement: Statement | null;
}

/** The step that holds a line; null before the first one. */
export function stepAt({ plan, steps }: Analysed, line: number): StepAt | null {
  let low = 0;
  let high = plan.steps.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (plan.steps[middle]!.firstLine <= line) low = middle + 1;
    else high = middle;
  }
  const placed = plan.steps[low - 1];
  const step = steps[low - 1];
  if (placed === undefined || step === undefined || placed.firstLine + placed.lineCount <= line) return null;
  const within = line - placed.firstLine;
  const statement = placed.statements.find(({ range }) => range.start.line === within) ?? null;
  return { step, firstLine: placed.firstLine, statement };
}
