/**
 * Substituent constants of groups on an arene: published where the group is known, guessed from its first atoms otherwise.
 *
 * Knows: graphs and the rows of `substituents`.  Must not know: sites, scales.
 * Invariants: a guess never goes beyond the range of the published values.   (tests/chemistry/substituents.test.ts)
 * Sources: Hansch, Leo and Taft, Chem. Rev. 1991, 91, 165.
 */

import type { SubstituentRow } from '../tables/rows.ts';
import { unfolded } from './atom-kinds.ts';
import { buildGraph } from './build-graph.ts';
import type { Graph } from './graph.ts';
import { readSmiles } from './smiles.ts';

/** Constants of one substituent; `known` tells published ones from guesses. */
export interface Sigma {
  readonly name: string | null;
  readonly m: number;
  readonly p: number;
  /** What direct conjugation with an electron-rich centre adds to σp. */
  readonly minus: number;
  /** What direct conjugation with an electron-poor centre adds to σp. */
  readonly plus: number;
}

/** Share of a substituent's effect that passes a saturated carbon. */
const THROUGH_CARBON = 0.4;
const NOTHING: Sigma = { name: null, m: 0, p: 0, minus: 0, plus: 0 };

export interface Substituents {
  /** The constants of the branch that starts at `root` when one comes from `from`. */
  readonly sigmaOf: (graph: Graph, root: number, from: number) => Sigma;
}

/** Indexes the table by surroundings of three, two and one bonds. */
export function readSubstituents(rows: readonly SubstituentRow[]): Substituents {
  const byDepth = [3, 2, 1, 0].map((depth) => ({ depth, found: new Map<string, Sigma[]>() }));
  for (const row of rows) {
    const graph = graphOf(row.smiles);
    const from = graph.atoms.findIndex(({ mapNumber }) => mapNumber === 1);
    const root = graph.atoms[from]!.neighbours[0]!;
    const sigma: Sigma = {
      name: row.name,
      m: row.sigmaM,
      p: row.sigmaP,
      minus: (row.sigmaPMinus ?? row.sigmaP) - row.sigmaP,
      plus: (row.sigmaPPlus ?? row.sigmaP) - row.sigmaP,
    };
    for (const { depth, found } of byDepth) {
      const key = unfolded(graph, root, from, depth);
      found.set(key, [...(found.get(key) ?? []), sigma]);
    }
  }
  const sigmaOf = (graph: Graph, root: number, from: number, generation = 0): Sigma => {
    for (const { depth, found } of byDepth) {
      if (depth === 0 && isSaturatedCarbon(graph, root)) break;
      const list = found.get(unfolded(graph, root, from, depth));
      if (list !== undefined) return depth === 3 && list.length === 1 ? list[0]! : mean(list);
    }
    if (!isSaturatedCarbon(graph, root) || 4 < generation) return NOTHING;
    let [m, p] = [-0.07, -0.15];
    for (const next of graph.atoms[root]!.neighbours) {
      if (next === from || isSaturatedCarbon(graph, next)) continue;
      const inner = sigmaOf(graph, next, root, generation + 1);
      m += THROUGH_CARBON * inner.m;
      p += THROUGH_CARBON * inner.m;
    }
    return { name: null, m, p, minus: 0, plus: 0 };
  };
  return { sigmaOf: (graph, root, from) => sigmaOf(graph, root, from) };
}

function isSaturatedCarbon(graph: Graph, index: number): boolean {
  const { element, aromatic, bonds } = graph.atoms[index]!;
  return element === 'C' && !aromatic && bonds.every((bond) => graph.bonds[bond]!.order === 1);
}

function mean(list: readonly Sigma[]): Sigma {
  const of = (pick: (sigma: Sigma) => number) =>
    list.reduce((sum, sigma) => sum + pick(sigma), 0) / list.length;
  return {
    name: null,
    m: of(({ m }) => m),
    p: of(({ p }) => p),
    minus: of(({ minus }) => minus),
    plus: of(({ plus }) => plus),
  };
}

function graphOf(smiles: string): Graph {
  const { structure, problem } = readSmiles(smiles);
  if (structure === undefined) throw new Error(`${smiles}: ${problem.message}`);
  const built = buildGraph(structure);
  if (built.graph === undefined) throw new Error(`${smiles}: ${built.problem.message}`);
  return built.graph;
}
