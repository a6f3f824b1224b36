import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { estimateInWater } from '../../server/src/chemistry/estimate.ts';
import { errorOf, judgeFile } from '../../server/tools/judge.ts';
import { readEstimatorTables, readParents, readRules, sitesByRule } from '../../server/tools/rule-sites.ts';
import { WRITTEN_TWICE } from './written-twice.ts';

const data = join(import.meta.dirname, '../../data');
const rules = readRules(join(data, 'groups.csv'));
const tables = readEstimatorTables(data, rules);

function estimate(smiles: string, kind: 'acid' | 'base') {
  const found = sitesByRule(smiles, rules)!;
  const site = found.sites.find((one) => one.marked && one.kind === kind)!;
  return estimateInWater(found.graph, site, site.equivalents, tables)!;
}

test.each(WRITTEN_TWICE)('the estimate does not depend on how %s is written', (...texts) => {
  const kind = /OH:1|CH2:1/.test(texts[0]!) ? 'acid' : 'base';
  const [first, ...others] = texts.map((text) => estimate(text, kind));
  for (const other of others) {
    expect(other.value).toBeCloseTo(first!.value, 9);
    expect(other.sd).toBeCloseTo(first!.sd, 9);
  }
});

test('nothing that the fit has not seen moves the value, and all of it widens the sd', () => {
  const known = estimate('[OH:1]c1ccc(cc1)C(C)(C)C', 'acid');
  const unknown = estimate('[OH:1]c1ccc(cc1)[Ge](C)(C)C', 'acid');
  expect(unknown.sd).toBeGreaterThan(known.sd);
  expect(Math.abs(unknown.value - 10)).toBeLessThan(1.5);
});

test('the parts of an estimate add up to it', () => {
  const constant = estimate('[OH:1]c1ccc(cc1)[N+](=O)[O-]', 'acid');
  expect(constant.hops.reduce((sum, { value }) => sum + value, 0)).toBeCloseTo(constant.value, 9);
  expect(constant.hops.length).toBeGreaterThan(1);
});

test('published parents come out as published', () => {
  const errors = readParents(join(data, 'frames.csv')).map(({ smiles, kind, pKa }) =>
    Math.abs(estimate(smiles, kind).value - pKa),
  );
  expect(errors.reduce((sum, error) => sum + error, 0) / errors.length).toBeLessThan(0.3);
});

test('trends of the textbook', () => {
  const acid = (smiles: string) => estimate(smiles, 'acid').value;
  const base = (smiles: string) => estimate(smiles, 'base').value;
  expect(acid('OC(=O)C(Cl)Cl'.replace('O', '[OH:1]'))).toBeLessThan(acid('[OH:1]C(=O)CCl') - 0.8);
  expect(acid('[OH:1]C(=O)CCCCl')).toBeGreaterThan(acid('[OH:1]C(=O)CCl') + 1);
  expect(base('[NH2:1]c1ccc(OC)cc1')).toBeGreaterThan(base('[NH2:1]c1cccc(OC)c1'));
  expect(base('[n:1]1cccc(C(F)(F)F)c1')).toBeLessThan(base('[n:1]1cccc(C)c1') - 1.5);
  expect(base('[NH2:1]CC(F)F')).toBeLessThan(base('[NH2:1]CCF'));
});

const file = join(import.meta.dirname, '..', '..', '..', 'shared', 'values', 'water_calibration.csv');
describe.skipIf(!existsSync(file))(
  'molecules kept aside (skipped where the file of measured values is absent)',
  () => {
    const judged = existsSync(file) ? judgeFile(file, data) : [];
    const seen = new Set(judged.filter(({ row }) => !row.heldOut).map(({ frame }) => frame));
    const aside = judged.filter(({ row }) => row.heldOut);
    const mean = (list: typeof aside) =>
      list.reduce((sum, one) => sum + (errorOf(one) ?? 0), 0) / list.length;

    test('95 % are covered', () => {
      expect(aside.filter((one) => errorOf(one) !== null).length / aside.length).toBeGreaterThan(0.95);
    });
    test('mean absolute error at most 0.5 on frames that the fit has seen', () => {
      expect(mean(aside.filter(({ frame, value }) => value !== null && seen.has(frame)))).toBeLessThan(0.5);
    });
    test('nine of ten errors inside 1.64 sd', () => {
      const inside = aside.filter((one) => (errorOf(one) ?? Number.POSITIVE_INFINITY) <= 1.64 * one.sd);
      expect(inside.length / aside.length).toBeGreaterThan(0.88);
    });
  },
);
