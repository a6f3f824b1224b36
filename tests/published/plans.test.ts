/**
 * Published pH values and outcomes against plans as a chemist writes them, from the text to the solved flask.
 *
 * Table of approximate pH values at 25 °C: CRC Handbook of Chemistry and Physics, "Approximate pH values", recalled;
 * the book gives normal solutions, here as mol in a litre. Values after the comma are its own, so 0.3 is allowed.
 */
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { flaskStates } from '../../server/src/answers/flask-states.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);
const analysed = (text: string) => analyseNow(analyser, { file: 'published.lyate', text, language: 'lyate' });

/** pH of a litre of water with these charges. */
function pHOf(...charges: readonly string[]): number {
  const plan = analysed(['step A', 'solvent water 1 L', ...charges, ''].join('\n'));
  expect(plan.findings.filter(({ check }) => check === 'unknown-name')).toEqual([]);
  const last = flaskStates(plan, 'A')!.at(-1)!;
  expect(Math.abs(last.residual)).toBeLessThan(1e-9);
  return last.pH!;
}

const APPROXIMATE: readonly (readonly [string, number, string])[] = [
  ['1 M hydrochloric acid', 0.1, 'acid HCl 1 mol'],
  ['0.1 M hydrochloric acid', 1.1, 'acid HCl 0.1 mol'],
  ['0.01 M hydrochloric acid', 2.0, 'acid HCl 0.01 mol'],
  ['0.1 N sulfuric acid', 1.2, 'acid H2SO4 0.05 mol'],
  ['0.01 N sulfuric acid', 2.1, 'acid H2SO4 0.005 mol'],
  ['0.1 N phosphoric acid', 1.5, 'acid H3PO4 0.1 mol'],
  ['0.1 N oxalic acid', 1.6, 'charge "oxalic acid" 0.05 mol'],
  ['0.1 N tartaric acid', 2.2, 'charge "tartaric acid" 0.05 mol'],
  ['0.1 N citric acid', 2.2, 'charge "citric acid" 0.0333 mol'],
  ['0.1 M formic acid', 2.3, 'charge "formic acid" 0.1 mol'],
  ['0.1 M lactic acid', 2.4, 'charge <CC(O)C(=O)O> 0.1 mol'],
  ['1 M acetic acid', 2.4, 'charge AcOH 1 mol'],
  ['0.1 M acetic acid', 2.9, 'charge AcOH 0.1 mol'],
  ['0.01 M acetic acid', 3.4, 'charge AcOH 0.01 mol'],
  ['0.01 M benzoic acid', 3.1, 'charge <OC(=O)c1ccccc1> 0.01 mol'],
  ['0.1 M hydrogen cyanide', 5.1, 'charge <C#N> 0.1 mol'],
  ['0.033 M boric acid', 5.2, 'charge "boric acid" 0.0333 mol'],
  ['1 M sodium hydroxide', 14, 'base NaOH 1 mol'],
  ['0.1 M sodium hydroxide', 13, 'base NaOH 0.1 mol'],
  ['0.01 M potassium hydroxide', 12, 'base KOH 0.01 mol'],
  ['0.1 N trisodium phosphate', 12, 'charge Na3PO4 0.0333 mol'],
  ['0.1 M sodium bicarbonate', 8.4, 'base NaHCO3 0.1 mol'],
  ['1 M ammonia', 11.6, 'charge <N> 1 mol'],
  ['0.1 M ammonia', 11.1, 'charge <N> 0.1 mol'],
  ['0.01 M ammonia', 10.6, 'charge <N> 0.01 mol'],
  ['0.1 M potassium cyanide', 11, 'charge KCN 0.1 mol'],
  ['0.05 M borax', 9.2, 'charge <[Na+].[Na+].[O-]B1OB2OB([O-])OB(O1)O2> 0.05 mol'],
];
test.each(APPROXIMATE)('%s has pH %d', (_, published, charge) => {
  expect(Math.abs(pHOf(charge) - published)).toBeLessThanOrEqual(0.3);
});

test('0.10 M acetic acid has pH 2.88 (P. Atkins, J. de Paula, Physical Chemistry, exercise; recalled)', () => {
  expect(pHOf('charge "acetic acid" 0.1 mol')).toBeCloseTo(2.88, 2);
});

test('0.025 M of each phosphate has pH 6.865 (IUPAC 2002) within 0.02', () => {
  const pH = pHOf('charge KH2PO4 0.025 mol', 'charge Na2HPO4 0.025 mol');
  expect(Math.abs(pH - 6.865)).toBeLessThan(0.02);
});

test('0.025 M of each carbonate has pH 10.012 (IUPAC 2002) within 0.02', () => {
  expect(Math.abs(pHOf('charge NaHCO3 0.025 mol', 'charge Na2CO3 0.025 mol') - 10.012)).toBeLessThan(0.02);
});

