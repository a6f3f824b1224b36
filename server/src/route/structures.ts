/**
 * What the language needs to know of a structure: whether it can be, its molar mass, its mapped atoms, its key.
 *
 * Knows: structures.  Must not know: names, amounts, acidity.
 * Units: g/mol.
 */
import { buildGraph } from '../chemistry/build-graph.ts';
import type { Graph } from '../chemistry/graph.ts';
import type { Span } from '../chemistry/molecule.ts';
import { neutralForm } from '../chemistry/neutral.ts';
import { readSmiles } from '../chemistry/smiles.ts';
import { canonicalKey, molarMass } from '../chemistry/toolkit.ts';
import { boundedCache } from '../tables/cache.ts';

export interface KnownStructure {
  readonly problem: {
    readonly check: 'unreadable-structure' | 'impossible-valence';
    readonly message: string;
    readonly span: Span;
  } | null;
  readonly molarMass: number | null;
  /** Atoms by map number, in the order of the text. */
  readonly sites: ReadonlyMap<number, readonly number[]>;
  readonly graph: Graph | null;
}

/** Larger structures are read but not worked on; the flask reports its own limit. */
const LARGEST = 2000;
const structures = boundedCache<string, KnownStructure>(6000);
const keys = boundedCache<string, string>(2000);

/** Reads a SMILES; never throws. */
export function structureOf(smiles: string): KnownStructure {
  const known = structures.get(smiles);
  if (known !== undefined) return known;
  const structure = look(smiles);
  structures.set(smiles, structure);
  return structure;
}

function look(smiles: string): KnownStructure {
  const nothing = { molarMass: null, sites: new Map<number, number[]>(), graph: null };
  const read = readSmiles(smiles);
  if (read.structure === undefined)
    return { ...nothing, problem: { check: 'unreadable-structure', ...read.problem } };
  const sites = new Map<number, number[]>();
  for (const { mapNumber, index } of read.structure.atoms) {
    if (mapNumber === 0) continue;
    const atoms = sites.get(mapNumber);
    if (atoms === undefined) sites.set(mapNumber, [index]);
    else atoms.push(index);
  }
  if (LARGEST < read.structure.atoms.length) return { ...nothing, sites, problem: null };
  const built = buildGraph(read.structure);
  if (built.graph === undefined) return { ...nothing, sites, problem: built.problem };
  return { problem: null, molarMass: molarMass(built.graph), sites, graph: built.graph };
}

/** Key of a substance as the tables hold it: its neutral fragments' keys in order; null where there is no graph. */
export function substanceKey(smiles: string): string | null {
  const known = keys.get(smiles);
  if (known !== undefined) return known;
  const { graph } = structureOf(smiles);
  if (graph === null) return null;
  const neutral = neutralForm(graph);
  const key = neutral.graph.fragments
    .filter((fragment) => !fragment.every((atom) => neutral.absorbed.has(atom)))
    .map((fragment) => canonicalKey(neutral.graph, fragment) ?? '?')
    .sort()
    .join(' ');
  keys.set(smiles, key);
  return key;
}

/** Key that tells drawings of different charge apart: what two definitions of one name must share. */
export function sameStructure(one: string, other: string): boolean {
  if (one === other) return true;
  const a = structureOf(one).graph;
  const b = structureOf(other).graph;
  if (a === null || b === null) return false;
  const key = (graph: Graph) =>
    graph.fragments
      .map((fragment) => canonicalKey(graph, fragment) ?? '?')
      .sort()
      .join(' ');
  return key(a) === key(b) && !key(a).includes('?');
}
