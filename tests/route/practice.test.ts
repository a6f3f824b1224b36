import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { formatText } from '../../server/src/route/format.ts';
import { parseLine } from '../../server/src/route/parse.ts';
import { readFixtures } from '../support/fixtures.ts';

const FILES = ['sound-1.md', 'sound-2.md', 'flawed.md'];

describe('the plans of everyday practice', () => {
  it.each(FILES)('are written in the language: %s', (file) => {
    const fixtures = readFixtures(readFileSync(new URL(`../practice/${file}`, import.meta.url), 'utf8'));
    expect(fixtures.length).toBeGreaterThan(10);
    for (const { title, plan, markers } of fixtures) {
      const expected = new Set(markers.map(({ line }) => line));
      const faults = plan
        .split('\n')
        .flatMap((line, at) =>
          expected.has(at) ? [] : parseLine(line).problems.map(({ message }) => [title, line, message]),
        );
      expect(faults).toEqual([]);
      const laid = formatText(plan, 'lyate');
      expect(formatText(laid, 'lyate')).toBe(laid);
    }
  });
});
