/**
 * The scaffold of a molecule: its rings and the chains between them, without what hangs on them.
 *
 * Two molecules have one scaffold when its atoms have the same elements and neighbours.
 */
import { buildGraph } from '../src/chemistry/build-graph.ts';
import type { Graph } from '../src/chemistry/graph.ts';
import { neutralForm } from '../src/chemistry/neutral.ts';
import { readSmiles } from '../src/chemistry/smiles.ts';

/** Rounds after which the name of an atom holds its surroundings in any scaffold of a drug's size. */
const ROUNDS = 6;

/** Name of the scaffold with the family of the site; null for molecules without rings. */
export function siteScaffold(smiles: string, family: string): string | null {
  const { structure } = readSmiles(smiles);
  const built = structure === undefined ? undefined : buildGraph(structure).graph;
  if (built === undefined) return null;
  const { graph } = neutralForm(built);
  const kept = pruned(graph);
  return kept.size === 0 ? null : `${family} ${named(graph, kept)}`;
}

function pruned(graph: Graph): Set<number> {
  const inRing = new Set(graph.rings.flat());
  const kept = new Set(graph.atoms.map(({ index }) => index));
  const ends = () =>
    [...kept].filter(
      (atom) =>
        !inRing.has(atom) && graph.atoms[atom]!.neighbours.filter((next) => kept.has(next)).length < 2,
    );
  for (let gone = ends(); gone.length !== 0; gone = ends()) for (const atom of gone) kept.delete(atom);
  return kept;
}

function named(graph: Graph, kept: ReadonlySet<number>): string {
  let names = new Map(
    [...kept].map((atom) => {
      const { element, aromatic } = graph.atoms[atom]!;
      return [atom, `${element}${aromatic ? ':' : ''}`];
    }),
  );
  const numbers = new Map<string, number>();
  for (let round = 0; round < ROUNDS; round++) {
    names = new Map(
      [...names].map(([atom, name]) => {
        const around = graph.atoms[atom]!.neighbours.flatMap((next) => names.get(next) ?? []).sort();
        const key = `${name}(${around.join()})`;
        // A short number stands for a long name, so that names do not double with each round.
        if (!numbers.has(key)) numbers.set(key, hash(key));
        return [atom, numbers.get(key)!.toString(36)];
      }),
    );
  }
  return [...names.values()].sort().join('.');
}

function hash(text: string): number {
  let value = 5381;
  for (let place = 0; place < text.length; place++) value = (value * 33 + text.charCodeAt(place)) >>> 0;
  return value;
}
