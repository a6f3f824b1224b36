/**
 * Standard buffers written as plans, from the names in the text and the project's own tables to the pH.
 *
 * Published: R. P. Buck et al., Measurement of pH, Pure Appl. Chem. 2002, 74, 2169 (primary and secondary standards,
 * values at the molality given; molality and molarity differ by less than 0.002 in pH here). Recalled from that source.
 */
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);

function pHOf(lines: readonly string[], celsius = 25): number {
  const text = ['step A', 'solvent water 1 L', `temperature ${celsius} °C`, ...lines].join('\n');
  const plan = analyseNow(analyser, { file: 'x.lyate', text: `${text}\n`, language: 'lyate' });
  expect(plan.findings.filter(({ severity }) => severity === 'error')).toEqual([]);
  return plan.steps[0]!.facts.moments.at(-1)!.state().pH!;
}

const PHOSPHATE = ['charge KH2PO4 25 mmol', 'charge Na2HPO4 25 mmol'];
const PHTHALATE = ['charge <[K+].OC(=O)c1ccccc1C(=O)[O-]> 50 mmol'];
const CARBONATE = ['charge NaHCO3 25 mmol', 'charge Na2CO3 25 mmol'];

test.each([
  ['equimolal phosphate', PHOSPHATE, 6.865],
  ['phosphate 1 : 3.5', ['charge KH2PO4 8.695 mmol', 'charge Na2HPO4 30.43 mmol'], 7.413],
  ['hydrogen phthalate', PHTHALATE, 4.005],
  ['borax', ['charge borax 10 mmol'], 9.18],
  ['carbonate', CARBONATE, 10.012],
  ['dihydrogen citrate', ['charge <[K+].OC(=O)CC(O)(CC(=O)O)C(=O)[O-]> 50 mmol'], 3.776],
])('%s at 25 °C within 0.02 of its published pH', (_, lines, published) => {
  expect(Math.abs(pHOf(lines) - published)).toBeLessThan(0.02);
});

test.each([
  ['phthalate', PHTHALATE, 5, 3.999],
  ['phosphate', PHOSPHATE, 5, 6.951],
  ['phosphate', PHOSPHATE, 50, 6.833],
  ['carbonate', CARBONATE, 5, 10.245],
  ['carbonate', CARBONATE, 50, 9.828],
])('%s, lines %j, at %i °C within 0.03', (_, lines, celsius, published) => {
  expect(Math.abs(pHOf(lines, celsius) - published)).toBeLessThan(0.03);
});
