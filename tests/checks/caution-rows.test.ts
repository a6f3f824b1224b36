/** Rows of the cautions table speak where they should and nowhere near. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { differences, readFixtures } from '../support/fixtures.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);
const fixtures = readFixtures(readFileSync(new URL('./caution-rows.md', import.meta.url), 'utf8')).filter(
  ({ plan }) => plan !== '',
);

test.each(fixtures.map((fixture) => [fixture.title, fixture] as const))('%s', (_, fixture) => {
  const { findings } = analyseNow(analyser, { file: 'x.lyate', text: fixture.plan, language: 'lyate' });
  expect(differences(fixture, findings)).toEqual([]);
});
