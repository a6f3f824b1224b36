/**
 * The keys by which rows of tables are found again: of a substance as it is sold, and of a marked site.
 *
 * Knows: structures.  Must not know: tables, files.
 * Invariant: a key does not depend on how the molecule is written.   (tests/chemistry/measured.test.ts)
 * Units: g/mol.
 */
import { buildGraph } from './build-graph.ts';
import type { Graph } from './graph.ts';
import { neutralForm } from './neutral.ts';
import { siteNames } from './site-names.ts';
import { readSmiles } from './smiles.ts';
import { canonicalKey, molarMass } from './toolkit.ts';

export interface MarkedSite {
  readonly key: string;
  readonly atoms: readonly number[];
  readonly classes: readonly number[];
}

/** Key of a substance, the keys of its fragments in order, metals and counterions included. @throws Error in words */
export function substanceIdentity(smiles: string): { readonly key: string; readonly mass: number | null } {
  const graph = graphOf(smiles);
  const neutral = neutralForm(graph);
  const keys = neutral.graph.fragments
    .filter((fragment) => !fragment.every((atom) => neutral.absorbed.has(atom)))
    .map((fragment) => canonicalKey(neutral.graph, fragment) ?? '?')
    .sort();
  return { key: keys.join(' '), mass: molarMass(graph) };
}

/** Key of a neutral molecule and names of its atoms marked `:1`. @throws Error in words */
export function markedSite(smiles: string): MarkedSite {
  const neutral = neutralForm(graphOf(smiles));
  const fragment = neutral.graph.fragments.find(
    (atoms) => !atoms.every((atom) => neutral.absorbed.has(atom)),
  )!;
  const names = siteNames(neutral.graph, fragment);
  const atoms = neutral.graph.atoms.filter(({ mapNumber }) => mapNumber === 1).map(({ index }) => index);
  if (atoms.length === 0) throw new Error(`${smiles} marks no site with :1`);
  return {
    key: canonicalKey(neutral.graph, fragment) ?? '?',
    atoms,
    classes: [...new Set(atoms.flatMap((atom) => names.get(atom) ?? []))],
  };
}

function graphOf(smiles: string): Graph {
  const { structure, problem } = readSmiles(smiles);
  if (structure === undefined) throw new Error(`${smiles}: ${problem.message}`);
  const built = buildGraph(structure);
  if (built.graph === undefined) throw new Error(`${smiles}: ${built.problem.message}`);
  return built.graph;
}
