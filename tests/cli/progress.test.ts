/** Progress: shown on terminals only, for long runs only, and gone at the end. */
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { progressOf } from '../../server/src/cli/progress.ts';

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

function stream(isTTY: boolean) {
  const written: string[] = [];
  const write = (text: string) => written.push(text);
  return { written, stream: { isTTY, write } as unknown as NodeJS.WriteStream };
}

it('counts on a terminal once the run is long, and wipes its line', () => {
  const { written, stream: terminal } = stream(true);
  const progress = progressOf(3, terminal);
  progress.step();
  expect(written).toEqual([]);
  vi.advanceTimersByTime(500);
  progress.step();
  progress.step();
  progress.end();
  expect(written).toEqual(['\r\u001b[K2 of 3 plans', '\r\u001b[K']);
});

it('stays silent for short runs and elsewhere', () => {
  for (const isTTY of [true, false]) {
    const { written, stream: out } = stream(isTTY);
    const progress = progressOf(2, out);
    progress.step();
    if (!isTTY) vi.advanceTimersByTime(5000);
    progress.step();
    progress.end();
    expect(written).toEqual([]);
  }
});
