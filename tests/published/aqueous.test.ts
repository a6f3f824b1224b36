/** The flask's aqueous side against published figures: standard buffers, textbook exercises, limiting laws. */
import { expect, test } from 'vitest';
import type { Perceived } from '../../server/src/chemistry/couple.ts';
import { pKaOfWater } from '../../server/src/flask/balance.ts';
import { solveFlask } from '../../server/src/flask/solve.ts';
import { pKwOfLiquid } from '../../server/src/flask/water-constant.ts';
import { type CoupleSpec, constantsIn, flask, molecule, type Part, tables, WATER } from '../flask/kit.ts';

const pH = (parts: readonly Part[], celsius = 25) =>
  solveFlask(flask([[WATER, 1]], parts, celsius + 273.15), tables, constantsIn);

/** An acid of several steps with the first `lost` protons gone, their place taken by sodium. */
function salt(group: string, family: string, pKa: readonly number[], lost: number): Perceived {
  const couples = pKa.map(
    (water, step): CoupleSpec => ({ group, family, element: 'O', water, held: lost <= step }),
  );
  return molecule(couples, [-lost, ...Array.from({ length: lost }, () => 1)]);
}
// Constants at 25 °C and no ionic strength. Phosphoric, boric, carbonic: CRC Handbook. Phthalic: Hamer, Pinching, Acree,
// J. Res. Natl. Bur. Stand. 1945, 35, 539 (2.950, 5.408). Citric: Bates and Pinching, J. Am. Chem. Soc. 1949, 71, 1274.
const PHOSPHORIC = [2.148, 7.198, 12.35];
const PHTHALIC = [2.95, 5.408];
const CARBONIC = [6.352, 10.329];
const BORIC = [9.237];
const CITRIC = [3.128, 4.761, 6.396];
const phosphate = (lost: number, mol: number): Part => ({
  name: `phosphate ${lost}`,
  molecule: salt('phosphoric-acid', 'phosphoric', PHOSPHORIC, lost),
  mol,
});

// Values of the primary and secondary standards at 25 °C: IUPAC Recommendations 2002, Pure Appl. Chem. 2002, 74, 2169.
// Molalities of dilute solutions are taken as molarities, which costs less than 0.002.
const buffers: readonly (readonly [string, number, readonly Part[]])[] = [
  ['equimolal phosphate, 0.025 m each', 6.865, [phosphate(1, 0.025), phosphate(2, 0.025)]],
  ['phosphate 0.008695 m and 0.03043 m', 7.413, [phosphate(1, 0.008695), phosphate(2, 0.03043)]],
  [
    'hydrogen phthalate 0.05 m',
    4.005,
    [{ name: 'KHP', molecule: salt('carboxylic-acid-aryl', 'carboxylic-acid', PHTHALIC, 1), mol: 0.05 }],
  ],
  [
    'borax 0.01 m',
    9.18,
    [
      { name: 'boric acid', molecule: salt('boric-acid', 'boronic-acid', BORIC, 0), mol: 0.02 },
      { name: 'borate', molecule: salt('boric-acid', 'boronic-acid', BORIC, 1), mol: 0.02 },
    ],
  ],
  [
    'carbonate 0.025 m each',
    10.012,
    [
      { name: 'NaHCO3', molecule: salt('carbonic-acid', 'carboxylic-acid', CARBONIC, 1), mol: 0.025 },
      { name: 'Na2CO3', molecule: salt('carbonic-acid', 'carboxylic-acid', CARBONIC, 2), mol: 0.025 },
    ],
  ],
  [
    'dihydrogen citrate 0.05 m',
    3.776,
    [{ name: 'KH2Cit', molecule: salt('carboxylic-acid', 'carboxylic-acid', CITRIC, 1), mol: 0.05 }],
  ],
];
test.each(buffers)('%s has its published pH %d within 0.02', (_, published, parts) => {
  const state = pH(parts);
  expect(Math.abs(state.pH! - published)).toBeLessThan(0.02);
  expect(Math.abs(state.residual)).toBeLessThan(1e-12);
});

// The same recommendations, table of values over temperature.
test.each([
  [15, 6.9],
  [25, 6.865],
  [37, 6.841],
  [50, 6.833],
])('equimolal phosphate at %d °C has pH %d within 0.02', (celsius, published) => {
  expect(Math.abs(pH([phosphate(1, 0.025), phosphate(2, 0.025)], celsius).pH! - published)).toBeLessThan(
    0.02,
  );
});
test.each([
  [20, 10.062],
  [25, 10.012],
  [37, 9.91],
])('carbonate buffer at %d °C has pH %d within 0.02', (celsius, published) => {
  expect(Math.abs(pH(buffers[4]![2], celsius).pH! - published)).toBeLessThan(0.02);
});

test('pure water has half of pKw as its pH (IAPWS R11-07)', () => {
  for (const celsius of [0, 25, 60, 100]) expect(pH([], celsius).pH).toBeCloseTo(pKwOfLiquid(celsius) / 2, 3);
});

test('pKa of water is 15.738 on its own molarity (definition)', () => {
  expect(pKaOfWater(13.995)).toBeCloseTo(15.738, 3);
});

const acetic = (lost: number, mol: number): Part => ({
  name: 'acetic acid',
  molecule: salt('carboxylic-acid', 'carboxylic-acid', [4.756], lost),
  mol,
});
test('0.10 M acetic acid has pH 2.88 (P. Atkins, J. de Paula, Physical Chemistry, exercise)', () => {
  expect(Math.abs(pH([acetic(0, 0.1)]).pH! - 2.88)).toBeLessThan(0.01);
});

const naoh = (mol: number): Part => ({
  name: 'NaOH',
  mol,
  molecule: molecule(
    [{ group: 'water', family: 'water', element: 'O', water: 15.738, held: false }],
    [-1, 1],
  ),
});
const hcl = (mol: number): Part => ({
  name: 'HCl',
  mol,
  molecule: molecule([{ group: 'hydrogen-chloride', family: 'mineral-acid', element: 'Cl', water: -6 }]),
});
// R. G. Bates, Determination of pH (Wiley, 1973): −log a(H) of 0.1 m HCl 1.09 to 1.11, of 0.01 m HCl 2.04 to 2.05.
test.each([
  [0.1, 1.1],
  [0.01, 2.045],
])('%d M HCl has pH %d within 0.02 (Bates)', (molar, published) => {
  expect(Math.abs(pH([hcl(molar)]).pH! - published)).toBeLessThan(0.02);
});

test('0.10 M NaOH has pH 12.88 within 0.03 (Bates, secondary figure)', () => {
  expect(Math.abs(pH([naoh(0.1)]).pH! - 12.88)).toBeLessThan(0.03);
});

test('a dilute buffer follows Henderson and Hasselbalch', () => {
  for (const ratio of [0.3, 1, 3]) {
    const { pH: found } = pH([acetic(0, 3e-3), acetic(1, 3e-3 * ratio)]);
    expect(Math.abs(found! - (4.756 + Math.log10(ratio)))).toBeLessThan(0.06);
  }
});

test('the equivalence point of acetic acid and sodium hydroxide, 0.05 M acetate, lies at pH 8.7 (textbook)', () => {
  expect(Math.abs(pH([acetic(0, 0.05), naoh(0.05)]).pH! - 8.7)).toBeLessThan(0.1);
  expect(Math.abs(pH([acetic(0, 0.05), naoh(0.025)]).pH! - 4.756)).toBeLessThan(0.1);
});
