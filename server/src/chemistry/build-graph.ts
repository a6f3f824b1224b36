/**
 * Turns a structure as written into a graph: hydrogens, one Kekulé form, rings, aromaticity; or says what cannot be.
 *
 * Knows: atoms, bonds, elements.  Must not know: acidity, names, files.
 * Invariants:
 *  1. Accepts what RDKit's sanitizer accepts, with its hydrogen counts and aromatic atoms.   (tests/chemistry/build-graph.test.ts)
 *  2. Kekulé and aromatic text of one molecule give the same graph.                          (same)
 *  3. Atoms keep the order of the text.
 */
import { findAromatic } from './aromaticity.ts';
import { isMetal, numberOf, valencesOf } from './elements.ts';
import type { Graph, GraphAtom, GraphBond } from './graph.ts';
import { largestMatching } from './matching.ts';
import type { Atom, Bond, Span, Structure } from './molecule.ts';
import { type Adjacency, adjacencyOf, partsOf, ringEdges, smallestRings } from './rings.ts';

export interface GraphProblem {
  readonly check: 'unreadable-structure' | 'impossible-valence';
  readonly message: string;
  readonly span: Span;
}

export type GraphReading =
  | { readonly graph: Graph; readonly problem?: undefined }
  | { readonly graph?: undefined; readonly problem: GraphProblem };

const ORDERS = { '-': 1, '/': 1, '\\': 1, '=': 2, '#': 3, $: 4, ':': 0 } as const;
/** An aromatic bond before the double bonds are placed. */
const OPEN = 0;
/** Elements whose lone pair may be drawn as a bond to a metal. */
const DONORS = new Set(['N', 'O', 'P', 'S', 'Cl', 'As', 'Se', 'Br', 'Te', 'I']);

/** What is still being worked out about the atoms and bonds of one structure. */
interface Draft {
  readonly structure: Structure;
  readonly adjacency: Adjacency;
  readonly inRing: readonly boolean[];
  readonly orders: number[];
  readonly charges: number[];
  readonly hydrogens: number[];
  /** Bonds to metals that are lone pairs of their other end. */
  readonly dative: Set<number>;
}

/** The graph of a structure that the reader accepted. */
export function buildGraph(structure: Structure): GraphReading {
  const { atoms, bonds } = structure;
  const adjacency = adjacencyOf(atoms.length, bonds);
  const inRing = ringEdges(atoms.length, bonds, adjacency);
  const draft: Draft = {
    structure,
    adjacency,
    inRing,
    orders: bonds.map((bond, index) => orderAsWritten(bond, atoms, inRing[index]!)),
    charges: atoms.map(({ charge }) => charge),
    hydrogens: atoms.map(({ writtenHydrogens }) => writtenHydrogens ?? 0),
    dative: new Set(),
  };
  separateCharges(draft);
  const problem = loneAromatic(draft) ?? placeDoubleBonds(draft) ?? fillHydrogens(draft);
  return problem === null ? { graph: finish(draft) } : { problem };
}

function orderAsWritten({ symbol, from, to }: Bond, atoms: readonly Atom[], inRing: boolean): number {
  if (symbol !== undefined) return ORDERS[symbol];
  return atoms[from]!.aromatic && atoms[to]!.aromatic && inRing ? OPEN : 1;
}

/** Sum of bond orders, an open aromatic bond counted as one, without hydrogens. */
function orderSum({ adjacency, orders }: Draft, atom: number): number {
  return adjacency.edges[atom]!.reduce((sum, bond) => sum + Math.max(1, orders[bond]!), 0);
}

/**
 * Writes groups that are often drawn with five bonds on nitrogen as separated charges: nitro, N-oxides, azides, diazo.
 */
function separateCharges(draft: Draft): void {
  const { structure, adjacency, orders, charges } = draft;
  structure.atoms.forEach(({ element, aromatic }, atom) => {
    if (element !== 'N' || charges[atom] !== 0) return;
    const sum = orderSum(draft, atom) + draft.hydrogens[atom]!;
    if (aromatic ? sum !== 4 : sum !== 5) return;
    const bond = adjacency.edges[atom]!.find((candidate, place) => {
      const other = adjacency.neighbours[atom]![place]!;
      const around = adjacency.neighbours[other]!.filter((each) => !isMetal(structure.atoms[each]!.element));
      const single = around.length === 1 && charges[other] === 0;
      const { element: partner } = structure.atoms[other]!;
      return (
        single &&
        ((partner === 'O' && orders[candidate] === 2) ||
          (!aromatic && partner === 'N' && orders[candidate] === 3))
      );
    });
    if (bond === undefined) return;
    const { from, to } = structure.bonds[bond]!;
    orders[bond]! -= 1;
    charges[atom] = 1;
    charges[from === atom ? to : from] = -1;
  });
}

