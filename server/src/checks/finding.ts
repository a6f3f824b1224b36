/**
 * What a check says: one fact at one place, with its figures.
 *
 * Knows: ranges.  Must not know: how it is shown.
 */
import type { Range } from '../route/plan.ts';

export type Severity = 'error' | 'warning' | 'information' | 'hint';

export interface Related {
  readonly range: Range;
  readonly message: string;
  readonly file?: string;
  /** The range counts from the start of the file, not of the step: definitions outside any step. */
  readonly absolute?: boolean;
}

export interface Finding {
  readonly check: string;
  readonly severity: Severity;
  /** How sure, 0 … 1; severity says how bad. */
  readonly confidence: number;
  /** Label of the step; null outside steps. */
  readonly step: string | null;
  readonly range: Range;
  readonly message: string;
  readonly figures: Readonly<Record<string, number | null>>;
  readonly related: readonly Related[];
  readonly accepted: boolean;
  readonly reason: string | null;
}
