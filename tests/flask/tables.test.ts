/** The flask's own tables name groups, reagents and sources that exist. */
import { existsSync, readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { expect, test } from 'vitest';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { readTable } from '../../server/tools/read-table.ts';

const sources = new Set(
  (JSON.parse(readFileSync('data/sources.json', 'utf8')) as { id: string }[]).map(({ id }) => id),
);
const read = (name: string) =>
  readTable(`data/${name}.csv`, `data/schema/${name}.json`, sources).map(({ cells }) => cells);
const records = (name: string) =>
  parse(readFileSync(`data/${name}.csv`, 'utf8'), { columns: true, bom: true }) as Record<string, string>[];
const groups = records('groups');
const REAGENTS = 'data/reagents.csv';

test.each(['kinetics', 'enthalpies', 'gases', 'hydrides', 'heats'])(
  '%s keeps its schema and cites sources that exist',
  (name) => {
    expect(read(name).length).toBeGreaterThan(3);
  },
);

test.each(['kinetics', 'enthalpies', 'gases'])('%s names groups and families that exist', (name) => {
  const ids = new Set(groups.map(({ id }) => id));
  const families = new Set(groups.map(({ family }) => family));
  for (const row of read(name)) {
    for (const id of row.groups as string[]) expect(ids, id).toContain(id);
    for (const family of (row.families ?? []) as string[]) expect(families, family).toContain(family);
  }
});

test.runIf(existsSync(REAGENTS))('reagents that are named stand in the table of reagents', () => {
  const known = new Set(
    records('reagents').flatMap(({ name, synonyms }) =>
      [name!, ...synonyms!.split(';')].map((word) => foldName(word.trim())),
    ),
  );
  const named = [
    ...read('kinetics').flatMap(({ bases, helpers }) => [...(bases as string[]), ...(helpers as string[])]),
    ...read('hydrides').map(({ reagent }) => String(reagent)),
  ];
  const unknown = named.filter((what) => what.startsWith('reagent:') && !known.has(foldName(what.slice(8))));
  expect(unknown).toEqual([]);
});
