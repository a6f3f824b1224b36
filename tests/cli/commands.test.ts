/** Every command of the built command line: text, data, standard input and exit codes. */
import { spawn, spawnSync } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, test } from 'vitest';

const folder = mkdtempSync(join(tmpdir(), 'lyate-commands-'));
afterAll(() => rmSync(folder, { recursive: true }));
const file = (name: string, text: string) => {
  writeFileSync(join(folder, name), text);
  return join(folder, name);
};

function lyate(words: readonly string[], input = '') {
  return spawnSync(process.execPath, ['dist/lyate.cjs', ...words], {
    encoding: 'utf8',
    input,
    timeout: 30_000,
    env: { ...process.env, NO_COLOR: '1' },
  });
}

const UPHILL = `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
`;
const CLEAN = `compound M = CCOC(=O)[CH2:1]C(=O)OCC
step A
  solvent EtOH 50 mL
  charge M 10 mmol
  base NaOEt 1.05 equiv
  deprotonate M at :1
`;
const WARNS = 'step A\n  solvent THF 20 mL\n  charge benzaldehyde 5 mmol\n  base NaCl 1 equiv\n';
const uphill = file('uphill.lyate', UPHILL);
const clean = file('clean.lyate', CLEAN);
const warns = file('warns.lyate', WARNS);

test('check: exit code 1 from the limit on, 0 below, 2 for what cannot be run', () => {
  expect(lyate(['check', uphill]).status).toBe(1);
  expect(lyate(['check', clean])).toMatchObject({
    status: 0,
    stdout: '1 plan checked: 0 errors, 0 warnings, 0 for information.\n',
  });
  expect(lyate(['check', warns]).status).toBe(0);
  expect(lyate(['check', warns, '--fail-on', 'warning']).status).toBe(1);
  expect(lyate(['check', warns, '--max-warnings', '0']).status).toBe(1);
  expect(lyate(['check', '--fail-on', 'never', warns]).status).toBe(2);
  expect(lyate(['check', '--no-such-option', warns]).status).toBe(2);
  expect(lyate(['nonsense']).status).toBe(2);
});

test('check: the published case has its figures on the right atom and base', () => {
  const { stdout } = lyate(['check', '--format', 'json', uphill]);
  const [finding, ...others] = JSON.parse(stdout).files[0].findings;
  expect(others).toEqual([]);
  expect(finding).toMatchObject({ check: 'transfer-uphill', severity: 'error', step: 'A' });
  expect(finding.range).toEqual({ start: { line: 5, character: 19 }, end: { line: 5, character: 21 } });
  // Water 15.738 (definition); acetophenone 18.3 (Keeffe, Kresge 1990).
  expect(finding.figures.deltaPKa).toBeCloseTo(15.738 - 18.3, 1);
  // [enolate]/[ketone] = K [OH−]/[H2O], with 11 mmol of hydroxide in 30 mL.
  const worked = (10 ** (15.738 - 18.3) * (11 / 30)) / 55.3;
  expect(finding.figures.extent / worked).toBeGreaterThan(0.7);
  expect(finding.figures.extent / worked).toBeLessThan(1.4);
  const lines = UPHILL.split('\n');
  const places = finding.related.map(
    ({ range }: { range: { start: { line: number; character: number }; end: { character: number } } }) =>
      lines[range.start.line]!.slice(range.start.character, range.end.character),
  );
  expect(places).toEqual(expect.arrayContaining(['NaOH', 'water']));
});

test('check: SARIF, JUnit and remarks of hosting services come from the same findings', () => {
  const sarif = JSON.parse(lyate(['check', '--format', 'sarif', uphill]).stdout);
  expect(sarif.version).toBe('2.1.0');
  expect(sarif.runs[0].results[0]).toMatchObject({ ruleId: 'transfer-uphill', level: 'error' });
  expect(lyate(['check', '--format', 'junit', uphill]).stdout).toContain('failures="1"');
  expect(lyate(['check', '--format', 'github', uphill]).stdout).toMatch(/^::error file=.*,line=6,/);
  expect(JSON.parse(lyate(['check', '--format', 'gitlab', uphill]).stdout)).toHaveLength(1);
});

