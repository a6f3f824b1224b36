/**
 * Where an aromatic ring system stands to a site: which of its atoms are ortho, meta, para, or across a fusion.
 *
 * Knows: graphs.  Must not know: acidity, tables.
 * Invariants: places depend on the graph only, never on the order of atoms.   (tests/chemistry/cores.test.ts)
 */
import { atomKinds } from './atom-kinds.ts';
import type { Graph } from './graph.ts';

/** An aromatic ring system that holds the site or that the site reaches through a short chain. */
export interface Core {
  /** Atoms of the ring system. */
  readonly atoms: ReadonlySet<number>;
  /** Ring atom from which places are counted: the site itself, or the atom that the chain meets. */
  readonly anchor: number;
  /** Bonds between site and anchor; 0 where the site is part of the ring. */
  readonly reach: number;
  /** Neighbour of the site through which the ring system is met; −1 where the site is part of the ring. */
  readonly way: number;
  /** Place of each ring atom. */
  readonly places: ReadonlyMap<number, string>;
}

/** Chains longer than this carry no ring effect worth its own place. */
const FARTHEST = 4;

const systems = new WeakMap<Graph, readonly (readonly number[])[]>();

/** Aromatic ring systems: aromatic rings joined by shared bonds. */
export function ringSystems(graph: Graph): readonly (readonly number[])[] {
  const known = systems.get(graph);
  if (known !== undefined) return known;
  const rings = aromaticRings(graph);
  const group = rings.map((_, index) => index);
  for (let a = 0; a < rings.length; a++) {
    for (let b = 0; b < a; b++) {
      if (group[a] === group[b] || !shareBond(rings[a]!, rings[b]!)) continue;
      const [old, kept] = [group[a]!, group[b]!];
      group.forEach((value, index) => {
        if (value === old) group[index] = kept;
      });
    }
  }
  const made = [...new Set(group)].map((id) => [
    ...new Set(rings.filter((_, index) => group[index] === id).flat()),
  ]);
  systems.set(graph, made);
  return made;
}

function aromaticRings(graph: Graph): readonly (readonly number[])[] {
  return graph.rings.filter((ring) => ring.every((atom) => graph.atoms[atom]!.aromatic));
}

function shareBond(first: readonly number[], second: readonly number[]): boolean {
  return 2 <= first.filter((atom) => second.includes(atom)).length;
}

const coresBySite = new WeakMap<Graph, Map<number, readonly Core[]>>();

/** The ring systems that bear on a site, nearest first. */
export function coresOf(graph: Graph, site: number): readonly Core[] {
  let found = coresBySite.get(graph);
  if (found === undefined) {
    found = new Map();
    coresBySite.set(graph, found);
  }
  let cores = found.get(site);
  if (cores === undefined) {
    cores = findCores(graph, site);
    found.set(site, cores);
  }
  return cores;
}

function findCores(graph: Graph, site: number): Core[] {
  const cores: Core[] = [];
  for (const atoms of ringSystems(graph)) {
    const set = new Set(atoms);
    if (set.has(site)) {
      cores.push({ atoms: set, anchor: site, reach: 0, way: -1, places: placesIn(graph, set, site) });
      continue;
    }
    const { anchor, reach, way } = nearest(graph, set, site);
    if (anchor !== -1) cores.push({ atoms: set, anchor, reach, way, places: placesIn(graph, set, anchor) });
  }
  return cores.sort((a, b) => a.reach - b.reach);
}

/** The ring atom that is met first from a site, by a chain outside other aromatic rings. */
function nearest(
  graph: Graph,
  ring: ReadonlySet<number>,
  site: number,
): Pick<Core, 'anchor' | 'reach' | 'way'> {
  let front = [site];
  const ways = new Map([[site, -1]]);
  for (let reach = 1; reach <= FARTHEST; reach++) {
    const next: number[] = [];
    for (const atom of front) {
      if (graph.atoms[atom]!.aromatic && atom !== site) continue;
      for (const other of graph.atoms[atom]!.neighbours) {
        if (ways.has(other)) continue;
        const way = atom === site ? other : ways.get(atom)!;
        if (ring.has(other)) return { anchor: other, reach, way };
        ways.set(other, way);
        next.push(other);
      }
    }
    front = next;
  }
  return { anchor: -1, reach: 0, way: -1 };
}

