/**
 * Boric acids give one proton for each boron, by taking up hydroxide, however many hydroxyl groups they carry.
 *
 * Knows: graphs.  Must not know: constants, tables.
 */
import type { Graph } from './graph.ts';

/** The family of couples that count once for each boron. */
const FAMILY = 'boronic-acid';

/**
 * Of the sites of one kind those that count: for each boron one hydroxyl group, one without its proton if there is
 * any, else one that the plan has named.
 *
 * @param familyOf the family of the couple at an atom
 * @param lacksProton whether the drawing has taken the proton from an atom
 */
export function countedSites(
  graph: Graph,
  sites: readonly number[],
  familyOf: (atom: number) => string,
  lacksProton: (atom: number) => boolean,
): number[] {
  const chosen = new Map<number, number>();
  const rank = (atom: number) => (lacksProton(atom) ? 2 : graph.atoms[atom]!.mapNumber !== 0 ? 1 : 0);
  for (const atom of sites) {
    const boron = familyOf(atom) === FAMILY ? boronOf(graph, atom) : -1;
    if (boron === -1) continue;
    const known = chosen.get(boron);
    if (known === undefined || rank(known) < rank(atom)) chosen.set(boron, atom);
  }
  if (chosen.size === 0) return [...sites];
  return sites.filter((atom) => {
    const boron = familyOf(atom) === FAMILY ? boronOf(graph, atom) : -1;
    return boron === -1 || chosen.get(boron) === atom;
  });
}

function boronOf(graph: Graph, atom: number): number {
  return graph.atoms[atom]!.neighbours.find((next) => graph.atoms[next]!.element === 'B') ?? -1;
}
