/**
 * Tells which atoms of a fragment are equal by its constitution: they have equal surroundings at every distance.
 *
 * Knows: graphs.  Must not know: acidity.
 * Invariant: classes agree with those of an independent canonizer.   (tests/chemistry/symmetry.test.ts)
 * Absent on purpose: stereochemistry, which does not change a constant by more than its uncertainty.
 * Cost: each round looks only at atoms beside those that the round before told apart.
 */
import type { Graph } from './graph.ts';

/** For each atom of the fragment its class; two atoms of one class are interchangeable. */
export function symmetryClasses(graph: Graph, fragment: readonly number[]): Map<number, number> {
  const classes = new Map<number, number>(fragment.map((atom) => [atom, 0]));
  const sizes = [fragment.length];
  let changed = split(new Set(fragment), (atom) => {
    const { number, charge, hydrogens, isotope, aromatic } = graph.atoms[atom]!;
    return `${number} ${charge} ${hydrogens} ${isotope} ${aromatic}`;
  });
  let beside = new Set(fragment);
  do {
    changed = split(beside, surroundings);
    beside = new Set(changed.flatMap((atom) => graph.atoms[atom]!.neighbours));
  } while (changed.length !== 0);
  return classes;

  function surroundings(atom: number): string {
    const { neighbours, bonds } = graph.atoms[atom]!;
    const around = neighbours.map((other, place) => {
      const { aromatic, order } = graph.bonds[bonds[place]!]!;
      return classes.get(other)! * 8 + (aromatic ? 5 : order);
    });
    return around.sort((a, b) => a - b).join(' ');
  }

  /**
   * Gives atoms of one class that are described differently different classes.
   *
   * Atoms of a class that are not looked at stay together: nothing beside them has changed. They, or the largest part
   * where all are looked at, keep the number of the class.
   *
   * @returns the atoms whose class is new
   */
  function split(atoms: ReadonlySet<number>, describe: (atom: number) => string): number[] {
    const parts = new Map<number, Map<string, number[]>>();
    for (const atom of atoms) {
      const name = classes.get(atom)!;
      if (sizes[name] === 1) continue;
      const byText = parts.get(name) ?? new Map<string, number[]>();
      parts.set(name, byText);
      const text = describe(atom);
      const part = byText.get(text);
      if (part === undefined) byText.set(text, [atom]);
      else part.push(atom);
    }
    const moved: number[] = [];
    for (const [name, byText] of parts) {
      const members = [...byText.values()].sort((a, b) => b.length - a.length);
      const looked = members.reduce((sum, part) => sum + part.length, 0);
      for (const part of looked < sizes[name]! ? members : members.slice(1)) {
        const fresh = sizes.push(part.length) - 1;
        sizes[name]! -= part.length;
        for (const atom of part) classes.set(atom, fresh);
        moved.push(...part);
      }
    }
    return moved;
  }
}
