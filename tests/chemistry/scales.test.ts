import { describe, expect, test } from 'vitest';
import type { Constant } from '../../server/src/chemistry/couple.ts';
import { measuredConstants } from '../../server/src/chemistry/measured.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { carry, scaleDistance, scaleIds } from '../../server/src/chemistry/scales.ts';
import { tables } from '../support/tables.ts';

const constant = (value: number, scale: string, sd = 0.2): Constant => ({
  value,
  sd,
  scale,
  origin: 'measured',
  sources: [],
  hops: [],
});
const phenol = { family: 'phenol', group: 'phenol', kind: 'acid' } as const;
const ammonium = { family: 'ammonium', group: 'amine-tertiary', kind: 'base' } as const;

test('on its own scale a constant comes back as it is', () => {
  const own = constant(10, 'water');
  expect(carry(own, phenol, 'water', tables)).toBe(own);
  expect(scaleDistance('water', 'water', phenol, tables)).toBe(0);
});

test.each(scaleIds(tables).filter((scale) => scale !== 'water'))(
  '%s: there and back gives the first value, less surely',
  (scale) => {
    for (const site of [phenol, ammonium]) {
      const there = carry(constant(9.5, 'water'), site, scale, tables);
      if (there === null) continue;
      expect(there.scale).toBe(scale);
      expect(there.origin).toBe('carried');
      expect(there.sd).toBeGreaterThan(0.2);
      expect(there.hops.at(-1)!.value).toBe(there.value);
      const back = carry(there, site, 'water', tables)!;
      expect(back.value).toBeCloseTo(9.5, 6);
      expect(back.sd).toBeGreaterThan(0.2);
    }
  },
);

test('every hop adds its variance', () => {
  for (const sd of [0, 0.5, 2]) {
    const there = carry(constant(10, 'water', sd), phenol, 'DMSO', tables)!;
    expect(there.sd).toBeGreaterThan(sd);
  }
});

test('outside the range of its points a line is trusted less with every unit', () => {
  const sds = [10, 16, 22, 28].map((value) => carry(constant(value, 'water'), phenol, 'DMSO', tables)!.sd);
  expect(sds).toEqual([...sds].sort((a, b) => a - b));
  expect(sds[3]).toBeGreaterThan(sds[0]! + 0.5);
});

test('a scale that no line reaches gives null', () => {
  expect(carry(constant(10, 'water'), phenol, 'mercury', tables)).toBeNull();
  expect(scaleDistance('water', 'mercury', phenol, tables)).toBeNull();
});

describe('the trade knows these', () => {
  test.each([
    ['acetic acid in methanol', 4.76, { ...phenol, family: 'carboxylic-acid', group: '' }, 'MeOH', 9.6, 0.4],
    ['phenol in methanol', 9.99, phenol, 'MeOH', 14.4, 0.4],
    ['aniline in methanol', 4.6, { family: 'anilinium', group: '', kind: 'base' }, 'MeOH', 6, 0.4],
    ['pyridine in methanol', 5.23, { family: 'pyridinium', group: '', kind: 'base' }, 'MeOH', 5.4, 0.4],
    ['phenol in DMSO', 9.99, phenol, 'DMSO', 18, 1.2],
    ['triethylamine in acetonitrile', 10.72, ammonium, 'MeCN', 18.8, 1],
  ] as const)('%s', (_, value, site, scale, expected, within) => {
    expect(Math.abs(carry(constant(value, 'water'), site, scale, tables)!.value - expected)).toBeLessThan(
      within,
    );
  });

  test('neutral acids lose far more than cationic ones when water gives way to an alcohol', () => {
    for (const alcohol of ['MeOH', 'EtOH', 'iPrOH', 'tBuOH']) {
      const neutral = carry(constant(9.5, 'water'), phenol, alcohol, tables)!.value;
      const cationic = carry(constant(9.5, 'water'), ammonium, alcohol, tables)!.value;
      expect(neutral - cationic).toBeGreaterThan(2.5);
    }
  });
});

/** Measured pairs: what the value on one scale says of that on the other. */
test.each([
  ['water', 'MeCN', 'base', 0.7],
  ['DMSO', 'MeCN', 'acid', 1],
  ['water', 'DMSO', 'base', 1],
] as const)('from %s to %s, values of a %s come within %d on average', (from, to, kind, within) => {
  const errors: number[] = [];
  const inside: boolean[] = [];
  for (const { smiles } of tables.measured) {
    const perceived = perceive(smiles, tables);
    const all = measuredConstants(perceived, tables);
    perceived.couples.forEach((couple, index) => {
      const on = (scale: string) =>
        all.find((one) => one.couple === index && one.constant.scale === scale)?.constant;
      const [first, second] = [on(from), on(to)];
      if (couple.kind !== kind || first === undefined || second === undefined) return;
      const carried = carry(first, couple, to, tables)!;
      errors.push(Math.abs(carried.value - second.value));
      inside.push(errors.at(-1)! < 1.64 * Math.hypot(carried.sd, second.sd));
    });
  }
  expect(errors.length).toBeGreaterThan(15);
  expect(errors.reduce((sum, error) => sum + error, 0) / errors.length).toBeLessThan(within);
  expect(inside.filter(Boolean).length / inside.length).toBeGreaterThan(0.85);
});
