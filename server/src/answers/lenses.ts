/**
 * One line above each step that sums up what was found in it.
 *
 * Knows: analysed plans.  Must not know: the protocol, commands.
 */
import type { Finding, Severity } from '../checks/finding.ts';
import type { Range } from '../route/plan.ts';
import { shiftRange } from './ranges.ts';
import type { Analysed } from './types.ts';

export interface Lens {
  readonly range: Range;
  readonly label: string;
  readonly title: string;
}

const WORDS: readonly [Severity, string, string][] = [
  ['error', 'error', 'errors'],
  ['warning', 'warning', 'warnings'],
  ['information', 'remark', 'remarks'],
];

/** One for each step. */
export function lensesOf({ plan, findings }: Analysed): Lens[] {
  const byStep = new Map<string, Finding[]>();
  for (const finding of findings) {
    if (finding.step === null) continue;
    const list = byStep.get(finding.step);
    if (list === undefined) byStep.set(finding.step, [finding]);
    else list.push(finding);
  }
  return plan.steps.map(({ label, range, firstLine }) => ({
    range: shiftRange(range, firstLine),
    label,
    title: summary(byStep.get(label) ?? []),
  }));
}

function summary(findings: readonly Finding[]): string {
  const open = findings.filter(({ accepted }) => !accepted);
  const parts = WORDS.flatMap(([severity, one, many]) => {
    const count = open.filter((finding) => finding.severity === severity).length;
    return count === 0 ? [] : [`${count} ${count === 1 ? one : many}`];
  });
  const accepted = findings.length - open.length;
  if (accepted !== 0) parts.push(`${accepted} accepted`);
  return parts.length === 0 ? 'Nothing found' : parts.join(', ');
}
