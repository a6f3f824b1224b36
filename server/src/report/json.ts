/**
 * Findings for machines, in the form that the command line documents.
 *
 * Knows: findings.  Must not know: where they are written to.
 */
import type { Finding } from '../checks/finding.ts';
import type { FileFindings } from './summary.ts';

/** `{"version":1,"files":[…]}`; positions as in the language server protocol. */
export function jsonReport(files: readonly FileFindings[]): string {
  return `${JSON.stringify({ version: 1, files: files.map(({ file, findings }) => ({ file, findings: findings.map(plainFinding) })) })}\n`;
}

/** One finding with exactly the documented fields. */
export function plainFinding({
  check,
  severity,
  confidence,
  step,
  range,
  message,
  figures,
  related,
  accepted,
  reason,
}: Finding) {
  return {
    check,
    severity,
    confidence,
    step,
    range,
    message,
    figures,
    related: related.map(({ range, message, file }) => ({
      range,
      message,
      ...(file === undefined ? {} : { file }),
    })),
    accepted,
    reason,
  };
}
