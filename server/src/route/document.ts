/**
 * A whole text as read: blocks of lines, each step one block, what stands before the first step another.
 *
 * Knows: lines and trees.  Must not know: tables, structures, what a step means.
 * Invariants:
 *  1. A block depends on its own text alone and is remembered by it, so that an edit reads one block anew.
 *  2. Blocks in order hold every line that is not blank.                          (tests/route/document.test.ts)
 */
import { boundedCache } from '../tables/cache.ts';
import { maskMarkdown } from './markdown.ts';
import { parseLine } from './parse.ts';
import type { LineTree, NameNode } from './tree.ts';

export type Language = 'lyate' | 'markdown';

export interface Block {
  readonly text: string;
  /** One for each line up to the last that is not blank. */
  readonly lines: readonly LineTree[];
  /** Whether the first line opens a step. */
  readonly isStep: boolean;
  /** Texts that stand for a compound wherever one of that name is declared. */
  readonly mentions: readonly string[];
}

export interface PlacedBlock {
  readonly firstLine: number;
  readonly block: Block;
}

export interface RouteDocument {
  readonly blocks: readonly PlacedBlock[];
}

const BLOCKS_REMEMBERED = 6000;
const blocks = boundedCache<string, Block>(BLOCKS_REMEMBERED);

/** Reads a text; line breaks of every kind count as one. */
export function readDocument(text: string, language: Language): RouteDocument {
  const plain = text.includes('\r') ? text.replace(/\r\n?/g, '\n') : text;
  const source = language === 'markdown' ? maskMarkdown(plain) : plain;
  const placed: PlacedBlock[] = [];
  let start = 0;
  let firstLine = 0;
  let line = 0;
  for (let at = 0; at <= source.length; line++) {
    const next = source.indexOf('\n', at);
    const end = next < 0 ? source.length : next;
    if (start < at && opensStep(source, at)) {
      add(placed, source.slice(start, at), firstLine);
      start = at;
      firstLine = line;
    }
    at = end + 1;
  }
  add(placed, source.slice(start), firstLine);
  return { blocks: placed };
}

/** The tree of a line of the document; null for blank lines at the end of a block and outside fences. */
export function lineAt({ blocks: placed }: RouteDocument, line: number): LineTree | null {
  let low = 0;
  let high = placed.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (placed[middle]!.firstLine <= line) low = middle + 1;
    else high = middle;
  }
  const found = placed[low - 1];
  return found?.block.lines[line - found.firstLine] ?? null;
}

function add(placed: PlacedBlock[], text: string, firstLine: number): void {
  const known = blocks.get(text);
  const block = known ?? readBlock(text);
  if (known === undefined) blocks.set(text, block);
  if (block.lines.length !== 0) placed.push({ firstLine, block });
}

function opensStep(text: string, lineStart: number): boolean {
  let at = lineStart;
  while (text[at] === ' ' || text[at] === '\t') at++;
  if (!text.startsWith('step', at)) return false;
  const after = text[at + 4];
  return after === undefined || /\s/.test(after);
}

function readBlock(text: string): Block {
  const lines = text.split('\n').map(parseLine);
  while (0 < lines.length && lines.at(-1)!.leaves.every(({ kind }) => kind === 'blank')) lines.pop();
  const mentions = new Set<string>();
  for (const { names } of lines)
    for (const name of names) for (const word of mentionsOf(name)) mentions.add(word);
  return {
    text: lines.map((line) => line.text).join('\n'),
    lines,
    isStep: opensStep(text, 0),
    mentions: [...mentions],
  };
}

/** A quoted name as a whole, of others the first word, and the first words of the parts of a mixture. */
export function mentionsOf({ kind, text, words }: NameNode): string[] {
  if (kind === 'structure') return [];
  if (kind === 'string') return [text];
  const first = words[0]!.text;
  if (!text.includes('/')) return [first];
  return [first, ...text.split('/').map((part) => part.trim().split(/\s/, 1)[0]!)];
}
