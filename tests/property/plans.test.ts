/** Properties of whole plans: no text throws, layout changes no finding, order of analysis changes nothing. */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import type { Finding } from '../../server/src/checks/finding.ts';
import { formatText } from '../../server/src/route/format.ts';
import { readFixtures } from '../support/fixtures.ts';
import { tables } from '../support/tables.ts';

const plans = ['sound-1', 'sound-2', 'flawed'].flatMap((name) =>
  readFixtures(readFileSync(new URL(`../practice/${name}.md`, import.meta.url), 'utf8')),
);
const texts = plans.map(({ plan }) => plan);
const analyser = createAnalyser(tables);
const analyse = (text: string, by = analyser) =>
  analyseNow(by, { file: 'any.lyate', text, language: 'lyate' });

/** A plan of ordinary practice with a few signs taken out, put in or doubled. */
const damaged = fc
  .record({
    text: fc.constantFrom(...texts),
    wounds: fc.array(
      fc.record({
        at: fc.nat(2000),
        cut: fc.nat(6),
        sign: fc.oneof(
          fc.string({ maxLength: 3, unit: 'binary' }),
          fc.constantFrom('"', '\n', '[', '(', '<', ' ', '−', '1e400', '\0', '\r', '//', 'use "'),
        ),
      }),
      { minLength: 1, maxLength: 4 },
    ),
  })
  .map(({ text, wounds }) =>
    wounds.reduce((now, { at, cut, sign }) => {
      const place = at % (now.length + 1);
      return now.slice(0, place) + sign + now.slice(place + cut);
    }, text),
  );

test('no text throws, and every finding lies in the text', () => {
  fc.assert(
    fc.property(fc.oneof(damaged, fc.string({ unit: 'binary' })), (text) => {
      const lines = text.split(/\r\n|\n|\r/);
      for (const { range, check } of analyse(text).findings) {
        expect(check).not.toBe('check-failed');
        const { start, end } = range;
        expect(start.line).toBeLessThan(lines.length);
        expect(start.character).toBeLessThanOrEqual(lines[start.line]!.length);
        expect(end.line).toBeLessThan(lines.length);
        expect(end.character).toBeLessThanOrEqual(lines[end.line]!.length);
        expect(start.line < end.line || start.character <= end.character).toBe(true);
      }
    }),
    { numRuns: 150 },
  );
});

test('the formatter is settled after one pass, whatever the text', () => {
  fc.assert(
    fc.property(fc.oneof(damaged, fc.string({ unit: 'binary' })), (text) => {
      const once = formatText(text, 'lyate');
      expect(formatText(once, 'lyate')).toBe(once);
    }),
    { numRuns: 300 },
  );
});

/** What a finding says, without where its columns are. */
const said = ({ check, severity, step, message, range }: Finding) =>
  [check, severity, step, range.start.line, message].join(' | ');

test.each(plans.map(({ title, plan }) => [title, plan] as const))(
  'layout changes no finding: %s',
  (_, text) => {
    expect(analyse(formatText(text, 'lyate')).findings.map(said)).toEqual(analyse(text).findings.map(said));
  },
);

test('a plan behind other plans gives the findings that it gives alone', () => {
  const fresh = texts.slice(0, 12).map((text) => analyse(text, createAnalyser(tables)).findings);
  const shared = createAnalyser(tables);
  for (const text of [...texts.slice(0, 12)].reverse()) analyse(text, shared);
  expect(texts.slice(0, 12).map((text) => analyse(text, shared).findings)).toEqual(fresh);
});

test('lines put above a plan only move its findings', () => {
  for (const text of texts.slice(0, 20)) {
    const moved = analyse(`\n// new\n${text}`).findings;
    const before = analyse(text).findings.map((finding) => ({
      ...finding,
      range: {
        start: { ...finding.range.start, line: finding.range.start.line + 2 },
        end: { ...finding.range.end, line: finding.range.end.line + 2 },
      },
    }));
    expect(moved.map(said)).toEqual(before.map(said));
  }
});
