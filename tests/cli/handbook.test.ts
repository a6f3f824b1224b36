/** Every block of commands of the handbook, run as it stands: hook, CI, diff, baseline, archives, library. */
import { execFileSync, spawnSync } from 'node:child_process';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { answersTo } from '../../server/src/cli/records.ts';
import { bundleProgram, type Ended, folderOf } from '../support/program.ts';

const BLOCKS = new Map<string, string[]>();
for (const [, kind, body] of readFileSync('data/handbook/review.md', 'utf8').matchAll(
  /^```(?:sh|ts) (\w+)\n([\s\S]*?)^```$/gm,
))
  BLOCKS.set(kind!, [...(BLOCKS.get(kind!) ?? []), body!]);

const GOOD = `compound 1 = CCOC(=O)[CH2:1]C(=O)OCC
step A
  solvent EtOH 50 mL
  charge 1 10 mmol
  base NaOEt 1.1 equiv
  deprotonate 1 at :1
`;
const BAD = GOOD.replace('NaOEt', 'NaHCO3');

let path = '';
beforeAll(() => {
  const program = bundleProgram();
  const tools = folderOf({ lyate: `#!/bin/sh\nexec ${process.execPath} ${program} "$@"\n` });
  chmodSync(join(tools, 'lyate'), 0o755);
  path = `${tools}${delimiter}${process.env.PATH}`;
});

const env = () => ({
  ...process.env,
  PATH: path,
  GIT_CONFIG_GLOBAL: '/dev/null',
  GIT_AUTHOR_NAME: 'A',
  GIT_AUTHOR_EMAIL: 'a@example.org',
  GIT_COMMITTER_NAME: 'A',
  GIT_COMMITTER_EMAIL: 'a@example.org',
});
function shell(cwd: string, script: string): Ended {
  const { status, stdout, stderr } = spawnSync('bash', ['-c', script], { cwd, env: env(), encoding: 'utf8' });
  return { status, stdout, stderr };
}
function repository(files: Readonly<Record<string, string>>): string {
  const folder = folderOf(files);
  expect(shell(folder, 'git init -q -b main && git add -A && git commit -q -m first').status).toBe(0);
  return folder;
}

describe('the hook', () => {
  it('refuses a commit with an error, looks at what is staged only, and lets a sound one through', () => {
    const folder = repository({ 'plans/route.lyate': GOOD, 'notes with blank.txt': '' });
    writeFileSync(join(folder, '.git/hooks/pre-commit'), BLOCKS.get('hook')![0]!);
    chmodSync(join(folder, '.git/hooks/pre-commit'), 0o755);

    writeFileSync(join(folder, 'plans/route.lyate'), BAD);
    const refused = shell(folder, 'git commit -q -a -m bad');
    expect(refused.status).not.toBe(0);
    expect(refused.stdout + refused.stderr).toContain('plans/route.lyate:6:20 error transfer-uphill');
    expect(shell(folder, 'git log --oneline').stdout.trim().split('\n')).toHaveLength(1);

    writeFileSync(join(folder, 'plans/new plan.lyate'), GOOD);
    expect(
      shell(folder, 'git reset -q && git add "plans/new plan.lyate" && git commit -q -m sound'),
    ).toMatchObject({ status: 0 });
    expect(shell(folder, 'git commit -q --allow-empty -m empty').status).toBe(0);
    expect(shell(folder, 'git log --oneline').stdout.trim().split('\n')).toHaveLength(3);
  });

  it('of the framework calls commands that there are', () => {
    const hooks = readFileSync('.pre-commit-hooks.yaml', 'utf8');
    const entries = [...hooks.matchAll(/entry: (.+)/g)].map(([, entry]) => entry!);
    expect(entries).toHaveLength(2);
    const folder = folderOf({ 'a.lyate': BAD });
    expect(entries.map((entry) => shell(folder, `${entry} a.lyate`).status)).toEqual([1, 0]);
  });
});

describe('the recipes for CI', () => {
  it('run, and leave their files', () => {
    const folder = repository({ 'plans/route.lyate': BAD });
    const ended = shell(folder, BLOCKS.get('ci')!.join(''));
    expect(ended.stderr).toBe('');
    expect(ended.stdout).toMatch(/^::error file=plans\/route\.lyate,line=6,/);
    expect(JSON.parse(readFileSync(join(folder, 'lyate.sarif'), 'utf8')).runs[0].results[0].ruleId).toBe(
      'transfer-uphill',
    );
    expect(JSON.parse(readFileSync(join(folder, 'gl-code-quality-report.json'), 'utf8'))[0].check_name).toBe(
      'transfer-uphill',
    );
    expect(readFileSync(join(folder, 'lyate-junit.xml'), 'utf8')).toContain('<failure type="error"');
    expect(readFileSync(join(folder, 'review.html'), 'utf8')).toMatch(/^<!doctype html>/);
    const yaml = readFileSync('data/handbook/review.md', 'utf8');
    for (const line of BLOCKS.get('ci')![0]!.trim().split('\n')) expect(yaml).toContain(`npx ${line}`);
  });
});

