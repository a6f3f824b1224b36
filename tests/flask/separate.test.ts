/** Two layers drawn apart: nothing is lost, and each thing goes where the trade expects it. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { ingredientsIn } from '../../server/src/flask/separate.ts';
import type { Contents, Ingredient } from '../../server/src/flask/state.ts';
import { tables } from '../support/tables.ts';

let next = 0;
function put(smiles: string, mol: number, role: Ingredient['role'] = 'compound'): Ingredient {
  return {
    id: next++,
    name: smiles,
    molecule: perceive(smiles, tables),
    mol,
    volume: null,
    role,
    reagent: null,
    solvent: null,
    assumed: false,
    qualifier: null,
  };
}

function solvent(name: string, volume: number): Ingredient {
  const row = tables.solvents.find((one) => one.name === name)!;
  return { ...put(row.smiles!, 0, 'solvent'), name, solvent: row, volume };
}

const flask = (...ingredients: Ingredient[]): Contents => ({ ingredients, temperature: 298.15 });
const ACID = 'OC(=O)c1ccc(Cl)cc1';
const AMINE = 'CCN(CC)Cc1ccccc1';
const AMIDE = 'O=C(NCc1ccccc1)c1ccc(F)cc1';
const SODIUM_HYDROXIDE = '[Na+].[OH-]';

const share = (layer: 'organic' | 'aqueous', contents: Contents, smiles: string) => {
  const before = contents.ingredients.find(({ name }) => name === smiles)!;
  const after = ingredientsIn(layer, contents, tables).find(({ id }) => id === before.id);
  return (after?.mol ?? 0) / before.mol;
};

test('an acid goes into base and an amine into acid, an amide stays', () => {
  const layers = [solvent('EtOAc', 0.03), solvent('water', 0.03)];
  const base = flask(
    ...layers,
    put(ACID, 5e-3),
    put(AMINE, 5e-3),
    put(AMIDE, 5e-3),
    put(SODIUM_HYDROXIDE, 0.02),
  );
  expect(share('aqueous', base, ACID)).toBeGreaterThan(0.9);
  expect(share('organic', base, AMINE)).toBeGreaterThan(0.9);
  expect(share('organic', base, AMIDE)).toBeGreaterThan(0.9);
  const acid = flask(...layers, put(ACID, 5e-3), put(AMINE, 5e-3), put('Cl', 0.02));
  expect(share('organic', acid, ACID)).toBeGreaterThan(0.9);
  expect(share('aqueous', acid, AMINE)).toBeGreaterThan(0.9);
});

test('each solvent stays in its layer, and one phase stays whole', () => {
  const contents = flask(solvent('EtOAc', 0.03), solvent('water', 0.03), solvent('MeOH', 0.003));
  const names = (layer: 'organic' | 'aqueous') =>
    ingredientsIn(layer, contents, tables).map(({ name }) => name);
  expect(names('organic')).toEqual(['EtOAc']);
  expect(names('aqueous')).toEqual(['water', 'MeOH']);
  const one = flask(solvent('water', 0.03), put(ACID, 1e-3));
  expect(ingredientsIn('organic', one, tables)).toEqual(one.ingredients);
});

test('a hydrochloride set free by base leaves its chloride in the water', () => {
  const contents = flask(
    solvent('EtOAc', 0.03),
    solvent('water', 0.03),
    put(`Cl.${AMINE}`, 5e-3),
    put(SODIUM_HYDROXIDE, 0.01),
  );
  const amine = ingredientsIn('organic', contents, tables).find(({ role }) => role === 'compound')!;
  expect(amine.molecule!.components).toHaveLength(1);
  expect(amine.molecule!.couples.every(({ kind, holdsProton }) => kind !== 'base' || !holdsProton)).toBe(
    true,
  );
});

test('what is in the two layers adds up to what was in the flask', () => {
  const mol = fc.double({ min: 1e-3, max: 0.1, noNaN: true });
  fc.assert(
    fc.property(mol, mol, mol, (acid, amine, hydroxide) => {
      const contents = flask(
        solvent('CH2Cl2', 0.05),
        solvent('water', 0.05),
        put(ACID, acid),
        put(AMINE, amine),
        put(SODIUM_HYDROXIDE, hydroxide),
      );
      for (const smiles of [ACID, AMINE, SODIUM_HYDROXIDE]) {
        const sum = share('organic', contents, smiles) + share('aqueous', contents, smiles);
        // Traces of less than a thousandth are not carried on.
        expect(sum).toBeGreaterThan(0.9989);
        expect(sum).toBeLessThan(1 + 1e-12);
      }
    }),
    { numRuns: 30 },
  );
});
