import fc from 'fast-check';
import { expect, test } from 'vitest';
import { judgeTransfer } from '../../server/src/flask/judge.ts';
import { heldInSalt } from '../../server/src/flask/salts.ts';
import { solveFlask } from '../../server/src/flask/solve.ts';
import { protonatedShare } from '../../server/src/flask/uptake.ts';
import { type CoupleSpec, constantsIn, DCM, flask, molecule, stock, tables, WATER } from './kit.ts';

const amine: CoupleSpec = {
  group: 'amine-primary',
  family: 'ammonium',
  element: 'N',
  kind: 'base',
  held: false,
  component: 1,
  water: 10.65,
  dmso: 11,
};
const chloride: CoupleSpec = {
  group: 'hydrogen-chloride',
  family: 'mineral-acid',
  element: 'Cl',
  water: -6,
  dmso: 1.8,
};
/** `Cl.NCC` */
const sideBySide = () => molecule([chloride, amine], [0, 0]);
const stepsOf = (spec: CoupleSpec) =>
  constantsIn(molecule([{ ...spec, component: 0 }]), 'DMSO', tables).steps[0]!;

test('hydrogen chloride beside an amine is its salt', () => {
  expect(
    heldInSalt([
      { steps: stepsOf(chloride), held: 1 },
      { steps: stepsOf(amine), held: 0 },
    ]),
  ).toEqual([0, 1]);
  const state = solveFlask(
    flask([[DCM, 1]], [{ name: 'salt', molecule: sideBySide(), mol: 0.1 }]),
    tables,
    constantsIn,
  );
  expect(state.couples.find(({ couple }) => couple.kind === 'base')!.charged).toBe(1);
});

test('protons are moved, never made, and only downhill', () => {
  const component = fc.record({
    values: fc.array(fc.double({ min: -5, max: 40, noNaN: true }), { maxLength: 3 }),
    share: fc.double({ min: 0, max: 1, noNaN: true }),
  });
  fc.assert(
    fc.property(fc.array(component, { maxLength: 4 }), (parts) => {
      const drawn = parts.map(({ values, share }) => ({
        steps: [...values].sort((a, b) => a - b).map((dmso) => stepsOf({ ...chloride, dmso })[0]!),
        held: Math.round(share * values.length),
      }));
      const held = heldInSalt(drawn);
      expect(held.reduce((a, b) => a + b, 0)).toBe(drawn.reduce((sum, one) => sum + one.held, 0));
      held.forEach((count, place) => {
        expect(count).toBeGreaterThanOrEqual(0);
        expect(count).toBeLessThanOrEqual(drawn[place]!.steps.length);
      });
      if (drawn.length === 1) expect(held[0]).toBe(drawn[0]!.held);
    }),
  );
});

test('triethylamine sets an amine free from its salt half way, a guanidine wholly', () => {
  const free = (base: ReturnType<typeof stock.Et3N>) => {
    const contents = flask(
      [[DCM, 1]],
      [
        { name: 'salt', molecule: sideBySide(), mol: 0.1 },
        { name: 'base', molecule: base, mol: 0.3 },
      ],
    );
    const verdict = judgeTransfer(
      contents,
      { ingredient: 1, couples: [], direction: 'deprotonate' },
      tables,
      constantsIn,
    )!;
    expect(verdict.site.couple.kind).toBe('base');
    return 1 - protonatedShare(solveFlask(contents, tables, constantsIn), 1)!;
  };
  expect(free(stock.Et3N())).toBeLessThan(0.5);
  expect(free(stock.DBU())).toBeGreaterThan(0.95);
});

test('an acid and an amine in dichloromethane meet as a pair in the balance too', () => {
  const contents = flask(
    [[DCM, 1]],
    [
      { name: 'acid', molecule: stock.carboxylicAcid(), mol: 0.1 },
      { name: 'Et3N', molecule: stock.Et3N(), mol: 0.11 },
    ],
  );
  const state = solveFlask(contents, tables, constantsIn);
  expect(state.couples.find(({ couple }) => couple.family === 'carboxylic-acid')!.protonated).toBeLessThan(
    0.05,
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [], direction: 'deprotonate' },
    tables,
    constantsIn,
  )!;
  expect(verdict.allowances).toContain('ion-pair');
  expect(verdict.extent).toBeCloseTo(
    1 - state.couples.find(({ couple }) => couple.family === 'carboxylic-acid')!.protonated,
    6,
  );
});

test('dihydrogen phosphate gives its proton at pKa 7 and takes one at pKa 2', () => {
  const oxygen = (water: number, held: boolean): CoupleSpec => ({
    group: 'phosphoric-acid',
    family: 'phosphoric',
    element: 'O',
    water,
    held,
  });
  const salt = () => molecule([oxygen(2.15, true), oxygen(7.2, true), oxygen(12.35, false)], [-1, 1]);
  const judge = (direction: 'deprotonate' | 'protonate', other: ReturnType<typeof stock.NaOH>) =>
    judgeTransfer(
      flask(
        [[WATER, 1]],
        [
          { name: 'KH2PO4', molecule: salt(), mol: 0.1 },
          { name: 'other', molecule: other, mol: 0.1 },
        ],
      ),
      { ingredient: 1, couples: [], direction },
      tables,
      constantsIn,
    )!;
  expect(judge('deprotonate', stock.NaOH()).site.constant.value).toBe(7.2);
  expect(judge('protonate', stock.HCl()).site.constant.value).toBe(2.15);
});
