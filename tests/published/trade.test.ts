/**
 * What every chemist of the trade knows about acidity; common practice, no published source.
 *
 * Each fact is asked of the engine twice where it can be: of the tables, and of the rules alone.
 */
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { constantsIn } from '../../server/src/chemistry/constants.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { type PlacedWindow, placedWindow, solventWindow } from '../../server/src/flask/window.ts';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { tables } from '../support/tables.ts';

/** The constant in water of the couple on the atom marked :1. */
function inWater(smiles: string, kind: 'acid' | 'base', estimateOnly: boolean): number {
  const molecule = perceive(smiles, tables);
  const { couples } = constantsIn(molecule, 'water', tables, estimateOnly ? { estimateOnly } : {});
  const marked = molecule.graph!.atoms.findIndex(({ mapNumber }) => mapNumber === 1);
  const place = molecule.couples.findIndex(
    (couple) => couple.kind === kind && couple.equivalents.includes(marked),
  );
  expect(place, smiles).not.toBe(-1);
  return couples[place]!.value;
}

const CLASSES: readonly (readonly [string, 'acid' | 'base', number, number, readonly string[]])[] = [
  [
    'sulfonic acids lie below 0',
    'acid',
    -15,
    0,
    ['CS(=O)(=O)[OH:1]', 'Cc1ccc(cc1)S(=O)(=O)[OH:1]', '[OH:1]S(=O)(=O)C(F)(F)F'],
  ],
  [
    'carboxylic acids lie at about 4',
    'acid',
    3.5,
    5.2,
    ['CC(=O)[OH:1]', 'CCCC(=O)[OH:1]', '[OH:1]C(=O)c1ccccc1', 'CC(C)C(=O)[OH:1]', '[OH:1]C=O'],
  ],
  [
    'phenols lie at 9 to 10',
    'acid',
    8.9,
    10.5,
    ['[OH:1]c1ccccc1', 'Cc1ccc([OH:1])cc1', 'Clc1ccc([OH:1])cc1', '[OH:1]c1ccc2ccccc2c1'],
  ],
  [
    'ammonium ions lie at 9 to 11',
    'base',
    9,
    11.3,
    ['[NH3:1]', 'C[NH2:1]', 'CC[NH:1]CC', 'CC[N:1](CC)CC', 'NCC[NH2:1]'],
  ],
  ['water lies at 15.7', 'acid', 15.65, 15.8, ['[OH2:1]']],
  [
    'alcohols lie at 15.5 to 19',
    'acid',
    15.3,
    19.1,
    ['C[OH:1]', 'CC[OH:1]', 'CC(C)[OH:1]', 'CC(C)(C)[OH:1]', '[OH:1]C1CCCCC1'],
  ],
  [
    'terminal alkynes lie at about 25',
    'acid',
    23,
    26,
    ['C#[CH:1]', 'CC#[CH:1]', 'CC(C)(C)C#[CH:1]', '[CH:1]#Cc1ccccc1'],
  ],
  ['hydrogen lies at about 35', 'acid', 33, 37, ['[H][H:1]']],
  [
    'ammonia and amines lie at 34 to 38 as acids',
    'acid',
    34,
    38.5,
    ['[NH3:1]', 'C[NH2:1]', 'CC(C)[NH:1]C(C)C', 'C1CCC[NH:1]C1'],
  ],
  ['alkenes lie at about 44', 'acid', 42, 46, ['C=[CH2:1]']],
  [
    'alkanes lie at about 50 or above',
    'acid',
    48,
    58,
    ['[CH4:1]', 'C[CH3:1]', '[CH2:1]1CCCCC1', 'CCC[CH3:1]'],
  ],
  ['protonated ethers are strong acids', 'base', -5, -1, ['CC[O:1]CC', 'C1CC[O:1]C1']],
  [
    'protonated ketones are strong acids',
    'base',
    -9,
    -1.5,
    ['CC(C)=[O:1]', '[O:1]=C1CCCCC1', 'CC(=[O:1])c1ccccc1'],
  ],
  ['protonated alcohols are strong acids', 'base', -4, -1, ['C[OH:1]', 'CC[OH:1]', 'CC(C)(C)[OH:1]']],
  ['protonated esters are strong acids', 'base', -9, -3, ['CC(=[O:1])OCC']],
];
const cases = CLASSES.flatMap(([fact, kind, low, high, structures]) =>
  structures.map((smiles) => [fact, smiles, kind, low, high] as const),
);
test.each(cases)('%s: %s', (_, smiles, kind, low, high) => {
  const value = inWater(smiles, kind, false);
  expect(value).toBeGreaterThanOrEqual(low);
  expect(value).toBeLessThanOrEqual(high);
});
/** The constant of each parent is what the rules start from; tert-butanol and methane are their known outliers. */
test.each(cases)('%s, by the rules alone: %s', (_, smiles, kind, low, high) => {
  const value = inWater(smiles, kind, true);
  expect(value).toBeGreaterThanOrEqual(low - 1);
  expect(value).toBeLessThanOrEqual(high + 1);
});

