/** Sound practice stays silent, its flawed twins speak. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { differences, readFixtures } from '../support/fixtures.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);

for (const file of ['sound-1', 'sound-2', 'sound-3', 'flawed', 'flawed-2']) {
  const fixtures = readFixtures(readFileSync(new URL(`./${file}.md`, import.meta.url), 'utf8'));
  test.each(fixtures.map((fixture) => [fixture.title, fixture] as const))(`${file}: %s`, (_, fixture) => {
    const { findings } = analyseNow(analyser, {
      file: 'practice.lyate',
      text: fixture.plan,
      language: 'lyate',
    });
    expect(differences(fixture, findings)).toEqual([]);
  });
}

const open = readFixtures(readFileSync(new URL('./not-yet.md', import.meta.url), 'utf8'));
test.each(open.map((fixture) => [fixture.title, fixture] as const))('not yet said: %s', (_, fixture) => {
  const { findings } = analyseNow(analyser, {
    file: 'practice.lyate',
    text: fixture.plan,
    language: 'lyate',
  });
  expect(differences(fixture, findings)).not.toEqual([]);
});
