import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { beforeAll, expect, test } from 'vitest';
import { buildGraph, type GraphReading } from '../../server/src/chemistry/build-graph.ts';
import { isMetal } from '../../server/src/chemistry/elements.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { adjacencyOf, ringEdges, smallestRings } from '../../server/src/chemistry/rings.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { loadRDKit, type RDKit, type ReadByRDKit, readByRDKit } from './rdkit.ts';
import { changedStructures, STRUCTURES } from './structures.ts';

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
 * Whether a text mixes aromatic atoms or bonds with others in one ring, or writes an aromatic bond outside rings.
 *
 * RDKit then makes up hydrogens or radicals; a reader that underlines mistakes refuses such text.
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
  return (
    mixed ||
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
