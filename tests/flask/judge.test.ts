/** Properties of the one judge over random flasks. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { answerFor, judgeTransfer } from '../../server/src/flask/judge.ts';
import { mediumOf } from '../../server/src/flask/medium.ts';
import { normalBelow } from '../../server/src/flask/numbers.ts';
import { solveFlask } from '../../server/src/flask/solve.ts';
import type { Contents, Verdict } from '../../server/src/flask/state.ts';
import { constantsIn, DMSO, flask, molecule, tables, WATER } from './kit.ts';

const pKa = fc.double({ min: 4, max: 30, noNaN: true });
const mol = fc.double({ min: 0.01, max: 1, noNaN: true });
const sd = fc.double({ min: 0.05, max: 2, noNaN: true });

const acidOf = (value: number, spread: number) =>
  molecule([
    { group: 'carboxylic-acid', family: 'nh-acid', element: 'N', water: value, dmso: value, sd: spread },
  ]);
const baseOf = (value: number, spread: number) =>
  molecule(
    [
      {
        group: 'some-base',
        family: 'alkoxide',
        element: 'O',
        water: value,
        dmso: value,
        sd: spread,
        held: false,
      },
    ],
    [-1, 1],
  );

interface Draw {
  readonly site: number;
  readonly base: number;
  readonly sd: number;
  readonly acidMol: number;
  readonly baseMol: number;
}
const draw = fc.record({ site: pKa, base: pKa, sd, acidMol: mol, baseMol: mol });

function made({ site, base, sd: spread, acidMol, baseMol }: Draw, times = 1): Contents {
  return flask(
    [[DMSO, times]],
    [
      { name: 'A', molecule: acidOf(site, spread), mol: acidMol * times },
      { name: 'B', molecule: baseOf(base, 0.3), mol: baseMol * times, role: 'base' },
    ],
  );
}
const judge = (contents: Contents): Verdict =>
  judgeTransfer(contents, { ingredient: 1, couples: [0], direction: 'deprotonate' }, tables, constantsIn)!;

test('the same flask gives the same verdict to the last bit', () => {
  fc.assert(
    fc.property(draw, (one) => {
      expect(judge(made(one))).toEqual(judge(made(one)));
    }),
  );
});

test('a stronger base never lowers the extent nor raises the probability of failure', () => {
  fc.assert(
    fc.property(draw, fc.double({ min: 0, max: 6, noNaN: true }), (one, more) => {
      const weak = judge(made(one));
      const strong = judge(made({ ...one, base: one.base + more }));
      expect(strong.extent).toBeGreaterThanOrEqual(weak.extent - 1e-9);
      expect(strong.probability).toBeLessThanOrEqual(weak.probability + 1e-6);
    }),
  );
});

test('scaling all amounts and volumes leaves the verdict', () => {
  fc.assert(
    fc.property(draw, fc.constantFrom(0.001, 0.1, 25), (one, times) => {
      const [small, large] = [judge(made(one)), judge(made(one, times))];
      expect(large.answer).toBe(small.answer);
      expect(large.logK).toBe(small.logK);
      expect(large.extent).toBeCloseTo(small.extent, 6);
      expect(large.probability).toBeCloseTo(small.probability, 6);
    }),
  );
});

test('a wider sd never makes a verdict surer', () => {
  fc.assert(
    fc.property(draw, fc.double({ min: 0, max: 3, noNaN: true }), (one, more) => {
      const [narrow, wide] = [judge(made(one)), judge(made({ ...one, sd: one.sd + more }))];
      expect(Math.abs(wide.probability - 0.5)).toBeLessThanOrEqual(Math.abs(narrow.probability - 0.5) + 1e-9);
    }),
  );
});

test('the probability agrees with the share of drawn constants that fail', () => {
  // A plain draw over normal errors, fixed seed, against the closed form.
  let seed = 7;
  const uniform = () => {
    seed = (seed * 48271) % 2147483647;
    return seed / 2147483647;
  };
  const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  const one: Draw = { site: 16, base: 15.4, sd: 1, acidMol: 0.2, baseMol: 0.24 };
  const wanted = judge(made(one));
  const turns = 4000;
  let failed = 0;
  for (let turn = 0; turn < turns; turn++) {
    const shifted = { ...one, site: one.site + normal() * wanted.sd };
    if (judge(made(shifted)).extent < 0.5) failed++;
  }
  expect(Math.abs(failed / turns - wanted.probability)).toBeLessThan(0.03);
});

test('log K is the difference of the constants, and half conversion needs no K at equal amounts', () => {
  const verdict = judge(made({ site: 18, base: 18, sd: 0.5, acidMol: 0.2, baseMol: 0.2 }));
  expect(verdict.logK).toBe(0);
  expect(verdict.extent).toBeCloseTo(0.5, 6);
  expect(verdict.probability).toBeCloseTo(0.5, 6);
});

test('answers follow the thresholds', () => {
  expect([0, 0.19, 0.2, 0.79, 0.8, 1].map((value) => answerFor(value))).toEqual([
    'yes',
    'yes',
    'undecided',
    'undecided',
    'no',
    'no',
  ]);
});

test('the normal distribution is that of the tables (Abramowitz and Stegun)', () => {
  expect(normalBelow(0)).toBeCloseTo(0.5, 7);
  expect(normalBelow(1.959964)).toBeCloseTo(0.975, 6);
  expect(normalBelow(-3)).toBeCloseTo(0.0013498980316, 9);
});

test('charge and mass balance close in random flasks of water', () => {
  const part = fc.record({
    value: fc.double({ min: -2, max: 14, noNaN: true }),
    amount: mol,
    isBase: fc.boolean(),
  });
  fc.assert(
    fc.property(fc.array(part, { minLength: 1, maxLength: 6 }), (parts) => {
      const contents = flask(
        [[WATER, 1]],
        parts.map(({ value, amount, isBase }) => ({
          name: 'X',
          mol: amount,
          molecule: isBase ? baseOf(value, 0.2) : acidOf(value, 0.2),
        })),
      );
      const state = solveFlask(contents, tables, constantsIn);
      expect(Math.abs(state.residual)).toBeLessThan(1e-9);
      // Every proton charged is found again.
      const charged = state.couples.reduce((sum, { amount, charged: held }) => sum + amount * held, 0);
      const found = state.couples.reduce((sum, { amount, protonated }) => sum + amount * protonated, 0);
      expect(Math.abs(found - charged)).toBeLessThan(1e-9);
      expect(state).toEqual(solveFlask(contents, tables, constantsIn));
    }),
  );
});

test('amounts that are no amounts stop nothing', () => {
  for (const amount of [0, -3, Number.NaN, Number.POSITIVE_INFINITY]) {
    const state = solveFlask(
      flask([[WATER, 1]], [{ name: 'A', molecule: acidOf(5, 0.2), mol: amount }]),
      tables,
      constantsIn,
    );
    expect(state.pH).toBeCloseTo(7, 1);
  }
});

test('no solvent, no structure, no couples: an answer without a pH', () => {
  const empty: Contents = { ingredients: [], temperature: 298.15 };
  expect(solveFlask(empty, tables, constantsIn).pH).toBeNull();
  expect(mediumOf(empty).solvent).toBeNull();
});
