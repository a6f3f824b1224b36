import { join } from 'node:path';
import { expect, test } from 'vitest';
import type { Constant, Couple, OwnValue, Perceived } from '../../server/src/chemistry/couple.ts';
import {
  type ConstantOptions,
  type ConstantSources,
  coupleConstants,
  type MeasuredConstant,
} from '../../server/src/chemistry/couple-constants.ts';
import { readEstimatorTables, readRules, sitesByRule } from '../../server/tools/rule-sites.ts';

const data = join(import.meta.dirname, '../../data');
const rules = readRules(join(data, 'groups.csv'));
const tables = readEstimatorTables(data, rules);

/** A molecule drawn neutral, with the couples that the rules find on O, N, S and P. */
function perceived(smiles: string): Perceived {
  const { graph, sites } = sitesByRule(smiles, rules)!;
  const couples = sites
    .filter(({ atom }) => graph.atoms[atom]!.element !== 'C')
    .map(({ atom, kind, group, family, rule, equals }): Couple => {
      return {
        atom,
        element: graph.atoms[atom]!.element,
        group,
        groupName: rule.name,
        kind,
        family,
        holdsProton: kind === 'acid',
        equivalents: equals,
        component: 0,
      };
    });
  const atoms = graph.atoms.map(({ index }) => index);
  const component = { index: 0, atoms, charge: 0, bareCharge: 0, spectator: false };
  return {
    smiles,
    key: smiles,
    problem: null,
    graph,
    components: [component],
    couples,
    uncovered: [],
    molarMass: null,
  };
}

const NONE: ConstantSources = { measured: () => [], carry: () => null, estimateElsewhere: () => null };

function stepsOf(smiles: string, low: number, high: number): number[] {
  const { steps } = coupleConstants(perceived(smiles), 'water', tables, NONE);
  return steps[0]!.map(({ constant }) => constant.value).filter((value) => low < value && value < high);
}

test.each([
  ['succinic acid', 'OC(=O)CCC(=O)O', [4.2, 5.6], 0.5],
  ['glutaric acid', 'OC(=O)CCCC(=O)O', [4.3, 5.4], 0.4],
  ['glycine', 'NCC(=O)O', [2.35, 9.78], 0.7],
  ['4-aminobutanoic acid', 'NCCCC(=O)O', [4.0, 10.5], 0.5],
  ['ethylenediamine', 'NCCN', [7.0, 9.9], 0.4],
  ['1,4-diaminobutane', 'NCCCCN', [9.6, 10.8], 0.4],
  ['piperazine', 'C1CNCCN1', [5.4, 9.8], 0.6],
  ['phosphoric acid', 'OP(=O)(O)O', [2.15, 7.2, 12.35], 0.9],
  ['lysine', 'NCCCCC(N)C(=O)O', [2.2, 9.1, 10.5], 0.8],
  ['histidine', 'NC(Cc1c[nH]cn1)C(=O)O', [1.8, 6.1, 9.2], 1.3],
] as const)('%s has sensible steps in water', (_, smiles, expected, margin) => {
  const steps = stepsOf(smiles, 0, 13.2);
  expect(steps).toHaveLength(expected.length);
  for (const [k, value] of steps.entries())
    expect(Math.abs(value - expected[k]!), `${value}`).toBeLessThan(margin);
});

test('couples are parallel to the molecule and steps rise', () => {
  const molecule = perceived('OC(=O)CN(CC(=O)O)CCN(CC(=O)O)CC(=O)O');
  const { couples, steps } = coupleConstants(molecule, 'water', tables, NONE);
  expect(couples).toHaveLength(molecule.couples.length);
  const values = steps[0]!.map(({ constant }) => constant.value);
  expect([...values].sort((a, b) => a - b)).toEqual(values);
  const inner = values.filter((value) => 0 < value && value < 14);
  expect(inner.length).toBeGreaterThanOrEqual(5);
});

