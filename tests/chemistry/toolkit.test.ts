import { beforeAll, expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import type { Structure } from '../../server/src/chemistry/molecule.ts';
import { neutralForm } from '../../server/src/chemistry/neutral.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import {
  canonicalKey,
  draw,
  elementCounts,
  logP,
  molarMass,
  symmetryClasses,
} from '../../server/src/chemistry/toolkit.ts';
import { loadRDKit, type RDKit, readByRDKit } from './rdkit.ts';
import { randomFrom, STRUCTURES } from './structures.ts';

let rdkit: RDKit;
beforeAll(async () => {
  rdkit = await loadRDKit();
});

function structureOf(smiles: string): Structure | null {
  return readSmiles(smiles).structure ?? null;
}

function graphOf(smiles: string): Graph {
  return buildGraph(structureOf(smiles)!).graph!;
}

function keysOf(graph: Graph): string {
  const { graph: neutral } = neutralForm(graph);
  return neutral.fragments
    .map((fragment) => canonicalKey(neutral, fragment))
    .sort()
    .join(' ');
}

/** The same structure with its atoms and bonds in another order. */
function shuffled({ atoms, bonds }: Structure, random: () => number): Structure {
  const order = atoms.map(({ index }) => [random(), index] as const).sort((a, b) => a[0] - b[0]);
  const place = new Map(order.map(([, old], index) => [old, index]));
  return {
    atoms: order.map(([, old], index) => ({ ...atoms[old]!, index })),
    bonds: bonds
      .map((bond) => ({ ...bond, from: place.get(bond.from)!, to: place.get(bond.to)! }))
      .map((bond) => [random(), bond] as const)
      .sort((a, b) => a[0] - b[0])
      .map(([, bond]) => bond),
  };
}

test('a key does not depend on the order of the atoms', () => {
  const random = randomFrom(5);
  const differing: string[] = [];
  let tried = 0;
  for (const text of STRUCTURES) {
    const structure = structureOf(text);
    const graph = structure === null ? undefined : buildGraph(structure).graph;
    if (graph === undefined) continue;
    tried += 1;
    const other = buildGraph(shuffled(structure!, random)).graph;
    if (other === undefined || keysOf(other) !== keysOf(graph)) differing.push(text);
  }
  expect(tried).toBeGreaterThan(400);
  expect(differing).toEqual([]);
});

test.each([
  ['c1ccccc1O', 'OC1=CC=CC=C1'],
  ['CC(=O)[O-].[Na+]', '[Na+].[O-]C(C)=O'],
  ['CN(=O)=O', 'C[N+](=O)[O-]'],
  ['N[C@@H](C)C(=O)O', 'N[C@H](C)C(=O)O'],
  ['Cc1c[nH]cn1', 'CC1=CNC=N1'],
])('%s and %s have one key', (one, other) => {
  expect(keysOf(graphOf(one))).toBe(keysOf(graphOf(other)));
});

test.each([
  ['CCO', 'COC'],
  ['Cc1c[nH]cn1', 'Cc1cnc[nH]1'],
  ['CC(C)=O', 'CC(O)=C'],
  ['C[N+](C)(C)C', 'CC(C)(C)C'],
  ['Oc1ccccc1C', 'Oc1cccc(C)c1'],
])('%s and %s have different keys', (one, other) => {
  expect(keysOf(graphOf(one))).not.toBe(keysOf(graphOf(other)));
});

test('symmetry puts equal atoms into one class', () => {
  const classes = (text: string) => {
    const graph = graphOf(text);
    const found = symmetryClasses(graph, graph.fragments[0]!);
    return graph.atoms.map(({ index }) => found.get(index));
  };
  const [c1, o1, o2] = classes('OC(=O)CC(=O)O').filter((_, atom) => [1, 0, 6].includes(atom)) as number[];
  expect(c1).toBe(o2);
  expect(c1).not.toBe(o1);
  const phenol = classes('Oc1ccccc1');
  expect(phenol[2]).toBe(phenol[6]);
  expect(phenol[3]).toBe(phenol[5]);
  expect(phenol[2]).not.toBe(phenol[3]);
});

test.each([
  ['CCO', 46.069],
  ['O=S(=O)(O)O', 98.072],
  ['[Na+].[Cl-]', 58.44],
  ['BrCCCc1ccccc1', 199.091],
  ['[Li]CCCC', 64.056],
  ['[Pd]', 106.42],
])('the molar mass of %s is %f g/mol', (text, mass) => {
  expect(molarMass(graphOf(text))).toBeCloseTo(mass, 2);
});

test('the molar mass agrees with the average mass that RDKit gives', () => {
  for (const text of STRUCTURES) {
    const structure = structureOf(text);
    const graph = structure === null ? undefined : buildGraph(structure).graph;
    if (graph === undefined || graph.atoms.some(({ isotope }) => isotope !== 0)) continue;
    if (readByRDKit(rdkit, text) === null) continue;
    const molecule = rdkit.get_mol(text)!;
    const { amw } = JSON.parse(molecule.get_descriptors());
    molecule.delete();
    const own = molarMass(graph)!;
    // Tables of atomic masses differ in the fifth figure (sulfur 32.06 or 32.067).
    expect(Math.abs(own - amw) / amw, `${text} ${own} ${amw}`).toBeLessThan(3e-4);
  }
});

test('counts the elements with their hydrogens', () => {
  expect(Object.fromEntries(elementCounts(graphOf('CC(=O)OCC.[H]O[H]')))).toEqual({ C: 4, H: 10, O: 3 });
});

test('log P is that of the form drawn, higher for the longer chain', () => {
  const value = (text: string) => logP(graphOf(text), graphOf(text).fragments[0]!)!;
  expect(value('CCCCCCCC')).toBeGreaterThan(value('CCO'));
  expect(value('CC(=O)O')).toBeGreaterThan(-1.5);
  expect(value('CC(=O)O')).toBeLessThan(1);
});

test('a drawing has a place for every atom, the current text colour, and is the same each time', () => {
  const graph = graphOf('CCOC(=O)c1ccc(N)cc1.[Na+]');
  const drawing = draw(graph, 'x')!;
  expect([...drawing.places.keys()].sort((a, b) => a - b)).toEqual(graph.atoms.map(({ index }) => index));
  expect(drawing.svg).toContain('currentColor');
  expect(drawing.svg).not.toContain('rgb(0,0,0)');
  expect(draw(graph, 'x')).toEqual(drawing);
});

test('very large molecules get no key and no drawing', () => {
  const graph = graphOf('C'.repeat(700));
  expect(canonicalKey(graph, graph.fragments[0]!)).toBeNull();
  expect(logP(graph, graph.fragments[0]!)).toBeNull();
  expect(draw(graph, 'x')).toBeNull();
});
