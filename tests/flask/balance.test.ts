import fc from 'fast-check';
import { all, create } from 'mathjs';
import { expect, test } from 'vitest';
import {
  formShares,
  meanProtons,
  type Polyprotic,
  solveBalance,
  stepShares,
} from '../../server/src/flask/balance.ts';

const constants = fc
  .array(fc.double({ min: -5, max: 45, noNaN: true }), { minLength: 1, maxLength: 5 })
  .map((values) => values.sort((a, b) => a - b));
const acid = constants.chain((pKa) =>
  fc.record({
    pKa: fc.constant(pKa),
    amount: fc.double({ min: 1e-4, max: 1, noNaN: true }),
    protonsCharged: fc.integer({ min: 0, max: pKa.length }),
  }),
);
const flask = fc.array(acid, { minLength: 1, maxLength: 6 });
const water: Polyprotic = { pKa: [-1.743, 15.738], amount: 55.34, protonsCharged: 1 };

test('protons held never rise with pH and stay between none and all', () => {
  fc.assert(
    fc.property(constants, fc.double({ min: -20, max: 60, noNaN: true }), (pKa, pH) => {
      const here = meanProtons(pKa, pH);
      expect(here).toBeGreaterThanOrEqual(0);
      expect(here).toBeLessThanOrEqual(pKa.length + 1e-12);
      expect(meanProtons(pKa, pH + 0.5)).toBeLessThanOrEqual(here + 1e-12);
    }),
  );
});

test('shares of the forms add up to one, and the steps hold the mean number of protons', () => {
  fc.assert(
    fc.property(constants, fc.double({ min: -20, max: 60, noNaN: true }), (pKa, pH) => {
      expect(formShares(pKa, pH).reduce((a, b) => a + b)).toBeCloseTo(1, 12);
      expect(stepShares(pKa, pH).reduce((a, b) => a + b)).toBeCloseTo(meanProtons(pKa, pH), 10);
    }),
  );
});

test('the balance closes for any mixture in water, and twice gives the same bits', () => {
  fc.assert(
    fc.property(flask, (mix) => {
      const balance = solveBalance([water, ...mix]);
      expect(Math.abs(balance.residual)).toBeLessThan(1e-9);
      expect(solveBalance([water, ...mix])).toEqual(balance);
    }),
  );
});

test('an independent solver with 60 figures agrees within 1e-6', () => {
  const math = create(all!, { number: 'BigNumber', precision: 60 });
  const big = (value: number) => math.bignumber(value);
  // Concentrations of the forms from the product of constants, summed plainly: no logarithms, no scaling.
  const excess = (acids: readonly Polyprotic[], pH: unknown) => {
    let sum = big(0);
    const hydrogen = math.pow(big(10), math.unaryMinus(pH as never));
    for (const { pKa, amount, protonsCharged } of acids) {
      const terms = [big(1)];
      for (let held = 1; held <= pKa.length; held++) {
        const beta = math.pow(big(10), big(pKa[pKa.length - held]!));
        terms.push(math.multiply(math.multiply(terms[held - 1]!, beta), hydrogen) as never);
      }
      const total = terms.reduce((a, b) => math.add(a, b) as never);
      const bound = terms.reduce((a, b, held) => math.add(a, math.multiply(b, big(held))) as never, big(0));
      const mean = math.divide(bound, total) as never;
      sum = math.add(sum, math.multiply(math.subtract(mean, big(protonsCharged)), big(amount))) as never;
    }
    return sum;
  };
  fc.assert(
    fc.property(flask, (mix) => {
      const acids = [water, ...mix];
      let low = big(-20);
      let high = big(70);
      for (let turn = 0; turn < 60; turn++) {
        const middle = math.divide(math.add(low, high), big(2)) as typeof low;
        if (math.smaller(excess(acids, middle), big(0))) high = middle;
        else low = middle;
      }
      expect(Math.abs(solveBalance(acids).pH - Number(low.toString()))).toBeLessThan(1e-6);
    }),
    { numRuns: 25 },
  );
});

test('at half neutralisation the pH is the pKa (Henderson and Hasselbalch)', () => {
  const half = [
    { pKa: [7], amount: 0.05, protonsCharged: 1 },
    { pKa: [7], amount: 0.05, protonsCharged: 0 },
  ];
  expect(solveBalance([water, ...half]).pH).toBeCloseTo(7, 4);
});

test('a stronger base never lowers what the acid loses', () => {
  const pKa = fc.double({ min: 0, max: 40, noNaN: true });
  fc.assert(
    fc.property(pKa, pKa, fc.double({ min: 0, max: 5 }), (site, base, more) => {
      const lost = (value: number) => {
        const acids = [
          { pKa: [site], amount: 1, protonsCharged: 1 },
          { pKa: [value], amount: 1, protonsCharged: 0 },
        ];
        return 1 - stepShares([site], solveBalance(acids).pH)[0]!;
      };
      expect(lost(base + more)).toBeGreaterThanOrEqual(lost(base) - 1e-9);
    }),
  );
});

test('a gas leaves down to what the liquid holds, and pulls its equilibrium', () => {
  const carbonate = (most: number | null): Polyprotic => ({
    pKa: [6.35, 10.33],
    amount: 1,
    protonsCharged: 0,
    gas: most === null ? null : { protons: 2, most },
  });
  const acetic = { pKa: [4.76], amount: 2, protonsCharged: 1 };
  const open = solveBalance([water, acetic, carbonate(0.033)]);
  const closed = solveBalance([water, acetic, carbonate(null)]);
  expect(open.left[2]).toBeGreaterThan(0.9);
  expect(open.pH).toBeGreaterThan(closed.pH + 0.5);
  const dissolved = 1 - open.left[2]!;
  expect(dissolved * formShares([6.35, 10.33], open.pH)[2]!).toBeCloseTo(0.033, 6);
});
