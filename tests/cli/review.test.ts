/** `lyate check` as reviewers use it: configuration, house files, baseline, limits, bad input. */
import { existsSync, mkdirSync, readFileSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { bundleProgram, type Ended, folderOf, start } from '../support/program.ts';

let program = '';
beforeAll(() => {
  program = bundleProgram();
});
const lyate = (cwd: string, words: readonly string[], input?: string | Uint8Array): Ended =>
  start(program, words, { cwd, ...(input === undefined ? {} : { input }) });

/** Sodium bicarbonate takes no proton from diethyl malonate. */
const UPHILL = `compound 1 = CCOC(=O)[CH2:1]C(=O)OCC
step A
  solvent EtOH 50 mL
  charge 1 10 mmol
  base NaHCO3 1.1 equiv
  deprotonate 1 at :1
`;
const checksIn = ({ stdout }: Ended): Record<string, string[]> =>
  Object.fromEntries(
    JSON.parse(stdout).files.map(
      ({ file, findings }: { file: string; findings: { check: string; severity: string }[] }) => [
        file,
        findings.map(({ check, severity }) => `${severity} ${check}`),
      ],
    ),
  );

describe('a configuration', () => {
  it('sets severities for all plans and for some, from the folder above', () => {
    const folder = folderOf({
      'lyate.json': JSON.stringify({
        severities: { 'transfer-uphill': 'warning' },
        overrides: [{ files: ['drafts/**'], severities: { 'transfer-uphill': 'off' } }],
        ignore: ['old/**'],
      }),
      'a.lyate': UPHILL,
      'drafts/b.lyate': UPHILL,
      'old/c.lyate': UPHILL,
    });
    const all = lyate(folder, ['check', '--format', 'json']);
    expect(checksIn(all)).toEqual({ 'a.lyate': ['warning transfer-uphill'], 'drafts/b.lyate': [] });
    expect(all.status).toBe(0);
    expect(checksIn(lyate(join(folder, 'drafts'), ['check', '--format', 'json', 'b.lyate']))).toEqual({
      'b.lyate': [],
    });
    expect(checksIn(lyate(folder, ['check', '--format', 'json', 'old/c.lyate']))).toEqual({
      'old/c.lyate': ['warning transfer-uphill'],
    });
  });

  it('is left alone above a .git and above the folder that is named', () => {
    const folder = folderOf({
      'lyate.json': '{"severities":{"transfer-uphill":"off"}}',
      'inner/a.lyate': UPHILL,
      'repository/.git/HEAD': '',
      'repository/a.lyate': UPHILL,
    });
    expect(lyate(folder, ['check', 'inner/a.lyate']).status).toBe(0);
    expect(lyate(folder, ['check', '--workspace', 'inner', 'inner/a.lyate']).status).toBe(1);
    expect(lyate(folder, ['check', 'repository/a.lyate']).status).toBe(1);
  });

  it('has its faults found at their place, with exit code 1', () => {
    const folder = folderOf({
      'lyate.json': '{\n  "severitis": {},\n  "values": ["gone.csv", "../out.csv"]\n}\n',
      'plans/a.lyate': 'plan "nothing"\n',
    });
    const { status, stdout } = lyate(folder, ['check', 'plans']);
    expect(status).toBe(1);
    expect(stdout).toContain('lyate.json:2:3 error bad-configuration');
    expect(stdout).toContain('There is no entry "severitis". Is severities meant?');
    expect(stdout).toContain('"gone.csv" is not there or cannot be read.');
    expect(stdout).toContain('"../out.csv" leads out of the folder of this file.');
  });

  it('says which file won and what holds', () => {
    const folder = folderOf({
      'lyate.json': '{"concentration": 0.7, "values": ["own.csv"]}',
      'own.csv': 'name,smiles,direction,scale,value\n',
      'sub/a.lyate': UPHILL,
    });
    const told = JSON.parse(lyate(folder, ['check', '--print-config', 'sub/a.lyate']).stdout);
    expect(told).toMatchObject({
      file: 'sub/a.lyate',
      workspace: folder,
      configuration: join(folder, 'lyate.json'),
      houseFiles: ['own.csv'],
      problems: [],
      settings: { concentration: 0.7, thresholds: { error: 0.95 } },
    });
    const none = JSON.parse(
      lyate(folderOf({ 'a.lyate': '' }), ['check', '--print-config', 'a.lyate']).stdout,
    );
    expect(none.configuration).toBeNull();
    expect(none.settings.concentration).toBe(0.2);
  });
});

describe('house files', () => {
  it('change the verdict, and a line that cannot be read is named', () => {
    const csv =
      'name,smiles,direction,scale,value,sd\ndiethyl malonate,CCOC(=O)[CH2:1]C(=O)OCC,acid,water,3.0,0.1\n';
    const folder = folderOf({
      'lyate.json': '{"values":["house/pka.csv"]}',
      'house/pka.csv': csv,
      'a.lyate': UPHILL,
    });
    expect(lyate(folder, ['check', 'a.lyate']).status).toBe(0);
    writeFileSync(join(folder, 'house/pka.csv'), csv.replace('3.0', 'three'));
    const { status, stdout } = lyate(folder, ['check', 'a.lyate']);
    expect(status).toBe(1);
    expect(stdout).toContain('house/pka.csv:2:1 error bad-configuration');
    expect(stdout).toContain('value "three" is not a number');
    expect(stdout).toContain('a.lyate:6:20 error transfer-uphill');
  });

  it('bring reagents that plans then know', () => {
    const folder = folderOf({
      'lyate.json': '{"reagents":["r.csv"]}',
      'r.csv': 'name,smiles,roles\nVerdant base,CCN(CC)CC,amine-base\n',
      'a.lyate':
        'compound 1 = CC(=O)O\nstep A\n  solvent THF 5 mL\n  charge 1 1 mmol\n  base verdant-base 1.1 equiv\n',
    });
    expect(lyate(folder, ['check', 'a.lyate']).stdout).not.toContain('unknown-name');
    expect(lyate(folder, ['check', '--workspace', '/', 'a.lyate']).status).toBe(0);
    writeFileSync(join(folder, 'lyate.json'), '{}');
    expect(lyate(folder, ['check', 'a.lyate']).stdout).toContain('unknown-name');
  });
});

describe('a baseline', () => {
  it('keeps what is known quiet, wherever it moves, and tells what is new and what is gone', () => {
    const folder = folderOf({ 'plans/a.lyate': UPHILL });
    const check = ['check', '--baseline', 'known.json', 'plans'];
    expect(lyate(folder, [...check, '--write-baseline']).status).toBe(0);
    expect(lyate(folder, check)).toMatchObject({ status: 0, stderr: '' });
    expect(lyate(join(folder, 'plans'), ['check', '--baseline', '../known.json', 'a.lyate']).status).toBe(0);

    writeFileSync(
      join(folder, 'plans/a.lyate'),
      `// moved\n\n${UPHILL}${UPHILL.slice(UPHILL.indexOf('step')).replace('step A', 'step B')}`,
    );
    const more = lyate(folder, check);
    expect(more.status).toBe(1);
    expect(more.stdout.match(/transfer-uphill/g)).toHaveLength(1);
    expect(more.stdout).toContain('(step B)');

    writeFileSync(join(folder, 'plans/a.lyate'), UPHILL.replace('NaHCO3', 'NaOEt'));
    const gone = lyate(folder, check);
    expect(gone.status).toBe(0);
    expect(gone.stderr).toContain('gone since the baseline: plans/a.lyate: transfer-uphill in step A');
  });

  it('marks what is new in SARIF', () => {
    const folder = folderOf({ 'a.lyate': UPHILL });
    lyate(folder, ['check', '--baseline', 'known.json', '--write-baseline']);
    writeFileSync(join(folder, 'b.lyate'), UPHILL);
    writeFileSync(join(folder, 'a.lyate'), `${UPHILL}  quux\n`);
    const { runs } = JSON.parse(
      lyate(folder, ['check', '--baseline', 'known.json', '--format', 'sarif', 'a.lyate']).stdout,
    );
    expect(
      runs[0].results.map(({ ruleId, baselineState }: { ruleId: string; baselineState: string }) => [
        ruleId,
        baselineState,
      ]),
    ).toEqual([
      ['unreadable-line', 'new'],
      ['transfer-uphill', 'unchanged'],
    ]);
  });

  it('that is none is refused with exit code 2', () => {
    const folder = folderOf({ 'a.lyate': UPHILL, 'x.json': '{"version":9}', 'y.json': 'oh' });
    expect(lyate(folder, ['check', '--baseline', 'x.json'])).toMatchObject({
      status: 2,
      stderr: 'lyate: x.json is no baseline of this version\n',
    });
    expect(lyate(folder, ['check', '--baseline', 'y.json'])).toMatchObject({
      status: 2,
      stderr: 'lyate: y.json is no JSON\n',
    });
    expect(lyate(folder, ['check', '--baseline', 'z.json'])).toMatchObject({
      status: 2,
      stderr: 'lyate: z.json does not exist\n',
    });
    expect(lyate(folder, ['check', '--write-baseline']).status).toBe(2);
  });
});

describe('limits', () => {
  const folder = () =>
    folderOf({ 'a.lyate': UPHILL, 'lyate.json': '{"severities":{"transfer-uphill":"warning"}}' });
  it('leave out what is less sure than asked', () => {
    expect(
      lyate(folder(), ['check', '--min-confidence', '1', '--format', 'json', '--fail-on', 'warning']).status,
    ).toBe(0);
    expect(lyate(folder(), ['check', '--min-confidence', '0.5', '--fail-on', 'warning']).status).toBe(1);
    expect(lyate(folder(), ['check', '--min-confidence', '2']).status).toBe(2);
  });
  it('count warnings', () => {
    expect(lyate(folder(), ['check', '--max-warnings', '1']).status).toBe(0);
    expect(lyate(folder(), ['check', '--max-warnings', '0']).status).toBe(1);
  });
  it('quiet information', () => {
    const plan = { 'a.lyate': 'compound 1 = CCO\nstep A\n  solvent THF 2 mL\n' };
    expect(lyate(folderOf(plan), ['check']).stdout).toContain('unused-compound');
    expect(lyate(folderOf(plan), ['check', '--quiet']).stdout).not.toContain('unused-compound');
  });
  it('keep colour and progress to terminals', () => {
    const { stdout, stderr } = start(program, ['check'], { cwd: folder(), env: { FORCE_COLOR: '1' } });
    expect(stdout + stderr).not.toContain('\u001b');
  });
});

describe('bad input', () => {
  it('is named on standard error with exit code 2, and the rest is checked', () => {
    const folder = folderOf({ 'a.lyate': UPHILL, 'latin.lyate': Uint8Array.from([0x70, 0xe9, 0xff]) });
    mkdirSync(join(folder, 'folder.lyate'));
    writeFileSync(join(folder, 'huge.lyate'), '');
    truncateSync(join(folder, 'huge.lyate'), 100 * 1024 * 1024);
    const ended = lyate(folder, [
      'check',
      'a.lyate',
      'missing.lyate',
      'latin.lyate',
      'folder.lyate',
      'huge.lyate',
    ]);
    expect(ended.status).toBe(2);
    expect(ended.stderr.trim().split('\n').sort()).toEqual([
      'lyate: huge.lyate is larger than 64 MB',
      'lyate: latin.lyate is not UTF-8 text',
      'lyate: missing.lyate does not exist',
    ]);
    expect(ended.stdout).toContain('transfer-uphill');
  });

  it('on standard input too', () => {
    const folder = folderOf({});
    expect(lyate(folder, ['check', '--stdin'], Uint8Array.from([0xff]))).toMatchObject({
      status: 2,
      stderr: 'lyate: standard input is not UTF-8 text\n',
    });
    expect(lyate(folder, ['check', '--stdin', '--name', 'plans/x.lyate'], UPHILL).stdout).toContain(
      'plans/x.lyate:6:20',
    );
  });

  it('leaves no half written baseline', () => {
    const folder = folderOf({ 'a.lyate': UPHILL });
    const { status } = lyate(folder, ['check', '--baseline', 'no/such/folder.json', '--write-baseline']);
    expect(status).toBe(2);
    expect(existsSync(join(folder, 'no'))).toBe(false);
    expect(readFileSync(join(folder, 'a.lyate'), 'utf8')).toBe(UPHILL);
  });
});