describe('diff', () => {
  it('tells what a changed base did, by revision and by file', () => {
    const folder = repository({
      'plans/route.lyate': `use "shared.lyate"\n${GOOD.slice(GOOD.indexOf('step'))}`,
      'plans/shared.lyate': GOOD.slice(0, GOOD.indexOf('step')),
    });
    writeFileSync(
      join(folder, 'plans/route.lyate'),
      `use "shared.lyate"\n// weaker\n${BAD.slice(BAD.indexOf('step'))}`,
    );
    expect(shell(folder, 'git commit -q -a -m weaker').status).toBe(0);
    const told = shell(folder, BLOCKS.get('diff')![0]!);
    expect(told.status).toBe(1);
    expect(told.stdout).toMatch(/^\+ error transfer-uphill \(step A, line 7\): /);
    expect(told.stdout).toMatch(/1 appeared, 0 gone, 0 changed, 0 as before\.\n$/);
    const back = shell(
      folder,
      'git show HEAD~1:plans/route.lyate > plans/old.lyate; lyate diff plans/route.lyate plans/old.lyate --format json',
    );
    expect(back.status).toBe(0);
    expect(JSON.parse(back.stdout).gone[0].check).toBe('transfer-uphill');
    expect(shell(folder, 'lyate diff --rev HEAD~1 --to HEAD~1 plans/route.lyate').stdout).toBe(
      '0 appeared, 0 gone, 0 changed, 0 as before.\n',
    );
  });

  it('refuses revisions that are none, options in their place, and files outside git', () => {
    const folder = repository({ 'a.lyate': GOOD });
    for (const rev of ['nothing', '--output=x', '$(touch x)', ''])
      expect(
        shell(folder, `lyate diff --rev=${JSON.stringify(rev).replace('$', '\\$')} a.lyate`),
      ).toMatchObject({ status: 2, stdout: '' });
    expect(existsSync(join(folder, 'x'))).toBe(false);
    writeFileSync(join(folder, 'b.lyate'), GOOD);
    expect(shell(folder, 'lyate diff --rev HEAD b.lyate')).toMatchObject({
      status: 2,
      stderr: 'lyate: b.lyate is not in HEAD\n',
    });
    expect(shell(folder, 'lyate diff a.lyate').status).toBe(2);
    const outside = folderOf({ 'c.lyate': GOOD });
    expect(shell(outside, 'lyate diff --rev HEAD c.lyate').stderr).toContain('is in no git repository');
  });
});

describe('the baseline', () => {
  it('passes what it wrote down', () => {
    const folder = folderOf({ 'plans/route.lyate': BAD });
    expect(shell(folder, `set -e\n${BLOCKS.get('baseline')![0]!}`)).toMatchObject({ status: 0, stderr: '' });
    expect(JSON.parse(readFileSync(join(folder, 'lyate-baseline.json'), 'utf8')).files[0].file).toBe(
      'plans/route.lyate',
    );
  });
});