function measuredAt(
  molecule: Perceived,
  group: RegExp,
  value: number,
  scale = 'water',
  step: number | null = null,
): MeasuredConstant {
  const couple = molecule.couples.findIndex((one) => group.test(one.group));
  const constant: Constant = {
    value,
    sd: 0.03,
    scale,
    origin: 'measured',
    sources: ['some-source'],
    hops: [{ what: 'measured', value, sd: 0.03, sources: ['some-source'] }],
  };
  return { couple, step, constant };
}

function constantOf(
  molecule: Perceived,
  group: RegExp,
  scale: string,
  sources: ConstantSources,
  options: ConstantOptions = {},
): Constant | null {
  const { couples } = coupleConstants(molecule, scale, tables, sources, options);
  return couples[molecule.couples.findIndex((one) => group.test(one.group))] ?? null;
}

const SHIFT: ConstantSources['carry'] = (constant, _, to) => ({
  ...constant,
  value: constant.value + 5,
  sd: Math.hypot(constant.sd, 1),
  scale: to,
  origin: 'carried',
  hops: [...constant.hops, { what: `to ${to}`, value: 5, sd: 1, sources: [] }],
});

test('trust: plan, house, measured here, measured elsewhere, estimate', () => {
  const phenol = perceived('Oc1ccccc1');
  const here = measuredAt(phenol, /^phenol/, 9.97);
  const there = measuredAt(phenol, /^phenol/, 18.0, 'DMSO');
  const own = (origin: 'plan' | 'house', value: number): OwnValue => ({
    origin,
    value,
    sd: 0.2,
    atoms: [],
    scale: 'water',
    source: 'notebook',
  });
  const with_ = (measured: readonly MeasuredConstant[]): ConstantSources => ({
    ...NONE,
    measured: () => measured,
    carry: SHIFT,
  });
  expect(constantOf(phenol, /^phenol/, 'water', NONE)!.origin).toBe('estimated');
  expect(constantOf(phenol, /^phenol/, 'water', with_([here, there]))).toEqual(here.constant);
  expect(constantOf(phenol, /^phenol/, 'DMSO', with_([here, there]))).toEqual(there.constant);
  expect(constantOf(phenol, /^phenol/, 'DMSO', with_([here]))).toMatchObject({
    origin: 'carried',
    value: 14.97,
    scale: 'DMSO',
  });
  expect(constantOf(phenol, /^phenol/, 'water', with_([here]), { own: [own('house', 9.5)] })).toMatchObject({
    origin: 'house',
    value: 9.5,
  });
  const both = { own: [own('plan', 9.1), own('house', 9.5)] };
  expect(constantOf(phenol, /^phenol/, 'water', with_([here]), both)).toMatchObject({
    origin: 'plan',
    value: 9.1,
  });
  expect(constantOf(phenol, /^phenol/, 'water', with_([here]), { estimateOnly: true })!.origin).toBe(
    'estimated',
  );
});

test('each hop adds its variance and a line', () => {
  const phenol = perceived('Oc1ccccc1');
  const here = measuredAt(phenol, /^phenol/, 9.97);
  const carried = constantOf(phenol, /^phenol/, 'DMSO', { ...NONE, measured: () => [here], carry: SHIFT })!;
  expect(carried.sd).toBeCloseTo(Math.hypot(0.03, 1), 9);
  expect(carried.hops.map(({ what }) => what)).toEqual(['measured', 'to DMSO']);
});

test('a measured step replaces that step alone', () => {
  const molecule = perceived('OC(=O)CCC(=O)O');
  const second = measuredAt(molecule, /^carboxylic-acid/, 5.64, 'water', 2);
  const { steps } = coupleConstants(molecule, 'water', tables, { ...NONE, measured: () => [second] });
  const carboxyl = steps[0]!.filter(({ couple }) => couple.group === 'carboxylic-acid');
  expect(carboxyl.map(({ constant }) => constant.origin)).toEqual(['estimated', 'measured']);
});