/**
 * Places of ring atoms counted from the anchor.
 *
 * In the anchor's own six-membered ring o, m, p; in its five-membered ring a (beside it), b (across), each with the
 * kind of atom that the short way passes; elsewhere f, the distance, whether resonance reaches it, and through which
 * place of the anchor's ring the way leads.
 */
function placesIn(graph: Graph, core: ReadonlySet<number>, anchor: number): Map<number, string> {
  const distance = distances(graph, core, anchor);
  const own = graph.rings.filter((ring) => ring.includes(anchor) && ring.every((atom) => core.has(atom)));
  const places = new Map<number, string>();
  const fused: number[] = [];
  for (const atom of core) {
    if (atom === anchor) continue;
    const d = distance.get(atom) ?? 9;
    const ring = own.find((candidate) => candidate.includes(atom));
    if (ring === undefined) fused.push(atom);
    else if (ring.length === 6) places.set(atom, ['i', 'o', 'm', 'p'][d] ?? 'p');
    else places.set(atom, placeInSmallRing(graph, ring, anchor, atom));
  }
  const held = [...places];
  for (const atom of fused) {
    const d = distance.get(atom) ?? 9;
    const own = distances(graph, core, atom);
    const [door, way] = held
      .map(([other, place]) => [place, own.get(other) ?? 9] as const)
      .sort((a, b) => a[1] - b[1] || (a[0] < b[0] ? -1 : 1))[0] ?? ['i', d];
    places.set(atom, `f${d}${d % 2 === 1 ? 'c' : 'n'}${door}${way}`);
  }
  return places;
}

function placeInSmallRing(graph: Graph, ring: readonly number[], anchor: number, atom: number): string {
  const steps = (ring.indexOf(atom) - ring.indexOf(anchor) + ring.length) % ring.length;
  const forward = steps * 2 <= ring.length;
  const at = (place: number) => ring[(place + 2 * ring.length) % ring.length]!;
  const end = ring.indexOf(atom);
  const hetero = (index: number) => (graph.atoms[index]!.element === 'C' ? '' : 'x');
  const short = forward ? steps : ring.length - steps;
  // Beside the anchor the neighbour on the far side tells N–C–N from C–C–N; across, the atom that is passed.
  if (short === 1) return `a${hetero(at(forward ? end + 1 : end - 1))}`;
  return `b${hetero(at(forward ? end - 1 : end + 1))}`;
}

function distances(graph: Graph, core: ReadonlySet<number>, anchor: number): Map<number, number> {
  const found = new Map([[anchor, 0]]);
  let front = [anchor];
  for (let d = 1; front.length !== 0; d++) {
    const next: number[] = [];
    for (const atom of front) {
      for (const other of graph.atoms[atom]!.neighbours) {
        if (!core.has(other) || found.has(other)) continue;
        found.set(other, d);
        next.push(other);
      }
    }
    front = next;
  }
  return found;
}

/** A name of the ring system with its heteroatoms and doubly bound substituents as the anchor sees it. */
export function frameName(graph: Graph, core: Core): string {
  const kinds = atomKinds(graph);
  const counts = new Map<string, number>();
  for (const [atom, place] of core.places) {
    const kind = kinds[atom]!;
    const part = kind === 'c' ? place.slice(0, 3) : `${place}${kind}`;
    counts.set(part, (counts.get(part) ?? 0) + 1);
  }
  return `${kinds[core.anchor]}|${[...counts]
    .map(([part, count]) => part + count)
    .sort()
    .join('')}`;
}