test('the ladder of acids stands in its known order', () => {
  const ladder = [
    '[OH:1]S(=O)(=O)C(F)(F)F',
    'CS(=O)(=O)[OH:1]',
    'FC(F)(F)C(=O)[OH:1]',
    'CC(=O)[OH:1]',
    '[OH:1]c1ccccc1',
    'CCOC(=O)[CH2:1]C(=O)OCC',
    'CC[OH:1]',
    'CC(=O)[CH3:1]',
    'CC#[CH:1]',
    'CC(C)[NH:1]C(C)C',
    'C=[CH2:1]',
    'CCC[CH3:1]',
  ];
  const values = ladder.map((smiles) => inWater(smiles, 'acid', false));
  expect(values).toEqual([...values].sort((a, b) => a - b));
});

const row = (name: string) => tables.solventByName.get(foldName(name))!;
const width = ({ low, high }: PlacedWindow) => high!.value - low!.value;

test('the window of water spans 14 units', () => {
  expect(width(placedWindow(row('water'), tables))).toBeCloseTo(14, 1);
});

test('the window of sulfuric acid is tiny', () => {
  const { own } = solventWindow(row('H2SO4'));
  expect(own!.high).toBeLessThan(5);
  const narrower = tables.solvents.filter(({ pKs }) => pKs !== null && pKs < own!.high);
  expect(narrower.map(({ name }) => name)).toEqual([]);
});

test.each(['DMSO', 'MeCN', 'DMF'])('the window of %s is at least twice as wide as that of water', (name) => {
  expect(width(placedWindow(row(name), tables))).toBeGreaterThan(28);
});

test('the window of benzene is by far the widest: no acid within reach of the rules ends it', () => {
  const { low, high } = placedWindow(row('benzene'), tables);
  expect(low).toBeNull();
  for (const name of ['water', 'MeOH', 'acetic acid', 'DMSO', 'MeCN', 'DMF', 'acetone', 'CH2Cl2']) {
    expect(placedWindow(row(name), tables).high!.value, name).toBeLessThan(high!.value - 8);
  }
  for (const name of ['water', 'MeOH', 'acetic acid', 'DMSO', 'MeCN', 'DMF', 'acetone', 'THF', 'Et2O'])
    expect(placedWindow(row(name), tables).low, name).not.toBeNull();
});

test('stronger bases stand in ethanol than in water, in DMSO than in ethanol, in benzene than in DMSO', () => {
  const ends = ['water', 'EtOH', 'DMSO', 'benzene'].map(
    (name) => placedWindow(row(name), tables).high!.value,
  );
  expect(ends).toEqual([...ends].sort((a, b) => a - b));
});

const analyser = createAnalyser(tables);
function extentOf(structure: string, solvent: string, reagent: string, keyword: 'base' | 'acid'): number {
  const verb = keyword === 'base' ? 'deprotonate' : 'protonate';
  const text = `compound P = ${structure}
step A
  solvent ${solvent} 50 mL
  charge P 10 mmol
  ${keyword} ${reagent} 1.1 equiv
  ${verb} P at :1
`;
  const plan = analyseNow(analyser, { file: 'trade.lyate', text, language: 'lyate' });
  return plan.steps[0]!.facts.transfers[0]!.verdicts[0]!.extent;
}

/** An acid that stands above a conjugate base in the table of acids reacts with it to completion, the reverse does not. */
test.each([
  ['acetic acid and phenoxide', 'CC(=O)[OH:1]', '<[Na+].[O-]c1ccccc1>', 'water', 'base'],
  ['phenol and hydroxide', '[OH:1]c1ccccc1', 'NaOH', 'water', 'base'],
  ['ammonium and hydroxide', '[Cl-].CC[NH+:1](CC)CC', 'NaOH', 'water', 'base'],
  ['malonate ester and ethoxide', 'CCOC(=O)[CH2:1]C(=O)OCC', 'NaOEt', 'EtOH', 'base'],
  ['ketone and amide base', 'O=C1CCCC[CH2:1]1', 'LDA', 'THF', 'base'],
  ['alkyne and butyllithium', 'CCCCC#[CH:1]', 'n-BuLi', 'THF', 'base'],
  ['amine and hydrochloric acid', 'CC[N:1](CC)CC', 'HCl', 'water', 'acid'],
  ['carboxylate and sulfonic acid', '[Na+].CC(=O)[O-:1]', 'MsOH', 'water', 'acid'],
] as const)('%s react to completion', (_, structure, reagent, solvent, keyword) => {
  expect(extentOf(structure, solvent, reagent, keyword)).toBeGreaterThan(0.9);
});
test.each([
  ['phenol and acetate', '[OH:1]c1ccccc1', 'NaOAc', 'water', 'base'],
  ['water-like alcohol and phenoxide', 'CC[OH:1]', '<[Na+].[O-]c1ccccc1>', 'THF', 'base'],
  ['ammonium and acetate', '[Cl-].CC[NH+:1](CC)CC', 'NaOAc', 'water', 'base'],
  ['ketone and ethoxide', 'CC(=O)[CH3:1]', 'NaOEt', 'EtOH', 'base'],
  ['alkyne and hydroxide', 'CCCCC#[CH:1]', 'NaOH', 'water', 'base'],
  ['amine and phenol', 'Nc1cccc[n:1]1', 'phenol', 'water', 'acid'],
] as const)('%s do not', (_, structure, reagent, solvent, keyword) => {
  expect(extentOf(structure, solvent, reagent, keyword)).toBeLessThan(0.1);
});
