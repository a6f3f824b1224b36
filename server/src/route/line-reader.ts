/**
 * Walks over the tokens of one line and marks each with what it turned out to be.
 *
 * Knows: tokens and leaves.  Must not know: statements, units, tables.
 * Invariant: leaves come out in order, without gaps and overlaps.                 (tests/route/parse.test.ts)
 */
import type { Span } from '../chemistry/molecule.ts';
import type { Token } from './scan.ts';
import type { Leaf, LeafKind, LineProblem, NameNode } from './tree.ts';

/** Ends the reading of one line; never leaves the parser. */
export class UnreadableLine extends Error {
  readonly span: Span;

  constructor(message: string, span: Span) {
    super(message);
    this.span = span;
  }
}

export class LineReader {
  readonly line: string;
  readonly names: NameNode[] = [];
  readonly problems: LineProblem[] = [];
  readonly #tokens: readonly Token[];
  readonly #marks: Leaf[] = [];
  #place = 0;
  #last: Span;

  constructor(line: string, tokens: readonly Token[], start: Span) {
    this.line = line;
    this.#tokens = tokens;
    this.#last = start;
  }

  /** What comes next, or further on; undefined behind the last token. */
  peek(ahead = 0): Token | undefined {
    return this.#tokens[this.#place + ahead];
  }

  /** The text of the next word; undefined where something else comes. */
  word(ahead = 0): string | undefined {
    const token = this.peek(ahead);
    return token?.kind === 'word' ? token.text : undefined;
  }

  /** Takes the next token as one leaf. */
  take(kind: LeafKind): Token {
    const token = this.peek();
    if (token === undefined) throw this.missing('Something');
    this.mark(kind, token);
    this.#place++;
    this.#last = token;
    return token;
  }

  /** Takes the next token in pieces, each with its own kind; the pieces must cover it. */
  takePieces(pieces: readonly Leaf[]): void {
    this.#marks.push(...pieces);
    this.#last = this.peek() ?? this.#last;
    this.#place++;
  }

  /** Takes a word if it is the one asked for. */
  takeWord(word: string, kind: LeafKind): boolean {
    if (this.word() !== word) return false;
    this.take(kind);
    return true;
  }

  expectWord(word: string, kind: LeafKind): void {
    if (!this.takeWord(word, kind)) throw this.missing(`The word “${word}”`);
  }

  /** Takes one of a fixed set of words. */
  expectOneOf<Value extends string>(values: readonly Value[], kind: LeafKind): { value: Value; span: Span } {
    const value = values.find((candidate) => candidate === this.word());
    if (value === undefined) throw this.missing(`One of ${values.join(', ')}`);
    return { value, span: this.take(kind) };
  }

  mark(kind: LeafKind, { start, end }: Span): void {
    this.#marks.push({ kind, start, end });
  }

  report(check: string, message: string, { start, end }: Span): void {
    this.problems.push({ check, message, start, end });
  }

  /** What to throw where something that the statement needs does not come. */
  missing(what: string): UnreadableLine {
    const next = this.peek();
    return next === undefined
      ? new UnreadableLine(`${what} is missing at the end of this line.`, this.#last)
      : new UnreadableLine(`${what} is expected here.`, next);
  }

  /** Marks what is left as plain text; returns its span, null where nothing is left. */
  rest(): Span | null {
    const first = this.peek();
    if (first === undefined) return null;
    while (this.peek() !== undefined) this.take('text');
    return { start: first.start, end: this.#last.end };
  }

  /** The end of the last token taken. */
  get end(): number {
    return this.#last.end;
  }

  /** All leaves, blanks filled in. */
  leaves(comment: Span | null): Leaf[] {
    const all: Leaf[] = [];
    let at = 0;
    const add = (leaf: Leaf) => {
      if (at < leaf.start) all.push({ kind: 'blank', start: at, end: leaf.start });
      all.push(leaf);
      at = leaf.end;
    };
    for (const leaf of this.#marks) add(leaf);
    if (comment !== null) add({ kind: 'comment', start: comment.start, end: comment.end });
    if (at < this.line.length) all.push({ kind: 'blank', start: at, end: this.line.length });
    return all;
  }
}
