/**
 * Bonds between an atom and all others of its graph; −1 where there is no way.
 *
 * Knows: graphs.  Must not know: acidity.
 */
import type { Graph } from './graph.ts';

const known = new WeakMap<Graph, Map<number, Int16Array>>();

export function bondDistances(graph: Graph, start: number): Int16Array {
  const ofGraph = known.get(graph) ?? new Map<number, Int16Array>();
  known.set(graph, ofGraph);
  const cached = ofGraph.get(start);
  if (cached !== undefined) return cached;
  const found = new Int16Array(graph.atoms.length).fill(-1);
  found[start] = 0;
  const queue = [start];
  for (let head = 0; head < queue.length; head++) {
    const atom = queue[head]!;
    for (const next of graph.atoms[atom]!.neighbours) {
      if (found[next] !== -1) continue;
      found[next] = found[atom]! + 1;
      queue.push(next);
    }
  }
  ofGraph.set(start, found);
  return found;
}
