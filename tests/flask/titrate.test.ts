import fc from 'fast-check';
import { expect, test } from 'vitest';
import { solveFlask } from '../../server/src/flask/solve.ts';
import type { Contents, Ingredient } from '../../server/src/flask/state.ts';
import { titrateTo } from '../../server/src/flask/titrate.ts';
import { constantsIn, flask, stock, THF, tables, WATER } from './kit.ts';

const reagent = (molecule: Ingredient['molecule']): Ingredient => ({
  id: 99,
  name: 'titrant',
  molecule,
  mol: 1,
  volume: null,
  role: 'quench',
  reagent: null,
  solvent: null,
  assumed: false,
  qualifier: null,
});
const acetic = (mol: number): Contents =>
  flask([[WATER, 1]], [{ name: 'acid', molecule: stock.carboxylicAcid(), mol }]);
const to = (contents: Contents, pH: number, molecule: Ingredient['molecule']) =>
  titrateTo(contents, pH, reagent(molecule), tables, constantsIn);

test('half an equivalent of sodium hydroxide brings acetic acid to its pKa, one to the end point (textbook)', () => {
  expect(to(acetic(0.1), 4.65, stock.NaOH()).mol! / 0.1).toBeCloseTo(0.5, 1);
  expect(to(acetic(0.1), 8.7, stock.NaOH()).mol! / 0.1).toBeCloseTo(1, 2);
});

test('the amount found gives the pH asked for', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 3.5, max: 12.5, noNaN: true }),
      fc.double({ min: 0.01, max: 0.5, noNaN: true }),
      (pH, mol) => {
        const answer = to(acetic(mol), pH, stock.NaOH());
        expect(answer.obstacle).toBeNull();
        expect(Math.abs(answer.after!.pH! - pH)).toBeLessThan(0.01);
      },
    ),
    { numRuns: 40 },
  );
});

test('acid takes a carbonate solution down while carbon dioxide leaves', () => {
  const soda = flask([[WATER, 1]], [{ name: 'Na2CO3', molecule: stock.carbonate(), mol: 0.5 }]);
  const answer = to(soda, 3, stock.HCl());
  expect(answer.mol).toBeGreaterThan(0.99);
  expect(answer.after!.gases[0]!.name).toBe('CO2');
  expect(answer.after!.gases[0]!.mol).toBeGreaterThan(0.4);
  expect(Math.abs(answer.after!.pH! - 3)).toBeLessThan(0.01);
});

test('what cannot be reached is said', () => {
  expect(to(acetic(0.1), 12.5, stock.bicarbonate()).obstacle).toBe('out-of-reach');
  expect(to(acetic(0.1), 2, stock.NaOH()).obstacle).toBe('already-beyond');
  expect(to(flask([[THF, 1]], []), 7, stock.NaOH()).obstacle).toBe('no-water');
});

test('a flask at the pH asked for needs nothing', () => {
  const { pH } = solveFlask(acetic(0.1), tables, constantsIn);
  expect(to(acetic(0.1), pH!, stock.NaOH()).mol).toBe(0);
});
