import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { writeSmiles } from '../../server/src/chemistry/write-smiles.ts';
import { changedStructures, grid, STRUCTURES } from './structures.ts';

function graphOf(smiles: string): Graph | null {
  const { structure } = readSmiles(smiles);
  return structure === undefined ? null : (buildGraph(structure).graph ?? null);
}

/** Bonds as pairs of the first graph's atoms with their Kekulé orders. */
function bondsOf({ bonds }: Graph, order: readonly number[]): string[] {
  return bonds
    .map(({ from, to, order: bond }) => {
      const ends = [order[from]!, order[to]!].sort((a, b) => a - b);
      return `${ends.join('-')} ${bond}`;
    })
    .sort();
}

test('what is printed reads back as the same graph, atom by atom and bond by bond', () => {
  const graphs = [...STRUCTURES, ...changedStructures(2000, 11)].flatMap((text) => graphOf(text) ?? []);
  expect(graphs.length).toBeGreaterThan(1000);
  for (const graph of graphs) {
    const { text, order } = writeSmiles(graph);
    const again = graphOf(text);
    expect(again, text).not.toBeNull();
    for (const { index, element, charge, hydrogens, isotope } of again!.atoms) {
      const before = graph.atoms[order[index]!]!;
      expect({ element, charge, hydrogens, isotope }, text).toEqual({
        element: before.element,
        charge: before.charge,
        hydrogens: before.hydrogens,
        isotope: before.isotope,
      });
    }
    expect(bondsOf(again!, order)).toEqual(bondsOf(graph, [...graph.atoms.keys()]));
  }
});

test('prints chosen fragments only', () => {
  const graph = graphOf('[Na+].CC([O-])=O.O')!;
  expect(writeSmiles(graph, graph.fragments[1])).toEqual({ text: 'CC(=O)[O-]', order: [1, 2, 4, 3] });
});

test('brackets only where the usual number of hydrogens does not hold', () => {
  expect(writeSmiles(graphOf('[CH4].[NH3].[CH3].[13CH4].[OH-].[Si]')!).text).toBe(
    'C.N.[CH3].[13CH4].[OH-].[Si]',
  );
});

test('more than nine open rings take two digits, and a very long chain does not overflow', () => {
  const cage = buildGraph(grid(14, 14)).graph!;
  const { text } = writeSmiles(cage);
  expect(text).toContain('%10');
  expect(graphOf(text)!.bonds.length).toBe(cage.bonds.length);
  expect(writeSmiles(graphOf('C'.repeat(20_000))!).text.length).toBe(20_000);
});
