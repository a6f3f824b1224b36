/**
 * Finds where a pattern fits a graph.
 *
 * Knows: graphs and patterns.  Must not know: what a pattern means.
 * Invariants:
 *  1. The atoms found equal RDKit's for every rule of the tables.   (tests/chemistry/match.test.ts)
 *  2. Stops after a fixed amount of work per pattern; a cage cannot hang it.   (same)
 */
import type { Graph } from './graph.ts';
import type { AtomQuery, BondQuery, Pattern } from './smarts.ts';

/** Steps that one pattern may take on one graph. */
const WORK_LIMIT = 200_000;

/** What queries ask about the atoms of a graph, worked out once. */
interface View {
  readonly graph: Graph;
  readonly totalHydrogens: Uint8Array;
  readonly valences: Uint8Array;
  readonly ringBonds: Uint8Array;
  /** Size of the smallest ring of each atom; 0 outside rings. */
  readonly smallestRing: Uint16Array;
  /** Atoms by atomic number. */
  readonly byNumber: ReadonlyMap<number, readonly number[]>;
  readonly all: readonly number[];
  readonly inner: Map<Compiled, Inner>;
}

/** What is known about a pattern inside a pattern, and the work that is left for all atoms together. */
interface Inner {
  /** 0 unknown, 1 yes, 2 no. */
  readonly known: Uint8Array;
  readonly work: { left: number };
}

type AtomTest = (view: View, atom: number) => boolean;
type BondTest = (view: View, bond: number) => boolean;

interface Stage {
  readonly test: AtomTest;
  /** Stage whose atom this one hangs on; −1 for the first of a separate part. */
  readonly parent: number;
  readonly bond: BondTest | null;
  /** Ring bonds back to earlier stages. */
  readonly closures: readonly { readonly stage: number; readonly bond: BondTest }[];
}

interface Compiled {
  readonly stages: readonly Stage[];
  /** Stage of each atom of the pattern. */
  readonly stageOf: readonly number[];
  /** Atomic numbers that the first atom can have; null for any. */
  readonly numbers: readonly number[] | null;
}

const compiledPatterns = new WeakMap<Pattern, Compiled>();
const views = new WeakMap<Graph, View>();

/** The distinct atoms that the pattern's first atom can be, in ascending order. */
export function matchSites(graph: Graph, pattern: Pattern): number[] {
  const view = viewOf(graph);
  const compiled = compile(pattern);
  const work = { left: WORK_LIMIT };
  return candidates(view, compiled).filter((atom) => fits(view, compiled, atom, work));
}

/** All embeddings that differ in their set of atoms, each in the order of the pattern's atoms. */
export function matchAll(graph: Graph, pattern: Pattern, limit = 1000): number[][] {
  const view = viewOf(graph);
  const compiled = compile(pattern);
  const work = { left: WORK_LIMIT };
  const found: number[][] = [];
  const seen = new Set<string>();
  for (const atom of candidates(view, compiled)) {
    embed(view, compiled, atom, work, (atoms) => {
      const key = [...atoms].sort((a, b) => a - b).join(' ');
      if (!seen.has(key)) {
        seen.add(key);
        found.push(compiled.stageOf.map((stage) => atoms[stage]!));
      }
      return limit <= found.length;
    });
    if (limit <= found.length) break;
  }
  return found;
}

/** Whether the pattern fits with its first atom on this one. */
export function matchesAt(graph: Graph, pattern: Pattern, atom: number): boolean {
  return fits(viewOf(graph), compile(pattern), atom, { left: WORK_LIMIT });
}

function candidates(view: View, { numbers }: Compiled): readonly number[] {
  if (numbers === null) return view.all;
  if (numbers.length === 1) return view.byNumber.get(numbers[0]!) ?? [];
  return numbers.flatMap((number) => view.byNumber.get(number) ?? []).sort((a, b) => a - b);
}

function fits(view: View, compiled: Compiled, atom: number, work: { left: number }): boolean {
  if (compiled.stages.length === 1) return compiled.stages[0]!.test(view, atom);
  let found = false;
  embed(view, compiled, atom, work, () => {
    found = true;
    return true;
  });
  return found;
}

