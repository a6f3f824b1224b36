/**
 * Findings as JUnit XML: a suite for each plan, a case for each finding or one that passed.
 *
 * Knows: findings.  Must not know: where they are written to.
 */

import type { Severity } from '../checks/finding.ts';
import { plainLine } from './plain.ts';
import { atLeast, type FileFindings } from './summary.ts';

/** Findings below `failOn` and accepted ones are cases that pass with their message as output. */
export function junitReport(files: readonly FileFindings[], failOn: Severity): string {
  const suites = files.map(({ file, findings }) => {
    const failed = findings.filter(({ severity, accepted }) => !accepted && atLeast(severity, failOn));
    const cases = findings.map((finding) => {
      const { check, range, severity, message, step } = finding;
      const name = `${check} ${range.start.line + 1}:${range.start.character + 1}`;
      const body = failed.includes(finding)
        ? `<failure type="${xml(severity)}" message="${xml(message)}"/>`
        : `<system-out>${xml(message)}</system-out>`;
      return `    <testcase classname="${xml(step === null ? file : `${file} step ${step}`)}" name="${xml(name)}">${body}</testcase>`;
    });
    const body = cases.length === 0 ? [`    <testcase classname="${xml(file)}" name="no findings"/>`] : cases;
    return [
      `  <testsuite name="${xml(file)}" tests="${body.length}" failures="${failed.length}">`,
      ...body,
      '  </testsuite>',
    ].join('\n');
  });
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    '<testsuites name="lyate">',
    ...suites,
    '</testsuites>',
    '',
  ].join('\n');
}

function xml(text: string): string {
  return plainLine(text)
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replace(
      /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]|[\ufffe\uffff]/g,
      '\ufffd',
    );
}
