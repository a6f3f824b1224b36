/**
 * Which atoms of a product look like atoms of its reactants.
 *
 * Atoms are told apart by their surroundings, the closest likeness matched first; a hint for where to point, never a
 * mechanism.
 * Knows: graphs.  Must not know: acidity, flasks.
 * Invariant: every reactant atom explains at most one product atom for each time it is charged.   (tests/flask/convert.test.ts)
 */
import type { Graph } from '../chemistry/graph.ts';

const WIDEST = 3;

/** Product atoms of an element that no reactant atom explains. */
export function unmatchedAtoms(
  product: Graph,
  reactants: readonly { readonly graph: Graph | null; readonly count: number }[],
  element: string,
): number[] {
  const open = new Set(product.atoms.filter((atom) => atom.element === element).map(({ index }) => index));
  const pool = reactants.map(({ graph, count }) => ({
    graph,
    left: new Map(
      (graph?.atoms ?? []).filter((atom) => atom.element === element).map(({ index }) => [index, count]),
    ),
  }));
  for (let width = WIDEST; 0 <= width; width--) {
    const wanted = surroundings(product, width);
    for (const { graph, left } of pool) {
      if (graph === null || left.size === 0) continue;
      const offered = surroundings(graph, width);
      for (const atom of open) {
        const match = [...left.keys()].find((other) => offered[other] === wanted[atom]);
        if (match === undefined) continue;
        open.delete(atom);
        const count = left.get(match)! - 1;
        if (count <= 0) left.delete(match);
        else left.set(match, count);
      }
    }
  }
  return [...open].sort((a, b) => a - b);
}

/** A word for each atom and its neighbours out to some bonds; equal words look alike. */
function surroundings({ atoms }: Graph, width: number): string[] {
  let words = atoms.map(({ element }) => element);
  for (let turn = 0; turn < width; turn++) {
    words = atoms.map(({ index, neighbours }) => {
      const around = neighbours
        .filter((other) => atoms[other]!.element !== 'H')
        .map((other) => words[other]!)
        .sort();
      return `${words[index]}(${around.join()})`;
    });
  }
  return words;
}
