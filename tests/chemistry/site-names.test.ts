import { expect, test } from 'vitest';
import { siteNames } from '../../server/src/chemistry/site-names.ts';
import { graphOf } from './written-graph.ts';

const names = (smiles: string) => {
  const graph = graphOf(smiles);
  const found = siteNames(graph, graph.fragments[0]!);
  return graph.atoms.map(({ index, element }) => `${element}${found.get(index)}`);
};

test.each([
  ['OC(=O)CC(O)(CC(=O)O)C(=O)O', 'C(C(O)=O)C(C(=O)O)(O)CC(=O)O'],
  ['Cc1ccc2[nH]ccc2c1', 'c1c[nH]c2ccc(C)cc12'],
  ['CC(C)=CC(=O)OCC', 'CCOC(=O)C=C(C)C'],
  ['N1CCN2CCCC2C1', 'C1CC2CNCCN2C1'],
])('%s and %s have the same names', (one, other) => {
  expect(names(one).sort()).toEqual(names(other).sort());
});

test('equal atoms share a name and different ones do not', () => {
  const [methyl, , , other] = names('CC(=O)C');
  expect(methyl).toBe(other);
  expect(new Set(names('CCCCO')).size).toBe(5);
  expect(new Set(names('c1ccccc1')).size).toBe(1);
  expect(new Set(names('Cc1ccccc1')).size).toBe(5);
});