test('check: a plan on standard input goes by the name it is given', () => {
  const { status, stdout } = lyate(
    ['check', '--stdin', '--name', 'notes.md', '--format', 'json'],
    `# Day

\`\`\`lyate
${UPHILL}\`\`\`
`,
  );
  const [{ file: name, findings }] = JSON.parse(stdout).files;
  expect([status, name]).toEqual([1, 'notes.md']);
  expect(findings.map(({ range }: { range: { start: { line: number } } }) => range.start.line)).toEqual([8]);
});

test('check: a share of confidence leaves findings out and refuses what is none', () => {
  const doubtful = file(
    'doubtful.lyate',
    'compound P = COC(=O)[CH2:1]C(=O)OC\nstep A\n  solvent CH2Cl2 20 mL\n  charge P 5 mmol\n  base DBU 1 equiv\n  deprotonate P at :1\n',
  );
  expect(lyate(['check', doubtful]).stdout).toContain('1 warning,');
  expect(lyate(['check', doubtful, '--min-confidence', '0.99']).stdout).toContain('0 warnings,');
  expect(lyate(['check', uphill, '--min-confidence', '2']).status).toBe(2);
});

test('check --ndjson: one answer a line, in order, one for one', () => {
  const records = [
    JSON.stringify({ id: 'a', text: UPHILL }),
    'not JSON',
    JSON.stringify({ id: 7, text: CLEAN }),
    JSON.stringify({ id: 'c' }),
    '[1]',
    JSON.stringify({ text: WARNS }),
  ];
  const { status, stdout } = lyate(['check', '--ndjson'], `${records.join('\n')}\n`);
  expect(status).toBe(0);
  const answers = stdout
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line));
  expect(answers.map(({ id }) => id)).toEqual(['a', null, 7, 'c', null, null]);
  const checks = (answer: { findings: { check: string }[] }) => answer.findings.map(({ check }) => check);
  expect(checks(answers[0])).toEqual(['transfer-uphill']);
  expect(answers[1].error).toBe('not JSON');
  expect(checks(answers[2])).toEqual([]);
  expect(answers[3].error).toContain('"text"');
  expect(answers[4].error).toBeDefined();
  expect(checks(answers[5])).toEqual(['not-a-base']);
});

test('sites: text, one object, and one a line', () => {
  const text = lyate(['sites', 'Oc1ccccc1']);
  expect(text.stdout).toMatch(/^Oc1ccccc1 on the water scale\n/);
  expect(text.stdout).toMatch(/ O0 +phenol +9\.99 ± /);
  const record = JSON.parse(lyate(['sites', 'Oc1ccccc1', '--format', 'json', '--in', 'DMSO']).stdout);
  const phenol = record.sites.find(({ group }: { group: string }) => group === 'phenol');
  expect(phenol).toMatchObject({
    atom: 0,
    element: 'O',
    holdsProton: true,
    scale: 'DMSO',
    origin: 'measured',
  });
  expect(phenol.pKa).toBeCloseTo(18, 1);
  const { stdout, status } = lyate(['sites', '-', '--estimate-only'], 'CC(=O)O\n\nC1CC\nCCN\n');
  const lines = stdout
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line));
  expect(status).toBe(0);
  expect(lines.map(({ smiles }) => smiles)).toEqual(['CC(=O)O', 'C1CC', 'CCN']);
  expect(lines[1].error).toBe('The ring is not closed.');
  for (const { origin, pKa } of [...lines[0].sites, ...lines[2].sites]) {
    expect(origin).not.toBe('measured');
    expect(pKa).toBeGreaterThanOrEqual(-15);
    expect(pKa).toBeLessThanOrEqual(60);
  }
  expect(lyate(['sites', 'C1CC']).status).toBe(2);
});

