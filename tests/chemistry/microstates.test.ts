import fc from 'fast-check';
import { expect, test } from 'vitest';
import { type MicroSite, macroscopicSteps } from '../../server/src/chemistry/microstates.ts';

const acid = (pK: number, couple = 0): MicroSite => ({ pK, kind: 'acid', couple, held: true });
const base = (pK: number, couple = 0): MicroSite => ({ pK, kind: 'base', couple, held: false });

test('equal sites without interaction differ by the statistical factor', () => {
  const [first, second] = macroscopicSteps([acid(4.5), acid(4.5)], () => 0);
  expect(first!.pK).toBeCloseTo(4.5 - Math.log10(2), 9);
  expect(second!.pK).toBeCloseTo(4.5 + Math.log10(2), 9);
});

test('a lone site keeps its constant', () => {
  expect(macroscopicSteps([base(9.3)], () => 0)).toEqual([{ pK: 9.3, couple: 0 }]);
});

test('an amino acid loses its carboxyl proton first, and each constant feels the other charge', () => {
  const [first, second] = macroscopicSteps([base(7.75, 1), acid(4.35, 0)], () => 2);
  expect(first).toEqual({ pK: expect.closeTo(2.35, 2), couple: 0 });
  expect(second).toEqual({ pK: expect.closeTo(9.75, 2), couple: 1 });
});

test('constants rise, and their sum is that of taking all protons away at once', () => {
  const site = fc.record({
    pK: fc.double({ min: -2, max: 14, noNaN: true }),
    kind: fc.constantFrom('acid' as const, 'base' as const),
    couple: fc.integer({ min: 0, max: 9 }),
    held: fc.boolean(),
  });
  fc.assert(
    fc.property(
      fc.array(site, { minLength: 1, maxLength: 8 }),
      fc.double({ min: 0, max: 4, noNaN: true }),
      (sites, pull) => {
        const steps = macroscopicSteps(sites, () => pull);
        expect(steps).toHaveLength(sites.length);
        for (let k = 1; k < steps.length; k++) expect(steps[k]!.pK).toBeGreaterThan(steps[k - 1]!.pK - 1e-9);
        const acids = sites.filter(({ kind }) => kind === 'acid').length;
        const bases = sites.length - acids;
        const pairs = (n: number) => (n * (n - 1)) / 2;
        const whole = sites.reduce((sum, { pK }) => sum + pK, 0) + pull * (pairs(acids) - pairs(bases));
        expect(steps.reduce((sum, { pK }) => sum + pK, 0)).toBeCloseTo(whole, 6);
        expect(steps.map(({ couple }) => couple).sort()).toEqual(sites.map(({ couple }) => couple).sort());
      },
    ),
    { seed: 7, numRuns: 200 },
  );
});

test('many sites follow the same order as few', () => {
  const many = Array.from({ length: 14 }, (_, k) => acid(2 + k, k));
  expect(macroscopicSteps(many, () => 0).map(({ couple }) => couple)).toEqual(
    many.map(({ couple }) => couple),
  );
});
