/** Pages of the checks, and how figures are written. */
import { expect, test } from 'vitest';
import { explanation, overview } from '../../server/src/answers/explain.ts';
import { amountOf, figure, oneDecimal, percent } from '../../server/src/answers/figures.ts';
import { CHECKS } from '../../server/src/checks/registry.generated.ts';

test.each(CHECKS.map((check) => [check.name, check] as const))('%s has its page', (name, check) => {
  const page = explanation(name)!;
  expect(page.split('\n')[0]).toBe(`# ${name}`);
  for (const words of [check.summary, check.why, check.remedy, check.silentWhen])
    expect(page).toContain(words);
  for (const plan of [check.wrong, check.right])
    if (plan !== undefined) expect(page).toContain(plan.trimEnd());
  expect(page).toContain('judgement of a qualified chemist');
});

test('there is no page for a name that is no check', () => {
  for (const name of ['', 'Transfer-uphill', 'transfer-uphil', '__proto__', 'constructor'])
    expect(explanation(name)).toBeNull();
});

test('the overview names every check once', () => {
  const lines = overview().split('\n');
  for (const { name, summary } of CHECKS)
    expect(lines.filter((line) => line.startsWith(`  ${name} `) && line.endsWith(summary))).toHaveLength(1);
});

test.each([
  [0, '0'],
  [1.23456, '1.23'],
  [-2.6, '−2.6'],
  [0.00012, '1.2e−4'],
  [123456, '1.2e5'],
  [Number.POSITIVE_INFINITY, '∞'],
  [Number.NEGATIVE_INFINITY, '−∞'],
])('%d is written %s', (value, text) => {
  expect(figure(value)).toBe(text);
});

test.each([
  [-0.04, '0.0'],
  [-2.649, '−2.6'],
  [15.738, '15.7'],
])('%d to one place is %s', (value, text) => {
  expect(oneDecimal(value)).toBe(text);
});

test.each([
  [0, '0 %'],
  [-1e-20, '0 %'],
  [1e-6, '< 0.01 %'],
  [0.0005, '0.05 %'],
  [0.1234, '12.3 %'],
  [0.99999, '> 99.9 %'],
  [1, '100 %'],
])('a share of %d is %s', (value, text) => {
  expect(percent(value)).toBe(text);
});

test.each([
  [0, '0 mmol'],
  [2e-6, '2 µmol'],
  [0.005, '5 mmol'],
  [1.5, '1.5 mol'],
])('%d mol is %s', (value, text) => {
  expect(amountOf(value)).toBe(text);
});
