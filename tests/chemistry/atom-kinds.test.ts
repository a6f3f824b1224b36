import { expect, test } from 'vitest';
import { atomKinds, orderBetween, unfolded } from '../../server/src/chemistry/atom-kinds.ts';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { WRITTEN_TWICE } from './written-twice.ts';

function graphOf(smiles: string): Graph {
  return buildGraph(readSmiles(smiles).structure!).graph!;
}

function marked(graph: Graph): number {
  return graph.atoms.findIndex(({ mapNumber }) => mapNumber === 1);
}

// Nitro groups drawn with five bonds are brought to the charged form elsewhere.
const SAME_FORM = WRITTEN_TWICE.map((texts) => texts.filter((text) => !text.includes('N(=O)=O')));

test.each(SAME_FORM)('names do not depend on how %s is written', (...texts) => {
  const names = texts.map((text) => {
    const graph = graphOf(text);
    return { kinds: [...atomKinds(graph)].sort(), around: unfolded(graph, marked(graph), -1, 4) };
  });
  for (const name of names) expect(name).toEqual(names[0]);
});

test.each([
  ['CC([OH:1])=O', 'OH'],
  ['C[C:1](=O)OC', 'C=OO'],
  ['C[C:1](=O)N', 'C=ON'],
  ['C[C:1]#N', 'C#N'],
  ['CC(=O)[NH:1]C', 'Na1'],
  ['C[NH:1]C', 'N1'],
  ['C[N+:1](=O)[O-]', 'NO2'],
  ['C[N+:1](C)(C)C', 'N0+'],
  ['C[S:1](C)(=O)=O', 'S(=O)2'],
  ['c1cc[nH:1]c1', 'nH'],
  ['Cn1c[n:1]cc1', 'n'],
  ['O=[c:1]1cc[nH]cc1', 'c=O'],
])('%s marks the kind %s', (smiles, kind) => {
  const graph = graphOf(smiles);
  expect(atomKinds(graph)[marked(graph)]).toBe(kind);
});

test('a nearer view is a part of what a wider view tells apart', () => {
  const [ethyl, propyl] = ['[CH3:1]CC', '[CH3:1]CCC'].map(graphOf);
  expect(unfolded(ethyl!, 0, -1, 1)).toBe(unfolded(propyl!, 0, -1, 1));
  expect(unfolded(ethyl!, 0, -1, 3)).not.toBe(unfolded(propyl!, 0, -1, 3));
});

test('order of a bond, and none between strangers', () => {
  const graph = graphOf('C=CC#N');
  expect([
    orderBetween(graph, 0, 1),
    orderBetween(graph, 1, 2),
    orderBetween(graph, 2, 3),
    orderBetween(graph, 0, 3),
  ]).toEqual([2, 1, 3, 0]);
});
