import { beforeAll, expect, test } from 'vitest';
import {
  massOf,
  numberOf,
  outerElectronsOf,
  symbolOf,
  valencesOf,
} from '../../server/src/chemistry/elements.ts';
import { loadRDKit, type RDKit, readByRDKit } from './rdkit.ts';

let rdkit: RDKit;
beforeAll(async () => {
  rdkit = await loadRDKit();
});

test('every element and charge may have as many bonds as RDKit allows', () => {
  const differences: string[] = [];
  for (let number = 2; number <= 118; number++) {
    for (let charge = -4; charge <= 4; charge++) {
      for (let hydrogens = 0; hydrogens <= 8; hydrogens++) {
        const count = hydrogens === 0 ? '' : `H${hydrogens}`;
        const text = `[${symbolOf(number)}${count}${charge < 0 ? charge : charge === 0 ? '' : `+${charge}`}]`;
        const valences = valencesOf(symbolOf(number), charge);
        const ours = valences === null || hydrogens <= Math.max(0, ...valences);
        if (ours !== (readByRDKit(rdkit, text) !== null)) differences.push(`${text} ${ours}`);
      }
    }
  }
  expect(differences).toEqual([]);
});

test('symbols and numbers name each other, and an unknown symbol has no number', () => {
  for (let number = 1; number <= 118; number++) expect(numberOf(symbolOf(number))).toBe(number);
  expect(numberOf('Xy')).toBe(0);
  expect(symbolOf(0)).toBe('');
});

test('masses are the average ones and missing where there is none', () => {
  expect(massOf('C')).toBe(12.011);
  expect(massOf('Cl')).toBe(35.45);
  expect(massOf('Br')).toBe(79.904);
  expect(massOf('I')).toBe(126.9);
  expect(massOf('Og')).toBeNaN();
});

test.each([
  ['H', 1],
  ['C', 4],
  ['O', 6],
  ['P', 5],
  ['K', 1],
  ['Fe', 8],
  ['Zn', 12],
  ['Ge', 4],
  ['Br', 7],
  ['Pd', 10],
  ['Sn', 4],
  ['I', 7],
  ['Ba', 2],
  ['La', 3],
  ['Pt', 10],
  ['Hg', 12],
  ['Pb', 4],
])('%s has %i outer electrons', (element, count) => {
  expect(outerElectronsOf(element)).toBe(count);
});
