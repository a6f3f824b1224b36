/** Suggestions over the everyday steps of the practice fixtures: none makes a step worse, and sound choices come first. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import type { Edit } from '../../server/src/answers/fix.ts';
import { suggestionsAt } from '../../server/src/answers/suggest.ts';
import { readFixtures } from '../support/fixtures.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);
const analyse = (text: string) => analyseNow(analyser, { file: 'practice.lyate', text, language: 'lyate' });

function edited(text: string, edits: readonly Edit[]): string {
  const lines = text.split('\n');
  const starts = lines.map((_, line) => lines.slice(0, line).reduce((sum, one) => sum + one.length + 1, 0));
  const at = ({ line, character }: { line: number; character: number }) =>
    (starts[line] ?? text.length) + character;
  return edits
    .map((edit, order) => ({ ...edit, order }))
    .sort((a, b) => at(b.range.start) - at(a.range.start) || b.order - a.order)
    .reduce(
      (now, { range, text: put }) => now.slice(0, at(range.start)) + put + now.slice(at(range.end)),
      text,
    );
}

const errorsOf = (text: string) =>
  analyse(text).findings.filter(({ severity }) => severity === 'error').length;

const asked = ['sound-1', 'sound-2', 'flawed'].flatMap((file) =>
  readFixtures(readFileSync(new URL(`../practice/${file}.md`, import.meta.url), 'utf8')).flatMap(
    ({ title, plan, sound }) => {
      const analysed = analyse(plan);
      return analysed.plan.steps.flatMap(({ firstLine }, place) =>
        suggestionsAt(analysed, firstLine).map((suggestions) => ({
          title,
          plan,
          sound: sound && file !== 'flawed',
          suggestions,
          additions: analysed.steps[place]!.facts.additions,
        })),
      );
    },
  ),
);

test('there is something to ask', () => {
  expect(asked.length).toBeGreaterThan(50);
});

test('the best suggestion never adds an error', () => {
  for (const { title, plan, suggestions } of asked) {
    const [best] = suggestions.list;
    if (best === undefined) continue;
    const text = edited(plan, best.edits);
    expect(errorsOf(text), `${title}: ${best.title}\n${text}`).toBeLessThanOrEqual(errorsOf(plan));
  }
});

test('a sound choice comes first nine times in ten', () => {
  const kept = asked.flatMap(({ suggestions, sound, additions }) => {
    const { acting, verdict } = suggestions.asWritten;
    if (!sound || verdict.answer !== 'yes' || acting.length !== 1) return [];
    const written = additions.find(({ ingredient }) => ingredient.name === acting[0])?.ingredient.reagent
      ?.name;
    return [suggestions.list[0]?.option.reagent.name === written];
  });
  expect(kept.length).toBeGreaterThan(25);
  expect(kept.filter(Boolean).length / kept.length).toBeGreaterThanOrEqual(0.9);
});
