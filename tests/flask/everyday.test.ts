/** Transfers of everyday steps and their flawed twins, with stated constants: what the one judge must say. */
import { expect, test } from 'vitest';
import type { Perceived } from '../../server/src/chemistry/couple.ts';
import { type Intent, judgeTransfer } from '../../server/src/flask/judge.ts';
import type { SolventRow } from '../../server/src/tables/rows.ts';
import {
  constantsIn,
  DCM,
  DMF,
  ETHANOL,
  flask,
  MECN,
  type Part,
  reagentRow,
  stock,
  THF,
  TOLUENE,
  tables,
  WATER,
} from './kit.ts';

const potash = reagentRow('K2CO3', ['solid-base', 'carbonate'], { surfaceCeiling: 19, protonCapacity: 1 });
const hydride = reagentRow('NaH', ['metal-hydride'], { surfaceCeiling: 35 });
const amide = reagentRow('LDA', ['metal-amide']);
const butyl = reagentRow('n-BuLi', ['organometallic']);

interface Case {
  readonly solvent: SolventRow;
  readonly site: Perceived;
  readonly base: Part;
  readonly celsius?: number;
  readonly others?: readonly Part[];
}

function judge({ solvent, site, base, celsius = 25, others = [] }: Case, more: Partial<Intent> = {}) {
  const contents = flask(
    [[solvent, 1]],
    [{ name: 'A', molecule: site, mol: 0.2 }, base, ...others],
    celsius + 273.15,
  );
  const intent: Intent = { ingredient: 1, couples: [], direction: 'deprotonate', ...more };
  return judgeTransfer(contents, intent, tables, constantsIn)!;
}
const part = (name: string, molecule: Perceived, mol = 0.21, reagent?: Part['reagent']): Part => ({
  name,
  molecule,
  mol,
  role: 'base',
  ...(reagent ? { reagent } : {}),
});

const sound: readonly (readonly [string, Case])[] = [
  [
    'malonate and sodium ethoxide in ethanol',
    { solvent: ETHANOL, site: stock.malonate(), base: part('NaOEt', stock.NaOEt()) },
  ],
  [
    'alkyne and n-butyllithium in toluene at −40 °C',
    { solvent: TOLUENE, site: stock.alkyne(), base: part('n-BuLi', stock.nBuLi(), 0.2, butyl), celsius: -40 },
  ],
  [
    'phenol and potash in DMF',
    { solvent: DMF, site: stock.phenol(), base: part('K2CO3', stock.carbonate(), 0.3, potash) },
  ],
  [
    'malonate and potash in DMF',
    { solvent: DMF, site: stock.malonate(), base: part('K2CO3', stock.carbonate(), 0.3, potash) },
  ],
  [
    'malonate and potash in acetonitrile',
    { solvent: MECN, site: stock.malonate(), base: part('K2CO3', stock.carbonate(), 0.3, potash) },
  ],
  [
    'alcohol and sodium hydride in THF',
    { solvent: THF, site: stock.alcohol(), base: part('NaH', stock.NaH(), 0.22, hydride) },
  ],
  [
    'alcohol and sodium hydride in DMF',
    { solvent: DMF, site: stock.alcohol(), base: part('NaH', stock.NaH(), 0.22, hydride) },
  ],
  [
    'ester and LDA in THF at −78 °C',
    { solvent: THF, site: stock.ester(), base: part('LDA', stock.LDA(), 0.21, amide), celsius: -78 },
  ],
  [
    'ketone and LDA in THF at −78 °C',
    { solvent: THF, site: stock.ketone(), base: part('LDA', stock.LDA(), 0.21, amide), celsius: -78 },
  ],
  [
    'ketone and LiHMDS in THF',
    { solvent: THF, site: stock.ketone(), base: part('LiHMDS', stock.LiHMDS(), 0.21, amide), celsius: -78 },
  ],
  [
    'diisopropylamine and n-butyllithium in THF',
    {
      solvent: THF,
      site: stock.diisopropylamine(),
      base: part('n-BuLi', stock.nBuLi(), 0.2, butyl),
      celsius: -78,
    },
  ],
  [
    'ketone and LDA made in the flask',
    {
      solvent: THF,
      site: stock.ketone(),
      base: part('n-BuLi', stock.nBuLi(), 0.21, butyl),
      celsius: -78,
      others: [part('iPr2NH', stock.diisopropylamine(), 0.23)],
    },
  ],
  [
    'carboxylic acid and sodium carbonate in water',
    { solvent: WATER, site: stock.carboxylicAcid(), base: part('Na2CO3', stock.carbonate(), 0.2) },
  ],
  [
    'carboxylic acid and triethylamine in dichloromethane',
    { solvent: DCM, site: stock.carboxylicAcid(), base: part('Et3N', stock.Et3N()) },
  ],
  [
    'phenol and sodium hydroxide in water',
    { solvent: WATER, site: stock.phenol(), base: part('NaOH', stock.NaOH(), 0.22) },
  ],
];
test.each(sound)('%s goes', (_, one) => {
  const verdict = judge(one);
  expect(verdict.answer).toBe('yes');
  expect(verdict.extent).toBeGreaterThan(0.5);
});

