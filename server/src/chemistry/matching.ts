/**
 * Pairs up vertices along edges so that as many as possible have a partner: places the double bonds of aromatic rings.
 *
 * Knows: numbers.  Must not know: atoms.
 * Cost: cubic at worst in the number of vertices, near linear after the greedy start.
 * Sources: Edmonds, Canad. J. Math. 1965, 17, 449 (blossoms).
 */

/**
 * A largest matching.
 *
 * @param neighbours  for each vertex the vertices it may be paired with
 * @returns for each vertex its partner, −1 where it has none
 */
export function largestMatching(neighbours: readonly (readonly number[])[]): Int32Array {
  const count = neighbours.length;
  const partner = new Int32Array(count).fill(-1);
  // Vertices with few choices first: this alone finishes almost every ring system.
  const order = neighbours
    .map((_, vertex) => vertex)
    .sort((a, b) => neighbours[a]!.length - neighbours[b]!.length);
  for (const vertex of order) {
    if (partner[vertex] !== -1) continue;
    let best = -1;
    for (const other of neighbours[vertex]!) {
      if (partner[other] !== -1) continue;
      if (best === -1 || free(other) < free(best)) best = other;
    }
    if (best !== -1) {
      partner[vertex] = best;
      partner[best] = vertex;
    }
  }
  for (let vertex = 0; vertex < count; vertex++)
    if (partner[vertex] === -1) augment(neighbours, partner, vertex);
  return partner;

  function free(vertex: number): number {
    return neighbours[vertex]!.reduce((sum, other) => sum + (partner[other] === -1 ? 1 : 0), 0);
  }
}

/** Looks for an augmenting path from an unpaired vertex and flips it. */
function augment(neighbours: readonly (readonly number[])[], partner: Int32Array, root: number): void {
  const count = neighbours.length;
  const parent = new Int32Array(count).fill(-1);
  const base = Int32Array.from({ length: count }, (_, vertex) => vertex);
  const used = new Uint8Array(count);
  used[root] = 1;
  const queue = [root];
  for (let head = 0; head < queue.length; head++) {
    const vertex = queue[head]!;
    for (const other of neighbours[vertex]!) {
      if (base[vertex] === base[other] || partner[vertex] === other) continue;
      if (other === root || (partner[other] !== -1 && parent[partner[other]!] !== -1)) {
        contract(vertex, other);
      } else if (parent[other] === -1) {
        parent[other] = vertex;
        if (partner[other] === -1) {
          flip(other);
          return;
        }
        used[partner[other]!] = 1;
        queue.push(partner[other]!);
      }
    }
  }

  function contract(vertex: number, other: number): void {
    const common = commonBase(vertex, other);
    const inBlossom = new Uint8Array(count);
    markPath(vertex, common, other, inBlossom);
    markPath(other, common, vertex, inBlossom);
    for (let each = 0; each < count; each++) {
      if (inBlossom[base[each]!] === 0) continue;
      base[each] = common;
      if (used[each] === 0) {
        used[each] = 1;
        queue.push(each);
      }
    }
  }

  function commonBase(first: number, second: number): number {
    const seen = new Uint8Array(count);
    for (let vertex = first; ; vertex = parent[partner[vertex]!]!) {
      vertex = base[vertex]!;
      seen[vertex] = 1;
      if (partner[vertex] === -1) break;
    }
    for (let vertex = second; ; vertex = parent[partner[vertex]!]!) {
      vertex = base[vertex]!;
      if (seen[vertex] === 1) return vertex;
    }
  }

  function markPath(from: number, stop: number, child: number, inBlossom: Uint8Array): void {
    let below = child;
    for (let vertex = from; base[vertex] !== stop; vertex = parent[partner[vertex]!]!) {
      inBlossom[base[vertex]!] = 1;
      inBlossom[base[partner[vertex]!]!] = 1;
      parent[vertex] = below;
      below = partner[vertex]!;
    }
  }

  function flip(end: number): void {
    for (let vertex = end; vertex !== -1; ) {
      const above = parent[vertex]!;
      const next = partner[above]!;
      partner[vertex] = above;
      partner[above] = vertex;
      vertex = next;
    }
  }
}
