import { expect, test } from 'vitest';
import { mixedConstants } from '../../server/src/flask/activity.ts';
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

test('equimolal phosphate, 0.025 + 0.025 mol/kg, has pH 6.865 (NBS/IUPAC standard; value from memory)', () => {
  // pKa values of phosphoric acid at 25 °C from memory of the CRC Handbook.
  const pKa = mixedConstants([2.148, 7.198, 12.35], 0, 0.1);
  const { pH } = solveBalance([{ pKa, concentration: 0.05, protonsCharged: 1.5 }], 0, PKW);
  expect(Math.abs(pH - 6.865)).toBeLessThan(0.02);
});

test('0.05 mol/kg potassium hydrogen phthalate has pH 4.005 (Hamer, Pinching, Acree 1946)', () => {
  // pKa values of phthalic acid at 25 °C from memory of the CRC Handbook; ionic strength of the salt with its second step.
  const pKa = mixedConstants([2.95, 5.408], 0, 0.053);
  const { pH } = solveBalance([{ pKa, concentration: 0.05, protonsCharged: 1 }], 0, PKW);
  expect(Math.abs(pH - 4.005)).toBeLessThan(0.02);
});
