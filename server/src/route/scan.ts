/**
 * Cuts one line into words, strings, structures in angle brackets and a comment.
 *
 * Knows: characters.  Must not know: keywords, units, tables.
 * Invariants:
 *  1. Never throws; every character outside blanks lies in one token or the comment.   (tests/route/parse.test.ts)
 *  2. A comment begins with `//` at the start of the line or after a blank, never inside quotes.
 * Cost: linear in length.
 */
import type { Span } from '../chemistry/molecule.ts';

export interface Token extends Span {
  readonly kind: 'word' | 'string' | 'structure';
  /** As written; strings and structures with their delimiters. */
  readonly text: string;
  readonly closed: boolean;
}

export interface Scanned {
  readonly tokens: readonly Token[];
  readonly comment: Span | null;
}

/** The tokens of a line from a place on. */
export function scanLine(line: string, from = 0): Scanned {
  const tokens: Token[] = [];
  let at = from;
  while (at < line.length) {
    if (isBlank(line, at)) {
      at++;
      continue;
    }
    if (line.startsWith('//', at) && (at === 0 || isBlank(line, at - 1))) {
      return { tokens, comment: { start: at, end: line.length } };
    }
    const token =
      line[at] === '"'
        ? readString(line, at)
        : line[at] === '<'
          ? readStructure(line, at)
          : readWord(line, at);
    tokens.push(token);
    at = token.end;
  }
  return { tokens, comment: null };
}

/** Text between the quotes of a string token, escapes resolved. */
export function stringText({ text, closed }: Token): string {
  return text.slice(1, closed ? -1 : undefined).replace(/\\(["\\])/g, '$1');
}

/** Blanks as JavaScript's \s has them, the byte order mark among them. */
export function isBlank(line: string, at: number): boolean {
  const code = line.charCodeAt(at);
  if (code === 32 || code === 9) return true;
  if (33 <= code && code < 160) return false;
  return /\s/.test(line[at]!);
}

function readWord(line: string, start: number): Token {
  let end = start;
  while (end < line.length && !isBlank(line, end)) end++;
  return { kind: 'word', text: line.slice(start, end), start, end, closed: true };
}

function readString(line: string, start: number): Token {
  let end = start + 1;
  while (end < line.length && line[end] !== '"') end += line[end] === '\\' ? 2 : 1;
  const closed = end < line.length;
  end = closed ? end + 1 : line.length;
  return { kind: 'string', text: line.slice(start, end), start, end, closed };
}

function readStructure(line: string, start: number): Token {
  const close = line.indexOf('>', start);
  const closed = 0 <= close;
  const end = closed ? close + 1 : line.length;
  return { kind: 'structure', text: line.slice(start, end), start, end, closed };
}
