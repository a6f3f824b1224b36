/** Every check against its literate fixtures and its own examples; the catalogue holds together. */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { CHECKS } from '../../server/src/checks/registry.generated.ts';
import { DEFAULT_SETTINGS } from '../../server/src/checks/settings.ts';
import { differences, readFixtures } from '../support/fixtures.ts';
import { tables } from '../support/tables.ts';

/** What no plan can raise: a fault of the program or of the configuration, and an atom that no rule covers. */
const NOT_FROM_A_PLAN = ['bad-configuration', 'budget-reached', 'check-failed', 'no-rule'];

const place = (name: string) => new URL(`./${name}.md`, import.meta.url);
/** A check that is off by default is turned on for its own fixtures. */
function analyserFor(name: string) {
  const isQuiet = CHECKS.some((check) => check.name === name && check.quiet);
  if (!isQuiet) return shared;
  return createAnalyser(tables, { ...DEFAULT_SETTINGS, severities: { [name]: 'information' } });
}
const shared = createAnalyser(tables);
const findingsOf = (text: string, analyser = shared) =>
  analyseNow(analyser, { file: 'fixture.lyate', text, language: 'lyate' }).findings;

describe.each(CHECKS.map(({ name }) => name).filter((name) => existsSync(place(name))))('%s', (name) => {
  const fixtures = readFixtures(readFileSync(place(name), 'utf8')).filter(({ plan }) => plan !== '\n');
  const speaks = fixtures.filter(({ markers }) => markers.some(({ check }) => check === name));
  const analyser = analyserFor(name);

  test.each(fixtures.map((fixture) => [fixture.title, fixture] as const))('%s', (_, fixture) => {
    const findings = findingsOf(fixture.plan, analyser);
    expect(differences(fixture, findings)).toEqual([]);
    // A plan that may carry information of other checks is still silent about this one.
    if (!speaks.includes(fixture))
      expect(findings.filter(({ check, accepted }) => check === name && !accepted)).toEqual([]);
  });

  test('speaks in one fixture and stays silent in two', () => {
    expect(speaks.length).toBeGreaterThanOrEqual(NOT_FROM_A_PLAN.includes(name) ? 0 : 1);
    expect(fixtures.length - speaks.length).toBeGreaterThanOrEqual(2);
  });
});

test('every check that a plan can raise has a fixture', () => {
  const without = CHECKS.filter(
    ({ name }) => !NOT_FROM_A_PLAN.includes(name) && !existsSync(place(name)),
  ).map(({ name }) => name);
  expect(without).toEqual([]);
});

const examples = CHECKS.filter(({ wrong }) => wrong !== undefined);
test.each(examples.map((check) => [check.name, check] as const))(
  '%s says itself in its first example and not in its second',
  (name, { wrong, right }) => {
    const analyser = analyserFor(name);
    const loud = findingsOf(wrong!, analyser).filter(({ severity }) => severity !== 'information');
    const own = findingsOf(wrong!, analyser).filter(({ check }) => check === name);
    expect(own.length).toBeGreaterThan(0);
    expect(loud.filter(({ check }) => check !== name)).toEqual([]);
    expect(right).toBeDefined();
    const still = findingsOf(right!, analyser).filter(({ check, severity }) => {
      if (severity === 'error' || severity === 'warning') return true;
      return check === name && own.some((said) => said.severity === severity);
    });
    expect(still).toEqual([]);
  },
);

const sources = new Set(
  (
    JSON.parse(readFileSync(new URL('../../data/sources.json', import.meta.url), 'utf8')) as { id: string }[]
  ).map(({ id }) => id),
);
test.each(CHECKS.map((check) => [check.name, check] as const))('%s is fully explained', (name, check) => {
  expect(existsSync(new URL(`../../server/src/checks/${name}.ts`, import.meta.url))).toBe(true);
  for (const words of [check.summary, check.why, check.remedy, check.silentWhen])
    expect(words).toMatch(/^\p{Lu}.{15,}\.$/u);
  for (const source of check.sources) expect(sources.has(source), source).toBe(true);
  expect(check.inStep ?? check.fromText, 'a check has one way to speak').toBeDefined();
});

test('the registry names every file of a check once', () => {
  const folder = new URL('../../server/src/checks/', import.meta.url);
  const files = readdirSync(folder).filter((file) =>
    /export default define/.test(readFileSync(new URL(file, folder), 'utf8')),
  );
  expect(CHECKS.map(({ name }) => `${name}.ts`).sort()).toEqual(files.sort());
});

test('no-rule speaks where a table lacks the group of an atom', () => {
  const fewer = { ...tables, version: 'without groups', groups: tables.groups.slice(0, 1) };
  const text = 'step A\n  solvent THF 20 mL\n  charge <CCN> 5 mmol\n';
  const own = findingsOf(text, createAnalyser(fewer)).filter(({ check }) => check === 'no-rule');
  expect(own.map(({ range }) => range.start.line)).toContain(2);
  expect(own[0]!.message).toContain('No rule covers N (atom 2)');
});