test('flask: the balance of a buffer, one state for each line that changes it', () => {
  const buffer = file(
    'buffer.lyate',
    'step A\n  solvent water 1 L\n  charge KH2PO4 0.025 mol\n  charge Na2HPO4 0.025 mol\n',
  );
  const { step, states } = JSON.parse(lyate(['flask', buffer, '--step', 'A', '--format', 'json']).stdout);
  expect(step).toBe('A');
  expect(states.map(({ line }: { line: number }) => line)).toEqual([1, 2, 3]);
  const last = states.at(-1);
  expect(Math.abs(last.pH - 6.865)).toBeLessThan(0.02);
  expect(Math.abs(last.residual)).toBeLessThan(1e-9);
  expect(last.ionicStrength).toBeCloseTo(0.1, 2);
  const acid = last.couples.find(
    ({ group, pKa }: { group: string; pKa: number }) => group.startsWith('phosph') && 6 < pKa && pKa < 8,
  );
  expect(acid).toMatchObject({ atom: expect.any(Number), amount: expect.any(Number) });
  expect(lyate(['flask', buffer, '--step', 'A']).stdout).toContain('pH 6.8');
  expect(lyate(['flask', buffer, '--step', 'Q']).status).toBe(2);
});

test('window: words and data; an unknown solvent is said', () => {
  expect(lyate(['window', 'water', 'DMSO']).stdout).toMatch(
    /^water +own: 0\.0 to 14\.0.*\nDMSO +own: 0\.0 to/,
  );
  const { solvents } = JSON.parse(lyate(['window', 'H2O', '--format', 'json']).stdout);
  expect(solvents[0]).toMatchObject({ name: 'water', own: { low: 0, high: 13.995 } });
  expect(lyate(['window', 'unobtainium'])).toMatchObject({
    status: 2,
    stderr: 'lyate: no solvent is called unobtainium\n',
  });
});

test('explain: a page, the list, and an unknown name', () => {
  expect(lyate(['explain', 'transfer-uphill']).stdout).toMatch(/^# transfer-uphill\n/);
  expect(lyate(['explain']).stdout).toMatch(/^text\n {2}accept-without-effect /);
  expect(lyate(['explain', 'no-such-check']).status).toBe(2);
});

test('format: prints, checks and writes', () => {
  const ragged = file('ragged.lyate', 'step   A\nsolvent THF   20 mL\n');
  const laidOut = 'step A\n  solvent     THF 20 mL\n';
  expect(lyate(['format', ragged])).toMatchObject({ status: 0, stdout: laidOut });
  expect(lyate(['format', '--check', ragged])).toMatchObject({ status: 1, stdout: `${ragged}\n` });
  expect(lyate(['format', '--write', ragged]).status).toBe(0);
  expect(readFileSync(ragged, 'utf8')).toBe(laidOut);
  expect(lyate(['format', '--check', ragged])).toMatchObject({ status: 0, stdout: '' });
  expect(lyate(['format', join(folder, 'nowhere.lyate')]).status).toBe(2);
});

test('serve: answers an editor and ends when told', async () => {
  const server = spawn(process.execPath, ['dist/lyate.cjs', 'serve', '--stdio']);
  let out = '';
  const heard = (words: string) =>
    new Promise<void>((resolve) => {
      server.stdout.on('data', (part: Buffer) => {
        out += part.toString();
        if (out.includes(words)) resolve();
      });
    });
  const send = (body: object) => {
    const text = JSON.stringify({ jsonrpc: '2.0', ...body });
    server.stdin.write(`Content-Length: ${Buffer.byteLength(text)}\r\n\r\n${text}`);
  };
  send({ id: 1, method: 'initialize', params: { processId: null, rootUri: null, capabilities: {} } });
  await heard('"hoverProvider"');
  send({ id: 2, method: 'shutdown' });
  await heard('"id":2');
  const ended = once(server, 'exit');
  send({ method: 'exit' });
  expect(await ended).toEqual([0, null]);
});

test('the version and the help are on standard output', () => {
  expect(lyate(['--version']).stdout).toMatch(/^lyate \d+\.\d+\.\d+, tables \S+\n$/);
  expect(lyate(['--help'])).toMatchObject({ status: 0, stdout: expect.stringContaining('Usage: lyate') });
});
