import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { beforeAll, expect, test } from 'vitest';
import { buildGraph, type GraphReading } from '../../server/src/chemistry/build-graph.ts';
import { isMetal } from '../../server/src/chemistry/elements.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { adjacencyOf, ringEdges, smallestRings } from '../../server/src/chemistry/rings.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { writeSmiles } from '../../server/src/chemistry/write-smiles.ts';
import { loadRDKit, type RDKit, type ReadByRDKit, readByRDKit } from './rdkit.ts';
import { changedStructures, grid, STRUCTURES } from './structures.ts';

let rdkit: RDKit;
beforeAll(async () => {
  rdkit = await loadRDKit();
});

function read(smiles: string): GraphReading | null {
  const { structure } = readSmiles(smiles);
  return structure === undefined ? null : buildGraph(structure);
}

/** Charge that RDKit moves from chlorine, bromine and iodine to their doubly bound oxygens; here they stay as drawn. */
function separatedOxides({ atoms, bonds }: Graph): Map<number, number> {
  const moved = new Map<number, number>();
  for (const { index, element, charge, neighbours, bonds: around } of atoms) {
    const orders = around.map((bond) => bonds[bond]!.order);
    const sum = orders.reduce((total, order) => total + order, 0);
    if (!['Cl', 'Br', 'I'].includes(element) || charge !== 0 || sum < 3 || sum % 2 === 0) continue;
    if (!neighbours.every((other) => atoms[other]!.element === 'O')) continue;
    neighbours.forEach((other, place) => {
      if (orders[place] === 2) moved.set(other, 1);
    });
    moved.set(index, -orders.filter((order) => order === 2).length);
  }
  return moved;
}

/**
 * Whether a text mixes aromatic atoms or bonds with others in one ring, gives an aromatic atom a fourth neighbour, or writes an
 * aromatic bond outside rings.
 *
 * RDKit then makes up hydrogens or radicals, or refuses what has a Kekulé form; a reader that underlines mistakes differs.
 */
function isHalfAromatic(smiles: string): boolean {
  const { atoms, bonds } = readSmiles(smiles).structure!;
  const adjacency = adjacencyOf(atoms.length, bonds);
  const inRing = ringEdges(atoms.length, bonds, adjacency);
  const rings = smallestRings(atoms.length, bonds, adjacency, inRing);
  const mixed = rings.some((ring) => {
    const written = ring.filter((atom) => atoms[atom]!.aromatic).length;
    const multiple = bonds.some(
      ({ from, to, symbol }) =>
        ring.includes(from) && ring.includes(to) && symbol !== undefined && symbol !== ':',
    );
    return 0 < written && (written < ring.length || multiple);
  });
  const crowded = atoms.some(
    ({ aromatic, index, writtenHydrogens }) =>
      aromatic && 3 < adjacency.edges[index]!.length + (writtenHydrogens ?? 0),
  );
  return (
    mixed ||
    crowded ||
    bonds.some(({ from, to, symbol }) => symbol === ':' && !(atoms[from]!.aromatic && atoms[to]!.aromatic))
  );
}

/** RDKit lets carbon and its like have one bond too many when it leads to a metal, as in CC(C)(C)(C)[Li]. */
function isCrowdedCarbon(smiles: string): boolean {
  const { structure } = readSmiles(smiles);
  const problem = read(smiles)?.problem;
  const atom = structure!.atoms.find(({ span }) => span.start === problem?.span.start);
  return (
    problem?.check === 'impossible-valence' &&
    ['B', 'C', 'Si'].includes(atom!.element) &&
    structure!.bonds.some(({ from, to }) => {
      const other = from === atom!.index ? to : to === atom!.index ? from : null;
      return other !== null && isMetal(structure!.atoms[other]!.element);
    })
  );
}

