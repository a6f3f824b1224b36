/**
 * Lays a plan out evenly: statements under their step, what follows the keywords in one column, signs and comments aligned.
 *
 * Knows: trees.  Must not know: tables, what statements mean.
 * Invariants:
 *  1. Formatting twice gives the same as once.                                   (tests/route/format.test.ts)
 *  2. Only blanks between the parts of a line change, so the plan means the same. (same)
 *  3. Lines are neither added nor taken away; a line with a problem stays as it is.
 */
import { type Language, readDocument } from './document.ts';
import { fenceIndents } from './markdown.ts';
import type { LineTree } from './tree.ts';

const INDENT = '  ';
/** Column of what follows a keyword inside a step: one more than the longest of the common ones. */
const COLUMN = 'temperature '.length;
const TOP_LEVEL: ReadonlySet<string> = new Set(['plan', 'use', 'compound', 'step']);

interface Laid {
  readonly line: number;
  readonly code: string;
  readonly comment: string;
}

/** The text laid out; line breaks and a byte order mark stay what they are. */
export function formatText(text: string, language: Language): string {
  const lines = text.split(/\r\n|\r|\n/);
  const breaks = text.match(/\r\n|\r|\n/g) ?? [];
  const indents = language === 'markdown' ? fenceIndents(lines) : lines.map(() => '');
  const document = readDocument(text, language);
  for (const { block, firstLine } of document.blocks) {
    for (const run of runsOf(block.lines)) {
      for (const { line, code, comment } of alignComments(layOut(run, block.isStep))) {
        const at = firstLine + line;
        const start = indents[at] ?? '';
        const mark = at === 0 && text.startsWith('\uFEFF') ? '\uFEFF' : '';
        const laid = `${code}${comment}`.trimEnd();
        lines[at] = laid === '' ? mark : `${mark}${start}${laid}`;
      }
    }
  }
  return lines.map((line, at) => line + (breaks[at] ?? '')).join('');
}

type Numbered = readonly [number, LineTree];

/** Runs of lines between blank ones, whose signs and comments are aligned together. */
function runsOf(lines: readonly LineTree[]): Numbered[][] {
  const runs: Numbered[][] = [[]];
  for (const [line, tree] of lines.entries()) {
    if (tree.leaves.every(({ kind }) => kind === 'blank')) runs.push([[line, tree]], []);
    else runs.at(-1)!.push([line, tree]);
  }
  return runs;
}

function layOut(run: readonly Numbered[], inStep: boolean): Laid[] {
  const widest = run.reduce(
    (most, [, { syntax, problems }]) =>
      syntax?.keyword === 'compound' && problems.length === 0
        ? Math.max(most, syntax.nameSpan.end - syntax.nameSpan.start)
        : most,
    0,
  );
  return run.flatMap(([line, tree]) => {
    if (tree.problems.length !== 0) return [];
    return [{ line, code: codeOf(tree, inStep, widest), comment: commentOf(tree) }];
  });
}

function commentOf({ leaves, text }: LineTree): string {
  const comment = leaves.find(({ kind }) => kind === 'comment');
  return comment === undefined ? '' : text.slice(comment.start, comment.end).trimEnd();
}

function codeOf({ text, leaves, syntax, keyword }: LineTree, inStep: boolean, widest: number): string {
  if (syntax === null || keyword === null) {
    const isIndented =
      leaves[0]?.kind === 'blank' && text.slice(0, leaves[0].end).replace('\uFEFF', '') !== '';
    return inStep && isIndented && leaves.some(({ kind }) => kind === 'comment') ? INDENT : '';
  }
  if (syntax.keyword === 'compound') {
    const { nameSpan, smiles } = syntax;
    return `compound ${text.slice(nameSpan.start, nameSpan.end).padEnd(widest)} = ${smiles}`;
  }
  const word = text.slice(keyword.start, keyword.end);
  let said = '';
  let gap = false;
  for (const { kind, start, end } of leaves) {
    if (kind === 'comment') break;
    if (kind === 'blank') {
      gap = said !== '';
      continue;
    }
    if (start < keyword.end) continue;
    said += `${gap ? ' ' : ''}${text.slice(start, end)}`;
    gap = false;
  }
  if (TOP_LEVEL.has(syntax.keyword)) return `${word} ${said}`;
  if (syntax.keyword === 'measured' || !inStep)
    return `${syntax.keyword === 'measured' ? INDENT : ''}${word} ${said}`;
  return said === '' ? `${INDENT}${word}` : `${INDENT}${word.padEnd(COLUMN - 1)} ${said}`;
}

/** Comments behind statements begin in one column. */
function alignComments(laid: readonly Laid[]): Laid[] {
  const column = laid.reduce(
    (most, { code, comment }) => (comment === '' || code.trim() === '' ? most : Math.max(most, code.length)),
    0,
  );
  return laid.map((each) =>
    each.comment === '' || each.code.trim() === ''
      ? each
      : { ...each, code: `${each.code.padEnd(column)}  ` },
  );
}
