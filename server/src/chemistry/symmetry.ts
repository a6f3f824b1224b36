/**
 * Tells which atoms of a fragment are equal by its constitution: they have equal surroundings at every distance.
 *
 * Knows: graphs.  Must not know: acidity.
 * Invariant: classes agree with those of an independent canonizer.   (tests/chemistry/symmetry.test.ts)
 * Absent on purpose: stereochemistry, which does not change a constant by more than its uncertainty.
 * Cost: one pass over the bonds for each bond of distance that still splits a class.
 */
import type { Graph } from './graph.ts';

/** Fragments of more atoms are not refined: each atom is its own class. */
const LARGEST = 600;

/** For each atom of the fragment its class; two atoms of one class are interchangeable. */
export function symmetryClasses(graph: Graph, fragment: readonly number[]): Map<number, number> {
  if (LARGEST < fragment.length) return new Map(fragment.map((atom) => [atom, atom]));
  let classes = new Map<number, number>();
  let count = 0;
  assign((atom) => {
    const { number, charge, hydrogens, isotope, aromatic } = graph.atoms[atom]!;
    return `${number} ${charge} ${hydrogens} ${isotope} ${aromatic}`;
  });
  for (let before = 0; before < count && count < fragment.length; ) {
    before = count;
    assign((atom) => {
      const { neighbours, bonds } = graph.atoms[atom]!;
      const around = neighbours.map((other, place) => {
        const { aromatic, order } = graph.bonds[bonds[place]!]!;
        return classes.get(other)! * 8 + (aromatic ? 5 : order);
      });
      return `${classes.get(atom)} ${around.sort((a, b) => a - b)}`;
    });
  }
  return classes;

  function assign(description: (atom: number) => string): void {
    const known = new Map<string, number>();
    const next = new Map<number, number>();
    for (const atom of fragment) {
      const text = description(atom);
      let found = known.get(text);
      if (found === undefined) {
        found = known.size;
        known.set(text, found);
      }
      next.set(atom, found);
    }
    classes = next;
    count = known.size;
  }
}
