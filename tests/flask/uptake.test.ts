/** Acid set free, two layers, metals and catalysts: the allowances that need more than two partners. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Perceived } from '../../server/src/chemistry/couple.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { judgeTransfer } from '../../server/src/flask/judge.ts';
import { layerForms, organicShare } from '../../server/src/flask/layers.ts';
import { solveFlask } from '../../server/src/flask/solve.ts';
import { acidOfReagents, acidUptake, freeShare, protonatedShare } from '../../server/src/flask/uptake.ts';
import {
  type CoupleSpec,
  constantsIn,
  DCM,
  flask,
  molecule,
  type Part,
  reagentRow,
  stock,
  THF,
  TOLUENE,
  tables,
  WATER,
} from './kit.ts';

const amine = (): Part => ({ name: 'amine', molecule: stock.amine(), mol: 0.2 });

test('an acid chloride without base leaves half of the amine, with triethylamine nearly all of it', () => {
  const chloride: Part = {
    name: 'AcCl',
    molecule: molecule([]),
    mol: 0.1,
    reagent: reagentRow('AcCl', ['acylating'], { acidReleased: 1 }),
  };
  const bare = flask([[DCM, 1]], [amine(), chloride]);
  expect(acidOfReagents(bare)).toBeCloseTo(0.1, 12);
  const alone = acidUptake(bare, 1, stock.HCl(), acidOfReagents(bare), tables, constantsIn);
  expect(alone.before).toBeLessThan(0.01);
  expect(alone.after).toBeCloseTo(0.5, 2);
  const phosphazene = molecule([
    {
      group: 'phosphazene',
      family: 'phosphazenium',
      element: 'N',
      kind: 'base',
      held: false,
      dmso: 21,
      water: 19,
    },
  ]);
  const helped = flask([[DCM, 1]], [amine(), chloride, { name: 'base', molecule: phosphazene, mol: 0.2 }]);
  expect(acidUptake(helped, 1, stock.HCl(), 0.1, tables, constantsIn).after).toBeLessThan(0.01);
});

test('more acid never leaves more of the free amine', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 0.4, noNaN: true }),
      fc.double({ min: 0, max: 0.2, noNaN: true }),
      (mol, more) => {
        const contents = flask([[WATER, 1]], [amine()]);
        const share = (amount: number) =>
          acidUptake(contents, 1, stock.HCl(), amount, tables, constantsIn).after!;
        expect(share(mol + more)).toBeGreaterThanOrEqual(share(mol) - 1e-9);
      },
    ),
  );
});

test('a fluoride beside enough base holds no free hydrogen fluoride', () => {
  const fluoride = molecule([
    { group: 'hydrogen-fluoride', family: 'mineral-acid', element: 'F', water: 3.17, held: true },
  ]);
  const free = (base: number) =>
    freeShare(
      solveFlask(
        flask(
          [[WATER, 1]],
          [
            { name: 'HF', molecule: fluoride, mol: 0.1 },
            { name: 'NaOH', molecule: stock.NaOH(), mol: base },
          ],
        ),
        tables,
        constantsIn,
      ),
      1,
      'hydrogen-fluoride',
    )!;
  expect(free(0)).toBeGreaterThan(0.8);
  expect(free(0.12)).toBeLessThan(1e-6);
});

test('a nucleophile without basic nitrogen has no share', () => {
  expect(
    protonatedShare(
      solveFlask(
        flask([[WATER, 1]], [{ name: 'A', molecule: stock.phenol(), mol: 0.1 }]),
        tables,
        constantsIn,
      ),
      1,
    ),
  ).toBeNull();
});

/** A molecule whose structure is read, so that its log P can be calculated. */
function drawn(smiles: string, couples: readonly CoupleSpec[]): Perceived {
  const { structure } = readSmiles(smiles);
  const graph = buildGraph(structure!).graph!;
  const made = molecule(
    couples,
    graph.fragments.map((atoms) => atoms.reduce((sum, atom) => sum + graph.atoms[atom]!.charge, 0)),
  );
  // The stated constants hang on the object, so it is filled rather than copied.
  return Object.assign(made, {
    graph,
    smiles,
    components: made.components.map((one, index) => ({ ...one, atoms: graph.fragments[index]! })),
  });
}
const benzylamineSalt = () =>
  drawn('CCCCCC[NH3+].[Cl-]', [
    {
      group: 'amine-primary',
      family: 'ammonium',
      element: 'N',
      kind: 'base',
      held: true,
      water: 10.6,
      dmso: 11,
    },
    {
      group: 'hydrogen-chloride',
      family: 'mineral-acid',
      element: 'Cl',
      held: false,
      component: 1,
      water: -6,
      dmso: 1.8,
    },
  ]);