describe('an archive', () => {
  const records = Array.from({ length: 100 }, (_, id) =>
    JSON.stringify({ id, text: (id % 3 === 0 ? BAD : GOOD).replace('10 mmol', `${id + 1} mmol`) }),
  );
  records[40] = '{"id":40,"text":';
  records[41] = '{"id":"forty-one"}';
  records[42] = '[1,2]';
  records[43] = JSON.stringify({ id: 43, text: '\u2028 // a line of its own\n' });
  const archive = `${records.join('\n')}\n`;

  it('is answered in order, one for one, whoever works, and goes on where it stopped', () => {
    const folder = folderOf({ 'archive.ndjson': archive });
    expect(shell(folder, BLOCKS.get('archive')![0]!)).toMatchObject({ status: 0, stderr: '' });
    const answers = readFileSync(join(folder, 'answers.ndjson'), 'utf8');
    const lines = answers
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line));
    expect(lines.map(({ id }) => id)).toEqual(
      Array.from({ length: 100 }, (_, id) => (id === 40 || id === 42 ? null : id === 41 ? 'forty-one' : id)),
    );
    expect(lines[40].error).toBe('not JSON');
    expect(lines[41].error).toBe('the record has no "text"');
    expect(lines[42].error).toBe('not a JSON object');
    expect(
      lines.filter(({ findings }) =>
        findings?.some(({ check }: { check: string }) => check === 'transfer-uphill'),
      ).length,
    ).toBe(33);
    expect(shell(folder, 'lyate check --ndjson < archive.ndjson').stdout).toBe(answers);

    writeFileSync(join(folder, 'answers.ndjson'), answers.slice(0, answers.indexOf('{"id":60') + 20));
    expect(shell(folder, BLOCKS.get('resume')![0]!)).toMatchObject({ status: 0, stderr: '' });
    const after = readFileSync(join(folder, 'answers.ndjson'), 'utf8').trim().split('\n');
    // What has no id of its own cannot be known to be done; it is answered again.
    const again = new Set(['{"id":null,"error":"not JSON"}', '{"id":null,"error":"not a JSON object"}']);
    expect(after.slice(0, 60)).toEqual(answers.trim().split('\n').slice(0, 60));
    expect(after.slice(60).filter((line) => !again.has(line))).toEqual(answers.trim().split('\n').slice(60));
  });

  it('ends in peace when its reader does', () => {
    const folder = folderOf({ 'archive.ndjson': archive });
    const ended = shell(folder, 'set -o pipefail; lyate check --ndjson < archive.ndjson | head -1');
    expect(ended.stderr).toBe('');
    expect(JSON.parse(ended.stdout).id).toBe(0);
  });

  it('names bytes that are no text', () => {
    const folder = folderOf({ 'archive.ndjson': Uint8Array.from([0x7b, 0xff, 0x7d, 0x0a]) });
    expect(shell(folder, 'lyate check --ndjson < archive.ndjson').stdout).toBe(
      '{"id":null,"error":"not UTF-8 text"}\n',
    );
  });

  const hasParallel =
    spawnSync('parallel', ['--version'], { encoding: 'utf8' }).stdout?.includes('GNU parallel') ?? false;
  it.skipIf(!hasParallel)('is worked on by GNU parallel (skipped where it is not installed)', () => {
    const folder = folderOf({ 'archive.ndjson': archive });
    expect(shell(folder, BLOCKS.get('parallel')![0]!.replace('1M', '4k')).status).toBe(0);
    expect(readFileSync(join(folder, 'answers.ndjson'), 'utf8')).toBe(
      shell(folder, 'lyate check --ndjson < archive.ndjson').stdout,
    );
  });
});

describe('a record that takes its worker down', () => {
  it('is answered with an error, and those beside it as ever', async () => {
    const run = async (lines: readonly (string | null)[]) => {
      if (lines.some((line) => line?.includes('"bad"'))) throw new Error('out of memory');
      return lines.map((line) => `answer to ${line}`);
    };
    expect(await answersTo(['{"id":1}', '{"id":"bad"}', null], run)).toEqual([
      'answer to {"id":1}',
      '{"id":"bad","error":"this record could not be worked on: out of memory"}',
      'answer to null',
    ]);
  });
});

describe('Ctrl-C', () => {
  it('ends a run at once and leaves no file half written', () => {
    const folder = folderOf({
      'plans/route.lyate': GOOD.repeat(400).replace(/step A/g, () => `step A${Math.random()}`),
    });
    const ended = shell(
      folder,
      'lyate report plans -o review.html & sleep 0.3; kill -INT $!; wait $!; echo $?; ls -A',
    );
    expect(['130\nplans\n', '0\nplans\nreview.html\n']).toContain(ended.stdout);
    if (existsSync(join(folder, 'review.html')))
      expect(readFileSync(join(folder, 'review.html'), 'utf8')).toMatch(/<\/html>\n$/);
  });
});

describe('the library', () => {
  it('runs the example of the handbook', () => {
    const folder = folderOf({ 'example.mjs': BLOCKS.get('example')![0]! });
    mkdirSync(join(folder, 'node_modules/lyate'), { recursive: true });
    execFileSync(process.execPath, ['-e', BUILD, join(folder, 'node_modules/lyate/library.js')]);
    writeFileSync(
      join(folder, 'node_modules/lyate/package.json'),
      '{"type":"module","exports":"./library.js"}',
    );
    expect(shell(folder, 'node example.mjs').stdout).toMatch(
      /^error transfer-uphill: NaOH .* too weak .*\n$/,
    );
  });

  const BUILD = `require('esbuild').buildSync({bundle:true,platform:'browser',format:'esm',target:'es2022',
    alias:{'jsonc-parser':'jsonc-parser/lib/esm/main.js','csv-parse/sync':'csv-parse/browser/esm/sync'},
    entryPoints:['server/src/library/library.ts'],outfile:process.argv[1]})`;
});
