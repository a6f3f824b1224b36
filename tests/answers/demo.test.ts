/** The long demo route is sound: every transfer goes, and nothing worse than information is said of it. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { speciationAt } from '../../server/src/answers/flask-plots.ts';
import { suggestionsOf } from '../../server/src/answers/suggest.ts';
import { tables } from '../support/tables.ts';

const text = readFileSync(new URL('../../data/demo/five-steps.lyate', import.meta.url), 'utf8');
const analysed = analyseNow(createAnalyser(tables), { file: 'five-steps.lyate', text, language: 'lyate' });

test('five steps, fully read, without a stray word', () => {
  expect(analysed.plan.steps.map(({ label }) => label)).toEqual(['A', 'B', 'C', 'D', 'E']);
  const blamed = analysed.findings.filter(({ severity }) => severity === 'error' || severity === 'warning');
  expect(blamed.map(({ check, message }) => `${check}: ${message}`)).toEqual([]);
  expect(analysed.findings.map(({ check }) => check)).toContain('gas-release');
});

test('every intended transfer is judged and goes', () => {
  const verdicts = analysed.steps.flatMap(({ facts }) => facts.transfers.flatMap((fact) => fact.verdicts));
  expect(verdicts.map(({ answer }) => answer)).toEqual(['yes', 'yes', 'yes', 'yes']);
  for (const { extent } of verdicts) expect(extent).toBeGreaterThan(0.9);
});

test('what was written is among what would be suggested', () => {
  const names = (label: string) =>
    suggestionsOf(analysed, label)!.flatMap(({ list }) => list.map(({ option }) => option.reagent.name));
  expect(names('A')).toContain('K2CO3');
  expect(names('B')).toContain('NaH');
  expect(names('D').slice(0, 3)).toContain('LDA');
  expect(names('E')).toContain('HCl');
});

test('the base lies on both sides of the acid wash', () => {
  const step = analysed.plan.steps[4]!;
  const lineOf = (keyword: string) =>
    step.firstLine + step.statements.find((one) => one.keyword === keyword)!.range.start.line;
  const before = speciationAt(analysed, lineOf('protonate'))!.numbers;
  const after = speciationAt(analysed, lineOf('adjust'))!.numbers;
  expect(before.now).toBeLessThan(3);
  expect(after.now).toBeCloseTo(10, 1);
});
