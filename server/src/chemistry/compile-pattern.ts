/**
 * Turns a pattern into the order in which its atoms are placed and quick tests for each of them.
 *
 * Knows: patterns and the packed view of a graph.  Must not know: what a pattern means.
 * Invariant: two patterns of the same content are compiled once; a pattern inside others is asked once for each atom.
 */
import { boundedCache } from '../tables/cache.ts';
import {
  ALL_ALIPHATIC,
  ALL_AROMATIC,
  ATOM_FIELDS,
  BOND_IN_RING,
  BOND_KEYS,
  BOND_KINDS,
  kindsOfElement,
  SOME_CHARGE,
  SOME_RING,
  type View,
} from './graph-view.ts';
import type { AtomQuery, BondQuery, Pattern } from './smarts.ts';

/** A test of an atom that its key alone does not answer; inner patterns are asked by the matcher handed in. */
type AtomTest = (view: View, atom: number, fitsInner: FitsInner) => boolean;
export type FitsInner = (view: View, inner: Compiled, atom: number) => boolean;

/** An atom fits where `key & mask` is `value` and every further test agrees. */
export interface Condition {
  readonly mask: number;
  readonly value: number;
  readonly tests: readonly AtomTest[];
}

export interface Stage {
  readonly condition: Condition;
  /** Stage whose atom this one hangs on; −1 for the first of a separate part. */
  readonly parent: number;
  /** Keys of the bonds allowed to the parent, as bits. */
  readonly bond: number;
  /** Ring bonds back to earlier stages. */
  readonly closures: readonly { readonly stage: number; readonly bond: number }[];
}

export interface Compiled {
  readonly stages: readonly Stage[];
  /** Stage of each atom of the pattern. */
  readonly stageOf: readonly number[];
  /** Atomic numbers that the first atom can have; null for any. */
  readonly numbers: readonly number[] | null;
  /** Sets of kinds of atoms, each of which the graph must have one of. */
  readonly needs: readonly number[];
}

const compiledPatterns = new WeakMap<Pattern, Compiled>();
/** Patterns inside patterns return in many rules. */
const innerPatterns = boundedCache<string, Compiled>(2000);

/** The compiled form of a pattern; the same one every time. */
export function compilePattern(pattern: Pattern): Compiled {
  let compiled = compiledPatterns.get(pattern);
  if (compiled === undefined) {
    compiled = compileAnew(pattern);
    compiledPatterns.set(pattern, compiled);
  }
  return compiled;
}

/** Whether an atom fits a condition. */
export function holds(condition: Condition, view: View, atom: number, fitsInner: FitsInner): boolean {
  if ((view.atomKeys[atom]! & condition.mask) !== condition.value) return false;
  for (const test of condition.tests) if (!test(view, atom, fitsInner)) return false;
  return true;
}

function compileAnew(pattern: Pattern): Compiled {
  const order: number[] = [];
  const stageOf = pattern.atoms.map(() => -1);
  const parents: number[] = [];
  const treeBonds: number[] = [];
  const usedBonds = new Set<number>();
  for (let root = 0; root < pattern.atoms.length; root++) {
    if (stageOf[root] !== -1) continue;
    place(root, -1, 0);
    for (let head = order.length - 1; head < order.length; head++) {
      const atom = order[head]!;
      pattern.bonds.forEach(({ from, to, query }, bond) => {
        const other = from === atom ? to : to === atom ? from : -1;
        if (other === -1 || stageOf[other] !== -1) return;
        usedBonds.add(bond);
        place(other, head, bondsAllowed(query));
      });
    }
  }
  const stages = order.map(
    (atom, stage): Stage => ({
      condition: compileAtom(pattern.atoms[atom]!),
      parent: parents[stage]!,
      bond: treeBonds[stage]!,
      closures: pattern.bonds.flatMap(({ from, to, query }, bond) => {
        if (usedBonds.has(bond)) return [];
        const other = from === atom ? to : to === atom ? from : -1;
        return other !== -1 && stageOf[other]! < stage
          ? [{ stage: stageOf[other]!, bond: bondsAllowed(query) }]
          : [];
      }),
    }),
  );
  return { stages, stageOf, numbers: numbersOf(pattern.atoms[0]!), needs: needsOf(pattern) };

  function place(atom: number, parent: number, bond: number): void {
    stageOf[atom] = order.length;
    order.push(atom);
    parents.push(parent);
    treeBonds.push(bond);
  }
}

const ANY: Condition = { mask: 0, value: 0, tests: [] };
const NEVER: Condition = { mask: 0, value: 1, tests: [] };

function compileAtom(query: AtomQuery): Condition {
  switch (query[0]) {
    case 'and':
      return query
        .slice(1)
        .map((part) => compileAtom(part as AtomQuery))
        .reduce(both, ANY);
    case 'or': {
      const parts = query.slice(1).map((part) => compileAtom(part as AtomQuery));
      const test: AtomTest = (view, atom, fitsInner) => {
        for (const part of parts) if (holds(part, view, atom, fitsInner)) return true;
        return false;
      };
      return { ...ANY, tests: [test] };
    }
    case 'not': {
      const inside = query[1];
      if (inside[0] === 'ring') return field('ring', 0);
      if (inside[0] === 'aromatic') return field('aromatic', 0);
      const part = compileAtom(inside);
      return { ...ANY, tests: [(view, atom, fitsInner) => !holds(part, view, atom, fitsInner)] };
    }
    case 'within': {
      const inner = compileInner(query[1]);
      return { ...ANY, tests: [(view, atom, fitsInner) => fitsInner(view, inner, atom)] };
    }
    default:
      return compilePrimitive(query[0], query[1]);
  }
}

