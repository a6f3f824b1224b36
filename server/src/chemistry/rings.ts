/**
 * Finds which bonds lie in rings and the smallest rings through them.
 *
 * Knows: vertices and edges.  Must not know: elements, acidity.
 * Cost: linear for the ring bonds; for the rings, each ring bond costs one search that stops at `LARGEST_RING`.
 */

/** Rings of more atoms than this are ring bonds without a listed ring. */
const LARGEST_RING = 60;
/** Atoms looked at in all searches together; a cage beyond it keeps the rings found so far. */
const SEARCH_BUDGET = 4_000_000;

export interface Edge {
  readonly from: number;
  readonly to: number;
}

export interface Adjacency {
  /** Neighbouring vertices and, at the same place, the edges to them. */
  readonly neighbours: readonly (readonly number[])[];
  readonly edges: readonly (readonly number[])[];
}

/** Neighbour lists of a graph. */
export function adjacencyOf(count: number, edges: readonly Edge[]): Adjacency {
  const neighbours: number[][] = Array.from({ length: count }, () => []);
  const incident: number[][] = Array.from({ length: count }, () => []);
  edges.forEach(({ from, to }, edge) => {
    neighbours[from]!.push(to);
    neighbours[to]!.push(from);
    incident[from]!.push(edge);
    incident[to]!.push(edge);
  });
  return { neighbours, edges: incident };
}

/** For each edge whether it lies in any ring: every edge that is no bridge. */
export function ringEdges(count: number, edges: readonly Edge[], adjacency: Adjacency): boolean[] {
  const inRing = edges.map(() => true);
  const entered = new Int32Array(count).fill(-1);
  const lowest = new Int32Array(count);
  let clock = 0;
  for (let root = 0; root < count; root++) {
    if (entered[root] !== -1) continue;
    const path = [{ vertex: root, by: -1, next: 0 }];
    entered[root] = lowest[root] = clock++;
    while (path.length !== 0) {
      const top = path[path.length - 1]!;
      const { vertex } = top;
      if (top.next < adjacency.neighbours[vertex]!.length) {
        const edge = adjacency.edges[vertex]![top.next]!;
        const other = adjacency.neighbours[vertex]![top.next]!;
        top.next += 1;
        if (edge === top.by) continue;
        if (entered[other] !== -1) {
          lowest[vertex] = Math.min(lowest[vertex]!, entered[other]!);
        } else {
          entered[other] = lowest[other] = clock++;
          path.push({ vertex: other, by: edge, next: 0 });
        }
      } else {
        path.pop();
        const above = path[path.length - 1];
        if (above === undefined) continue;
        lowest[above.vertex] = Math.min(lowest[above.vertex]!, lowest[vertex]!);
        if (entered[above.vertex]! < lowest[vertex]!) inRing[top.by] = false;
      }
    }
  }
  return inRing;
}

/** The smallest ring through each ring edge, each ring once, as vertices in ring order. */
export function smallestRings(
  count: number,
  edges: readonly Edge[],
  adjacency: Adjacency,
  inRing: readonly boolean[],
): number[][] {
  const rings: number[][] = [];
  const known = new Set<string>();
  const cameFrom = new Int32Array(count);
  const distance = new Int32Array(count);
  let budget = SEARCH_BUDGET;
  edges.forEach((edge, index) => {
    if (!inRing[index] || budget <= 0) return;
    const ring = shortestWayBack(edge, index);
    if (ring === null) return;
    const key = [...ring].sort((a, b) => a - b).join(' ');
    if (known.has(key)) return;
    known.add(key);
    rings.push(ring);
  });
  return rings;

  function shortestWayBack({ from, to }: Edge, avoided: number): number[] | null {
    cameFrom.fill(-1);
    cameFrom[from] = from;
    distance[from] = 1;
    const queue = [from];
    for (let head = 0; head < queue.length; head++) {
      const vertex = queue[head]!;
      if (vertex === to) return trace(from, to);
      if (LARGEST_RING <= distance[vertex]!) return null;
      const neighbours = adjacency.neighbours[vertex]!;
      for (let place = 0; place < neighbours.length; place++) {
        const edge = adjacency.edges[vertex]![place]!;
        const other = neighbours[place]!;
        if (edge === avoided || !inRing[edge] || cameFrom[other] !== -1) continue;
        cameFrom[other] = vertex;
        distance[other] = distance[vertex]! + 1;
        queue.push(other);
        budget -= 1;
      }
    }
    return null;
  }

  function trace(from: number, to: number): number[] {
    const ring = [to];
    for (let vertex = to; vertex !== from; ) {
      vertex = cameFrom[vertex]!;
      ring.push(vertex);
    }
    return ring;
  }
}

/** Vertices of each connected part, in order of their first vertex. */
export function partsOf(count: number, adjacency: Adjacency): number[][] {
  const seen = new Uint8Array(count);
  const parts: number[][] = [];
  for (let root = 0; root < count; root++) {
    if (seen[root] === 1) continue;
    seen[root] = 1;
    const part = [root];
    for (let head = 0; head < part.length; head++) {
      for (const other of adjacency.neighbours[part[head]!]!) {
        if (seen[other] === 1) continue;
        seen[other] = 1;
        part.push(other);
      }
    }
    parts.push(part.sort((a, b) => a - b));
  }
  return parts;
}
