/**
 * The form of a check: its identity and explanation beside a pure function from facts to findings.
 *
 * Knows: facts and findings.  Must not know: other checks, files, the protocol.
 * Invariants:
 *  1. A check reads only the facts it is handed, so the same step gives the same findings.   (tests/answers/analyse.test.ts)
 *  2. A check never accepts or drops a finding; that is decided once, for all of them.
 */
import type { Range, TextProblem } from '../route/plan.ts';
import type { StepFacts } from './facts.ts';
import type { Related, Severity } from './finding.ts';

export type Family =
  | 'text'
  | 'direction'
  | 'solvent'
  | 'reagents'
  | 'conversion'
  | 'cautions'
  | 'data'
  | 'program';

/** One finding as a check reports it; the step and the acceptance are added around it. */
export interface Report {
  readonly range: Range;
  readonly message: string;
  readonly severity?: Severity;
  readonly confidence?: number;
  readonly figures?: Readonly<Record<string, number | null>>;
  readonly related?: readonly Related[];
}

export interface CheckPages {
  /** Names the fault; also the name of the file. */
  readonly name: string;
  readonly family: Family;
  readonly severity: Severity;
  /** Off unless a setting turns it on. */
  readonly quiet?: boolean;
  /** One sentence. */
  readonly summary: string;
  readonly why: string;
  readonly remedy: string;
  readonly silentWhen: string;
  readonly sources: readonly string[];
  /** Plans that the tests run: the first raises this check, the second does not. Absent where text cannot raise it. */
  readonly wrong?: string;
  readonly right?: string;
}

export interface Check extends CheckPages {
  /** Findings of one step, ranges relative to its first line. */
  inStep?(facts: StepFacts): Iterable<Report>;
  /** Turns a problem that the reader found in the text into a finding. */
  fromText?(problem: TextProblem): Report;
}

/** Gives a check its type; a check whose faults the reader finds needs no function of its own. */
export function defineCheck(check: Check): Check {
  return check;
}

/** A check whose faults are found while the text is read and resolved. */
export function defineTextCheck(pages: CheckPages): Check {
  return {
    ...pages,
    fromText: (problem) => ({
      range: problem.range,
      message: problem.message,
      ...(problem.severity ? { severity: problem.severity } : {}),
      related: problem.related ?? [],
    }),
  };
}
