/** Half-lives of alkyllithiums in ethers: as measured at the points, in order between them, silent far away. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { lifetimeAt } from '../../server/src/flask/lifetime.ts';
import { tables } from '../support/tables.ts';

const hours = (reagent: string, solvent: string, celsius: number) =>
  lifetimeAt(tables.limits, reagent, solvent, celsius)?.hours ?? null;

// P. Stanetty, M. D. Mihovilovic, J. Org. Chem. 1997, 62, 1514, from memory.
test.each([
  ['n-BuLi', 'THF', 0, 17],
  ['n-BuLi', 'THF', 20, 1.78],
  ['n-BuLi', 'Et2O', 25, 153],
  ['s-BuLi', 'Et2O', -20, 19.8],
  ['t-BuLi', 'THF', -40, 5.63],
])('%s in %s at %i °C', (reagent, solvent, celsius, measured) => {
  expect(hours(reagent, solvent, celsius)).toBeCloseTo(measured, 6);
});

test('between two points the half-life lies between theirs and falls with temperature', () => {
  const degree = fc.double({ min: 0, max: 20, noNaN: true });
  fc.assert(
    fc.property(degree, degree, (one, other) => {
      const [cold, warm] = [Math.min(one, other), Math.max(one, other)];
      expect(hours('n-BuLi', 'THF', warm)!).toBeLessThanOrEqual(hours('n-BuLi', 'THF', cold)! * (1 + 1e-12));
      expect(hours('n-BuLi', 'THF', cold)!).toBeLessThanOrEqual(17 * (1 + 1e-12));
      expect(hours('n-BuLi', 'THF', warm)!).toBeGreaterThanOrEqual(1.78 * (1 - 1e-12));
    }),
  );
});

test('far from any point, and for a pair without points, nothing is said', () => {
  expect(hours('n-BuLi', 'THF', -78)).toBeNull();
  expect(hours('LDA', 'THF', 0)).toBeNull();
  expect(hours('n-BuLi', 'toluene', 0)).toBeNull();
  expect(lifetimeAt(tables.limits, 'n-BuLi', 'THF', -20)!.isExtrapolated).toBe(true);
});
