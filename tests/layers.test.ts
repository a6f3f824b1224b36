/** Which folder may import which, that the inner folders are pure, and that no file imports itself by a detour. */
import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { expect, test } from 'vitest';

const ROOT = 'server/src';
/** What a folder may import besides itself. */
const MAY_IMPORT: Readonly<Record<string, readonly string[]>> = {
  tables: [],
  chemistry: ['tables'],
  flask: ['chemistry', 'tables'],
  route: ['chemistry', 'tables'],
  checks: ['flask', 'route', 'chemistry', 'tables'],
  answers: ['checks', 'flask', 'route', 'chemistry', 'tables'],
  report: ['answers', 'checks', 'route', 'tables'],
  host: ['answers', 'checks', 'route', 'tables'],
  lsp: ['host', 'report', 'answers', 'checks', 'route', 'tables'],
  library: ['host', 'report', 'answers', 'checks'],
  cli: ['lsp', 'host', 'report', 'answers', 'checks', 'flask', 'route', 'chemistry', 'tables'],
};
const PURE = ['tables', 'chemistry', 'flask', 'route', 'checks', 'answers', 'report'];
/** What would make a pure folder depend on more than its arguments. */
const IMPURE =
  /\b(?:Math\.random|Date\.now|new Date|performance\.now|process\.|globalThis|setTimeout|fetch\()/;

interface Import {
  readonly from: string;
  readonly to: string;
}

const files = readdirSync(ROOT, { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.ts'))
  .map((file) => join(ROOT, file));
const texts = new Map(files.map((file) => [file, readFileSync(file, 'utf8')]));
const specifiers = (text: string) =>
  [...text.matchAll(/(?:from|import|import\()\s*'([^']+)'/g)].map((found) => found[1]!);
const imports: Import[] = files.flatMap((from) =>
  specifiers(texts.get(from)!)
    .filter((to) => to.startsWith('.'))
    .map((to) => ({ from, to: relative('.', resolve(dirname(from), to)) })),
);
const folderOf = (file: string) => relative(ROOT, file).split('/')[0]!;

test('every folder of the source has its place', () => {
  expect([...new Set(files.map(folderOf))].sort()).toEqual(Object.keys(MAY_IMPORT).sort());
});

test('imports run downward only', () => {
  const inside = imports.filter(({ to }) => to.startsWith(ROOT));
  expect(inside.length).toBeGreaterThan(300);
  const wrong = inside.filter(({ from, to }) => {
    const [above, below] = [folderOf(from), folderOf(to)];
    return above !== below && !MAY_IMPORT[above]!.includes(below);
  });
  expect(wrong.map(({ from, to }) => `${from} → ${to}`)).toEqual([]);
});

test.each(PURE)('%s is pure', (folder) => {
  const own = files.filter((file) => folderOf(file) === folder);
  expect(own.length).toBeGreaterThan(0);
  const wrong = own.flatMap((file) => {
    const code = texts
      .get(file)!
      .replace(/\/\*[\s\S]*?\*\//g, '')
      .replace(/\/\/.*$/gm, '');
    const outside = specifiers(code).filter((to) => to.startsWith('node:') || to.startsWith('vscode'));
    const impure = IMPURE.exec(code)?.[0];
    return [...outside, ...(impure === undefined ? [] : [impure])].map((what) => `${file}: ${what}`);
  });
  expect(wrong).toEqual([]);
});

test('only lsp knows the protocol', () => {
  const wrong = files.filter(
    (file) => folderOf(file) !== 'lsp' && specifiers(texts.get(file)!).some((to) => to.startsWith('vscode-')),
  );
  expect(wrong).toEqual([]);
});

test('no file imports itself by a detour', () => {
  const targets = new Map<string, string[]>();
  for (const { from, to } of imports) targets.set(from, [...(targets.get(from) ?? []), to]);
  const done = new Set<string>();
  const circles: string[] = [];
  const visit = (file: string, way: readonly string[]) => {
    if (way.includes(file)) circles.push([...way.slice(way.indexOf(file)), file].join(' → '));
    if (done.has(file) || way.includes(file)) return;
    for (const next of targets.get(file) ?? []) visit(next, [...way, file]);
    done.add(file);
  };
  for (const file of files) visit(file, []);
  expect(circles).toEqual([]);
});
