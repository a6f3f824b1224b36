import fc from 'fast-check';
import { expect, test } from 'vitest';
import { meanProtons, solveBalance } from '../../server/src/flask/balance.ts';

const constants = fc
  .array(fc.double({ min: -2, max: 16, noNaN: true }), { minLength: 1, maxLength: 5 })
  .map((values) => values.sort((a, b) => a - b));

test('protons held never rise with pH and stay between none and all', () => {
  fc.assert(
    fc.property(constants, fc.double({ min: -3, max: 17, noNaN: true }), (pKa, pH) => {
      const here = meanProtons(pKa, pH);
      expect(here).toBeGreaterThanOrEqual(0);
      expect(here).toBeLessThanOrEqual(pKa.length + 1e-12);
      expect(meanProtons(pKa, pH + 0.5)).toBeLessThanOrEqual(here + 1e-12);
    }),
  );
});

test('the balance closes for any mixture, and twice gives the same bits', () => {
  const couple = fc.record({ pKa: constants, concentration: fc.double({ min: 1e-4, max: 1, noNaN: true }) });
  fc.assert(
    fc.property(
      fc.array(couple, { maxLength: 6 }),
      fc.double({ min: -1, max: 1, noNaN: true }),
      (mix, strong) => {
        const couples = mix.map((entry) => ({ ...entry, protonsCharged: entry.pKa.length }));
        const balance = solveBalance(couples, strong, 13.995);
        expect(Math.abs(balance.residual)).toBeLessThan(1e-9);
        expect(solveBalance(couples, strong, 13.995)).toEqual(balance);
      },
    ),
  );
});

test('at half neutralisation the pH is the pKa (Henderson and Hasselbalch)', () => {
  const { pH } = solveBalance([{ pKa: [7], concentration: 0.1, protonsCharged: 0.5 }], 0, 13.995);
  expect(pH).toBeCloseTo(7, 4);
});
