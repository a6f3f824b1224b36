import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import { coresOf } from '../../server/src/chemistry/cores.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';

/** The place of the atom marked :2 as the atom marked :1 sees it. */
function place(smiles: string): string | undefined {
  const graph = buildGraph(readSmiles(smiles).structure!).graph!;
  const at = (mark: number) => graph.atoms.findIndex(({ mapNumber }) => mapNumber === mark);
  return coresOf(graph, at(1))[0]?.places.get(at(2));
}

test('places in benzene', () => {
  expect(place('[OH:1]c1[cH:2]cccc1')).toBe('o');
  expect(place('[OH:1]c1c[cH:2]ccc1')).toBe('m');
  expect(place('[OH:1]c1cc[cH:2]cc1')).toBe('p');
  expect(place('[OH:1]C(=O)c1cc[cH:2]cc1')).toBe('p');
});

test('places in a ring that holds the site', () => {
  expect(place('[n:1]1[cH:2]cccc1')).toBe('o');
  expect(place('[n:1]1cc[cH:2]cc1')).toBe('p');
  expect(place('[n:1]1[cH:2][nH]cc1')).toBe('ax');
  expect(place('[n:1]1c[nH]c[cH:2]1')).toBe('a');
  expect(place('[n:1]1c[nH][cH:2]c1')).toBe('b');
});

test('places across a fusion are told apart by distance and way', () => {
  const quinoline = [
    '[n:1]1cccc2[cH:2]cccc12',
    '[n:1]1cccc2c[cH:2]ccc12',
    '[n:1]1cccc2cc[cH:2]cc12',
    '[n:1]1cccc2ccc[cH:2]c12',
  ].map(place);
  expect(new Set(quinoline).size).toBe(4);
  expect(place('[n:1]1cccc2[cH:2]cccc12')).toBe(place('[cH:2]1cccc2[n:1]cccc12'));
});

test('no ring system, no place', () => {
  const graph = buildGraph(readSmiles('CC(=O)O').structure!).graph!;
  expect(coresOf(graph, 3)).toEqual([]);
});
