/** Forms over pH, layers, solvent windows and heat. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { heatOfAddition } from '../../server/src/flask/heat.ts';
import { organicShare } from '../../server/src/flask/layers.ts';
import { speciate } from '../../server/src/flask/speciate.ts';
import { KJ_PER_UNIT, solventWindow } from '../../server/src/flask/window.ts';
import { constantsIn, flask, MECN, reagentRow, stock, THF, tables, WATER } from './kit.ts';

test('the forms of carbonate add up to one and cross at the constants', () => {
  const pHs = [0, 6.35, 8.34, 10.33, 14];
  const forms = speciate(stock.carbonate(), 'water', pHs, tables, constantsIn).filter(
    ({ component }) => component === 0,
  );
  expect(forms.map(({ charge }) => charge)).toEqual([-2, -1, 0]);
  pHs.forEach((_, place) => {
    expect(forms.reduce((sum, { shares }) => sum + shares[place]!, 0)).toBeCloseTo(1, 12);
  });
  expect(forms[2]!.shares[1]).toBeCloseTo(forms[1]!.shares[1]!, 3);
  expect(forms[0]!.shares[3]).toBeCloseTo(forms[1]!.shares[3]!, 3);
});

test('equal volumes and log D 0 share out evenly; two portions leave a quarter', () => {
  expect(organicShare(0, 1, 1)).toBeCloseTo(0.5, 12);
  expect(organicShare(0, 1, 1, 2)).toBeCloseTo(0.75, 12);
});

test('more solvent, more portions and a higher log D never leave more in water', () => {
  const logD = fc.double({ min: -6, max: 6, noNaN: true });
  const litres = fc.double({ min: 0.01, max: 10, noNaN: true });
  fc.assert(
    fc.property(logD, litres, litres, fc.integer({ min: 1, max: 5 }), (value, organic, water, portions) => {
      const share = organicShare(value, organic, water, portions);
      expect(share).toBeGreaterThanOrEqual(0);
      expect(share).toBeLessThanOrEqual(1);
      expect(organicShare(value, organic * 2, water, portions)).toBeGreaterThanOrEqual(share);
      expect(organicShare(value, organic, water, portions + 1)).toBeGreaterThanOrEqual(share);
      expect(organicShare(value + 1, organic, water, portions)).toBeGreaterThanOrEqual(share);
    }),
  );
});

test('the absolute window is as wide as the own one and lies lower where the proton is less at home', () => {
  const { own, absolute } = solventWindow({ ...MECN, pKs: 33, protonTransferEnergy: 46.4, transferSd: 3 });
  expect(absolute!.high - absolute!.low).toBeCloseTo(own!.high - own!.low, 12);
  expect(absolute!.low).toBeCloseTo(-46.4 / KJ_PER_UNIT, 12);
  expect(KJ_PER_UNIT).toBeCloseTo(5.708, 3);
  expect(solventWindow({ ...MECN, pKs: null })).toEqual({ own: null, absolute: null });
});

const naoh = (mol: number) => ({ name: 'NaOH', molecule: stock.NaOH(), mol });
const added = (contents: ReturnType<typeof flask>) => ({
  before: { ...contents, ingredients: contents.ingredients.slice(0, -1) },
  added: contents.ingredients.slice(-1),
});

test('1 mol of strong acid on 1 mol of strong base in a litre of water warms it by some 13 K', () => {
  const { before, added: list } = added(
    flask([[WATER, 1]], [naoh(1), { name: 'HCl', molecule: stock.HCl(), mol: 1 }]),
  );
  const { heat, rise } = heatOfAddition(before, list, tables, constantsIn);
  expect(heat).toBeCloseTo(-55.8, 0);
  expect(rise).toBeGreaterThan(12.5);
  expect(rise).toBeLessThan(14.5);
});

test('a hydride quenched warms more than a neutralisation, and the rise does not depend on the scale', () => {
  const NaH = { name: 'NaH', molecule: stock.NaH(), mol: 0.5, reagent: reagentRow('NaH', ['metal-hydride']) };
  const quench = (times: number) => {
    const contents = flask(
      [[THF, times]],
      [
        { ...NaH, mol: 0.5 * times },
        { name: 'ethanol', molecule: stock.alcohol(), mol: 0.6 * times },
      ],
    );
    const { before, added: list } = added(contents);
    return heatOfAddition(before, list, tables, constantsIn);
  };
  expect(quench(1).heat).toBeLessThan(-50);
  expect(quench(3).rise).toBeCloseTo(quench(1).rise!, 6);
});

test('nothing added, nothing heated', () => {
  const contents = flask([[WATER, 1]], [naoh(1)]);
  expect(heatOfAddition(contents, [], tables, constantsIn).heat).toBeCloseTo(0, 9);
});
