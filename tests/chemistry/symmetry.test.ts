import { Molecule } from 'openchemlib';
import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { neutralForm } from '../../server/src/chemistry/neutral.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { symmetryClasses } from '../../server/src/chemistry/symmetry.ts';
import { writeSmiles } from '../../server/src/chemistry/write-smiles.ts';
import { STRUCTURES } from './structures.ts';

function graphOf(smiles: string): Graph | null {
  const { structure } = readSmiles(smiles);
  return structure === undefined ? null : (buildGraph(structure).graph ?? null);
}

/** The atoms of each class, in one order. */
function partition(classes: ReadonlyMap<number, number>): string {
  const sets = new Map<number, number[]>();
  for (const [atom, name] of classes) sets.set(name, [...(sets.get(name) ?? []), atom]);
  return [...sets.values()]
    .map((atoms) => atoms.sort((a, b) => a - b).join(' '))
    .sort()
    .join(' | ');
}

interface Canonized {
  readonly classes: ReadonlyMap<number, number>;
  readonly aromatic: ReadonlySet<number>;
}

function byCanonizer(graph: Graph, fragment: readonly number[]): Canonized | null {
  const { text, order } = writeSmiles(graph, fragment);
  const molecule = Molecule.fromSmiles(text, { noCoordinates: true, noStereo: true });
  if (molecule.getAllAtoms() !== order.length) return null;
  molecule.ensureHelperArrays(Molecule.cHelperSymmetrySimple);
  return {
    classes: new Map(order.map((atom, place) => [atom, molecule.getSymmetryRank(place)])),
    aromatic: new Set(order.filter((_, place) => molecule.isAromaticAtom(place))),
  };
}

test('puts the same atoms together as an independent canonizer', () => {
  const differing: string[] = [];
  let compared = 0;
  let otherModel = 0;
  for (const text of STRUCTURES) {
    const drawn = graphOf(text);
    if (drawn === null) continue;
    const { graph } = neutralForm(drawn);
    for (const fragment of graph.fragments) {
      const theirs = byCanonizer(graph, fragment);
      if (theirs === null) continue;
      compared += 1;
      const ours = partition(symmetryClasses(graph, fragment));
      // Large and silicon rings are aromatic in one model only, and then their bonds are equal in one only.
      const sameModel = fragment.every((atom) => graph.atoms[atom]!.aromatic === theirs.aromatic.has(atom));
      if (!sameModel) otherModel += 1;
      else if (ours !== partition(theirs.classes)) differing.push(`${text}: ${ours}`);
    }
  }
  expect(compared - otherModel).toBeGreaterThan(400);
  expect(differing).toEqual([]);
});

test('tells the ends of a very long chain from its middle in little time', () => {
  const chain = graphOf('C'.repeat(300))!;
  expect(new Set(symmetryClasses(chain, chain.fragments[0]!).values()).size).toBe(150);
  const start = performance.now();
  const large = graphOf('C'.repeat(5000))!;
  expect(new Set(symmetryClasses(large, large.fragments[0]!).values()).size).toBe(2500);
  expect(performance.now() - start).toBeLessThan(1000);
});
