import { expect, test } from 'vitest';
import { pKwAt, pKwOfLiquid, waterDensity } from '../../server/src/flask/water-constant.ts';

// Check values of IAPWS R11-07: temperature K, density kg/m³, pKw.
test.each([
  [300, 1000, 13.906565],
  [600, 70, 21.048874],
  [600, 700, 11.203153],
  [800, 200, 15.089765],
  [800, 1200, 6.43833],
])('pKw at %d K and %d kg/m³ is the check value of IAPWS R11-07', (temperature, density, pKw) => {
  expect(pKwAt(temperature, density)).toBeCloseTo(pKw, 4);
});

// CRC Handbook, ionization constant of water at 0.1 MPa (IAPWS equation).
test.each([
  [0, 14.946],
  [25, 13.995],
  [50, 13.264],
  [75, 12.696],
  [100, 12.252],
])('pKw of liquid water at %d °C is that of the CRC Handbook within 0.01', (celsius, pKw) => {
  expect(Math.abs(pKwOfLiquid(celsius) - pKw)).toBeLessThan(0.01);
});

test('water at 25 °C weighs 997.05 kg/m³ (CRC Handbook, value from memory)', () => {
  expect(waterDensity(25)).toBeCloseTo(997.05, 1);
});
