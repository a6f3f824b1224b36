/**
 * Decides which rings are aromatic, from a Kekulé form, by Hückel's rule over single and fused rings.
 *
 * Knows: elements, charges, bond orders.  Must not know: how the text was written, acidity.
 * Invariants: both written forms of a molecule give the same answer, because only the Kekulé form is read.
 *   (tests/chemistry/build-graph.test.ts compares with RDKit)
 * Sources: Hückel's rule; which atoms may take part follows the rules that RDKit documents for its default model.
 */
import { numberOf, outerElectronsOf, symbolOf, valencesOf } from './elements.ts';

export interface KekuleAtom {
  readonly element: string;
  readonly charge: number;
  readonly hydrogens: number;
  /** Electrons without a partner. */
  readonly unpaired: number;
}

export interface KekuleBond {
  readonly from: number;
  readonly to: number;
  readonly order: number;
  readonly inRing: boolean;
}

/** Most rings that are looked at together, and most combinations tried in one fused system. */
const MOST_FUSED = 6;
const MOST_COMBINATIONS = 4000;
const LARGEST_FUSED_RING = 24;
/** Oxygen and sulfur lend their lone pair only where they also lie in a ring up to this size. */
const LARGEST_CHALCOGEN_RING = 8;

/** Elements that may be members of an aromatic ring. */
const MEMBERS = new Set(['B', 'C', 'N', 'O', 'Si', 'P', 'S', 'Se', 'Te']);

export interface Aromatic {
  readonly atoms: readonly boolean[];
  readonly bonds: readonly boolean[];
}

/** Aromatic atoms and bonds; `incident` lists the bonds of each atom. */
export function findAromatic(
  atoms: readonly KekuleAtom[],
  bonds: readonly KekuleBond[],
  incident: readonly (readonly number[])[],
  rings: readonly (readonly number[])[],
): Aromatic {
  const atomFlags = atoms.map(() => false);
  const bondFlags = bonds.map(() => false);
  const electrons = new Map<number, number | null>();
  const gives = (atom: number): number | null => {
    let value = electrons.get(atom);
    if (value === undefined) {
      value = electronsGiven(atom, atoms, bonds, incident);
      electrons.set(atom, value);
    }
    return value;
  };
  const inSmallRing = new Set(rings.filter(({ length }) => length <= LARGEST_CHALCOGEN_RING).flat());
  const candidates = rings.filter((ring) =>
    ring.every((atom) => gives(atom) !== null && (inSmallRing.has(atom) || !isDivalent(atom))),
  );
  const ringBonds = candidates.map((ring) => bondsOfRing(ring, bonds, incident));
  const joined = ringsJoined(ringBonds);
  for (const system of fusedSystems(joined)) markSystem(system);
  return { atoms: atomFlags, bonds: bondFlags };

  /** Oxygen and sulfur that lend a lone pair. */
  function isDivalent(atom: number): boolean {
    const { element, charge } = atoms[atom]!;
    return charge === 0 && (element === 'O' || element === 'S');
  }

  function markSystem(system: readonly number[]): void {
    const all = new Set(system.flatMap((ring) => ringBonds[ring]!));
    let open = all.size;
    let tried = 0;
    let subsets: number[][] = system.map((ring) => [ring]);
    for (let size = 1; size <= Math.min(MOST_FUSED, system.length); size++) {
      for (const subset of subsets) {
        tried += 1;
        if (followsRule(subset)) open -= mark(subset);
      }
      if (open === 0 || MOST_COMBINATIONS < tried) return;
      subsets = grow(subsets, MOST_COMBINATIONS - tried);
    }
  }

  /** Each subset with one more ring that shares a bond with it. */
  function grow(subsets: readonly number[][], limit: number): number[][] {
    const seen = new Set<string>();
    const larger: number[][] = [];
    for (const subset of subsets) {
      for (const ring of new Set(subset.flatMap((each) => joined[each]!))) {
        if (subset.includes(ring)) continue;
        const next = [...subset, ring].sort((a, b) => a - b);
        const key = next.join(' ');
        if (seen.has(key)) continue;
        seen.add(key);
        larger.push(next);
        if (limit <= larger.length) return larger;
      }
    }
    return larger;
  }

  function followsRule(subset: readonly number[]): boolean {
    const times = new Map<number, number>();
    for (const ring of subset)
      for (const atom of candidates[ring]!) times.set(atom, (times.get(atom) ?? 0) + 1);
    let sum = 0;
    // Atoms inside a fused system, shared by three rings, do not lie on its perimeter.
    for (const [atom, count] of times) if (count < 3) sum += gives(atom)!;
    return sum === 2 || (6 <= sum && (sum - 2) % 4 === 0);
  }

  /** Marks the perimeter of a subset; returns how many bonds are new. */
  function mark(subset: readonly number[]): number {
    const times = new Map<number, number>();
    for (const ring of subset)
      for (const bond of ringBonds[ring]!) times.set(bond, (times.get(bond) ?? 0) + 1);
    let fresh = 0;
    for (const [bond, count] of times) {
      if (count !== 1 || bondFlags[bond]) continue;
      bondFlags[bond] = true;
      fresh += 1;
      atomFlags[bonds[bond]!.from] = true;
      atomFlags[bonds[bond]!.to] = true;
    }
    return fresh;
  }
}

