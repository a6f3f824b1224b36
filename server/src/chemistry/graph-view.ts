/**
 * What patterns ask about a graph, worked out once and packed so that one comparison answers many questions.
 *
 * Knows: graphs.  Must not know: what a pattern means.
 * Absent on purpose: counts beyond what a field holds; such queries look at the graph itself.
 */
import type { Graph } from './graph.ts';

/** A field of an atom's key: where it begins and how many bits it has; the largest value means "this many or more". */
interface Field {
  readonly shift: number;
  readonly bits: number;
}

export const ATOM_FIELDS = {
  number: { shift: 0, bits: 7 },
  aromatic: { shift: 7, bits: 1 },
  ring: { shift: 8, bits: 1 },
  hydrogens: { shift: 9, bits: 3 },
  degree: { shift: 12, bits: 3 },
  connections: { shift: 15, bits: 3 },
  /** Charge plus eight. */
  charge: { shift: 18, bits: 4 },
  ringBonds: { shift: 22, bits: 3 },
  valence: { shift: 25, bits: 4 },
} as const satisfies Record<string, Field>;

/** Kinds of bonds; a key is the kind, plus eight where the bond lies in a ring. */
export const BOND_KINDS = { single: 0, double: 1, triple: 2, quadruple: 3, aromatic: 4 } as const;
export const BOND_IN_RING = 8;
export const BOND_KEYS = 16;

/** Sets of kinds of atoms as bits: an element's, its aromatic one's, and whether any atom is in a ring or charged. */
const ELEMENT_BITS = [6, 7, 8, 16, 15, 9, 17, 35, 53, 5, 14, 34, 1];
const OTHER = ELEMENT_BITS.length;
export const ALL_ALIPHATIC = 2 ** (OTHER + 1) - 1;
const AROMATIC_SHIFT = OTHER + 1;
export const ALL_AROMATIC = ALL_ALIPHATIC << AROMATIC_SHIFT;
export const SOME_RING = 1 << 28;
export const SOME_CHARGE = 1 << 29;

/** The set that holds an element, aromatic or not. */
export function kindsOfElement(number: number): number {
  const found = ELEMENT_BITS.indexOf(number);
  const bit = 1 << (found === -1 ? OTHER : found);
  return bit | (bit << AROMATIC_SHIFT);
}

export interface View {
  readonly graph: Graph;
  readonly atomKeys: Int32Array;
  readonly bondKeys: Uint8Array;
  /** Size of the smallest ring of each atom; 0 outside rings. */
  readonly smallestRing: Uint16Array;
  /** Atoms by atomic number. */
  readonly byNumber: ReadonlyMap<number, readonly number[]>;
  readonly all: readonly number[];
  /** Kinds of atoms that the graph has. */
  readonly present: number;
  /** Answers of patterns inside patterns, by the pattern. */
  readonly inner: Map<object, Inner>;
}

/** What is known about a pattern inside a pattern, and the work that is left for all atoms together. */
export interface Inner {
  /** 0 unknown, 1 yes, 2 no. */
  readonly known: Uint8Array;
  readonly work: { left: number };
}

const views = new WeakMap<Graph, View>();

/** The view of a graph; the same one every time. */
export function viewOf(graph: Graph): View {
  let view = views.get(graph);
  if (view === undefined) {
    view = buildView(graph);
    views.set(graph, view);
  }
  return view;
}

function buildView(graph: Graph): View {
  const { atoms, bonds, rings } = graph;
  const byNumber = new Map<number, number[]>();
  const atomKeys = new Int32Array(atoms.length);
  let present = 0;
  for (const { index, number, aromatic, charge, neighbours, bonds: around, hydrogens } of atoms) {
    let [explicit, ringBonds, valence] = [0, 0, hydrogens];
    for (let place = 0; place < around.length; place++) {
      const { inRing, order } = bonds[around[place]!]!;
      if (atoms[neighbours[place]!]!.number === 1) explicit += 1;
      if (inRing) ringBonds += 1;
      valence += order;
    }
    atomKeys[index] =
      number |
      ((aromatic ? 1 : 0) << ATOM_FIELDS.aromatic.shift) |
      ((ringBonds === 0 ? 0 : 1) << ATOM_FIELDS.ring.shift) |
      (Math.min(hydrogens + explicit, 7) << ATOM_FIELDS.hydrogens.shift) |
      (Math.min(neighbours.length, 7) << ATOM_FIELDS.degree.shift) |
      (Math.min(neighbours.length + hydrogens, 7) << ATOM_FIELDS.connections.shift) |
      (Math.max(0, Math.min(charge + 8, 15)) << ATOM_FIELDS.charge.shift) |
      (Math.min(ringBonds, 7) << ATOM_FIELDS.ringBonds.shift) |
      (Math.min(valence, 15) << ATOM_FIELDS.valence.shift);
    present |=
      (kindsOfElement(number) & (aromatic ? ALL_AROMATIC : ALL_ALIPHATIC)) |
      (ringBonds === 0 ? 0 : SOME_RING) |
      (charge === 0 ? 0 : SOME_CHARGE);
    const list = byNumber.get(number);
    if (list === undefined) byNumber.set(number, [index]);
    else list.push(index);
  }
  const smallestRing = new Uint16Array(atoms.length);
  for (const ring of rings) {
    for (const atom of ring) {
      if (smallestRing[atom] === 0 || ring.length < smallestRing[atom]!) smallestRing[atom] = ring.length;
    }
  }
  return {
    graph,
    atomKeys,
    bondKeys: Uint8Array.from(
      bonds,
      ({ order, aromatic, inRing }) =>
        (aromatic ? BOND_KINDS.aromatic : order - 1) + (inRing ? BOND_IN_RING : 0),
    ),
    smallestRing,
    byNumber,
    all: atoms.map(({ index }) => index),
    present,
    inner: new Map(),
  };
}
