/** Graphs from text, for tests. */
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';

/** The graph of a SMILES. @throws where it cannot be read */
export function graphOf(smiles: string): Graph {
  const { structure, problem } = readSmiles(smiles);
  if (structure === undefined) throw new Error(`${smiles}: ${problem.message}`);
  const built = buildGraph(structure);
  if (built.graph === undefined) throw new Error(`${smiles}: ${built.problem.message}`);
  return built.graph;
}
