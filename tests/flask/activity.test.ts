import { expect, test } from 'vitest';
import { logActivityCoefficient, mixedConstants } from '../../server/src/flask/activity.ts';

test('an uncharged species has unit activity coefficient', () => {
  expect(logActivityCoefficient(0, 0.1)).toBeCloseTo(0, 12);
});

test('at no ionic strength the constants are the thermodynamic ones', () => {
  expect(mixedConstants([2.15, 7.2, 12.35], 0, 0)).toEqual([2.15, 7.2, 12.35]);
});

test('beyond 0.5 M the coefficient is kept', () => {
  expect(logActivityCoefficient(1, 3)).toBe(logActivityCoefficient(1, 0.5));
});
