import { expect, test } from 'vitest';
import { pKaOfWater, solveBalance } from '../../server/src/flask/balance.ts';

// pKw 13.995 at 25 °C and 0.1 MPa: IAPWS equation for the ionization constant of water.
const PKW = 13.995;

test('pure water has half of pKw as its pH (IAPWS, 25 °C)', () => {
  expect(solveBalance([], 0, PKW).pH).toBeCloseTo(6.9975, 3);
});

test('pKa of water is 15.7 on its own molarity (common practice, no published source)', () => {
  expect(pKaOfWater(PKW)).toBeCloseTo(15.738, 3);
});

test('0.10 M acetic acid, pKa 4.76, has pH 2.88 (textbook exercise; value from memory)', () => {
  const { pH } = solveBalance([{ pKa: [4.76], concentration: 0.1, protonsCharged: 1 }], 0, PKW);
  expect(pH).toBeCloseTo(2.88, 2);
});

test('0.10 M HCl has pH 1.00 and 0.10 M NaOH pH 13.00 without activities (definition)', () => {
  expect(solveBalance([], 0.1, PKW).pH).toBeCloseTo(1, 3);
  expect(solveBalance([], -0.1, PKW).pH).toBeCloseTo(PKW - 1, 3);
});
