/** The flask over the project's own tables: everyday transfers and standard buffers, from names to verdicts. */
import { expect, test } from 'vitest';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { judgeTransfer } from '../../server/src/flask/judge.ts';
import { solveFlask } from '../../server/src/flask/solve.ts';
import type { Contents, Ingredient } from '../../server/src/flask/state.ts';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { tables } from '../support/tables.ts';

const plain = { volume: null, reagent: null, solvent: null, assumed: false, qualifier: null } as const;

function solvent(name: string, id: number): Ingredient {
  const row = tables.solventByName.get(foldName(name))!;
  const molecule = perceive(row.smiles, tables);
  return {
    ...plain,
    id,
    name,
    molecule,
    mol: (1000 * row.density!) / molecule.molarMass!,
    volume: 1,
    role: 'solvent',
    solvent: row,
  };
}
function reagent(name: string, id: number, mol: number): Ingredient {
  const row = tables.reagentByName.get(foldName(name))!;
  return {
    ...plain,
    id,
    name,
    molecule: row.smiles === null ? null : perceive(row.smiles, tables),
    mol,
    role: 'base',
    reagent: row,
  };
}
const compound = (smiles: string, id: number, mol: number): Ingredient => ({
  ...plain,
  id,
  name: smiles,
  molecule: perceive(smiles, tables),
  mol,
  role: 'compound',
});

/** The verdict on the site marked :1, or on whichever the flask takes. */
function judge(smiles: string, base: string, inSolvent: string, celsius = 25) {
  const contents: Contents = {
    ingredients: [solvent(inSolvent, 0), compound(smiles, 1, 0.2), reagent(base, 2, 0.22)],
    temperature: celsius + 273.15,
  };
  const { graph, couples } = contents.ingredients[1]!.molecule!;
  const marked = graph!.atoms.filter(({ mapNumber }) => mapNumber === 1).map(({ index }) => index);
  const meant = couples.flatMap(({ equivalents, holdsProton }, place) =>
    holdsProton && equivalents.some((atom) => marked.includes(atom)) ? [place] : [],
  );
  return judgeTransfer(contents, { ingredient: 1, couples: meant, direction: 'deprotonate' }, tables)!;
}

test.each([
  ['O=C1CCCC[CH2:1]1', 'LDA', 'THF', -78],
  ['CC(C)(C)OC(=O)[CH3:1]', 'LDA', 'THF', -78],
  ['O=C([CH3:1])c1ccccc1', 'LiHMDS', 'THF', -78],
  ['CCOC(=O)[CH2:1]C(=O)OCC', 'K2CO3', 'DMF', 25],
  ['CCOC(=O)[CH2:1]C(C)=O', 'NaOEt', 'EtOH', 25],
  ['CC(C)[NH:1]C(C)C', 'n-BuLi', 'THF', -78],
  ['OC(=O)c1ccccc1', 'Et3N', 'CH2Cl2', 25],
  ['COc1ccc([OH:1])cc1', 'NaOH', 'water', 25],
  ['c1ccc2[nH:1]ccc2c1', 'NaH', 'DMF', 25],
  ['[SH:1]c1ccccc1', 'K2CO3', 'DMF', 25],
  ['[Cl-].[NH3+:1]Cc1ccccc1', 'NaOH', 'water', 25],
  ['[K+].OP(=O)(O)[O-]', 'NaOH', 'water', 25],
])('%s loses its proton to %s in %s at %d °C', (smiles, base, inSolvent, celsius) => {
  const verdict = judge(smiles, base, inSolvent, celsius);
  expect(verdict.answer).toBe('yes');
  expect(verdict.extent).toBeGreaterThan(0.9);
});

test.each([
  ['O=C([CH3:1])c1ccccc1', 'NaOH', 'water'],
  ['O=C1CCCC[CH2:1]1', 'K2CO3', 'DMF'],
  ['COc1ccc([OH:1])cc1', 'NaHCO3', 'water'],
  ['O=C1CCC[CH2:1]1', 'NaOEt', 'EtOH'],
])('%s keeps its proton from %s in %s', (smiles, base, inSolvent) => {
  const verdict = judge(smiles, base, inSolvent);
  expect(verdict.answer).toBe('no');
  expect(verdict.extent).toBeLessThan(0.1);
});

test('phenol with potash in DMF and with triethylamine in dichloromethane is never refused', () => {
  expect(judge('COc1ccc([OH:1])cc1', 'K2CO3', 'DMF').answer).not.toBe('no');
  expect(judge('COc1ccc([OH:1])cc1', 'Et3N', 'CH2Cl2').answer).not.toBe('no');
});

// IUPAC Recommendations 2002, Pure Appl. Chem. 2002, 74, 2169; constants from the project's own table of measured values.
// The salts are made in the flask from acid and sodium hydroxide, which gives the same solutions.
test.each([
  ['phthalate', 4.005, 'OC(=O)c1ccccc1C(=O)O', 0.05, 0.05],
  ['carbonate', 10.012, 'OC(=O)O', 0.05, 0.075],
  ['borax', 9.18, 'OB(O)O', 0.04, 0.02],
  ['acetic acid 0.1 M', 2.88, 'CC(=O)O', 0.1, 0],
])('%s has pH %d within 0.02 by the measured constants of the tables', (_, published, acid, mol, alkali) => {
  const contents: Contents = {
    ingredients: [solvent('water', 0), compound(acid, 1, mol), reagent('NaOH', 2, alkali)],
    temperature: 298.15,
  };
  expect(Math.abs(solveFlask(contents, tables).pH! - published)).toBeLessThan(0.02);
});

// The same recommendations; the salts as a bottle holds them.
test.each([
  ['phosphate 1:1', 6.865, { '[K+].OP(=O)(O)[O-]': 0.025, '[Na+].[Na+].OP(=O)([O-])[O-]': 0.025 }],
  ['phosphate 1:3.5', 7.413, { '[K+].OP(=O)(O)[O-]': 0.008695, '[Na+].[Na+].OP(=O)([O-])[O-]': 0.03043 }],
  ['citrate', 3.776, { '[K+].O=C(O)CC(O)(CC(=O)O)C(=O)[O-]': 0.05 }],
  ['citrate, charged elsewhere', 3.776, { '[K+].OC(=O)CC(O)(C(=O)O)CC(=O)[O-]': 0.05 }],
  ['borax', 9.18, { 'OB(O)O': 0.02, '[Na+].[B-](O)(O)(O)O': 0.02 }],
  ['borax, as metaborate', 9.18, { 'OB(O)O': 0.02, '[Na+].OB(O)[O-]': 0.02 }],
  ['carbonate', 10.012, { '[Na+].OC(=O)[O-]': 0.025, '[Na+].[Na+].[O-]C(=O)[O-]': 0.025 }],
] as [string, number, Record<string, number>][])(
  '%s made of its salts has pH %d within 0.02',
  (_, published, salts) => {
    const contents: Contents = {
      ingredients: [
        solvent('water', 0),
        ...Object.entries(salts).map(([smiles, mol], place) => compound(smiles, place + 1, mol)),
      ],
      temperature: 298.15,
    };
    expect(Math.abs(solveFlask(contents, tables).pH! - published)).toBeLessThan(0.02);
  },
);