/** The first thing that differs between our reading and RDKit's; null where they agree. */
function difference(smiles: string): string | null {
  const ours = read(smiles);
  const theirs = readByRDKit(rdkit, smiles);
  if (ours === null) return null;
  if (ours.graph === undefined) {
    return theirs === null || isHalfAromatic(smiles) || isCrowdedCarbon(smiles)
      ? null
      : `${smiles}: refused, ${ours.problem.message}`;
  }
  if (theirs === null) return isHalfAromatic(smiles) ? null : `${smiles}: accepted`;
  const { atoms, bonds } = ours.graph;
  const oxo = separatedOxides(ours.graph);
  const own: ReadByRDKit = {
    elements: atoms.map(({ number }) => number),
    hydrogens: atoms.map(({ hydrogens }) => hydrogens),
    charges: atoms.map(({ index, charge }) => charge - (oxo.get(index) ?? 0)),
    aromaticAtoms: atoms.filter(({ aromatic }) => aromatic).map(({ index }) => index),
    aromaticBonds: bonds
      .filter(({ aromatic }) => aromatic)
      .map(({ from, to }) => [from, to].sort((a, b) => a - b).join('-'))
      .sort(),
  };
  for (const key of Object.keys(own) as (keyof ReadByRDKit)[]) {
    if (own[key].join() !== theirs[key].join()) return `${smiles}: ${key} ${own[key]} / ${theirs[key]}`;
  }
  return null;
}

test('agrees with RDKit on the structures of the trade', () => {
  expect(STRUCTURES.map(difference).filter((text) => text !== null)).toEqual([]);
});

test('agrees with RDKit on 6,000 changed structures', () => {
  const texts = changedStructures(6000, 20261201);
  expect(texts.filter((text) => read(text)?.graph !== undefined).length).toBeGreaterThan(2000);
  expect(texts.filter((text) => read(text)?.problem !== undefined).length).toBeGreaterThan(200);
  expect(texts.map(difference).filter((text) => text !== null)).toEqual([]);
});

const DATA = new URL('../../data/', import.meta.url);

test('agrees with RDKit on every structure of the tables', () => {
  const texts = readdirSync(DATA)
    .filter((name) => name.endsWith('.csv'))
    .flatMap((name) => {
      const rows = parse(readFileSync(new URL(name, DATA), 'utf8'), { columns: true, bom: true });
      return (rows as Record<string, string>[]).flatMap(({ smiles, example }) => [
        smiles ?? '',
        example ?? '',
      ]);
    })
    .filter((text) => text !== '' && readSmiles(text).structure !== undefined);
  expect(texts.length).toBeGreaterThan(300);
  expect([...new Set(texts)].map(difference).filter((text) => text !== null)).toEqual([]);
});

const CALIBRATION = new URL('../../../shared/values/water_calibration.csv', import.meta.url);

test.skipIf(!existsSync(CALIBRATION))('agrees with RDKit on the calibration molecules (kept outside)', () => {
  const rows = parse(readFileSync(CALIBRATION, 'utf8'), { columns: true, bom: true }) as Record<
    string,
    string
  >[];
  const texts = [...new Set(rows.map(({ smiles }) => smiles!))];
  expect(texts.length).toBeGreaterThan(2000);
  expect(texts.map(difference).filter((text) => text !== null)).toEqual([]);
});

/** What a graph says apart from where it stood in the text. */
function meaning({ atoms, bonds, fragments }: Graph) {
  return {
    atoms: atoms.map(({ element, charge, hydrogens, aromatic }) => ({
      element,
      charge,
      hydrogens,
      aromatic,
    })),
    bonds: bonds.map(({ from, to, aromatic, inRing }) => ({ ends: [from, to], aromatic, inRing })),
    fragments,
  };
}

test.each([
  ['c1ccccc1O', 'C1=CC=CC=C1O'],
  ['c1ccccc1O', 'C=1C=CC=CC1O'],
  ['c1ccc2ccccc2c1', 'C1=CC=C2C=CC=CC2=C1'],
  ['c1c[nH]cc1', 'C1=CNC=C1'],
  ['O=c1cc[nH]cc1', 'O=C1C=CNC=C1'],
  ['O=c1cc[nH]c(=O)[nH]1', 'O=C1C=CNC(=O)N1'],
  ['Cn1c(=O)c2c(ncn2C)n(C)c1=O', 'CN1C(=O)C2=C(N=CN2C)N(C)C1=O'],
  ['[cH-]1cccc1', '[CH-]1C=CC=C1'],
  ['c1cc[o+]cc1', 'C1=CC=[O+]C=C1'],
  ['[O-][n+]1ccccc1', '[O-][N+]1=CC=CC=C1'],
  ['O=n1ccccc1', '[O-][N+]1=CC=CC=C1'],
  ['CN(=O)=O', 'C[N+]([O-])=O'],
  ['CN=N#N', 'CN=[N+]=[N-]'],
])('reads %s and %s as the same graph', (one, other) => {
  expect(meaning(read(one)!.graph!)).toEqual(meaning(read(other)!.graph!));
});

