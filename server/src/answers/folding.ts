/**
 * What can be folded in a plan, and what grows step by step around a place when a selection is widened.
 *
 * Knows: documents.  Must not know: what steps mean, the protocol.
 */
import { lineAt, type RouteDocument } from '../route/document.ts';
import { blockRanges, leafAt } from '../route/places.ts';
import type { Position, Range } from '../route/plan.ts';
import { compare, inLine } from './ranges.ts';

export interface Fold {
  readonly firstLine: number;
  readonly lastLine: number;
  readonly kind: 'step' | 'comment' | 'compounds';
}

/** Steps, and runs of remarks or compounds of three lines and more. */
export function foldingOf(document: RouteDocument): Fold[] {
  const folds = blockRanges(document).map(
    ({ start, end }): Fold => ({ firstLine: start.line, lastLine: end.line, kind: 'step' }),
  );
  for (const { block, firstLine } of document.blocks) {
    let run: { kind: 'comment' | 'compounds'; from: number } | null = null;
    for (let at = 0; at <= block.lines.length; at++) {
      const tree = block.lines[at];
      const kind = tree === undefined ? null : runKind(tree);
      if (run !== null && run.kind === kind) continue;
      if (run !== null && 2 < at - run.from) {
        folds.push({ firstLine: firstLine + run.from, lastLine: firstLine + at - 1, kind: run.kind });
      }
      run = kind === null ? null : { kind, from: at };
    }
  }
  return folds.sort((a, b) => a.firstLine - b.firstLine || b.lastLine - a.lastLine);
}

function runKind({ syntax, leaves }: NonNullable<ReturnType<typeof lineAt>>): 'comment' | 'compounds' | null {
  if (syntax?.keyword === 'compound' || syntax?.keyword === 'measured') return 'compounds';
  if (syntax === null && leaves.some(({ kind }) => kind === 'comment')) return 'comment';
  return null;
}

/** Ranges around a place from the smallest to the largest: word, name or amount, statement, step. */
export function selectionAt(document: RouteDocument, { line, character }: Position): Range[] {
  const tree = lineAt(document, line);
  if (tree === null) return [];
  const around: Range[] = [];
  const leaf = leafAt(tree, character);
  if (leaf !== null && leaf.kind !== 'blank') around.push(inLine(line, leaf));
  for (const name of tree.names) {
    if (name.start <= character && character <= name.end) around.push(inLine(line, name));
  }
  if (tree.syntax !== null && 'amounts' in tree.syntax) {
    const { amounts } = tree.syntax;
    for (const amount of amounts) {
      if (amount.start <= character && character <= amount.end) around.push(inLine(line, amount));
    }
    const [first, last] = [amounts[0], amounts.at(-1)];
    if (first !== undefined && last !== undefined && first.start <= character && character <= last.end) {
      around.push(inLine(line, { start: first.start, end: last.end }));
    }
  }
  if (tree.span.start <= character && character <= tree.span.end) around.push(inLine(line, tree.span));
  around.push(inLine(line, { start: 0, end: tree.text.length }));
  for (const range of blockRanges(document)) {
    if (range.start.line <= line && line <= range.end.line) around.push(range);
  }
  return nested(around);
}

/** Only those that hold the one before and are larger. */
function nested(ranges: readonly Range[]): Range[] {
  const kept: Range[] = [];
  const bySize = [...ranges].sort(
    (a, b) =>
      a.end.line - a.start.line - (b.end.line - b.start.line) ||
      a.end.character - a.start.character - (b.end.character - b.start.character),
  );
  for (const range of bySize) {
    const inner = kept.at(-1);
    if (inner === undefined) kept.push(range);
    else if (
      compare(range.start, inner.start) <= 0 &&
      compare(inner.end, range.end) <= 0 &&
      (compare(range.start, inner.start) !== 0 || compare(inner.end, range.end) !== 0)
    )
      kept.push(range);
  }
  return kept;
}