const unsettled: readonly (readonly [string, Case])[] = [
  [
    'phenol and triethylamine in acetonitrile',
    { solvent: MECN, site: stock.phenol(), base: part('Et3N', stock.Et3N()) },
  ],
  [
    'phenol and triethylamine in dichloromethane',
    { solvent: DCM, site: stock.phenol(), base: part('Et3N', stock.Et3N()) },
  ],
  [
    'alcohol and potassium tert-butoxide in THF',
    { solvent: THF, site: stock.alcohol(), base: part('KOtBu', stock.KOtBu()) },
  ],
];
test.each(unsettled)('%s is never refused', (_, one) => {
  expect(judge(one).answer).not.toBe('no');
});

const flawed: readonly (readonly [string, Case])[] = [
  [
    'ketone and sodium hydroxide in water',
    { solvent: WATER, site: stock.ketone(), base: part('NaOH', stock.NaOH()) },
  ],
  [
    'ketone and potash in DMF',
    { solvent: DMF, site: stock.ketone(), base: part('K2CO3', stock.carbonate(), 0.3, potash) },
  ],
  [
    'alcohol and potash in DMF',
    { solvent: DMF, site: stock.alcohol(), base: part('K2CO3', stock.carbonate(), 0.3, potash) },
  ],
  [
    'phenol and sodium bicarbonate in water',
    { solvent: WATER, site: stock.phenol(), base: part('NaHCO3', stock.bicarbonate(), 0.2) },
  ],
  [
    'ketone and triethylamine in THF',
    { solvent: THF, site: stock.ketone(), base: part('Et3N', stock.Et3N()) },
  ],
  [
    'malonate and pyridine in dichloromethane',
    { solvent: DCM, site: stock.malonate(), base: part('pyridine', stock.pyridine()) },
  ],
  ['alkyne and DBU in THF', { solvent: THF, site: stock.alkyne(), base: part('DBU', stock.DBU()) }],
  [
    'ester and sodium ethoxide in ethanol',
    { solvent: ETHANOL, site: stock.ester(), base: part('NaOEt', stock.NaOEt()) },
  ],
];
test.each(flawed)('%s does not go', (_, one) => {
  const verdict = judge(one);
  expect(verdict.answer).toBe('no');
  expect(verdict.probability).toBeGreaterThan(0.95);
  expect(verdict.extent).toBeLessThan(0.1);
});

test('sodium hydroxide is some three to four units short of a ketone in water', () => {
  const verdict = judge(flawed[0]![1]);
  expect(verdict.logK).toBeCloseTo(15.74 - 19.3, 1);
  expect(verdict.broughtBy).toBe(2);
});

