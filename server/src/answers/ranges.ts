/**
 * Arithmetic on places in a text.
 *
 * Knows: lines and characters.  Must not know: what stands there.
 */
import type { Position, Range } from '../route/plan.ts';

/** A range in one line. */
export function inLine(line: number, { start, end }: { start: number; end: number }): Range {
  return { start: { line, character: start }, end: { line, character: end } };
}

/** Moved down by some lines. */
export function shiftRange({ start, end }: Range, lines: number): Range {
  return {
    start: { line: start.line + lines, character: start.character },
    end: { line: end.line + lines, character: end.character },
  };
}

/** Whether a place lies in a range or at its end. */
export function touches({ start, end }: Range, place: Position): boolean {
  return compare(start, place) <= 0 && compare(place, end) <= 0;
}

/** Whether two ranges share a place. */
export function overlap(a: Range, b: Range): boolean {
  return compare(a.start, b.end) <= 0 && compare(b.start, a.end) <= 0;
}

/** Negative where `a` comes first. */
export function compare(a: Position, b: Position): number {
  return a.line - b.line || a.character - b.character;
}
