/**
 * Prints a graph, or some of its atoms, as plain Kekulé SMILES without stereochemistry or map numbers.
 *
 * Knows: graphs.  Must not know: canonical orders, which are a library's work.
 * Invariant: what is printed reads back as the same graph.   (tests/chemistry/write-smiles.test.ts)
 */
import { valencesOf } from './elements.ts';
import type { Graph, GraphAtom } from './graph.ts';

const WITHOUT_BRACKETS = new Set(['B', 'C', 'N', 'O', 'P', 'S', 'F', 'Cl', 'Br', 'I']);
const SYMBOLS = ['', '', '=', '#', '$'];

export interface Written {
  readonly text: string;
  /** Atom of the graph at each place of the text's order. */
  readonly order: readonly number[];
}

/** SMILES of the given atoms (all where none are given); they must be whole fragments. */
export function writeSmiles(graph: Graph, chosen?: readonly number[]): Written {
  const seen = new Set<number>();
  const order: number[] = [];
  const parts: string[] = [];
  for (const root of chosen ?? graph.atoms.map(({ index }) => index)) {
    if (!seen.has(root)) parts.push(writeFragment(graph, root, seen, order));
  }
  return { text: parts.join('.'), order };
}

function writeFragment(graph: Graph, root: number, seen: Set<number>, order: number[]): string {
  const { children, closures } = walk(graph, root);
  const digits = new Map<number, number>();
  const free: number[] = [];
  let highest = 0;
  const text: string[] = [];
  const stack: (string | { readonly atom: number; readonly by: number })[] = [{ atom: root, by: -1 }];
  while (stack.length !== 0) {
    const top = stack.pop()!;
    if (typeof top === 'string') {
      text.push(top);
      continue;
    }
    const atom = graph.atoms[top.atom]!;
    seen.add(atom.index);
    order.push(atom.index);
    text.push(top.by === -1 ? '' : SYMBOLS[graph.bonds[top.by]!.order]!, symbolOfAtom(graph, atom));
    for (const bond of closures.get(atom.index) ?? []) {
      const open = digits.get(bond);
      if (open === undefined) {
        const digit = free.pop() ?? ++highest;
        digits.set(bond, digit);
        text.push(SYMBOLS[graph.bonds[bond]!.order]!, digit < 10 ? `${digit}` : `%${digit}`);
      } else {
        free.push(open);
        text.push(open < 10 ? `${open}` : `%${open}`);
      }
    }
    const onward = children.get(atom.index) ?? [];
    onward.forEach((next, place) => {
      if (place === 0) stack.push(next);
      else stack.push(')', next, '(');
    });
  }
  return text.join('');
}

/** The tree that the text follows, and at each atom the bonds that close rings. */
function walk(graph: Graph, root: number) {
  const children = new Map<number, { atom: number; by: number }[]>();
  const closures = new Map<number, number[]>();
  const entered = new Set([root]);
  const used = new Set<number>();
  const stack = [{ atom: root, next: 0 }];
  while (stack.length !== 0) {
    const top = stack[stack.length - 1]!;
    const { neighbours, bonds } = graph.atoms[top.atom]!;
    if (neighbours.length <= top.next) {
      stack.pop();
      continue;
    }
    const [other, by] = [neighbours[top.next]!, bonds[top.next]!];
    top.next += 1;
    if (used.has(by)) continue;
    used.add(by);
    if (entered.has(other)) {
      for (const end of [top.atom, other]) closures.set(end, [...(closures.get(end) ?? []), by]);
    } else {
      entered.add(other);
      children.set(top.atom, [...(children.get(top.atom) ?? []), { atom: other, by }]);
      stack.push({ atom: other, next: 0 });
    }
  }
  return { children, closures };
}

function symbolOfAtom(graph: Graph, { element, charge, hydrogens, isotope, bonds }: GraphAtom): string {
  const used = bonds.reduce((sum, bond) => sum + graph.bonds[bond]!.order, 0);
  const implied = WITHOUT_BRACKETS.has(element)
    ? valencesOf(element, 0)?.find((valence) => used <= valence)
    : undefined;
  if (charge === 0 && isotope === 0 && implied !== undefined && implied - used === hydrogens) return element;
  const sign =
    charge === 0 ? '' : `${charge < 0 ? '-' : '+'}${Math.abs(charge) === 1 ? '' : Math.abs(charge)}`;
  const count = hydrogens === 0 ? '' : hydrogens === 1 ? 'H' : `H${hydrogens}`;
  return `[${isotope === 0 ? '' : isotope}${element}${count}${sign}]`;
}
