/**
 * Short names for atoms and their surroundings, by which the estimator looks up substituents.
 *
 * Knows: graphs.  Must not know: acidity, tables.
 * Invariants: a name depends only on elements, bonds, charges and hydrogens, never on the order of atoms.   (tests/chemistry/atom-kinds.test.ts)
 */
import type { Graph, GraphAtom } from './graph.ts';

const HETERO = new Set(['O', 'N', 'S', 'P', 'Se', 'F', 'Cl', 'Br', 'I']);

/** Kinds of all atoms of a graph, worked out once. */
const kinds = new WeakMap<Graph, readonly string[]>();

export function atomKinds(graph: Graph): readonly string[] {
  const known = kinds.get(graph);
  if (known !== undefined) return known;
  const made = graph.atoms.map((atom) => kindOf(graph, atom));
  kinds.set(graph, made);
  return made;
}

/** Order of the bond between two neighbours; 0 where they are none. */
export function orderBetween(graph: Graph, first: number, second: number): number {
  for (const bond of graph.atoms[first]!.bonds) {
    const { from, to, order } = graph.bonds[bond]!;
    if ((from === first ? to : from) === second) return order;
  }
  return 0;
}

/**
 * The surroundings of an atom seen from one side, unfolded to a number of bonds, as one name.
 *
 * @param from the neighbour that one comes from; −1 to see all sides
 */
export function unfolded(graph: Graph, atom: number, from: number, depth: number): string {
  const own = atomKinds(graph)[atom]!;
  if (depth === 0) return own;
  const sides = graph.atoms[atom]!.neighbours.filter((next) => next !== from)
    .map((next) => bondMark(graph, atom, next) + unfolded(graph, next, atom, depth - 1))
    .sort();
  return sides.length === 0 ? own : `${own}(${sides.join(',')})`;
}

function bondMark(graph: Graph, first: number, second: number): string {
  if (graph.atoms[first]!.aromatic && graph.atoms[second]!.aromatic) return '';
  const order = orderBetween(graph, first, second);
  return order === 2 ? '=' : order === 3 ? '#' : '';
}

function kindOf(graph: Graph, atom: GraphAtom): string {
  const { element, charge, hydrogens } = atom;
  const sign = permanentCharge(graph, atom) ? (charge < 0 ? '-' : '+') : '';
  if (atom.aromatic) return aromaticKind(graph, atom) + sign;
  switch (element) {
    case 'C':
      return carbonKind(graph, atom) + sign;
    case 'N':
      return nitrogenKind(graph, atom) + sign;
    case 'O':
    case 'S':
    case 'Se':
    case 'Te':
      return chalcogenKind(graph, atom) + sign;
    case 'P':
    case 'As':
      return `${element}${doublyBound(graph, atom).length === 0 ? '' : '=O'}${hydrogens === 0 ? '' : 'H'}${sign}`;
    default:
      return element + sign;
  }
}

/** Whether a charge acts on the surroundings as a whole charge, not as one end of a dipole (nitro, N-oxide). */
export function permanentCharge(graph: Graph, { charge, neighbours }: GraphAtom): boolean {
  return charge !== 0 && !neighbours.some((next) => graph.atoms[next]!.charge * charge < 0);
}

function aromaticKind(graph: Graph, atom: GraphAtom): string {
  const { element, hydrogens, neighbours, charge } = atom;
  if (element === 'C') {
    const double = doublyBound(graph, atom).find((next) => !graph.atoms[next]!.aromatic);
    return double === undefined ? 'c' : `c=${graph.atoms[double]!.element}`;
  }
  if (element !== 'N') return element.toLowerCase();
  if (charge !== 0) return neighbours.some((next) => graph.atoms[next]!.charge < 0) ? 'nO' : 'n';
  return hydrogens !== 0 ? 'nH' : neighbours.length === 3 ? 'nR' : 'n';
}

function carbonKind(graph: Graph, atom: GraphAtom): string {
  const double = doublyBound(graph, atom);
  const singles = atom.neighbours
    .filter((next) => !double.includes(next))
    .map((next) => graph.atoms[next]!.element)
    .filter((element) => HETERO.has(element))
    .sort();
  if (atom.neighbours.some((next) => orderBetween(graph, atom.index, next) === 3)) {
    const third = atom.neighbours.find((next) => orderBetween(graph, atom.index, next) === 3)!;
    return `C#${graph.atoms[third]!.element}`;
  }
  if (double.length === 0) return `C${atom.hydrogens}`;
  const to = double
    .map((next) => graph.atoms[next]!.element)
    .sort()
    .join('');
  if (to === 'C') return `C=C${singles.join('')}`;
  const hydrogen = atom.hydrogens !== 0 && singles.length === 0 ? 'H' : '';
  return `C=${to}${singles.join('')}${hydrogen}`;
}

function nitrogenKind(graph: Graph, atom: GraphAtom): string {
  const { hydrogens, neighbours, charge, index } = atom;
  const oxygens = neighbours.filter(
    (next) => graph.atoms[next]!.element === 'O' && graph.atoms[next]!.neighbours.length === 1,
  );
  if (charge === 1 && oxygens.length === 2) return 'NO2';
  if (neighbours.some((next) => orderBetween(graph, index, next) === 3)) return 'N#';
  const double = doublyBound(graph, atom);
  if (double.length !== 0) return `N=${graph.atoms[double[0]!]!.element}`;
  const acyl = neighbours.some((next) => isAcyl(graph, next));
  return `${acyl ? 'Na' : 'N'}${hydrogens}`;
}

function chalcogenKind(graph: Graph, atom: GraphAtom): string {
  const { element, hydrogens, neighbours, index } = atom;
  const double = doublyBound(graph, atom);
  if (neighbours.length === 1 && double.length === 1) return `=${element}`;
  if (double.length !== 0) return `${element}(=O)${double.length}`;
  if (hydrogens !== 0) return `${element}H`;
  const acyl = neighbours.some((next) => isAcyl(graph, next) && orderBetween(graph, index, next) === 1);
  return acyl ? `${element}a` : element;
}

/** Whether an atom is C, S or P that is doubly bound to O, S or N outside aromatic rings. */
function isAcyl(graph: Graph, index: number): boolean {
  const atom = graph.atoms[index]!;
  if (atom.aromatic || !['C', 'S', 'P'].includes(atom.element)) return false;
  return doublyBound(graph, atom).some((next) => ['O', 'S'].includes(graph.atoms[next]!.element));
}

function doublyBound(graph: Graph, { index, neighbours }: GraphAtom): number[] {
  return neighbours.filter((next) => orderBetween(graph, index, next) === 2);
}
