/**
 * Finds where a pattern fits a graph.
 *
 * Knows: graphs and patterns.  Must not know: what a pattern means.
 * Invariants:
 *  1. The atoms found equal RDKit's for every rule of the tables.   (tests/chemistry/match.test.ts)
 *  2. Stops after a fixed amount of work per pattern; a cage cannot hang it.   (same)
 */
import { type Compiled, compilePattern, holds, type Stage } from './compile-pattern.ts';
import type { Graph } from './graph.ts';
import { type View, viewOf } from './graph-view.ts';
import type { Pattern } from './smarts.ts';

/** Steps that one pattern may take on one graph. */
const WORK_LIMIT = 200_000;

/** How a search ends: nothing there, as much as was wanted, or out of work. */
const NOTHING = 0;
const ENOUGH = 1;
const SPENT = 2;

interface Search {
  readonly view: View;
  readonly stages: readonly Stage[];
  /** Atom at each stage. */
  readonly placed: number[];
  readonly work: { left: number };
  /** Told of every embedding; true ends the search. */
  readonly visit: (placed: readonly number[]) => boolean;
}

/** The distinct atoms that the pattern's first atom can be, in ascending order. */
export function matchSites(graph: Graph, pattern: Pattern): number[] {
  const view = viewOf(graph);
  const compiled = compilePattern(pattern);
  if (!hasAll(view, compiled)) return [];
  const work = { left: WORK_LIMIT };
  const sites: number[] = [];
  for (const atom of candidates(view, compiled)) if (fits(view, compiled, atom, work)) sites.push(atom);
  return sites;
}

/** All embeddings that differ in their set of atoms, each in the order of the pattern's atoms. */
export function matchAll(graph: Graph, pattern: Pattern, limit = 1000): number[][] {
  const view = viewOf(graph);
  const compiled = compilePattern(pattern);
  const found: number[][] = [];
  const seen = new Set<string>();
  const search: Search = {
    view,
    stages: compiled.stages,
    placed: [],
    work: { left: WORK_LIMIT },
    visit: (placed) => {
      const key = [...placed].sort((a, b) => a - b).join(' ');
      if (!seen.has(key)) {
        seen.add(key);
        found.push(compiled.stageOf.map((stage) => placed[stage]!));
      }
      return limit <= found.length;
    },
  };
  if (!hasAll(view, compiled)) return [];
  for (const atom of candidates(view, compiled)) if (begin(search, atom) !== NOTHING) break;
  return found;
}

/** Whether the pattern fits with its first atom on this one. */
export function matchesAt(graph: Graph, pattern: Pattern, atom: number): boolean {
  return fits(viewOf(graph), compilePattern(pattern), atom, { left: WORK_LIMIT });
}

function hasAll({ present }: View, { needs }: Compiled): boolean {
  for (const need of needs) if ((present & need) === 0) return false;
  return true;
}

function candidates(view: View, { numbers }: Compiled): readonly number[] {
  if (numbers === null) return view.all;
  if (numbers.length === 1) return view.byNumber.get(numbers[0]!) ?? [];
  return numbers.flatMap((number) => view.byNumber.get(number) ?? []).sort((a, b) => a - b);
}

const first = () => true;

function fits(view: View, { stages }: Compiled, atom: number, work: { left: number }): boolean {
  if (!holds(stages[0]!.condition, view, atom, fitsInner)) return false;
  if (stages.length === 1) return true;
  return extend({ view, stages, placed: [atom], work, visit: first }, 1) === ENOUGH;
}

/** A pattern inside a pattern is asked once for each atom of a graph. */
function fitsInner(view: View, inner: Compiled, atom: number): boolean {
  let answers = view.inner.get(inner);
  if (answers === undefined) {
    answers = { known: new Uint8Array(view.all.length), work: { left: WORK_LIMIT } };
    if (!hasAll(view, inner)) answers.known.fill(2);
    view.inner.set(inner, answers);
  }
  const { known, work } = answers;
  if (known[atom] === 0) known[atom] = fits(view, inner, atom, work) ? 1 : 2;
  return known[atom] === 1;
}

function begin(search: Search, atom: number): number {
  const { view, stages, placed } = search;
  if (!holds(stages[0]!.condition, view, atom, fitsInner)) return NOTHING;
  placed.length = 0;
  placed.push(atom);
  return extend(search, 1);
}

/** Places the atoms from this stage on in every way that fits. */
function extend(search: Search, stage: number): number {
  const { view, stages, placed } = search;
  if (stage === stages.length) return search.visit(placed) ? ENOUGH : NOTHING;
  const { parent, bond } = stages[stage]!;
  if (parent === -1) {
    for (const atom of view.all) {
      const end = tryAtom(search, stage, atom);
      if (end !== NOTHING) return end;
    }
    return NOTHING;
  }
  const { neighbours, bonds } = view.graph.atoms[placed[parent]!]!;
  for (let place = 0; place < neighbours.length; place++) {
    if (((bond >>> view.bondKeys[bonds[place]!]!) & 1) === 0) continue;
    const end = tryAtom(search, stage, neighbours[place]!);
    if (end !== NOTHING) return end;
  }
  return NOTHING;
}

function tryAtom(search: Search, stage: number, atom: number): number {
  const { view, stages, placed, work } = search;
  work.left -= 1;
  if (work.left < 0) return SPENT;
  for (let earlier = 0; earlier < stage; earlier++) if (placed[earlier] === atom) return NOTHING;
  const { condition, closures } = stages[stage]!;
  if (!holds(condition, view, atom, fitsInner)) return NOTHING;
  for (const { stage: earlier, bond } of closures) {
    const other = view.graph.atoms[placed[earlier]!]!;
    const place = other.neighbours.indexOf(atom);
    if (place === -1 || ((bond >>> view.bondKeys[other.bonds[place]!]!) & 1) === 0) return NOTHING;
  }
  placed.push(atom);
  const end = extend(search, stage + 1);
  placed.length = stage;
  return end;
}