function loneAromatic({ structure, adjacency, orders, inRing }: Draft): GraphProblem | null {
  const lone = structure.atoms.find(
    ({ aromatic, index }) => aromatic && !adjacency.edges[index]!.some((bond) => inRing[bond]),
  );
  if (lone !== undefined) {
    return unreadable(
      lone.span,
      `The atom ${lone.element.toLowerCase()} is written as aromatic and stands in no ring; write ${lone.element}.`,
    );
  }
  const crowded = structure.atoms.find(
    ({ index }) => 3 < adjacency.edges[index]!.filter((bond) => orders[bond] === OPEN).length,
  );
  if (crowded !== undefined) {
    const message = `This aromatic ${crowded.element.toLowerCase()} has more than three aromatic bonds.`;
    return { check: 'impossible-valence', message, span: crowded.span };
  }
  const bond = structure.bonds.find(
    ({ from, to }, index) =>
      orders[index] === OPEN && !(structure.atoms[from]!.aromatic && structure.atoms[to]!.aromatic),
  );
  return bond === undefined
    ? null
    : unreadable(bond.span, 'This bond is written as aromatic between atoms that are not.');
}

/** Gives every aromatic atom that needs one a double bond. */
function placeDoubleBonds(draft: Draft): GraphProblem | null {
  const { structure, adjacency, orders, hydrogens } = draft;
  const needs = structure.atoms.map(({ aromatic, writtenHydrogens, element, index }) => {
    if (!aromatic) return false;
    const sum = orderSum(draft, index);
    if (writtenHydrogens === undefined && element === 'C') hydrogens[index] = Math.max(0, 3 - sum);
    const used = sum + hydrogens[index]!;
    const valences = valencesOf(element, draft.charges[index]!);
    const valence = valences?.find((allowed) => used <= allowed);
    return valence !== undefined && used < valence;
  });
  const places = new Map<number, number>();
  needs.forEach((needed, atom) => {
    if (needed) places.set(atom, places.size);
  });
  const order = [...places.keys()];
  const neighbours = order.map((atom) =>
    adjacency.neighbours[atom]!.flatMap((other, place) =>
      orders[adjacency.edges[atom]![place]!] === OPEN && places.has(other) ? [places.get(other)!] : [],
    ),
  );
  const partner = largestMatching(neighbours);
  const left = order.find((_, place) => partner[place] === -1);
  if (left !== undefined) return notKekule(draft, left);
  structure.bonds.forEach(({ from, to }, bond) => {
    if (orders[bond] !== OPEN) return;
    const [a, b] = [places.get(from), places.get(to)];
    orders[bond] = a !== undefined && b !== undefined && partner[a] === b ? 2 : 1;
  });
  return null;
}

/** The problem underlines the smallest ring through the atom that is left without a double bond. */
function notKekule({ structure, adjacency, inRing }: Draft, atom: number): GraphProblem {
  const { atoms, bonds } = structure;
  const ring = smallestRings(atoms.length, bonds, adjacency, inRing)
    .filter((members) => members.includes(atom))
    .sort((a, b) => a.length - b.length)[0] ?? [atom];
  const span = {
    start: Math.min(...ring.map((member) => atoms[member]!.span.start)),
    end: Math.max(...ring.map((member) => atoms[member]!.span.end)),
  };
  const advice = ring.some((member) => atoms[member]!.element === 'N')
    ? 'an aromatic nitrogen that carries a hydrogen is written [nH]'
    : 'check which of its atoms are aromatic';
  return unreadable(span, `Double bonds cannot be placed around this aromatic ring: ${advice}.`);
}

