/** Bad input through the built command line: one finding at the exact place, everything else analysed. */
import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, test } from 'vitest';
import type { Finding } from '../../server/src/checks/finding.ts';

/** A step that is always found at fault: that it is shows that the rest of a plan was analysed. */
const REST = 'step Z\n  solvent THF 20 mL\n  charge benzaldehyde 5 mmol\n  base NaCl 1 equiv\n';
const LONG = 5_000_000;
const structure = (smiles: string) =>
  `compound 1 = ${smiles}\nstep A\n  solvent THF 20 mL\n  charge 1 5 mmol\n`;

type Case = readonly [
  name: string,
  plan: string,
  check: string,
  line: number,
  from: number,
  to: number,
  says: string,
];
const CASES: readonly Case[] = [
  ['unreadable-line', 'step A\n  chrage 1 5 mmol\n', 'unreadable-line', 1, 2, 8, 'no keyword'],
  ['unclosed-ring', structure('CC(=O)c1ccccc'), 'unreadable-structure', 0, 20, 21, 'ring is not closed'],
  ['impossible-valence', structure('CC(C)(C)(C)C'), 'impossible-valence', 0, 14, 15, 'at most 4'],
  ['unknown-name', 'step A\n  solvent THFF 20 mL\n', 'unknown-name', 1, 10, 14, 'did you mean THF'],
  ['below-nothing', 'step A\n  charge benzaldehyde −3 mmol\n', 'bad-unit', 1, 22, 24, 'below nothing'],
  [
    'beyond-numbers',
    'step A\n  charge benzaldehyde 1e400 mmol\n',
    'bad-unit',
    1,
    22,
    27,
    'larger than any flask',
  ],
  ['cycle-a', 'use "cycle-b.lyate"\n', 'bad-use', 0, 4, 19, 'cycle-a.lyate → cycle-b.lyate'],
  ['cycle-b', 'use "cycle-a.lyate"\n', 'bad-use', 0, 4, 19, 'cycle-b.lyate → cycle-a.lyate'],
  ['itself', 'use "itself.lyate"\n', 'bad-use', 0, 4, 18, 'brings itself in'],
  ['outside', 'use "../../../../etc/passwd"\n', 'bad-use', 0, 4, 28, 'out of the workspace'],
  ['rooted', 'use "/etc/passwd"\n', 'bad-use', 0, 4, 17, ''],
  ['not-there', 'use "nowhere.lyate"\n', 'bad-use', 0, 4, 19, ''],
  ['long-line', `${'z'.repeat(LONG)}\n`, 'unreadable-line', 0, 0, LONG, 'longer than'],
  ['long-smiles', `compound 1 = ${'C'.repeat(LONG)}\n`, 'unreadable-line', 0, 0, LONG + 13, 'longer than'],
  ['long-note', `note "${'x'.repeat(LONG)}"\n`, 'unreadable-line', 0, 0, LONG + 7, 'longer than'],
  ['nul', 'step A\n  solvent TH\0F 20 mL\n', 'unknown-name', 1, 10, 14, ''],
  ['crlf', 'step A\r\n  chrage 1 5 mmol\r\n', 'unreadable-line', 1, 2, 8, 'no keyword'],
  ['byte-order-mark', '\ufeffstep A\n  chrage 1 5 mmol\n', 'unreadable-line', 1, 2, 8, 'no keyword'],
  ['emoji', 'step A "🧪 µ"\n  charge benzaldehyde 5 mmol 🧪\n', 'unreadable-line', 1, 29, 31, ''],
  ['micro', 'step A\n  charge benzaldehyde 510 µL 2 µz\n', 'bad-unit', 1, 31, 33, 'µz'],
  ['after-emoji', 'step A "🧪🧪" chrage\n', 'unreadable-line', 0, 14, 20, ''],
];

const folder = mkdtempSync(join(tmpdir(), 'lyate-bad-'));
mkdirSync(join(folder, 'plans'));
for (const [name, plan] of CASES) writeFileSync(join(folder, 'plans', `${name}.lyate`), plan + REST);
writeFileSync(join(folder, 'not-utf8.lyate'), Buffer.from([0x73, 0xff, 0xfe, 0x0a]));
afterAll(() => rmSync(folder, { recursive: true }));

function lyate(...words: string[]) {
  return spawnSync(process.execPath, ['dist/lyate.cjs', ...words], {
    encoding: 'utf8',
    maxBuffer: 1 << 28,
    timeout: 30_000,
  });
}

const run = lyate('check', join(folder, 'plans'), '--format', 'json');
const byName = new Map<string, Finding[]>(
  (JSON.parse(run.stdout) as { files: { file: string; findings: Finding[] }[] }).files.map(
    ({ file, findings }) => [file.split('/').at(-1)!.replace('.lyate', ''), findings],
  ),
);

test('nothing of it stops the command line', () => {
  expect(run.stderr).toBe('');
  expect(run.status).toBe(1);
  expect(byName.size).toBe(CASES.length);
});

test.each(CASES)('%s', (name, plan, check, line, from, to, says) => {
  const findings = byName.get(name)!;
  const restAt = plan.split('\n').length - 1;
  expect(findings.map((finding) => finding.check)).toEqual([check, 'not-a-base']);
  expect(findings[0]!.range).toEqual({
    start: { line, character: from },
    end: { line, character: to },
  });
  expect(findings[0]!.severity).toBe('error');
  expect(findings[0]!.message).toContain(says);
  expect(findings[1]!.range.start).toEqual({ line: restAt + 3, character: 7 });
});

test('what is not text, or not there, ends with exit code 2 and says so; the rest is checked', () => {
  const { status, stderr, stdout } = lyate(
    'check',
    join(folder, 'not-utf8.lyate'),
    join(folder, 'nowhere.lyate'),
    join(folder, 'plans', 'crlf.lyate'),
  );
  expect(status).toBe(2);
  expect(stderr).toMatch(/not-utf8\.lyate is not UTF-8 text/);
  expect(stderr).toMatch(/nowhere\.lyate does not exist/);
  expect(stdout).toContain('unreadable-line');
});

test('the report of a terminal holds no control sign of a plan', () => {
  const { stdout, status } = lyate('check', join(folder, 'plans', 'nul.lyate'));
  expect(status).toBe(1);
  expect(stdout).toContain('TH␀F');
  // biome-ignore lint/suspicious/noControlCharactersInRegex: their absence is what is tested
  expect(stdout).not.toMatch(/[\u0000-\u0008\u000b-\u001f]/);
});

test('compounds of another file are used, with their measured values', () => {
  writeFileSync(
    join(folder, 'shared.lyate'),
    'compound K = O=C([CH3:1])c1ccccc1\n  measured pKa 12.0 at :1 in water source "notebook 3"\n',
  );
  const step =
    'step A\n  solvent water 30 mL\n  charge K 1 mmol\n  base NaOH 1.2 equiv\n  deprotonate K at :1\n';
  writeFileSync(join(folder, 'uses.lyate'), `use "shared.lyate"\n${step}`);
  writeFileSync(join(folder, 'alone.lyate'), `compound K = O=C([CH3:1])c1ccccc1\n${step}`);
  const uses = lyate('check', join(folder, 'uses.lyate'));
  const alone = lyate('check', join(folder, 'alone.lyate'));
  expect([uses.status, uses.stdout]).toEqual([
    0,
    expect.stringContaining('1 plan checked: 0 errors, 0 warnings'),
  ]);
  expect(alone.status).toBe(1);
  expect(alone.stdout).toContain('transfer-uphill');
});
