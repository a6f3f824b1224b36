/**
 * Answers what stands where: the leaf and the name at a place, every place of a compound or a step's label, tokens to colour.
 *
 * Knows: trees.  Must not know: tables, what a name stands for.
 * Ranges are absolute lines of the document.
 */
import { type Language, lineAt, mentionsOf, type PlacedBlock, type RouteDocument } from './document.ts';
import type { Position, Range } from './plan.ts';
import type { Leaf, LeafKind, LineTree, NameNode } from './tree.ts';

/** Token types of the editor's protocol. */
export type TokenType =
  | 'keyword'
  | 'comment'
  | 'string'
  | 'number'
  | 'operator'
  | 'variable'
  | 'type'
  | 'property'
  | 'enumMember'
  | 'function'
  | 'regexp';

export interface SemanticToken {
  readonly start: number;
  readonly length: number;
  readonly type: TokenType;
  readonly isDefinition: boolean;
}

const TYPES: Readonly<Partial<Record<LeafKind, TokenType>>> = {
  keyword: 'keyword',
  link: 'keyword',
  comment: 'comment',
  string: 'string',
  number: 'number',
  unit: 'type',
  operator: 'operator',
  name: 'variable',
  definition: 'variable',
  structure: 'regexp',
  site: 'property',
  value: 'enumMember',
  check: 'function',
};

export interface NamePlace {
  readonly kind: 'name' | 'compound' | 'label';
  readonly text: string;
  readonly range: Range;
}

/** What an editor colours in one line, in order, never overlapping. */
export function tokensOf({ leaves }: LineTree): SemanticToken[] {
  return leaves.flatMap(({ kind, start, end }) => {
    const type = TYPES[kind];
    return type === undefined
      ? []
      : [{ start, length: end - start, type, isDefinition: kind === 'definition' }];
  });
}

/** The leaf that holds a place, or that ends there. */
export function leafAt(tree: LineTree, character: number): Leaf | null {
  const inside = tree.leaves.find(({ start, end }) => start <= character && character < end);
  if (inside !== undefined && inside.kind !== 'blank') return inside;
  return tree.leaves.find(({ kind, end }) => end === character && kind !== 'blank') ?? inside ?? null;
}

/** The name, compound or label at a place. */
export function nameAt(document: RouteDocument, { line, character }: Position): NamePlace | null {
  const tree = lineAt(document, line);
  if (tree === null) return null;
  const places = [
    ...labelsIn(tree, line),
    ...compoundsIn(tree, line),
    ...tree.names.flatMap((name) => wordsIn(name, line)),
    ...tree.names.map((name): NamePlace => ({ kind: 'name', text: name.text, range: inLine(line, name) })),
  ];
  return (
    places.find(({ range }) => range.start.character <= character && character <= range.end.character) ?? null
  );
}

/** Every place where a compound is defined or used, in the order of the text. */
export function occurrencesOf(document: RouteDocument, name: string): Range[] {
  return collect(
    document,
    (block) => block.mentions.includes(name) || block.text.includes(name),
    (tree, line) => [...compoundsIn(tree, line), ...tree.names.flatMap((node) => wordsIn(node, line))],
  )
    .filter(({ text }) => text === name)
    .map(({ range }) => range);
}

/** Every place where a step is named: at its own line and where others go on from it. */
export function labelOccurrencesOf(document: RouteDocument, label: string): Range[] {
  return collect(document, (block) => block.isStep, labelsIn)
    .filter(({ text }) => text === label)
    .map(({ range }) => range);
}

/** Ranges of the fences of a Markdown page or of the steps of a plan, to fold. */
export function blockRanges({ blocks }: RouteDocument): Range[] {
  return blocks
    .filter(({ block }) => block.isStep && 1 < block.lines.length)
    .map(({ firstLine, block: { lines } }) => ({
      start: { line: firstLine, character: 0 },
      end: { line: firstLine + lines.length - 1, character: lines.at(-1)!.text.length },
    }));
}

/** The language of a file by its name. */
export function languageOf(file: string): Language {
  return /\.(md|markdown)$/i.test(file) ? 'markdown' : 'lyate';
}

function collect(
  { blocks }: RouteDocument,
  wanted: (block: PlacedBlock['block']) => boolean,
  find: (tree: LineTree, line: number) => NamePlace[],
): NamePlace[] {
  return blocks.flatMap(({ block, firstLine }) =>
    wanted(block) ? block.lines.flatMap((tree, line) => find(tree, firstLine + line)) : [],
  );
}

function labelsIn({ syntax }: LineTree, line: number): NamePlace[] {
  if (syntax?.keyword !== 'step') return [];
  const { label, labelSpan, continues } = syntax;
  const own: NamePlace = { kind: 'label', text: label, range: inLine(line, labelSpan) };
  if (continues === null) return [own];
  return [own, { kind: 'label', text: continues.label, range: inLine(line, continues.span) }];
}

function compoundsIn({ syntax }: LineTree, line: number): NamePlace[] {
  if (syntax?.keyword !== 'compound') return [];
  return [{ kind: 'compound', text: syntax.name, range: inLine(line, syntax.nameSpan) }];
}

/** The parts of a name that stand for a compound wherever one of that name is declared. */
function wordsIn(name: NameNode, line: number): NamePlace[] {
  if (name.kind === 'string') return [{ kind: 'name', text: name.text, range: inLine(line, name) }];
  let from = 0;
  return mentionsOf(name).flatMap((text, index) => {
    // The first mention of a mixture is its whole first word, which the parts then give again.
    if (text === '' || (index === 0 && text.includes('/'))) return [];
    const at = name.text.indexOf(text, from);
    if (at < 0) return [];
    from = at + (name.text.includes('/') ? text.length : 0);
    const start = name.inner.start + at;
    return [{ kind: 'name' as const, text, range: inLine(line, { start, end: start + text.length }) }];
  });
}

function inLine(line: number, { start, end }: { start: number; end: number }): Range {
  return { start: { line, character: start }, end: { line, character: end } };
}