test('0.05 M hydrogen phthalate has pH 4.005 (IUPAC 2002) within 0.02', () => {
  expect(Math.abs(pHOf('charge <[K+].OC(=O)c1ccccc1C(=O)[O-]> 0.05 mol') - 4.005)).toBeLessThan(0.02);
});

test('a half-neutralised Tris buffer has the pKa of Tris, 8.07 (Goldberg 2002), raised by ionic strength', () => {
  const pH = pHOf('charge <NC(CO)(CO)CO> 0.05 mol', 'acid HCl 0.025 mol');
  expect(Math.abs(pH - 8.07)).toBeLessThan(0.12);
});

test('the isoelectric point of glycine, 5.97 (CRC Handbook; recalled), is the pH of its solution', () => {
  expect(Math.abs(pHOf('charge <NCC(=O)O> 0.1 mol') - 5.97)).toBeLessThan(0.15);
});

/** The verdict on the transfer of the only step. */
function verdictOn(text: string) {
  const plan = analysed(text);
  const [transfer] = plan.steps[0]!.facts.transfers;
  return { verdict: transfer!.verdicts[0]!, findings: plan.findings };
}
const transfer = (structure: string, solvent: string, base: string) => `compound P = ${structure}
step A
  solvent ${solvent} 50 mL
  charge P 10 mmol
  base ${base} 1.05 equiv
  deprotonate P at :1
`;

// March's Advanced Organic Chemistry and Clayden, Organic Chemistry: difference of the pKa values quoted there.
test.each([
  ['diethyl malonate by ethoxide in ethanol', 'CCOC(=O)[CH2:1]C(=O)OCC', 'EtOH', 'NaOEt', 15.9 - 13.3],
  ['ethyl acetoacetate by ethoxide in ethanol', 'CC(=O)[CH2:1]C(=O)OCC', 'EtOH', 'NaOEt', 15.9 - 10.7],
  ['phenol by hydroxide in water', '[OH:1]c1ccccc1', 'water', 'NaOH', 15.74 - 9.99],
  ['acetic acid by bicarbonate in water', 'CC(=O)[OH:1]', 'water', 'NaHCO3', 6.35 - 4.76],
  ['phenol by bicarbonate in water', '[OH:1]c1ccccc1', 'water', 'NaHCO3', 6.35 - 9.99],
  ['acetophenone by hydroxide in water', '[CH3:1]C(=O)c1ccccc1', 'water', 'NaOH', 15.74 - 18.3],
  ['acetone by hydroxide in water', '[CH3:1]C(=O)C', 'water', 'NaOH', 15.74 - 19.3],
])('log K of %s is that of the quoted constants', (_, structure, solvent, base, published) => {
  const { verdict } = verdictOn(transfer(structure, solvent, base));
  expect(Math.abs(verdict.logK - published)).toBeLessThan(Math.max(0.3, 2 * verdict.sd));
  expect(verdict.sd).toBeLessThan(1.3);
});

/** What the textbooks say happens; the flask must agree and the checks must follow. */
const OUTCOMES: readonly (readonly [string, string, string, string, 'goes' | 'fails'])[] = [
  [
    'a terminal alkyne keeps its proton in aqueous hydroxide (Clayden)',
    '[CH:1]#CCCCC',
    'water',
    'NaOH',
    'fails',
  ],
  ['sodium amide takes it in ammonia (Clayden)', '[CH:1]#CCCCC', 'liquid ammonia', 'NaNH2', 'goes'],
  [
    'bicarbonate leaves a phenol alone (Shriner, Systematic Identification)',
    '[OH:1]c1ccccc1C',
    'water',
    'NaHCO3',
    'fails',
  ],
  ['hydroxide takes it (Shriner)', '[OH:1]c1ccccc1C', 'water', 'NaOH', 'goes'],
  ['LDA forms an enolate in full (Clayden)', 'O=C1CCCC[CH2:1]1', 'THF', 'LDA', 'goes'],
  ['triethylamine forms none (Clayden)', 'O=C1CCCC[CH2:1]1', 'THF', 'Et3N', 'fails'],
  ['butyllithium takes an alkyne in THF (Clayden)', '[CH:1]#CCCCC', 'THF', 'n-BuLi', 'goes'],
  ['hydride takes an alcohol (March)', '[OH:1]CCCCCC', 'THF', 'NaH', 'goes'],
  ['carbonate leaves an alcohol alone (March)', '[OH:1]CCCCCC', 'MeCN', 'K2CO3', 'fails'],
];
test.each(OUTCOMES)('%s', (_, structure, solvent, base, outcome) => {
  const { verdict, findings } = verdictOn(transfer(structure, solvent, base));
  const blamed = findings.filter(
    ({ check, severity }) => check.startsWith('transfer-') && severity !== 'information',
  );
  expect(verdict.extent > 0.9).toBe(outcome === 'goes');
  expect(blamed.map(({ check }) => check)).toEqual(outcome === 'goes' ? [] : ['transfer-uphill']);
});
