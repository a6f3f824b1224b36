import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';

interface Entry {
  readonly id: string;
  readonly type: string;
  readonly title?: string;
  readonly author?: readonly object[];
  readonly editor?: readonly object[];
  readonly issued?: { readonly 'date-parts': readonly (readonly number[])[] };
  readonly 'container-title'?: string;
  readonly DOI?: string;
}

const data = new URL('../../data/', import.meta.url);
const entries = JSON.parse(readFileSync(new URL('sources.json', data), 'utf8')) as Entry[];

/** Entries that no row names, and why they stay. */
const BACKGROUND: Readonly<Record<string, string>> = {
  'himmel-2010': 'the scale on which windows of different solvents are drawn side by side',
  'buck-2002': 'the standard buffers of the published tests',
  'bates-1973': 'the standard buffers of the published tests',
  'stanetty-1997': 'how long organolithium reagents live in ethers',
  'bates-1972': 'what butyllithium makes of tetrahydrofuran',
  'yang-2019': 'sodium hydride in dipolar aprotic solvents',
  'greene-2014': 'what protecting groups withstand',
  'prudent-practices': 'the general rules behind the cautions',
};

test('every entry can be found by a reader', () => {
  for (const entry of entries) {
    if (entry.id === 'common-practice') continue;
    const year = entry.issued?.['date-parts'][0]?.[0];
    expect(entry.author ?? entry.editor, entry.id).toBeDefined();
    expect(entry.title ?? entry['container-title'], entry.id).toBeDefined();
    expect(year, entry.id).toBeGreaterThan(1900);
    if (entry.type === 'article-journal') expect(entry['container-title'], entry.id).toBeTruthy();
    if (entry.DOI !== undefined) expect(entry.DOI, entry.id).toMatch(/^10\.\d{4,5}\/\S+$/);
  }
});

test('keys are single and in order, so that two people can add to the list', () => {
  const ids = entries.map(({ id }) => id);
  expect(new Set(ids).size).toBe(ids.length);
  expect(ids).toEqual([...ids].sort());
});

test('every source that a check names is in the list', () => {
  const checks = new URL('../../server/src/checks/', import.meta.url);
  const known = new Set(entries.map(({ id }) => id));
  for (const name of readdirSync(checks).filter((file) => file.endsWith('.ts'))) {
    const list = /sources: \[([^\]]*)\]/.exec(readFileSync(new URL(name, checks), 'utf8'))?.[1] ?? '';
    const unknown = [...list.matchAll(/'([^']+)'/g)].map(([, key]) => key!).filter((key) => !known.has(key));
    expect(unknown, name).toEqual([]);
  }
});

test('every entry is named by a row or a module, or stays for a reason', () => {
  const modules = new URL('../../server/src/', import.meta.url);
  const text = [
    ...readdirSync(data)
      .filter((name) => name.endsWith('.csv'))
      .map((name) => new URL(name, data)),
    ...readdirSync(modules, { recursive: true, encoding: 'utf8' })
      .filter((name) => name.endsWith('.ts'))
      .map((name) => new URL(name, modules)),
  ]
    .map((file) => readFileSync(file, 'utf8'))
    .join('\n');
  const words = new Set(text.split(/[^\w-]+/));
  const idle = entries.filter(({ id }) => !words.has(id) && BACKGROUND[id] === undefined);
  expect(idle.map(({ id }) => id)).toEqual([]);
});