function compileInner(pattern: Pattern): Compiled {
  const key = JSON.stringify(pattern);
  let compiled = innerPatterns.get(key);
  if (compiled === undefined) {
    compiled = compileAnew(pattern);
    innerPatterns.set(key, compiled);
  }
  return compiled;
}

/** Both conditions at once. */
function both(one: Condition, other: Condition): Condition {
  const shared = one.mask & other.mask;
  if ((one.value & shared) !== (other.value & shared)) return NEVER;
  return {
    mask: one.mask | other.mask,
    value: one.value | other.value,
    tests: [...one.tests, ...other.tests],
  };
}

function field(name: keyof typeof ATOM_FIELDS, value: number): Condition {
  const { shift, bits } = ATOM_FIELDS[name];
  return { mask: (2 ** bits - 1) << shift, value: value << shift, tests: [] };
}

function compilePrimitive(word: string, value: number): Condition {
  switch (word) {
    case 'number':
      return value < 127 ? field('number', value) : NEVER;
    case 'aromatic':
      return field('aromatic', 1);
    case 'aliphatic':
      return field('aromatic', 0);
    case 'ring':
      return field('ring', 1);
    case 'charge':
      return -8 < value && value < 7
        ? field('charge', value + 8)
        : exactly(({ graph }, atom) => graph.atoms[atom]!.charge === value);
    case 'hydrogens':
      return value < 7
        ? field('hydrogens', value)
        : exactly((view, atom) => totalHydrogens(view, atom) === value);
    case 'degree':
      return value < 7
        ? field('degree', value)
        : exactly(({ graph }, atom) => graph.atoms[atom]!.neighbours.length === value);
    case 'connections':
      return value < 7
        ? field('connections', value)
        : exactly(
            ({ graph }, atom) =>
              graph.atoms[atom]!.neighbours.length + graph.atoms[atom]!.hydrogens === value,
          );
    case 'ringBonds':
      return value < 7 ? field('ringBonds', value) : NEVER;
    case 'valence':
      return value < 15 ? field('valence', value) : NEVER;
    case 'ringSize':
      return exactly(({ smallestRing }, atom) => smallestRing[atom] === value);
    default:
      return ANY;
  }
}

function exactly(test: AtomTest): Condition {
  return { ...ANY, tests: [test] };
}

function totalHydrogens({ graph }: View, atom: number): number {
  const { neighbours, hydrogens } = graph.atoms[atom]!;
  return neighbours.reduce((sum, other) => sum + (graph.atoms[other]!.number === 1 ? 1 : 0), hydrogens);
}

/** The keys of bonds that a query allows, as bits. */
function bondsAllowed(query: BondQuery): number {
  let allowed = 0;
  for (let key = 0; key < BOND_KEYS; key++) if (allowsBond(query, key)) allowed |= 1 << key;
  return allowed;
}

function allowsBond(query: BondQuery, key: number): boolean {
  const kind = key % BOND_IN_RING;
  switch (query[0]) {
    case 'and':
      return query.slice(1).every((part) => allowsBond(part as BondQuery, key));
    case 'or':
      return query.slice(1).some((part) => allowsBond(part as BondQuery, key));
    case 'not':
      return !allowsBond(query[1], key);
    case 'order':
      return kind === query[1] - 1;
    case 'aromatic':
      return kind === BOND_KINDS.aromatic;
    case 'ring':
      return BOND_IN_RING <= key;
    case 'usual':
      return kind === BOND_KINDS.aromatic || kind === BOND_KINDS.single;
    default:
      return true;
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

const EVERY_KIND = ALL_ALIPHATIC | ALL_AROMATIC;

/** What a graph must have for the pattern to fit anywhere. */
function needsOf({ atoms }: Pattern): number[] {
  const needs = new Set<number>();
  for (const query of atoms) {
    const kinds = kindsOf(query);
    if (kinds !== EVERY_KIND) needs.add(kinds);
    addNeeds(query, needs);
  }
  return [...needs];
}

/** Kinds of atoms that can fit a query. */
function kindsOf(query: AtomQuery): number {
  switch (query[0]) {
    case 'and':
      return query.slice(1).reduce((kinds: number, part) => kinds & kindsOf(part as AtomQuery), EVERY_KIND);
    case 'or':
      return query.slice(1).reduce((kinds: number, part) => kinds | kindsOf(part as AtomQuery), 0);
    case 'number':
      return kindsOfElement(query[1]);
    case 'aromatic':
      return ALL_AROMATIC;
    case 'aliphatic':
      return ALL_ALIPHATIC;
    case 'within':
      return kindsOf(query[1].atoms[0]!);
    default:
      return EVERY_KIND;
  }
}

/** Further needs of an atom that has to fit: rings, charges, and what its inner patterns need. */
function addNeeds(query: AtomQuery, needs: Set<number>): void {
  switch (query[0]) {
    case 'and':
      for (const part of query.slice(1)) addNeeds(part as AtomQuery, needs);
      return;
    case 'ring':
      needs.add(SOME_RING);
      return;
    case 'ringSize':
      if (0 < query[1]) needs.add(SOME_RING);
      return;
    case 'charge':
      if (query[1] !== 0) needs.add(SOME_CHARGE);
      return;
    case 'within':
      for (const need of needsOf(query[1])) needs.add(need);
  }
}
