/** Repairs of structures are offered where one is obvious and not otherwise. */
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { repairs } from '../../server/src/answers/smiles-repair.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';

const canBeRead = (text: string) => readSmiles(text).problem === undefined;

it.each([
  ['CC(=O', ['CC(=O)']],
  ['CC(C(=O)', ['CC(C(=O))']],
  ['c1ccccc', ['c1ccccc1']],
  ['CC)C', ['CCC']],
  ['C[NH3+', ['C[NH3+]']],
  ['C1CC2', []],
  ['CC(]', []],
  ['', []],
])('%s', (text, expected) => {
  expect(repairs(text, canBeRead)).toEqual(expected);
});

it('offers nothing that cannot be read, whatever the text', () => {
  fc.assert(
    fc.property(fc.string({ unit: fc.constantFrom(...'CNOc1=()[]+-2'), maxLength: 20 }), (text) => {
      for (const repaired of repairs(text, canBeRead)) expect(canBeRead(repaired)).toBe(true);
    }),
  );
});
