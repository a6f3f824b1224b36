/** Titration curves over the project's own tables, against textbook points. */
import { expect, test } from 'vitest';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { solveFlask } from '../../server/src/flask/solve.ts';
import type { Contents, Ingredient } from '../../server/src/flask/state.ts';
import { titrationCurve, usualTitrant } from '../../server/src/flask/titration-curve.ts';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { tables } from '../support/tables.ts';

const plain = { volume: null, reagent: null, solvent: null, assumed: false, qualifier: null } as const;
const compound = (smiles: string, mol: number, id: number): Ingredient => ({
  ...plain,
  id,
  name: smiles,
  molecule: perceive(smiles, tables),
  mol,
  role: 'compound',
});
function flask(solvent: string, litres: number, ...solutes: [string, number][]): Contents {
  const row = tables.solventByName.get(foldName(solvent))!;
  const bath: Ingredient = {
    ...plain,
    id: 0,
    name: solvent,
    molecule: perceive(row.smiles, tables),
    mol: 0,
    volume: litres,
    role: 'solvent',
    solvent: row,
  };
  return {
    temperature: 298.15,
    ingredients: [bath, ...solutes.map(([smiles, mol], place) => compound(smiles, mol, place + 1))],
  };
}
function titrant(name: string): Ingredient {
  const reagent = tables.reagentByName.get(foldName(name))!;
  return {
    ...plain,
    id: 9,
    name,
    molecule: perceive(reagent.smiles!, tables),
    mol: 0,
    role: 'quench',
    reagent,
  };
}

test('0.1 M acetic acid with hydroxide: start, half way, equivalence and excess as in the textbook', () => {
  const curve = titrationCurve(flask('water', 0.1, ['CC(=O)O', 0.01]), titrant('NaOH'), tables)!;
  expect(curve.kind).toBe('base');
  const at = (mol: number) =>
    curve.points.reduce((best, one) => (Math.abs(one.mol - mol) < Math.abs(best.mol - mol) ? one : best));
  // Harris, Quantitative Chemical Analysis: about 2.9, pKa, 8.9 without dilution, above 12.
  expect(at(0).pH).toBeCloseTo(2.88, 1);
  expect(curve.halves).toHaveLength(1);
  expect(curve.halves[0]!.mol).toBeCloseTo(0.005, 4);
  expect(Math.abs(curve.halves[0]!.pH - curve.halves[0]!.pKa)).toBeLessThan(0.15);
  const equivalence = solveFlask(
    {
      temperature: 298.15,
      ingredients: [...flask('water', 0.1, ['CC(=O)O', 0.01]).ingredients, { ...titrant('NaOH'), mol: 0.01 }],
    },
    tables,
  ).pH!;
  expect(equivalence).toBeGreaterThan(8.6);
  expect(equivalence).toBeLessThan(9.1);
  expect(curve.points.at(-1)!.pH).toBeGreaterThan(12);
});

test('pH never falls while a base is added, nor rises with an acid, and the jump is finely drawn', () => {
  const up = titrationCurve(
    flask('water', 0.1, ['OC(=O)CC(O)(CC(=O)O)C(=O)O', 0.01]),
    titrant('NaOH'),
    tables,
  )!;
  for (let place = 1; place < up.points.length; place++)
    expect(up.points[place]!.pH).toBeGreaterThanOrEqual(up.points[place - 1]!.pH - 1e-9);
  const down = titrationCurve(
    flask('water', 0.1, ['[Na+].[Na+].[O-]C([O-])=O', 0.01]),
    titrant('HCl'),
    tables,
  )!;
  expect(down.kind).toBe('acid');
  for (let place = 1; place < down.points.length; place++)
    expect(down.points[place]!.pH).toBeLessThanOrEqual(down.points[place - 1]!.pH + 1e-9);
  expect(up.points.length).toBeGreaterThan(70);
  expect(up.points.length).toBeLessThanOrEqual(240);
});

test('a triprotic acid has three half points in order, the middle one half way', () => {
  const { halves } = titrationCurve(
    flask('water', 0.1, ['OC(=O)CC(O)(CC(=O)O)C(=O)O', 0.01]),
    titrant('NaOH'),
    tables,
  )!;
  expect(halves.map(({ pKa }) => Math.round(pKa * 10) / 10)).toEqual([3.1, 4.8, 6.4]);
  expect(halves[1]!.mol).toBeCloseTo(0.015, 4);
});

test('a marked point has its couple half protonated', () => {
  const contents = flask('water', 0.1, ['[NH3+]CC([O-])=O', 0.01]);
  const { halves } = titrationCurve(contents, titrant('NaOH'), tables)!;
  const [first] = halves;
  const state = solveFlask(
    { ...contents, ingredients: [...contents.ingredients, { ...titrant('NaOH'), mol: first!.mol }] },
    tables,
  );
  const couple = state.couples.find(
    ({ constant, ingredient }) => ingredient === 1 && constant.value === first!.pKa,
  )!;
  expect(couple.protonated).toBeCloseTo(0.5, 2);
});

test('works on the DMSO scale as well', () => {
  const contents = flask('THF', 0.02, ['O=C(C)c1ccc(O)cc1', 0.005]);
  const { halves, scale } = titrationCurve(contents, titrant('LDA'), tables)!;
  expect(scale).toBe('DMSO');
  expect(halves.map(({ mol }) => Math.round(mol * 1e4) / 1e4)).toEqual([0.0025, 0.0075]);
});

test('the usual titrant goes against what is there', () => {
  const asked = (contents: Contents) => usualTitrant(contents, solveFlask(contents, tables));
  expect(asked(flask('water', 0.1, ['CC(=O)O', 0.01]))).toBe('NaOH');
  expect(asked(flask('water', 0.1, ['CCN(CC)CC', 0.01]))).toBe('HCl');
  expect(asked(flask('THF', 0.1, ['CC(=O)O', 0.01]))).toBe('LDA');
  expect(asked(flask('MeOH', 0.1, ['CC(=O)O', 0.01]))).toBe('NaOMe');
});