test('printed as a Kekulé form, every structure reads back as the same graph', () => {
  const broken = STRUCTURES.filter((text) => {
    const graph = read(text)?.graph;
    if (graph === undefined) return false;
    const { text: printed, order } = writeSmiles(graph);
    const again = read(printed)?.graph;
    const same = again?.atoms.every(({ index, element, charge, hydrogens, aromatic }) => {
      const before = graph.atoms[order[index]!]!;
      return (
        element === before.element &&
        charge === before.charge &&
        hydrogens === before.hydrogens &&
        aromatic === before.aromatic
      );
    });
    return same !== true || again?.bonds.length !== graph.bonds.length;
  });
  expect(broken).toEqual([]);
});

test.each([
  ['CCc1cccc1', 'unreadable-structure', 2, 8, 'which of its atoms are aromatic'],
  ['Cc1ncc2ncnc2n1.CO', 'unreadable-structure', 1, 13, '[nH]'],
  ['CC(c)C', 'unreadable-structure', 3, 4, 'stands in no ring'],
  ['CC(C)(C)(C)C', 'impossible-valence', 1, 2, 'This C has 5 bonds; it can have at most 4.'],
  ['C[O+](C)(C)C', 'impossible-valence', 1, 5, 'This O+ has 4 bonds; it can have at most 3.'],
  ['FC(F)=F', 'impossible-valence', 6, 7, 'This F has 2 bonds'],
  ['CC(C)(C)(C)[Li]', 'impossible-valence', 1, 2, 'This C has 5 bonds'],
] as const)('underlines the atom that cannot be in %s', (text, check, start, end, message) => {
  const { problem } = read(text)!;
  expect(problem).toMatchObject({ check, span: { start, end } });
  expect(problem?.message).toContain(message);
});

test('lists the smallest rings and the separate parts', () => {
  const sizes = (text: string) =>
    read(text)!
      .graph!.rings.map(({ length }) => length)
      .sort((a, b) => a - b);
  expect(sizes('c1ccc2ccccc2c1')).toEqual([6, 6]);
  expect(sizes('C1CC2CCC1C2')).toEqual([5, 5]);
  expect(sizes('CC1CC1C1CCC1')).toEqual([3, 4]);
  expect(sizes('CCO')).toEqual([]);
  expect(read('[Na+].CC([O-])=O.[Na+]')!.graph!.fragments).toEqual([[0], [1, 2, 3, 4], [5]]);
});

test('a chain of 2,000 atoms, 500 linked aromatic rings and a cage of 500 rings take bounded time', () => {
  const start = performance.now();
  expect(read('C'.repeat(2000))!.graph!.atoms.length).toBe(2000);
  expect(read(`C${'c1ccc(cc1)'.repeat(500)}C`)!.graph!.rings.length).toBe(500);
  expect(buildGraph(grid(21, 26)).graph!.rings.length).toBe(500);
  // One search for each ring of a large one must not become a search of the whole molecule.
  expect(read(`C1${'C'.repeat(1998)}C1`)!.graph!.rings.length).toBe(0);
  expect(performance.now() - start).toBeLessThan(2000);
});

test('long and deeply nested text does not overflow', () => {
  expect(read('C'.repeat(20_000))!.graph!.atoms.length).toBe(20_000);
  const depth = 10_000;
  expect(read(`${'C('.repeat(depth)}C${')C'.repeat(depth)}`)?.problem?.check ?? null).toBeNull();
  expect(read(`${'c1ccccc1('.repeat(1000)}C${')'.repeat(1000)}`)!.graph!.rings.length).toBe(1000);
});
