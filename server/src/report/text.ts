/**
 * Findings for a person at a terminal: place, message, the line of the plan and carets under it.
 *
 * Knows: findings and source text.  Must not know: files, exit codes.
 * Invariant: nothing from a plan reaches the terminal as a control sequence.   (tests/report/text.test.ts)
 */
import type { Finding, Severity } from '../checks/finding.ts';
import { plain, plainLine } from './plain.ts';
import { countOpen, type FileFindings } from './summary.ts';

export interface Paint {
  readonly severity: (severity: Severity, text: string) => string;
  readonly faint: (text: string) => string;
  readonly strong: (text: string) => string;
}

/** Paints nothing; for files, pipes and NO_COLOR. */
export const UNPAINTED: Paint = {
  severity: (_, text) => text,
  faint: (text) => text,
  strong: (text) => text,
};

const LONGEST_EXCERPT = 160;

/** The whole report; ends with a count. */
export function textReport(files: readonly FileFindings[], paint: Paint = UNPAINTED): string {
  const parts = files.filter(({ findings }) => findings.length !== 0).map((file) => fileReport(file, paint));
  return `${parts.join('\n')}${parts.length === 0 ? '' : '\n'}${countLine(files, paint)}\n`;
}

function fileReport({ file, text, findings }: FileFindings, paint: Paint): string {
  const lines = text.split(/\r\n|\n|\r/);
  return findings.map((finding) => findingReport(file, lines, finding, paint)).join('\n');
}

function findingReport(file: string, lines: readonly string[], finding: Finding, paint: Paint): string {
  const { start } = finding.range;
  const place = `${plainLine(file)}:${start.line + 1}:${start.character + 1}`;
  const step = finding.step === null ? '' : paint.faint(` (step ${plainLine(finding.step)})`);
  const head = `${paint.strong(place)} ${paint.severity(finding.severity, finding.severity)} ${finding.check}${step}`;
  const related = finding.related.map(({ range, message, file: other }) =>
    paint.faint(
      `    ${other === undefined ? '' : `${plainLine(other)}:`}${range.start.line + 1}:${range.start.character + 1} ${plainLine(message)}`,
    ),
  );
  const accepted = finding.accepted ? [`  accepted: ${plainLine(finding.reason ?? '')}`] : [];
  return [
    head,
    `  ${plain(finding.message)}`,
    ...accepted,
    ...excerpt(lines, finding, paint),
    ...related,
    '',
  ].join('\n');
}

/** The line of a finding with carets under its range; long lines are cut around it. */
function excerpt(lines: readonly string[], { range, severity }: Finding, paint: Paint): string[] {
  const line = lines[range.start.line];
  if (line === undefined || line.trim() === '') return [];
  const { character } = range.start;
  const end = range.end.line === range.start.line ? range.end.character : line.length;
  const from = character < LONGEST_EXCERPT ? 0 : character - LONGEST_EXCERPT / 2;
  const shown = plain(line.slice(from, from + LONGEST_EXCERPT));
  const blanks = plain(line.slice(from, character)).replace(/[^\t]/g, ' ');
  const width = Math.max(1, Math.min(end, from + LONGEST_EXCERPT) - character);
  const margin = `${range.start.line + 1}`.padStart(5);
  return [
    `${paint.faint(`${margin} |`)} ${shown}`,
    `${paint.faint('      |')} ${blanks}${paint.severity(severity, '^'.repeat(width))}`,
  ];
}

function countLine(files: readonly FileFindings[], paint: Paint): string {
  const counts = countOpen(files);
  const accepted = files.reduce(
    (sum, { findings }) => sum + findings.filter((finding) => finding.accepted).length,
    0,
  );
  const plural = (count: number, word: string) => `${count} ${word}${count === 1 ? '' : 's'}`;
  const words = [
    plural(counts.error, 'error'),
    plural(counts.warning, 'warning'),
    `${counts.information + counts.hint} for information`,
    ...(accepted === 0 ? [] : [`${accepted} accepted`]),
  ];
  return paint.strong(`${plural(files.length, 'plan')} checked: ${words.join(', ')}.`);
}