/** Walks through all embeddings from one first atom; stops when the visitor answers true. */
function embed(
  view: View,
  { stages }: Compiled,
  first: number,
  work: { left: number },
  visit: (atoms: readonly number[]) => boolean,
): void {
  if (!stages[0]!.test(view, first)) return;
  const { atoms: graphAtoms } = view.graph;
  const placed = [first];
  extend(1);

  function extend(stage: number): boolean {
    if (stage === stages.length) return visit(placed);
    const { parent, bond, test, closures } = stages[stage]!;
    if (parent === -1) {
      for (const atom of view.all) if (tryAtom(atom)) return true;
      return false;
    }
    const from = graphAtoms[placed[parent]!]!;
    for (let place = 0; place < from.neighbours.length; place++) {
      if (bond!(view, from.bonds[place]!) && tryAtom(from.neighbours[place]!)) return true;
    }
    return false;

    function tryAtom(atom: number): boolean {
      work.left -= 1;
      if (work.left < 0) return true;
      if (placed.includes(atom) || !test(view, atom)) return false;
      for (const closure of closures) {
        const other = graphAtoms[placed[closure.stage]!]!;
        const place = other.neighbours.indexOf(atom);
        if (place === -1 || !closure.bond(view, other.bonds[place]!)) return false;
      }
      placed.push(atom);
      const done = extend(stage + 1);
      placed.pop();
      return done;
    }
  }
}

function viewOf(graph: Graph): View {
  let view = views.get(graph);
  if (view !== undefined) return view;
  const count = graph.atoms.length;
  const totalHydrogens = new Uint8Array(count);
  const valences = new Uint8Array(count);
  const ringBonds = new Uint8Array(count);
  const smallestRing = new Uint16Array(count);
  const byNumber = new Map<number, number[]>();
  for (const { index, hydrogens, neighbours, bonds, number } of graph.atoms) {
    totalHydrogens[index] = neighbours.reduce(
      (sum, other) => sum + (graph.atoms[other]!.number === 1 ? 1 : 0),
      hydrogens,
    );
    valences[index] = bonds.reduce((sum, bond) => sum + graph.bonds[bond]!.order, hydrogens);
    ringBonds[index] = bonds.reduce((sum, bond) => sum + (graph.bonds[bond]!.inRing ? 1 : 0), 0);
    const list = byNumber.get(number);
    if (list === undefined) byNumber.set(number, [index]);
    else list.push(index);
  }
  for (const ring of graph.rings) {
    for (const atom of ring) {
      if (smallestRing[atom] === 0 || ring.length < smallestRing[atom]!) smallestRing[atom] = ring.length;
    }
  }
  view = {
    graph,
    totalHydrogens,
    valences,
    ringBonds,
    smallestRing,
    byNumber,
    all: graph.atoms.map(({ index }) => index),
    inner: new Map(),
  };
  views.set(graph, view);
  return view;
}

function compile(pattern: Pattern): Compiled {
  let compiled = compiledPatterns.get(pattern);
  if (compiled !== undefined) return compiled;
  const order: number[] = [];
  const stageOf = pattern.atoms.map(() => -1);
  const parents: number[] = [];
  const treeBonds: (BondTest | null)[] = [];
  const usedBonds = new Set<number>();
  for (let root = 0; root < pattern.atoms.length; root++) {
    if (stageOf[root] !== -1) continue;
    place(root, -1, null);
    for (let head = order.length - 1; head < order.length; head++) {
      const atom = order[head]!;
      pattern.bonds.forEach(({ from, to, query }, bond) => {
        const other = from === atom ? to : to === atom ? from : -1;
        if (other === -1 || stageOf[other] !== -1) return;
        usedBonds.add(bond);
        place(other, head, compileBond(query));
      });
    }
  }
  const stages = order.map((atom, stage): Stage => {
    const closures = pattern.bonds.flatMap(({ from, to, query }, bond) => {
      if (usedBonds.has(bond)) return [];
      const other = from === atom ? to : to === atom ? from : -1;
      return other !== -1 && stageOf[other]! < stage
        ? [{ stage: stageOf[other]!, bond: compileBond(query) }]
        : [];
    });
    return {
      test: compileAtom(pattern.atoms[atom]!),
      parent: parents[stage]!,
      bond: treeBonds[stage]!,
      closures,
    };
  });
  compiled = { stages, stageOf, numbers: numbersOf(pattern.atoms[0]!) };
  compiledPatterns.set(pattern, compiled);
  return compiled;

  function place(atom: number, parent: number, bond: BondTest | null): void {
    stageOf[atom] = order.length;
    order.push(atom);
    parents.push(parent);
    treeBonds.push(bond);
  }
}