/** Electrons that an atom gives to a ring: 0, 1 or 2; null where it cannot take part. */
function electronsGiven(
  atom: number,
  atoms: readonly KekuleAtom[],
  bonds: readonly KekuleBond[],
  incident: readonly (readonly number[])[],
): number | null {
  const { element, charge, hydrogens, unpaired } = atoms[atom]!;
  const usual = valencesOf(element, 0)?.[0];
  if (usual === undefined || !MEMBERS.has(element)) return null;
  if (0 < unpaired && (element !== 'C' || charge !== 0)) return null;
  const around = incident[atom]!.map((bond) => bonds[bond]!);
  const degree = around.length + hydrogens;
  if (3 < degree) return null;
  const total = around.reduce((sum, { order }) => sum + order, hydrogens);
  const limit = charge === 0 ? usual : valencesOf(symbolOf(numberOf(element) - charge), 0)?.[0];
  if (limit === undefined || limit < total) return null;
  const multiple = around.filter(({ order }) => 1 < order);
  if (1 < multiple.length) return null;
  const lonePairs = Math.max(outerElectronsOf(element) - usual - charge, 0);
  let available = usual - degree + lonePairs - unpaired;
  if (1 < available && 1 < total - degree) available = 1;
  if (available < 0) return null;
  const bond = multiple[0];
  const outside = bond !== undefined && !bond.inRing;
  if (available === 0) {
    if (bond === undefined) return null;
    return outside ? 0 : 1;
  }
  const stolen = outside && stealsFrom(element, atoms[bond.from === atom ? bond.to : bond.from]!.element);
  if (available === 1) {
    if (outside) return stolen ? 0 : 1;
    if (bond !== undefined) return 1;
    return charge === 1 ? 0 : null;
  }
  if (stolen) available -= 1;
  return available % 2 === 1 ? 1 : 2;
}

/** Whether a doubly bound neighbour outside the ring keeps the electrons: it has more outer electrons, or is smaller. */
function stealsFrom(element: string, other: string): boolean {
  const [own, theirs] = [outerElectronsOf(element), outerElectronsOf(other)];
  return own < theirs || (own === theirs && numberOf(other) < numberOf(element));
}

function bondsOfRing(
  ring: readonly number[],
  bonds: readonly KekuleBond[],
  incident: readonly (readonly number[])[],
): number[] {
  return ring.map((atom, place) => {
    const next = ring[(place + 1) % ring.length]!;
    return incident[atom]!.find((bond) => bonds[bond]!.from === next || bonds[bond]!.to === next)!;
  });
}

/** Groups rings that hang together by single shared bonds; rings that share more are a cage or a bridge. */
function fusedSystems(joined: readonly (readonly number[])[]): number[][] {
  const seen = new Set<number>();
  const systems: number[][] = [];
  joined.forEach((_, root) => {
    if (seen.has(root)) return;
    seen.add(root);
    const system = [root];
    for (let head = 0; head < system.length; head++) {
      for (const ring of joined[system[head]!]!) {
        if (seen.has(ring)) continue;
        seen.add(ring);
        system.push(ring);
      }
    }
    systems.push(system);
  });
  return systems;
}

/** For each ring the rings that share exactly one bond with it; large rings stand alone. */
function ringsJoined(ringBonds: readonly (readonly number[])[]): number[][] {
  const ringsOfBond = new Map<number, number[]>();
  ringBonds.forEach((bonds, ring) => {
    if (LARGEST_FUSED_RING < bonds.length) return;
    for (const bond of bonds) {
      const list = ringsOfBond.get(bond);
      if (list === undefined) ringsOfBond.set(bond, [ring]);
      else list.push(ring);
    }
  });
  return ringBonds.map((bonds, ring) => {
    const shared = new Map<number, number>();
    if (bonds.length <= LARGEST_FUSED_RING) {
      for (const bond of bonds)
        for (const other of ringsOfBond.get(bond)!)
          if (other !== ring) shared.set(other, (shared.get(other) ?? 0) + 1);
    }
    return [...shared].filter(([, count]) => count === 1).map(([other]) => other);
  });
}
