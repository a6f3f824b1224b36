/**
 * Findings as the log lines and files that hosting services turn into remarks beside the changed lines.
 *
 * Knows: findings.  Must not know: where they are written to.
 */
import type { Severity } from '../checks/finding.ts';
import { fingerprint } from './fingerprint.ts';
import { plainLine } from './plain.ts';
import type { FileFindings } from './summary.ts';

const COMMANDS: Record<Severity, string> = {
  error: 'error',
  warning: 'warning',
  information: 'notice',
  hint: 'notice',
};
const QUALITY: Record<Severity, string> = {
  error: 'critical',
  warning: 'major',
  information: 'info',
  hint: 'info',
};

/** Workflow commands of GitHub Actions, one line for each open finding. */
export function githubReport(files: readonly FileFindings[]): string {
  const lines = files.flatMap(({ file, findings }) =>
    findings
      .filter(({ accepted }) => !accepted)
      .map(({ severity, check, message, range }) => {
        const place = [
          `file=${property(file)}`,
          `line=${range.start.line + 1}`,
          `endLine=${range.end.line + 1}`,
          `col=${range.start.character + 1}`,
          `title=${property(check)}`,
        ].join(',');
        return `::${COMMANDS[severity]} ${place}::${data(message)}`;
      }),
  );
  return lines.map((line) => `${line}\n`).join('');
}

/** The code quality file of GitLab. */
export function gitlabReport(files: readonly FileFindings[]): string {
  const entries = files.flatMap(({ file, text, findings }) => {
    const lines = text.split(/\r\n|\n|\r/);
    return findings
      .filter(({ accepted }) => !accepted)
      .map((finding) => ({
        description: finding.message,
        check_name: finding.check,
        fingerprint: fingerprint(finding, lines),
        severity: QUALITY[finding.severity],
        location: { path: file, lines: { begin: finding.range.start.line + 1 } },
      }));
  });
  return `${JSON.stringify(entries, null, 1)}\n`;
}

function data(text: string): string {
  return plainLine(text).replaceAll('%', '%25').replaceAll('\r', '%0D').replaceAll('\n', '%0A');
}

function property(text: string): string {
  return data(text).replaceAll(':', '%3A').replaceAll(',', '%2C');
}
