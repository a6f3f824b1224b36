/** Acids of the tables with several protons give all of them. */
import { expect, test } from 'vitest';
import { constantsIn } from '../../server/src/chemistry/constants.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { tables } from '../support/tables.ts';

test.each([
  ['sulfuric acid', 'OS(=O)(=O)O', 'sulfuric-acid', [-3, 1.99]],
  ['hydrogen sulfate', '[Na+].OS(=O)(=O)[O-]', 'sulfuric-acid', [-3, 1.99]],
  ['phosphoric acid', 'OP(=O)(O)O', 'phosphoric-acid', [2.15, 7.2, 12.35]],
  ['carbonic acid', 'OC(=O)O', 'carbonic-acid', [6.35, 10.33]],
  ['sulfurous acid', 'O=S(O)O', 'sulfurous-acid', [1.86, 7.17]],
  ['malonic acid', 'OC(=O)CC(=O)O', 'carboxylic-acid', [2.85, 5.7]],
])('%s', (_, smiles, group, expected) => {
  const molecule = perceive(smiles, tables);
  const values = constantsIn(molecule, 'water', tables)
    .steps.flat()
    .filter(({ couple }) => couple.group === group)
    .map(({ constant }) => constant.value);
  expect(values).toHaveLength(expected.length);
  // Values: D. D. Perrin, Ionisation Constants of Inorganic Acids and Bases in Aqueous Solution (1982), from memory.
  for (const [place, value] of expected.entries())
    expect(Math.abs(values[place]! - value)).toBeLessThan(0.06);
});

test('imidazole has one acid step and one base step in water and in DMSO', () => {
  const molecule = perceive('c1c[nH]cn1', tables);
  for (const scale of ['water', 'DMSO'] as const) {
    const steps = constantsIn(molecule, scale, tables)
      .steps.flat()
      .filter(({ couple }) => couple.element === 'N');
    expect(steps.map(({ couple }) => couple.kind).sort()).toEqual(['acid', 'base']);
  }
});
