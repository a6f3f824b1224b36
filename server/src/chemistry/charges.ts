/**
 * How strongly a charge at one site moves the constant of another, by the bonds between them.
 *
 * Knows: graphs.  Must not know: groups, tables.
 * Units: pK units per unit charge.
 * Sources: stepwise constants of dicarboxylic acids, diamines and amino acids (Perrin, Dempsey and Serjeant 1981), worked out.
 */
import { atomKinds } from './atom-kinds.ts';
import { coresOf } from './cores.ts';
import { bondDistances } from './distances.ts';
import type { Graph } from './graph.ts';

/** By number of bonds between the two charged atoms, from one bond. */
const BY_DISTANCE = [8.5, 4.6, 2.4, 1.15, 0.72, 0.45, 0.33, 0.27, 0.22, 0.18, 0.15];
/** What each further way of the same length adds: rings carry a charge's pull on both sides. */
const FURTHER_WAY = 0.6;
/** Beyond this no pull is felt. */
const FARTHEST = 14;

/** Positive charge on an aromatic base also ends its donation into the ring: its effect on others of the ring grows. */
const DONATION_ENDS = 1.7;
/** A site counts as one of a ring system up to this many bonds from it. */
const CLOSE = 2;

/** How much stronger an aromatic base acts on a site of the same ring system. */
export function donationFactor(graph: Graph, first: number, second: number): number {
  const near = (site: number) => coresOf(graph, site).filter(({ reach }) => reach <= CLOSE);
  const others = near(second);
  const shared = near(first).some(({ atoms, anchor }) =>
    others.some((other) => atoms.has(other.anchor) && other.atoms.has(anchor)),
  );
  return shared ? DONATION_ENDS : 1;
}

/** How much stronger two bases push each other where one is part of an aromatic ring: it has no solvent of its own about its charge. */
export function basesFactor(graph: Graph, first: number, second: number): number {
  const mixed = isRingNitrogen(graph, first) !== isRingNitrogen(graph, second);
  return mixed ? DONATION_ENDS : donationFactor(graph, first, second);
}

function isRingNitrogen(graph: Graph, index: number): boolean {
  const { element, aromatic } = graph.atoms[index]!;
  return element === 'N' && aromatic;
}

/** Interaction of unit charges at two atoms; 0 where they belong to different fragments. */
export function chargePull(graph: Graph, first: number, second: number): number {
  const distance = bondDistances(graph, first);
  const d = distance[second]!;
  if (d <= 0 || FARTHEST < d) return 0;
  const base = BY_DISTANCE[d - 1] ?? 1.5 / d;
  return base * (1 + FURTHER_WAY * Math.min(2, waysBetween(graph, distance, second) - 1));
}

/** Number of shortest ways that arrive through different last atoms. */
function waysBetween(graph: Graph, distance: Int16Array, end: number): number {
  const arrivals = graph.atoms[end]!.neighbours.filter(
    (next) => distance[next] === distance[end]! - 1,
  ).length;
  return Math.max(1, arrivals);
}

/**
 * Whether a proton that leaves one atom and one that comes to the other make a tautomer, not a zwitterion.
 *
 * So it is where every atom between them is part of the same π system.
 */
export function makesTautomer(graph: Graph, first: number, second: number): boolean {
  const kinds = atomKinds(graph);
  const seen = new Set([first]);
  const queue = [first];
  for (let head = 0; head < queue.length; head++) {
    for (const next of graph.atoms[queue[head]!]!.neighbours) {
      if (next === second) return true;
      if (seen.has(next) || SATURATED.test(kinds[next]!)) continue;
      seen.add(next);
      queue.push(next);
    }
  }
  return false;
}

/** Kinds of atoms that end a π system. */
const SATURATED = /^(C[0-4]|N[0-3]|Na[0-3]|O|OH|S|SH|P.*|S\(.*)$/;
