import { expect, test } from 'vitest';
import { measuredConstants } from '../../server/src/chemistry/measured.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { tables } from '../support/tables.ts';

const found = (smiles: string) => {
  const perceived = perceive(smiles, tables);
  return measuredConstants(perceived, tables)
    .map(({ couple, step, constant }) => {
      const { element, kind } = perceived.couples[couple]!;
      return `${kind} ${element} ${step ?? '-'} ${constant.scale} ${constant.value}`;
    })
    .sort();
};

test.each([
  ['acetic acid and its salt', 'CC(=O)O', '[Na+].[O-]C(C)=O'],
  ['malonate in three drawings', 'CCOC(=O)CC(=O)OCC', 'O=C(CC(OCC)=O)OCC', 'CCOC(=O)[CH-]C(=O)OCC.[Na+]'],
  ['triethylamine and its hydrochloride, but for hydrogen chloride', 'CCN(CC)CC', 'CC[NH+](CC)CC'],
  ['a Kekulé form', 'Oc1ccccc1', 'OC1=CC=CC=C1', 'C1(O)=CC=CC=C1'],
  ['diisopropylamide', 'CC(C)NC(C)C', '[Li]N(C(C)C)C(C)C'],
])('%s find the same values', (_, first, ...others) => {
  expect(found(first).length).toBeGreaterThan(0);
  for (const other of others) expect(found(other)).toEqual(found(first));
});

test('every row finds the site that it marks, on its own scale', () => {
  const lost = tables.measured.filter((row) => {
    const perceived = perceive(row.smiles, tables);
    return !measuredConstants(perceived, tables).some(
      ({ couple, constant }) =>
        constant.value === row.value &&
        constant.scale === row.scale &&
        perceived.couples[couple]!.kind === row.direction,
    );
  });
  expect(lost.map(({ name, scale }) => `${name} in ${scale}`)).toEqual([]);
});

test('a molecule beside others keeps its values, and one without rows has none', () => {
  expect(found('CC(=O)O.CCN(CC)CC')).toEqual([...found('CC(=O)O'), ...found('CCN(CC)CC')].sort());
  expect(found('FC1CC2(CCNC2)C1Br')).toEqual([]);
});

test('no two rows give one site two values for the same step on one scale', () => {
  const seen = new Set<string>();
  const twice = tables.measured.filter(({ key, classes, direction, step, scale }) => {
    const id = [key, classes, direction, step, scale].join(' ');
    if (seen.has(id)) return true;
    seen.add(id);
    return false;
  });
  expect(twice.map(({ name }) => name)).toEqual([]);
});

test('stepwise constants of one molecule rise', () => {
  const steps = new Map<string, Map<number, number>>();
  for (const { key, step, value, scale } of tables.measured) {
    if (step === null || scale !== 'water') continue;
    steps.set(key, (steps.get(key) ?? new Map()).set(step, value));
  }
  for (const list of steps.values()) {
    const values = [...list].sort(([a], [b]) => a - b).map(([, value]) => value);
    expect(values).toEqual([...values].sort((a, b) => a - b));
  }
  expect(steps.size).toBeGreaterThan(50);
});

test('the table is as large as a chemist needs', () => {
  const count = (scale: string) => tables.measured.filter((row) => row.scale === scale).length;
  expect(count('water')).toBeGreaterThan(500);
  expect(count('DMSO')).toBeGreaterThan(300);
  expect(count('MeCN')).toBeGreaterThan(100);
});
