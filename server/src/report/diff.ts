/**
 * What a change of a plan did to its findings: which appeared, which are gone, which moved or changed their degree.
 *
 * Knows: findings.  Must not know: where the two texts come from.
 * Invariant: a plan against itself, or against itself with lines moved, has no difference.   (tests/report/diff.test.ts)
 */
import type { Finding } from '../checks/finding.ts';
import { plainFinding } from './json.ts';
import { plainLine } from './plain.ts';
import type { FileFindings } from './summary.ts';

export interface Changed {
  readonly before: Finding;
  readonly after: Finding;
}

export interface Difference {
  readonly appeared: readonly Finding[];
  readonly gone: readonly Finding[];
  /** Same check and step, with another degree, other figures or another acceptance. */
  readonly changed: readonly Changed[];
  /** Same in all but the line it stands on. */
  readonly same: number;
}

/** How alike two findings of one check are; the best pairs are taken first. */
enum Likeness {
  Same = 3,
  SameLine = 2,
  SameStep = 1,
}

/** Pairs the findings of two texts: first those that are the same, then those on the same line, then those of a step. */
export function difference(before: FileFindings, after: FileFindings): Difference {
  const [oldLines, newLines] = [linesOf(before), linesOf(after)];
  const open = new Set(after.findings);
  const pairs = new Map<Finding, Finding>();
  for (const degree of [Likeness.Same, Likeness.SameLine, Likeness.SameStep]) {
    for (const old of before.findings) {
      if (pairs.has(old)) continue;
      const oldLine = oldLines[old.range.start.line] ?? '';
      const match = [...open].find(
        (fresh) => degree <= likeness(old, oldLine, fresh, newLines[fresh.range.start.line] ?? ''),
      );
      if (match === undefined) continue;
      pairs.set(old, match);
      open.delete(match);
    }
  }
  const changed = [...pairs]
    .map(([old, fresh]): Changed => ({ before: old, after: fresh }))
    .filter(({ before: old, after: fresh }) => !isSame(old, fresh));
  return {
    appeared: after.findings.filter((finding) => open.has(finding)),
    gone: before.findings.filter((finding) => !pairs.has(finding)),
    changed,
    same: pairs.size - changed.length,
  };
}

/** For people; empty sections are left out. */
export function differenceText({ appeared, gone, changed, same }: Difference): string {
  const lines = [
    ...appeared.map((finding) => `+ ${told(finding)}`),
    ...gone.map((finding) => `- ${told(finding)}`),
    ...changed.flatMap(({ before, after }) => [
      `~ ${told(after)}`,
      `    before: ${before.severity}${word(before)}, ${plainLine(before.message)}`,
    ]),
  ];
  const counts = `${appeared.length} appeared, ${gone.length} gone, ${changed.length} changed, ${same} as before.`;
  return `${[...lines, counts].join('\n')}\n`;
}

/** For machines: findings as `check` gives them. */
export function differenceRecord({ appeared, gone, changed, same }: Difference): object {
  return {
    version: 1,
    appeared: appeared.map(plainFinding),
    gone: gone.map(plainFinding),
    changed: changed.map(({ before, after }) => ({
      before: plainFinding(before),
      after: plainFinding(after),
    })),
    same,
  };
}

function told(finding: Finding): string {
  const { severity, check, step, range, message } = finding;
  const where = step === null ? '' : `step ${plainLine(step)}, `;
  return `${severity} ${check} (${where}line ${range.start.line + 1})${word(finding)}: ${plainLine(message)}`;
}

function word({ accepted, reason }: Finding): string {
  return accepted ? ` accepted: ${plainLine(reason ?? '')}` : '';
}

function likeness(old: Finding, oldLine: string, fresh: Finding, newLine: string): number {
  if (old.check !== fresh.check || old.step !== fresh.step) return 0;
  if (oldLine.trim() !== newLine.trim()) return Likeness.SameStep;
  return isSame(old, fresh) ? Likeness.Same : Likeness.SameLine;
}

function isSame(a: Finding, b: Finding): boolean {
  return (
    a.severity === b.severity && a.message === b.message && a.accepted === b.accepted && a.reason === b.reason
  );
}

function linesOf({ text }: FileFindings): string[] {
  return text.split(/\r\n|\n|\r/);
}
