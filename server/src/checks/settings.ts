/**
 * What a user may set about the checks, with the values that hold where nothing is set.
 *
 * Knows: names and numbers.  Must not know: where a setting was read from.
 */
import type { Severity } from './finding.ts';

export interface Thresholds {
  /** P(extent < 50 %) from which a transfer that fails is an error, a warning, and undecided. */
  readonly error: number;
  readonly warning: number;
  readonly undecided: number;
}

export interface Settings {
  /** Severity by check name; `off` silences a check. */
  readonly severities: Readonly<Record<string, Severity | 'off'>>;
  readonly thresholds: Thresholds;
  /** mol/L, for steps that write no volume. */
  readonly concentration: number;
}

export const DEFAULT_SETTINGS: Settings = {
  severities: {},
  thresholds: { error: 0.95, warning: 0.8, undecided: 0.2 },
  concentration: 0.2,
};

/** The smallest and the largest value of each number, wherever it is read from. */
export const LIMITS = {
  thresholds: {
    error: { low: 0.5, high: 1 },
    warning: { low: 0.5, high: 1 },
    undecided: { low: 0, high: 0.5 },
  },
  concentration: { low: 0.001, high: 20 },
} as const;
