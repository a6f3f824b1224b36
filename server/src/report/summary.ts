/**
 * Counts findings and orders severities, for every form of report alike.
 *
 * Knows: findings.  Must not know: how they are printed.
 */
import type { Finding, Severity } from '../checks/finding.ts';

/** From the least to the most severe. */
export const SEVERITIES: readonly Severity[] = ['hint', 'information', 'warning', 'error'];

/** What a report is about: one file as it was given, its text, and what was found in it. */
export interface FileFindings {
  readonly file: string;
  readonly text: string;
  readonly findings: readonly Finding[];
  /** Those that a baseline knows; absent where none was asked. */
  readonly known?: readonly Finding[];
}

/** Whether one severity is at least as bad as another. */
export function atLeast(severity: Severity, limit: Severity): boolean {
  return SEVERITIES.indexOf(limit) <= SEVERITIES.indexOf(severity);
}

/** Number of findings of each severity that nobody has accepted. */
export function countOpen(files: readonly FileFindings[]): Record<Severity, number> {
  const counts: Record<Severity, number> = { hint: 0, information: 0, warning: 0, error: 0 };
  for (const { findings } of files) {
    for (const { severity, accepted } of findings) if (!accepted) counts[severity] += 1;
  }
  return counts;
}