test('aqueous carbonate frees an amine from its salt because the organic layer pulls it', () => {
  const potash: Part = {
    name: 'K2CO3',
    molecule: stock.carbonate(),
    mol: 0.3,
    reagent: reagentRow('K2CO3', ['carbonate'], { surfaceCeiling: 19 }),
  };
  const salt = { name: 'salt', molecule: benzylamineSalt(), mol: 0.1 };
  const free = (layers: Parameters<typeof flask>[0], id: number) =>
    1 - protonatedShare(solveFlask(flask(layers, [salt, potash]), tables, constantsIn), id)!;
  expect(
    free(
      [
        [WATER, 1],
        [TOLUENE, 1],
      ],
      2,
    ),
  ).toBeGreaterThan(0.9);
  expect(
    free(
      [
        [WATER, 1],
        [TOLUENE, 1],
      ],
      2,
    ),
  ).toBeGreaterThan(free([[WATER, 1]], 1));
});

test('the layer that holds an amine turns with the pH', () => {
  const at = (pH: number) => layerForms(benzylamineSalt(), pH, tables, constantsIn);
  expect(at(2).charges[0]!.charge).toBe(1);
  expect(at(13).charges[0]!.charge).toBe(0);
  expect(organicShare(at(2).logD!, 1, 1)).toBeLessThan(0.05);
  expect(organicShare(at(13).logD!, 1, 1)).toBeGreaterThan(0.9);
  expect(at(13).logD!).toBeCloseTo(at(13).logP!, 2);
});

const ketone = (): Part => ({ name: 'ketone', molecule: stock.ketone(), mol: 0.2 });
const verdict = (contents: ReturnType<typeof flask>, ingredient: number) =>
  judgeTransfer(contents, { ingredient, couples: [], direction: 'deprotonate' }, tables, constantsIn)!;

test('a lithium halide beside an amine base leaves an uphill transfer undecided', () => {
  const dbu: Part = { name: 'DBU', molecule: stock.DBU(), mol: 0.3, role: 'base' };
  const lithium: Part = { name: 'LiCl', molecule: drawn('[Li+].[Cl-]', []), mol: 0.3 };
  expect(verdict(flask([[THF, 1]], [ketone(), dbu]), 1).answer).toBe('no');
  const helped = verdict(flask([[THF, 1]], [ketone(), dbu, lithium]), 1);
  expect(helped).toMatchObject({ answer: 'undecided', probability: 0.5 });
  expect(helped.allowances).toContain('lewis-acid');
  const hydroxide: Part = { name: 'NaOH', molecule: stock.NaOH(), mol: 0.3 };
  expect(verdict(flask([[WATER, 1]], [ketone(), hydroxide, lithium]), 1).answer).toBe('no');
});

test('an onium salt takes hydroxide over into the organic layer: undecided at most', () => {
  const hydroxide: Part = { name: 'NaOH', molecule: stock.NaOH(), mol: 1 };
  const onium: Part = { name: 'TBAB', molecule: drawn('CCCC[N+](CCCC)(CCCC)CCCC.[Br-]', []), mol: 0.02 };
  expect(
    verdict(
      flask(
        [
          [WATER, 1],
          [TOLUENE, 1],
        ],
        [ketone(), hydroxide],
      ),
      2,
    ).answer,
  ).toBe('no');
  expect(
    verdict(
      flask(
        [
          [WATER, 1],
          [TOLUENE, 1],
        ],
        [ketone(), hydroxide, onium],
      ),
      2,
    ).allowances,
  ).toContain('phase-transfer');
});

test('an aluminium hydride reduces a ketone and does not enolise it', () => {
  const hydride: Part = {
    name: 'LiAlH4',
    molecule: molecule([], [-1, 1]),
    mol: 0.1,
    reagent: reagentRow('LiAlH4', ['aluminium-hydride']),
  };
  const state = solveFlask(flask([[THF, 1]], [ketone(), hydride]), tables, constantsIn);
  expect(state.gases).toEqual([]);
});
