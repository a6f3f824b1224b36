import fc from 'fast-check';
import { expect, test } from 'vitest';
import { largestMatching } from '../../server/src/chemistry/matching.ts';

/** The largest number of pairs, by trying every choice. */
function mostPairs(neighbours: readonly (readonly number[])[], free: readonly boolean[]): number {
  const first = free.indexOf(true);
  if (first === -1) return 0;
  const rest = free.map((value, vertex) => value && vertex !== first);
  const partners = neighbours[first]!.filter((other) => rest[other]);
  return Math.max(
    mostPairs(neighbours, rest),
    ...partners.map(
      (other) =>
        1 +
        mostPairs(
          neighbours,
          rest.map((value, vertex) => value && vertex !== other),
        ),
    ),
  );
}

test('pairs as many vertices as trying every choice does, along edges only', () => {
  const graphs = fc
    .integer({ min: 1, max: 9 })
    .chain((count) =>
      fc
        .array(fc.tuple(fc.nat(count - 1), fc.nat(count - 1)), { maxLength: 16 })
        .map((edges) =>
          Array.from({ length: count }, (_, vertex) => [
            ...new Set(
              edges.flatMap(([a, b]) => (a === b ? [] : a === vertex ? [b] : b === vertex ? [a] : [])),
            ),
          ]),
        ),
    );
  fc.assert(
    fc.property(graphs, (neighbours) => {
      const partner = largestMatching(neighbours);
      partner.forEach((other, vertex) => {
        if (other === -1) return;
        expect(partner[other]).toBe(vertex);
        expect(neighbours[vertex]).toContain(other);
      });
      const pairs = partner.filter((other) => other !== -1).length / 2;
      expect(pairs).toBe(
        mostPairs(
          neighbours,
          neighbours.map(() => true),
        ),
      );
    }),
    { numRuns: 500 },
  );
});
