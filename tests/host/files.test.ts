/** Files on disk: what may be read, what lies inside a workspace, what is searched. */
import {
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  realpathSync,
  rmSync,
  symlinkSync,
  truncateSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, test } from 'vitest';
import { createAnalyser } from '../../server/src/answers/analyse.ts';
import { inside, LARGEST_FILE, readText, workspaceOf, writeWhole } from '../../server/src/host/files.ts';
import { findPlans, languageOf } from '../../server/src/host/paths.ts';
import { analyseIn } from '../../server/src/host/plans.ts';
import { tables } from '../support/tables.ts';

const top = realpathSync(mkdtempSync(join(tmpdir(), 'lyate-host-')));
const root = join(top, 'work');
afterAll(() => rmSync(top, { recursive: true }));

function put(path: string, text: string | Uint8Array): string {
  const whole = join(root, path);
  mkdirSync(join(whole, '..'), { recursive: true });
  writeFileSync(whole, text);
  return whole;
}
put('.git/HEAD', 'ref');
const plan = put('plans/a.lyate', 'step A\n');
put('plans/deep/b.lyate', 'step A\n');
put('plans/notes.md', '# Notes\n');
put('plans/other.txt', 'no plan\n');
put('plans/node_modules/x/c.lyate', 'step A\n');
put('plans/old/d.lyate', 'step A\n');
put('plans/e.lyate', 'step A\n');
put('.gitignore', 'old/\n');
put('plans/.lyateignore', 'e.lyate\n');
writeFileSync(join(top, 'secret.lyate'), 'compound S = CCO\n');
symlinkSync(join(top, 'secret.lyate'), join(root, 'link.lyate'));
symlinkSync(top, join(root, 'way-out'));

test('text is read as it is, with its mark, and what is no text is said', () => {
  expect(readText(put('bom.lyate', '\ufeffstep A\r\n'))).toEqual({ text: '\ufeffstep A\r\n' });
  expect(readText(put('bytes.lyate', Buffer.from([0xc3, 0x28])))).toEqual({ problem: 'is not UTF-8 text' });
  expect(readText(root)).toEqual({ problem: 'is a folder' });
  expect(readText(join(root, 'nowhere'))).toEqual({ problem: 'does not exist' });
  expect(readText('/dev/zero')).toEqual({ problem: 'is not a regular file' });
  const large = put('large.lyate', '');
  truncateSync(large, LARGEST_FILE + 1);
  expect(readText(large)).toEqual({ problem: 'is larger than 64 MB' });
  rmSync(large);
});

test.each([
  ['plans/a.lyate', true],
  ['plans/../plans/a.lyate', true],
  ['not-there.lyate', true],
  ['..', false],
  ['.', false],
  ['', false],
  ['../secret.lyate', false],
  ['plans/../../secret.lyate', false],
  ['/etc/passwd', false],
  ['link.lyate', false],
  ['way-out/secret.lyate', false],
  ['..hidden.lyate', true],
])('%s lies inside the workspace: %s', (path, expected) => {
  expect(inside(root, path) !== null).toBe(expected);
});

test('the workspace is the nearest folder with a repository, but not above what an editor has open', () => {
  expect(workspaceOf(plan)).toBe(root);
  expect(workspaceOf(plan, [join(root, 'plans')])).toBe(join(root, 'plans'));
  expect(workspaceOf(join(top, 'secret.lyate'))).toBe(top);
});

test('folders are searched for plans past what ignore files name, files are taken as given', () => {
  const folder = join(root, 'plans');
  const names = (asked: string[]) => findPlans(asked).files.map((file) => file.slice(root.length + 1));
  expect(names([folder]).sort()).toEqual(['plans/a.lyate', 'plans/deep/b.lyate', 'plans/notes.md']);
  expect(names([join(folder, 'e.lyate'), join(folder, 'other.txt')])).toEqual([
    'plans/e.lyate',
    'plans/other.txt',
  ]);
  expect(names([folder, plan]).filter((name) => name === 'plans/a.lyate')).toHaveLength(1);
  expect(findPlans([join(root, 'nowhere'), join(folder, '*.nothing')])).toEqual({
    files: [],
    missing: [join(root, 'nowhere'), join(folder, '*.nothing')],
  });
});

test('Markdown is known by its ending', () => {
  expect(['a.md', 'A.MD', 'a.markdown', 'a.lyate', 'md'].map(languageOf)).toEqual([
    'markdown',
    'markdown',
    'markdown',
    'lyate',
    'lyate',
  ]);
});

test('a file is written whole and nothing is left beside it', () => {
  const path = put('written/out.lyate', 'before');
  writeWhole(path, 'after');
  expect(readFileSync(path, 'utf8')).toBe('after');
  expect(readdirSync(join(root, 'written'))).toEqual(['out.lyate']);
  expect(() => writeWhole(join(root, 'no-folder', 'x'), 'text')).toThrow();
});

test('a chain of use is followed on disk and never leaves the workspace', () => {
  put('chain/one.lyate', 'use "two.lyate"\ncompound One = CCO\n');
  put('chain/two.lyate', 'use "deep/three.lyate"\ncompound Two = CCN\n');
  put('chain/deep/three.lyate', 'compound Three = CCC(=O)O\n');
  const file = join(root, 'chain', 'main.lyate');
  const text =
    'use "one.lyate"\nstep A\n  solvent water 20 mL\n  charge One 1 mmol\n  charge Two 1 mmol\n  charge Three 1 mmol\n';
  const analyser = createAnalyser(tables);
  const analysed = analyseIn(root, analyser, { file, text, language: 'lyate' });
  expect(analysed.findings).toEqual([]);
  expect(analysed.source.file).toBe(file);

  const led = analyseIn(root, analyser, {
    file: join(root, 'main.lyate'),
    text: 'use "link.lyate"\n',
    language: 'lyate',
  });
  expect(led.findings.map(({ check }) => check)).toEqual(['bad-use']);
});

test('an open buffer is taken before the disk', () => {
  const file = join(root, 'chain', 'main.lyate');
  const text = 'use "one.lyate"\nstep A\n  charge Buffered 1 mmol\n';
  const asked: string[] = [];
  const analysed = analyseIn(root, createAnalyser(tables), { file, text, language: 'lyate' }, (path) => {
    asked.push(path);
    return 'compound Buffered = CCO\n';
  });
  expect(analysed.findings).toEqual([]);
  expect(asked).toEqual([join(root, 'chain', 'one.lyate')]);
});
