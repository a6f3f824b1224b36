import { expect, test } from 'vitest';
import { rememberConstants } from '../../server/src/flask/remember.ts';
import type { ConstantsIn } from '../../server/src/flask/state.ts';
import { constantsIn, stock, tables } from './kit.ts';

function counted(): { calls: () => number; constants: ConstantsIn } {
  let calls = 0;
  const constants = rememberConstants((...question) => {
    calls++;
    return constantsIn(...question);
  });
  return { calls: () => calls, constants };
}

test('a question is answered once, and the second answer is the first', () => {
  const { calls, constants } = counted();
  const phenol = stock.phenol();
  expect(constants(phenol, 'water', tables)).toBe(constants(phenol, 'water', tables));
  expect(constants(phenol, 'water', tables)).toEqual(constantsIn(phenol, 'water', tables));
  expect(calls()).toBe(1);
});

test('another scale, another own value, another version of the tables, another perception: asked anew', () => {
  const { calls, constants } = counted();
  const phenol = stock.phenol();
  constants(phenol, 'water', tables);
  constants(phenol, 'DMSO', tables);
  constants(phenol, 'water', tables, {
    own: [{ origin: 'plan', value: 9, sd: 0.1, atoms: [], scale: 'water', source: '' }],
  });
  constants(phenol, 'water', { ...tables, version: 'next' });
  const again = stock.phenol();
  const answer = constants(again, 'water', tables);
  expect(calls()).toBe(5);
  expect(answer.steps[0]![0]!.couple).toBe(again.couples[0]);
});