function compileAtom(query: AtomQuery): AtomTest {
  switch (query[0]) {
    case 'and': {
      const tests = query.slice(1).map((part) => compileAtom(part as AtomQuery));
      return (view, atom) => tests.every((test) => test(view, atom));
    }
    case 'or': {
      const tests = query.slice(1).map((part) => compileAtom(part as AtomQuery));
      return (view, atom) => tests.some((test) => test(view, atom));
    }
    case 'not': {
      const test = compileAtom(query[1]);
      return (view, atom) => !test(view, atom);
    }
    case 'within':
      return compileInner(compile(query[1]));
    default:
      return compilePrimitive(query[0], query[1]);
  }
}

/** A pattern inside a pattern is asked once for each atom of a graph. */
function compileInner(pattern: Compiled): AtomTest {
  return (view, atom) => {
    let inner = view.inner.get(pattern);
    if (inner === undefined) {
      inner = { known: new Uint8Array(view.all.length), work: { left: WORK_LIMIT } };
      view.inner.set(pattern, inner);
    }
    const { known, work } = inner;
    if (known[atom] === 0) known[atom] = fits(view, pattern, atom, work) ? 1 : 2;
    return known[atom] === 1;
  };
}

function compilePrimitive(word: string, value: number): AtomTest {
  switch (word) {
    case 'number':
      return ({ graph }, atom) => graph.atoms[atom]!.number === value;
    case 'aromatic':
      return ({ graph }, atom) => graph.atoms[atom]!.aromatic;
    case 'aliphatic':
      return ({ graph }, atom) => !graph.atoms[atom]!.aromatic;
    case 'ring':
      return ({ ringBonds }, atom) => ringBonds[atom] !== 0;
    case 'hydrogens':
      return ({ totalHydrogens }, atom) => totalHydrogens[atom] === value;
    case 'degree':
      return ({ graph }, atom) => graph.atoms[atom]!.neighbours.length === value;
    case 'connections':
      return ({ graph }, atom) =>
        graph.atoms[atom]!.neighbours.length + graph.atoms[atom]!.hydrogens === value;
    case 'valence':
      return ({ valences }, atom) => valences[atom] === value;
    case 'ringSize':
      return ({ smallestRing }, atom) => smallestRing[atom] === value;
    case 'ringBonds':
      return ({ ringBonds }, atom) => ringBonds[atom] === value;
    case 'charge':
      return ({ graph }, atom) => graph.atoms[atom]!.charge === value;
    default:
      return () => true;
  }
}

function compileBond(query: BondQuery): BondTest {
  switch (query[0]) {
    case 'and': {
      const tests = query.slice(1).map((part) => compileBond(part as BondQuery));
      return (view, bond) => tests.every((test) => test(view, bond));
    }
    case 'or': {
      const tests = query.slice(1).map((part) => compileBond(part as BondQuery));
      return (view, bond) => tests.some((test) => test(view, bond));
    }
    case 'not': {
      const test = compileBond(query[1]);
      return (view, bond) => !test(view, bond);
    }
    case 'order': {
      const order = query[1];
      return ({ graph }, bond) => graph.bonds[bond]!.order === order && !graph.bonds[bond]!.aromatic;
    }
    case 'aromatic':
      return ({ graph }, bond) => graph.bonds[bond]!.aromatic;
    case 'ring':
      return ({ graph }, bond) => graph.bonds[bond]!.inRing;
    case 'usual':
      return ({ graph }, bond) => graph.bonds[bond]!.aromatic || graph.bonds[bond]!.order === 1;
    default:
      return () => true;
  }
}

/** Atomic numbers that a query allows; null where it does not say. */
function numbersOf(query: AtomQuery): number[] | null {
  switch (query[0]) {
    case 'number':
      return [query[1]];
    case 'and':
      for (const part of query.slice(1)) {
        const numbers = numbersOf(part as AtomQuery);
        if (numbers !== null) return numbers;
      }
      return null;
    case 'or': {
      const parts = query.slice(1).map((part) => numbersOf(part as AtomQuery));
      if (parts.some((part) => part === null)) return null;
      return [...new Set(parts.flatMap((part) => part ?? []))];
    }
    case 'within':
      return numbersOf(query[1].atoms[0]!);
    default:
      return null;
  }
}
