/**
 * A plan with everything that the analysis found out about it; every answer is a function of this.
 *
 * Knows: plans, facts, findings.  Must not know: the protocol, files on disk, how anything is shown.
 */
import type { StepFacts } from '../checks/facts.ts';
import type { Finding } from '../checks/finding.ts';
import type { Settings } from '../checks/settings.ts';
import type { Plan } from '../route/plan.ts';
import type { Tables } from '../tables/tables.ts';

export interface SourceText {
  /** As the host names it; only compared and handed back. */
  readonly file: string;
  readonly text: string;
  readonly language: 'lyate' | 'markdown';
}

export interface AnalysedStep {
  readonly facts: StepFacts;
  /** Ranges relative to the step's first line. */
  readonly findings: readonly Finding[];
}

export interface Analysed {
  readonly source: SourceText;
  readonly plan: Plan;
  /** One for each step of the plan, in order. */
  readonly steps: readonly AnalysedStep[];
  /** Of the whole file, in the order of the text. */
  readonly findings: readonly Finding[];
  readonly tables: Tables;
  readonly settings: Settings;
}
