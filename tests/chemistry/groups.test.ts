/** The rules of `groups.csv`: each reaches its example, spares its near miss, and speaks of protons that exist. */
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { expect, test } from 'vitest';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { tables } from '../support/tables.ts';

const { groups } = tables;
const nearMisses = parse(readFileSync('tests/chemistry/near-misses.csv', 'utf8'), { columns: true }) as {
  group: string;
  smiles: string;
}[];

function groupsIn(smiles: string): Set<string> {
  const { problem, couples } = perceive(smiles, tables);
  expect(problem, smiles).toBeNull();
  return new Set(couples.map(({ group }) => group));
}

test('the table has at least 400 rules, acids and bases', () => {
  expect(groups.length).toBeGreaterThanOrEqual(400);
  for (const kind of ['acid', 'base'])
    expect(groups.filter((row) => row.kind === kind).length).toBeGreaterThan(120);
});

test('every rule wins a site of its own example against all other rules', () => {
  const missed = groups.filter(({ id, example }) => !groupsIn(example).has(id));
  expect(missed.map(({ id, example }) => `${id} ${example}`)).toEqual([]);
});

test('no rule wins a site of its near miss', () => {
  const ids = new Set(groups.map(({ id }) => id));
  expect(nearMisses.length).toBeGreaterThan(200);
  expect(nearMisses.filter(({ group }) => !ids.has(group))).toEqual([]);
  const taken = nearMisses.filter(({ group, smiles }) => groupsIn(smiles).has(group));
  expect(taken.map(({ group, smiles }) => `${group} ${smiles}`)).toEqual([]);
});

test('an acid site holds a proton in the reference form', () => {
  for (const { id, example } of groups) {
    const { couples, graph } = perceive(example, tables);
    for (const { atom, kind, group, holdsProton } of couples) {
      if (group !== id || kind !== 'acid') continue;
      const { hydrogens, neighbours } = graph!.atoms[atom]!;
      const explicit = neighbours.filter((other) => graph!.atoms[other]!.element === 'H').length;
      const protons = hydrogens + explicit;
      expect(protons > 0 || !holdsProton, `${id} ${example}`).toBe(true);
    }
  }
});

test('a nitrogen or oxygen that is a cation takes no proton', () => {
  const texts = [...groups.map(({ example }) => example), ...nearMisses.map(({ smiles }) => smiles)];
  const wrong = texts.flatMap((smiles) => {
    const { couples, graph } = perceive(smiles, tables);
    return couples
      .filter(({ kind, atom, holdsProton }) => {
        return kind === 'base' && !holdsProton && graph!.atoms[atom]!.charge > 0;
      })
      .map(({ group }) => `${group} ${smiles}`);
  });
  expect(wrong).toEqual([]);
});

test.each([
  ['nitrobenzene', 'O=[N+]([O-])c1ccccc1'],
  ['phenylnitromethane', 'O=[N+]([O-])Cc1ccccc1'],
  ['nitrofuran', 'O=[N+]([O-])c1ccco1'],
  ['a nitrate ester', 'CO[N+](=O)[O-]'],
  ['an azide', 'CN=[N+]=[N-]'],
  ['a diazonium ion', 'N#[N+]c1ccccc1'],
])('%s has no site that is a base in water', (_, smiles) => {
  const strongest = groups
    .filter(({ id, kind }) => kind === 'base' && groupsIn(smiles).has(id))
    .map(({ water }) => water ?? 0);
  expect(Math.max(-99, ...strongest)).toBeLessThan(-3);
});

test.each([
  ['potassium permanganate', '[K+].[O-][Mn](=O)(=O)=O'],
  ['sodium thiosulfate', '[Na+].[Na+].[O-]S(=O)(=O)[S-]'],
  ['sodium metabisulfite', '[Na+].[Na+].[O-]S(=O)S(=O)(=O)[O-]'],
])('%s is the salt of a strong acid', (_, smiles) => {
  const found = groupsIn(smiles);
  const acids = groups.filter(({ id, kind }) => kind === 'acid' && found.has(id));
  expect(acids.length).toBeGreaterThan(0);
  for (const { id, water } of acids) expect(water, id).toBeLessThan(3);
});

test('the N–H of a formamide is an amide’s', () => {
  expect(groupsIn('CNC=O')).toContain('amide-nh');
  expect(groupsIn('O=CNc1ccccc1')).toContain('anilide-nh');
  expect(groupsIn('CNC=S')).toContain('thioamide-nh');
});

test('values stand with their spread, and in the order of trade', () => {
  for (const row of groups) {
    expect(row.sources.length, row.id).toBeGreaterThan(0);
    for (const [value, sd] of [
      [row.water, row.waterSd],
      [row.dmso, row.dmsoSd],
      [row.mecn, row.mecnSd],
    ])
      expect((value === null) === (sd === null), `${row.id}: a value without its spread`).toBe(true);
  }
  const water = (id: string) => groups.find((row) => row.id === id)!.water!;
  const orders = [
    ['sulfonic-acid', 'carboxylic-acid', 'phenol', 'alcohol-primary', 'alcohol-tertiary'],
    ['diketone-ch', 'nitro-ch', 'malonate-ch', 'ketone-ch', 'ester-ch', 'amide-ch'],
    ['thiophenol', 'phenol', 'thiol', 'alcohol-primary'],
    ['amide-o', 'aniline', 'pyridine', 'imidazole', 'amine-primary', 'amidine', 'guanidine', 'phosphazene'],
    ['tetrazole-nh', 'benzotriazole-nh', 'triazole-124-nh', 'imidazole-nh', 'indole-nh'],
    ['nitrile-n', 'ketone-o', 'ether-o', 'alcohol-o', 'water-o'],
  ];
  for (const order of orders) {
    const values = order.map(water);
    expect(values, order.join(' < ')).toEqual([...values].sort((a, b) => a - b));
  }
});
