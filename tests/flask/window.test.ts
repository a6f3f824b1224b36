/** Windows of solvents on the absolute scale, with ends that are estimated where nothing was measured. */
import { expect, test } from 'vitest';
import { placedWindow, solventWindow } from '../../server/src/flask/window.ts';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { tables } from '../support/tables.ts';

const row = (name: string) => tables.solventByName.get(foldName(name))!;
const placed = (name: string) => placedWindow(row(name), tables);

test('water starts at nought and is as wide as its ionic product', () => {
  expect(placed('water')).toEqual({
    low: { value: 0, sd: 0, estimated: false },
    high: { value: 13.995, sd: 0.02, estimated: false },
  });
});

test('what is measured stands as it does without estimates', () => {
  for (const solvent of tables.solvents) {
    const { absolute } = solventWindow(solvent);
    if (absolute === null) continue;
    const { low, high } = placedWindow(solvent, tables);
    expect(low).toMatchObject({ value: absolute.low, estimated: false });
    expect(high!.value).toBeCloseTo(absolute.high, 9);
  }
});

test('estimated low ends agree with those from transfer energies within the sd they claim', () => {
  const misses = tables.solvents.flatMap((solvent) => {
    if (solvent.protonTransferEnergy === null) return [];
    const known = placedWindow(solvent, tables).low!;
    const guess = placedWindow({ ...solvent, protonTransferEnergy: null }, tables).low;
    return guess === null ? [] : [guess.value - known.value];
  });
  expect(misses.length).toBeGreaterThanOrEqual(10);
  const rms = Math.sqrt(misses.reduce((sum, miss) => sum + miss * miss, 0) / misses.length);
  expect(rms).toBeLessThan(3);
});

test('ends without a transfer energy or an autoprotolysis constant say that they are estimated', () => {
  expect(placed('THF')).toMatchObject({ low: { estimated: true }, high: { estimated: true } });
  expect(placed('acetic acid').high!.value - placed('acetic acid').low!.value).toBeCloseTo(14.5, 9);
  expect(placed('benzene')).toMatchObject({ low: null, high: { estimated: true } });
  expect(placed('CCl4')).toEqual({ low: null, high: null });
});

test('no window ends before it begins', () => {
  for (const solvent of tables.solvents) {
    const { low, high } = placedWindow(solvent, tables);
    if (low !== null && high !== null) expect(low.value, solvent.name).toBeLessThan(high.value);
  }
});
