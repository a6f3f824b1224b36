/**
 * Names the atoms of a fragment by their surroundings, so that a row of a table can point at a site.
 *
 * Knows: graphs.  Must not know: acidity, tables.
 * Invariant: equal atoms have equal names, and a molecule written otherwise has the same names.   (tests/chemistry/site-names.test.ts)
 * A name is a 32-bit number mixed from everything within reach; two different atoms of one molecule share one by
 * accident once in about a thousand million pairs.
 */
import type { Graph } from './graph.ts';

/** Bonds within which surroundings are looked at. */
const REACH = 24;

/** The name of each atom of the fragment. */
export function siteNames(graph: Graph, fragment: readonly number[]): Map<number, number> {
  let names = new Map(
    fragment.map((atom) => {
      const { number, charge, hydrogens, isotope, aromatic } = graph.atoms[atom]!;
      return [atom, [number, charge, hydrogens, isotope, aromatic ? 1 : 0].reduce(mixed, 1)] as const;
    }),
  );
  for (let round = 0; round < Math.min(REACH, fragment.length); round++) {
    names = new Map(
      fragment.map((atom) => {
        const { neighbours, bonds } = graph.atoms[atom]!;
        const around = neighbours.map((next, place) => {
          const { aromatic, order } = graph.bonds[bonds[place]!]!;
          return mixed(names.get(next)!, aromatic ? 5 : order);
        });
        return [atom, around.sort((a, b) => a - b).reduce(mixed, names.get(atom)!)] as const;
      }),
    );
  }
  return names;
}

/** One number out of two, different for nearly all pairs. */
function mixed(first: number, second: number): number {
  let hash = Math.imul(first ^ (second + 0x9e3779b9), 0x85ebca6b);
  hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
  return (hash ^ (hash >>> 16)) >>> 0;
}
