/** What a step hands to its checks: who added what, the flask after each line, transfers and conversions. */
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import type { StepFacts } from '../../server/src/checks/facts.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);
const factsOf = (text: string, step = 0): StepFacts =>
  analyseNow(analyser, { file: 'facts.lyate', text, language: 'lyate' }).steps[step]!.facts;
const mmol = ({ additions }: StepFacts, name: string) =>
  additions
    .filter(({ ingredient }) => ingredient.name === name)
    .map(({ ingredient }) => 1e3 * ingredient.mol);

const ETHER = `compound A = COc1ccc([OH:1])cc1
compound B = COc1ccc(OCc2ccccc2)cc1
step A
  solvent DMF 25 mL
  charge A 10 mmol
  base K2CO3 1.5 equiv
  temperature 60 °C
  deprotonate A at :1
  charge BnBr 1.1 equiv
  convert A + BnBr to B yield 90 %
`;

test('amounts in equivalents count from the first charged compound', () => {
  const facts = factsOf(ETHER);
  expect(mmol(facts, 'A')[0]).toBeCloseTo(10, 9);
  expect(mmol(facts, 'K2CO3')[0]).toBeCloseTo(15, 9);
  expect(mmol(facts, 'BnBr')[0]).toBeCloseTo(11, 9);
});

test('each line that changes the flask has its moment, with what is in it by then', () => {
  const { moments } = factsOf(ETHER);
  expect(moments.map(({ statement }) => statement.keyword)).toEqual([
    'solvent',
    'charge',
    'base',
    'deprotonate',
    'charge',
    'convert',
  ]);
  expect(moments.map(({ contents }) => contents.ingredients.length).slice(0, 3)).toEqual([1, 2, 3]);
});

test('a temperature holds from its line on', () => {
  const { moments, left } = factsOf(ETHER);
  expect(moments.map(({ contents }) => Math.round(contents.temperature - 273.15))).toEqual([
    25, 25, 25, 60, 60, 60,
  ]);
  expect(left.temperature).toBeCloseTo(333.15, 9);
});

test('reflux is the boiling point of the solvent', () => {
  const { left } = factsOf(
    'step A\n  solvent EtOH 20 mL\n  charge benzaldehyde 5 mmol\n  temperature reflux\n',
  );
  expect(left.temperature - 273.15).toBeCloseTo(78.4, 0);
});

test('a transfer is judged at its line and knows the conversion that follows', () => {
  const { transfers } = factsOf(ETHER);
  expect(transfers).toHaveLength(1);
  expect(transfers[0]!.ingredient!.name).toBe('A');
  expect(transfers[0]!.convert?.keyword).toBe('convert');
  expect(transfers[0]!.verdicts.map(({ answer }) => answer)).toEqual(['yes']);
});

test('a transfer of what is not in the flask has no ingredient and no verdict', () => {
  const { transfers } = factsOf(
    'compound A = CCO\nstep A\n  solvent THF 20 mL\n  base NaH 5 mmol\n  deprotonate A\n',
  );
  expect(transfers.map(({ ingredient, verdicts }) => [ingredient, verdicts.length])).toEqual([[null, 0]]);
});

test('a conversion puts the product into the flask by its yield and takes the reactants out', () => {
  const { left, conversions } = factsOf(ETHER);
  expect(conversions).toHaveLength(1);
  const held = (name: string) =>
    1e3 * left.ingredients.filter((one) => one.name === name).reduce((sum, one) => sum + one.mol, 0);
  expect(held('B')).toBeCloseTo(9, 6);
  expect(held('A')).toBeLessThan(1.001);
  expect(held('BnBr')).toBeLessThan(2.001);
});

test('several sites of one name are judged one by one', () => {
  const { transfers } = factsOf(`compound P = [OH:1]CCC#[CH:2]
step A
  solvent THF 20 mL
  temperature -78 °C
  charge P 5 mmol
  base n-BuLi 2.1 equiv 2.5 M in hexanes
  deprotonate P at :1, :2
`);
  expect(transfers[0]!.verdicts).toHaveLength(2);
});

test('a stock solution brings its solvent', () => {
  const { left } = factsOf(`step A
  solvent THF 20 mL
  charge benzaldehyde 5 mmol
  charge MeMgBr 1.2 equiv 3.0 M in Et2O
`);
  const ether = left.ingredients.find(({ name }) => name === 'Et2O');
  // A solvent goes by its volume: 6 mmol at 3.0 M are 2 mL.
  expect(1e3 * ether!.volume!).toBeCloseTo(2, 9);
  expect(ether!.role).toBe('solvent');
});

test('a step that goes on starts with what the step before left, not written by any of its lines', () => {
  const text = `${ETHER}step B continues A
  quench water 50 mL
`;
  const before = factsOf(text, 0).left.ingredients.map(({ name }) => name);
  const { additions } = factsOf(text, 1);
  const inherited = additions.filter(({ statement }) => statement === null);
  expect(inherited.map(({ ingredient }) => ingredient.name)).toEqual(before);
  expect(additions.at(-1)!.statement!.keyword).toBe('quench');
});

test('a wash leaves what stays organic and draws off what it took', () => {
  const { left } = factsOf(`compound E = CCOC(=O)CCc1ccccc1
compound N = C1CCN(Cc2ccccc2)CC1
step A
  solvent EtOAc 40 mL
  charge E 5 mmol
  charge N 5 mmol
  wash HCl 15 mmol in water 30 mL
  isolate E as neutral
`);
  const held = (name: string) =>
    1e3 * left.ingredients.filter((one) => one.name === name).reduce((sum, one) => sum + one.mol, 0);
  expect(held('E')).toBeGreaterThan(4.5);
  expect(held('N')).toBeLessThan(0.5);
});

test('what is inert takes no part', () => {
  const { additions } = factsOf(
    'step A\n  solvent THF 20 mL\n  charge benzaldehyde 5 mmol\n  inert frobnicate 5 mol%\n',
  );
  expect(
    additions.find(({ ingredient }) => ingredient.name === 'frobnicate')?.ingredient.role ?? 'inert',
  ).toBe('inert');
});
