/** Reports of findings line by line: for a terminal, for machines and for hosting services. */
import { expect, test } from 'vitest';
import type { Finding } from '../../server/src/checks/finding.ts';
import { githubReport, gitlabReport } from '../../server/src/report/annotations.ts';
import { fingerprint } from '../../server/src/report/fingerprint.ts';
import { jsonReport, plainFinding } from '../../server/src/report/json.ts';
import { junitReport } from '../../server/src/report/junit.ts';
import { plain, plainLine } from '../../server/src/report/plain.ts';
import { atLeast, countOpen } from '../../server/src/report/summary.ts';
import { textReport } from '../../server/src/report/text.ts';

const TEXT = [
  'step A "🧪 at −78 °C"',
  '\tbase 🧪NaOH 1 equiv // here',
  `note "${'x'.repeat(400)}NaOH"`,
  '',
].join('\n');

function finding(changes: Partial<Finding> = {}): Finding {
  return {
    check: 'transfer-uphill',
    severity: 'error',
    confidence: 0.99,
    step: 'A',
    range: { start: { line: 1, character: 8 }, end: { line: 1, character: 12 } },
    message: 'NaOH is 2.6 ± 0.6 units too weak.',
    figures: { logK: -2.6, extent: 0.0005 },
    related: [],
    accepted: false,
    reason: null,
    ...changes,
  };
}
const at = (line: number, from: number, to: number, endLine = line) => ({
  start: { line, character: from },
  end: { line: endLine, character: to },
});
const report = (...findings: Finding[]) => textReport([{ file: 'a.lyate', text: TEXT, findings }]);

test('carets stand under the range, behind tabs and behind signs of two code units', () => {
  expect(report(finding())).toBe(`a.lyate:2:9 error transfer-uphill (step A)
  NaOH is 2.6 ± 0.6 units too weak.
    2 | \tbase 🧪NaOH 1 equiv // here
      | \t       ^^^^

1 plan checked: 1 error, 0 warnings, 0 for information.
`);
});

test('a long line is cut around the range', () => {
  const lines = report(finding({ range: at(2, 406, 410) })).split('\n');
  expect(lines[2]!.length).toBeLessThan(200);
  const column = lines[3]!.indexOf('^');
  expect(lines[2]!.slice(column, column + 4)).toBe('NaOH');
  expect(lines[3]).toMatch(/\^{4}$/);
});

test('a range over several lines is underlined to the end of its first, an empty one by one caret', () => {
  expect(report(finding({ range: at(0, 0, 3, 1) })).split('\n')[3]).toBe(`      | ${'^'.repeat(21)}`);
  expect(report(finding({ range: at(0, 5, 5) })).split('\n')[3]).toBe('      |      ^');
});

test('a blank line and a line that is not there have no excerpt', () => {
  for (const line of [3, 99]) expect(report(finding({ range: at(line, 0, 1) }))).not.toContain('|');
});

test('accepted findings and related places are named', () => {
  const related = [
    { range: at(0, 5, 6), message: 'the step' },
    { range: at(4, 0, 1), message: 'defined here', file: 'b.lyate' },
  ];
  const text = report(finding({ accepted: true, reason: 'pilot\u001b[31m batch', related }));
  expect(text).toContain('  accepted: pilot␛[31m batch\n');
  expect(text).toContain('    1:6 the step\n');
  expect(text).toContain('    b.lyate:5:1 defined here\n');
  expect(text).toContain('1 plan checked: 0 errors, 0 warnings, 0 for information, 1 accepted.\n');
});

test('counts are in the number of what they count', () => {
  const findings = [
    finding({ severity: 'warning' }),
    finding({ severity: 'warning' }),
    finding({ severity: 'hint' }),
    finding({ severity: 'information' }),
  ];
  expect(report(...findings)).toMatch(/1 plan checked: 0 errors, 2 warnings, 2 for information\.\n$/);
  expect(textReport([])).toBe('0 plans checked: 0 errors, 0 warnings, 0 for information.\n');
});

test('JSON has the documented fields and no others', () => {
  const related = [{ range: at(0, 0, 1), message: 'base', absolute: true }];
  const { version, files } = JSON.parse(
    jsonReport([{ file: 'plans/a.lyate', text: TEXT, findings: [finding({ related })] }]),
  );
  expect(version).toBe(1);
  expect(files).toEqual([
    {
      file: 'plans/a.lyate',
      findings: [
        {
          check: 'transfer-uphill',
          severity: 'error',
          confidence: 0.99,
          step: 'A',
          range: at(1, 8, 12),
          message: 'NaOH is 2.6 ± 0.6 units too weak.',
          figures: { logK: -2.6, extent: 0.0005 },
          related: [{ range: at(0, 0, 1), message: 'base' }],
          accepted: false,
          reason: null,
        },
      ],
    },
  ]);
  expect(Object.keys(plainFinding(finding()))).toEqual([
    'check',
    'severity',
    'confidence',
    'step',
    'range',
    'message',
    'figures',
    'related',
    'accepted',
    'reason',
  ]);
});