/** Adds implied hydrogens and finds atoms with more bonds than they can have. */
function fillHydrogens(draft: Draft): GraphProblem | null {
  const { structure, charges, hydrogens } = draft;
  for (const { element, writtenHydrogens, aromatic, index, span } of structure.atoms) {
    const valences = valencesOf(element, charges[index]!);
    const bonds = bondsThatCount(draft, index, valences);
    if (writtenHydrogens === undefined && !aromatic && valences !== null) {
      const valence = valences.find((allowed) => bonds <= allowed);
      if (valence !== undefined && charges[index] === 0) hydrogens[index] = valence - bonds;
    }
    if (valences === null) continue;
    const total = bonds + hydrogens[index]!;
    const most = mostBonds(draft, index, valences);
    if (most < total) {
      const sign = charges[index] === 0 ? '' : charges[index]! < 0 ? '−' : '+';
      const message = `This ${element}${sign} has ${total} bonds; it can have at most ${most}.`;
      return { check: 'impossible-valence', message, span };
    }
  }
  return null;
}

/** Sum of bond orders; where they are too many, one single bond to a metal is the atom's lone pair and does not count. */
function bondsThatCount(draft: Draft, atom: number, valences: readonly number[] | null): number {
  const { structure, adjacency, orders, hydrogens } = draft;
  const sum = orderSum(draft, atom);
  const most = valences?.[valences.length - 1] ?? Number.POSITIVE_INFINITY;
  if (most === 0 || sum + hydrogens[atom]! <= most || !DONORS.has(structure.atoms[atom]!.element)) return sum;
  const dative = adjacency.edges[atom]!.find(
    (bond, place) =>
      orders[bond] === 1 && isMetal(structure.atoms[adjacency.neighbours[atom]![place]!]!.element),
  );
  if (dative === undefined) return sum;
  draft.dative.add(dative);
  return sum - 1;
}

/** The largest number of bonds; chlorine, bromine and iodine take up to seven when all of them lead to oxygen. */
function mostBonds(draft: Draft, atom: number, valences: readonly number[]): number {
  const { structure, adjacency, charges } = draft;
  const most = valences[valences.length - 1] ?? 0;
  const { element } = structure.atoms[atom]!;
  if (charges[atom] !== 0 || (element !== 'Cl' && element !== 'Br' && element !== 'I')) return most;
  const oxygens = adjacency.neighbours[atom]!.every((other) => structure.atoms[other]!.element === 'O');
  const sum = orderSum(draft, atom);
  return oxygens && sum % 2 === 1 && sum <= 7 ? 7 : most;
}

function finish({ structure, adjacency, inRing, orders, charges, hydrogens, dative }: Draft): Graph {
  const { atoms, bonds } = structure;
  const rings = smallestRings(atoms.length, bonds, adjacency, inRing);
  const kekuleBonds = bonds.map(({ from, to }, bond) => ({
    from,
    to,
    order: orders[bond]!,
    inRing: inRing[bond]!,
  }));
  const incident = adjacency.edges.map((edges) => edges.filter((bond) => !dative.has(bond)));
  const kekuleAtoms = atoms.map(({ element, index }) => {
    const used = hydrogens[index]! + incident[index]!.reduce((sum, bond) => sum + orders[bond]!, 0);
    const valences = valencesOf(element, charges[index]!);
    const unpaired = valences?.find((valence) => used <= valence) ?? used;
    return { element, charge: charges[index]!, hydrogens: hydrogens[index]!, unpaired: unpaired - used };
  });
  const aromatic = findAromatic(kekuleAtoms, kekuleBonds, incident, rings);
  return {
    atoms: atoms.map(
      ({ index, element, isotope, mapNumber, span }): GraphAtom => ({
        index,
        element,
        number: numberOf(element),
        charge: charges[index]!,
        isotope,
        mapNumber,
        hydrogens: hydrogens[index]!,
        aromatic: aromatic.atoms[index]!,
        bonds: adjacency.edges[index]!,
        neighbours: adjacency.neighbours[index]!,
        span,
      }),
    ),
    bonds: bonds.map(
      ({ from, to, span }, index): GraphBond => ({
        index,
        from,
        to,
        order: orders[index]!,
        aromatic: aromatic.bonds[index]!,
        inRing: inRing[index]!,
        span,
      }),
    ),
    rings,
    fragments: partsOf(atoms.length, adjacency),
  };
}

function unreadable(span: Span, message: string): GraphProblem {
  return { check: 'unreadable-structure', message, span };
}