test('sodium ethoxide takes part of a ketone in ethanol, and less than half', () => {
  const verdict = judge({ solvent: ETHANOL, site: stock.ketone(), base: part('NaOEt', stock.NaOEt()) });
  expect(verdict.extent).toBeGreaterThan(1e-5);
  expect(verdict.extent).toBeLessThan(0.5);
});

test('an uphill transfer whose anion is used up goes by a steady amount', () => {
  const one = { solvent: MECN, site: stock.malonate(), base: part('DBU', stock.DBU(), 0.02) };
  expect(judge(one).answer).toBe('no');
  const steady = judge(one, { isConsumed: true });
  expect(steady.answer).toBe('yes');
  expect(steady.allowances).toContain('steady-amount');
});

test('a Claisen condensation is judged by its product', () => {
  const one = { solvent: ETHANOL, site: stock.ester(), base: part('NaOEt', stock.NaOEt()) };
  const verdict = judge(one, { isConsumed: true, product: stock.malonate() });
  expect(verdict.answer).toBe('yes');
  expect(verdict.allowances).toContain('net-reaction');
  expect(verdict.net!.logK).toBeCloseTo(20.1 - 16.5, 6);
});

test('an arene gives its proton to butyllithium on paper only', () => {
  const verdict = judge({
    solvent: THF,
    site: stock.arene(),
    base: part('n-BuLi', stock.nBuLi(), 0.2, butyl),
  });
  expect(verdict.answer).toBe('yes');
  expect(verdict.kinetics).toBe('dead');
  expect(verdict.allowances).toContain('slow');
});

test('sodium hydroxide frees an amine from its salt', () => {
  const contents = flask(
    [[WATER, 1]],
    [{ name: 'salt', molecule: stock.Et3NHCl(), mol: 0.2 }, part('NaOH', stock.NaOH(), 0.22)],
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [0], direction: 'deprotonate' },
    tables,
    constantsIn,
  )!;
  expect(verdict.answer).toBe('yes');
  expect(verdict.extent).toBeGreaterThan(0.9);
});

test.each([
  ['hydrogen chloride', stock.HCl()],
  ['acetic acid', stock.carboxylicAcid()],
])('%s protonates an amine in water', (name, molecule) => {
  const contents = flask(
    [[WATER, 1]],
    [
      { name: 'amine', molecule: stock.amine(), mol: 0.2 },
      { name, molecule, mol: 0.22, role: 'acid' },
    ],
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [], direction: 'protonate' },
    tables,
    constantsIn,
  )!;
  expect(verdict.answer).toBe('yes');
  expect(verdict.extent).toBeGreaterThan(0.9);
});

test('ammonium chloride quenches an enolate', () => {
  const contents = flask(
    [[THF, 1]],
    [
      { name: 'enolate', molecule: stock.enolate(), mol: 0.2 },
      { name: 'NH4Cl', molecule: stock.NH4Cl(), mol: 0.3, role: 'quench' },
    ],
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [], direction: 'protonate' },
    tables,
    constantsIn,
  )!;
  expect(verdict.answer).toBe('yes');
  expect(verdict.extent).toBeGreaterThan(0.99);
});

test('half an equivalent of base is judged by what it can do, and says so', () => {
  const verdict = judge({ solvent: WATER, site: stock.phenol(), base: part('NaOH', stock.NaOH(), 0.08) });
  expect(verdict.answer).toBe('yes');
  expect(verdict.allowances).toContain('stoichiometric');
  expect(verdict.extent).toBeCloseTo(0.4, 1);
  expect(verdict.capacity).toBeCloseTo(0.4, 1);
});

test('a second acid that eats the base leaves too little for the site', () => {
  const verdict = judge({
    solvent: THF,
    site: stock.ketone(),
    base: part('LDA', stock.LDA(), 0.2, amide),
    others: [{ name: 'acid', molecule: stock.carboxylicAcid(), mol: 0.2 }],
  });
  expect(verdict.extent).toBeLessThan(0.1);
  expect(verdict.partner!.couple.family).toBe('carboxylic-acid');
});