test('JUnit has a case for each finding, failed from the limit on, and one for a plan without', () => {
  const xml = junitReport(
    [
      {
        file: 'a&b.lyate',
        text: TEXT,
        findings: [
          finding({ message: 'K < 1 & "no" \ud800' }),
          finding({ severity: 'warning' }),
          finding({ accepted: true, reason: 'known' }),
        ],
      },
      { file: 'clean.lyate', text: '', findings: [] },
    ],
    'error',
  );
  expect(xml.match(/<testcase /g)).toHaveLength(4);
  expect(xml).toContain('<testsuite name="a&amp;b.lyate" tests="3" failures="1">');
  expect(xml).toContain('<failure type="error" message="K &lt; 1 &amp; &quot;no&quot; \ufffd"/>');
  expect(xml).toContain('<testcase classname="a&amp;b.lyate step A" name="transfer-uphill 2:9">');
  expect(xml).toContain('<testcase classname="clean.lyate" name="no findings"/>');
});

test('JUnit fails warnings too where they are the limit', () => {
  const files = [{ file: 'a.lyate', text: TEXT, findings: [finding({ severity: 'warning' })] }];
  expect(junitReport(files, 'warning')).toContain('failures="1"');
  expect(junitReport(files, 'error')).toContain('failures="0"');
});

test('workflow commands are escaped, one a line, without what was accepted', () => {
  const out = githubReport([
    {
      file: 'a,b:c.lyate',
      text: TEXT,
      findings: [finding({ message: '100 %\n::error::x' }), finding({ accepted: true })],
    },
    { file: 'b.lyate', text: TEXT, findings: [finding({ severity: 'hint', range: at(0, 0, 1) })] },
  ]);
  expect(out).toBe(
    [
      '::error file=a%2Cb%3Ac.lyate,line=2,endLine=2,col=9,title=transfer-uphill::100 %25 ::error::x',
      '::notice file=b.lyate,line=1,endLine=1,col=1,title=transfer-uphill::NaOH is 2.6 ± 0.6 units too weak.',
      '',
    ].join('\n'),
  );
});

test('the code quality file names place, severity and fingerprint', () => {
  const [entry, ...others] = JSON.parse(
    gitlabReport([{ file: 'a.lyate', text: TEXT, findings: [finding(), finding({ accepted: true })] }]),
  );
  expect(others).toEqual([]);
  expect(entry).toMatchObject({
    check_name: 'transfer-uphill',
    severity: 'critical',
    location: { path: 'a.lyate', lines: { begin: 2 } },
  });
  expect(entry.fingerprint).toMatch(/^[0-9a-f]{16}$/);
});

test('a fingerprint stays when lines move and changes with check, step and line', () => {
  const lines = TEXT.split('\n');
  const here = fingerprint(finding(), lines);
  const moved = finding({ range: at(2, 4, 8) });
  expect(fingerprint(moved, ['new', ...lines])).toBe(here);
  expect(fingerprint(moved, ['new', lines[0]!, `    ${lines[1]}  `])).toBe(here);
  const others = [
    fingerprint(finding({ check: 'base-short' }), lines),
    fingerprint(finding({ step: 'B' }), lines),
    fingerprint(finding({ step: null }), lines),
    fingerprint(finding({ range: at(0, 0, 1) }), lines),
  ];
  expect(new Set([here, ...others]).size).toBe(5);
  // FNV-1a, 64 bit, of the bytes "a", 0, 0: worked by its published definition.
  expect(fingerprint(finding({ check: 'a', step: null, range: at(9, 0, 0) }), [])).toBe(fnv([97, 0, 0]));
});

/** FNV-1a as published, in halves of 32 bits, apart from the program's own way. */
function fnv(bytes: readonly number[]): string {
  let value = 14695981039346656037n;
  for (const byte of bytes) value = BigInt.asUintN(64, (value ^ BigInt(byte)) * 1099511628211n);
  return value.toString(16).padStart(16, '0');
}

test('no control or direction sign comes through', () => {
  for (let code = 0; code < 0x2100; code++) {
    const shown = plain(String.fromCharCode(code));
    const isControl = (code < 0x20 && code !== 9 && code !== 10) || (0x7f <= code && code < 0xa0);
    if (isControl) expect(shown).not.toBe(String.fromCharCode(code));
  }
  expect(plain('a\u202eb\u2028c')).toBe('a\ufffdb\ufffdc');
  expect(plainLine('a\r\n\tb\u001bc')).toBe('a b␛c');
  expect(plain('µ ° 🧪 −')).toBe('µ ° 🧪 −');
});

test('severities are in their order and accepted findings are not open', () => {
  expect(atLeast('error', 'warning')).toBe(true);
  expect(atLeast('warning', 'warning')).toBe(true);
  expect(atLeast('information', 'warning')).toBe(false);
  const files = [{ file: 'a', text: '', findings: [finding(), finding({ accepted: true })] }];
  expect(countOpen(files)).toEqual({ error: 1, warning: 0, information: 0, hint: 0 });
});
