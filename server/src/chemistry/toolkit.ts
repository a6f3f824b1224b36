/**
 * The door to the chemistry library: canonical keys, log P and drawings; with masses and symmetry of our own beside them.
 *
 * Knows: graphs.  Must not know: acidity, plans.
 * Invariants: the library only sees text printed from a graph that the strict reader accepted.   (tests/chemistry/toolkit.test.ts)
 * Units: g/mol; log P of octanol and water, dimensionless.
 */
import { Molecule, MoleculeProperties } from 'openchemlib';
import { boundedCache } from '../tables/cache.ts';
import { massOf } from './elements.ts';
import type { Graph } from './graph.ts';
import { writeSmiles } from './write-smiles.ts';

export { symmetryClasses } from './symmetry.ts';

/** Molecules of more atoms are not drawn. */
const LARGEST_DRAWING = 200;
/** Fragments of more atoms get no canonical key and no log P, whose cost grows with the square of the size. */
const LARGEST_KEY = 256;
/** Keys by printed text: counter-ions and solvents return in every molecule. */
const keys = boundedCache<string, string | null>(1000);

/**
 * A key that is equal for equal fragments, however they are written.
 *
 * Explicit hydrogens must have been absorbed; null for fragments too large or beyond the library.
 */
export function canonicalKey(graph: Graph, fragment: readonly number[]): string | null {
  if (LARGEST_KEY < fragment.length) return null;
  const { text } = writeSmiles(graph, fragment);
  let key = keys.get(text);
  if (key === undefined) {
    key = parse(text)?.getIDCode() ?? null;
    keys.set(text, key);
  }
  return key;
}

/** Calculated log P of the form drawn; null where the library has none. */
export function logP(graph: Graph, fragment: readonly number[]): number | null {
  const molecule = LARGEST_KEY < fragment.length ? null : parse(writeSmiles(graph, fragment).text);
  if (molecule === null) return null;
  const value = new MoleculeProperties(molecule).logP;
  return Number.isFinite(value) ? value : null;
}

/** Average molar mass of the whole graph in g/mol; null where an element has none. */
export function molarMass({ atoms }: Graph): number | null {
  const mass = atoms.reduce(
    (sum, { element, hydrogens }) => sum + massOf(element) + hydrogens * massOf('H'),
    0,
  );
  return Number.isNaN(mass) ? null : mass;
}

/** Counts of the elements of a graph, hydrogens included. */
export function elementCounts({ atoms }: Graph): Map<string, number> {
  const counts = new Map<string, number>();
  const add = (element: string, count: number) => {
    if (count !== 0) counts.set(element, (counts.get(element) ?? 0) + count);
  };
  for (const { element, hydrogens } of atoms) {
    add(element, 1);
    add('H', hydrogens);
  }
  return counts;
}

export interface Drawing {
  readonly svg: string;
  /** Where each atom of the graph lies in the drawing's own units. */
  readonly places: ReadonlyMap<number, { readonly x: number; readonly y: number }>;
}

/** A drawing in the current text colour; null for molecules too large or beyond the library. */
export function draw(graph: Graph, id: string, width = 280, height = 200): Drawing | null {
  if (LARGEST_DRAWING < graph.atoms.length) return null;
  const { text, order } = writeSmiles(graph);
  const molecule = parse(text);
  if (molecule === null || molecule.getAllAtoms() !== order.length) return null;
  molecule.inventCoordinates();
  const svg = molecule.toSVG(width, height, id, {
    suppressChiralText: true,
    suppressESR: true,
    suppressCIPParity: true,
    noStereoProblem: true,
  });
  const places = new Map<number, { x: number; y: number }>();
  order.forEach((atom, place) => {
    const tag = svg.split(`id="${id}:Atom:${place}"`)[1]?.split('>')[0] ?? '';
    const [x, y] = [/cx="(-?[\d.]+)"/.exec(tag)?.[1], /cy="(-?[\d.]+)"/.exec(tag)?.[1]];
    if (x !== undefined && y !== undefined) places.set(atom, { x: Number(x), y: Number(y) });
  });
  return { svg: svg.replaceAll('rgb(0,0,0)', 'currentColor'), places };
}

function parse(smiles: string): Molecule | null {
  try {
    return Molecule.fromSmiles(smiles, { noCoordinates: true, noStereo: true });
  } catch {
    return null;
  }
}
