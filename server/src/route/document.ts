/**
 * A whole text as read: blocks of lines, each step one block, what stands before the first step another.
 *
 * Knows: lines and trees.  Must not know: tables, structures, what a step means.
 * Invariants:
 *  1. A block depends on its own text alone and is remembered by it, so that an edit reads one block anew.
 *  2. Blocks in order hold every line that is not blank.                          (tests/route/incremental.test.ts)
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
  /** As it stands in the text, blank lines behind it included. */
  readonly raw: string;
  /** Line breaks in `raw`. */
  readonly height: number;
}

export interface RouteDocument {
  readonly blocks: readonly PlacedBlock[];
}

const BLOCKS_REMEMBERED = 6000;
const blocks = boundedCache<string, Block>(BLOCKS_REMEMBERED);

/**
 * Reads a text; line breaks of every kind count as one.
 *
 * Blocks that stand at the start or the end of the text as they did in `previous` are taken over unread; the result is
 * the same without it.
 */
export function readDocument(text: string, language: Language, previous?: RouteDocument): RouteDocument {
  const plain = text.includes('\r') ? text.replace(/\r\n?/g, '\n') : text;
  const source = language === 'markdown' ? maskMarkdown(plain) : plain;
  const old = previous?.blocks ?? [];
  const placed: PlacedBlock[] = [];
  let start = 0;
  let firstLine = 0;
  for (const each of old) {
    const end = start + each.raw.length;
    if (!source.startsWith(each.raw, start) || !endsBlock(source, end)) break;
    placed.push(each);
    start = end;
    firstLine += each.height;
  }
  const kept = placed.length;
  let end = source.length;
  let tail = old.length;
  for (; kept < tail; tail--) {
    const { raw } = old[tail - 1]!;
    const from = end - raw.length;
    if (from < start || !source.endsWith(raw, end) || !(from === start || startsBlock(source, from))) break;
    end = from;
  }
  for (let at = start; at < end; ) {
    const next = nextStep(source, at, end);
    firstLine = add(placed, source.slice(at, next), firstLine);
    at = next;
  }
  for (const each of old.slice(tail)) {
    placed.push(each.firstLine === firstLine ? each : { ...each, firstLine });
    firstLine += each.height;
  }
  return { blocks: placed };
}

/** Whether a block may begin here: a line that opens a step. */
function startsBlock(source: string, at: number): boolean {
  return source[at - 1] === '\n' && opensStep(source, at);
}

function endsBlock(source: string, at: number): boolean {
  return at === source.length || startsBlock(source, at);
}

/** Start of the first line behind `from` that opens a step; `end` where there is none. */
function nextStep(source: string, from: number, end: number): number {
  for (
    let line = source.indexOf('\n', from);
    0 <= line && line + 1 < end;
    line = source.indexOf('\n', line + 1)
  ) {
    if (opensStep(source, line + 1)) return line + 1;
  }
  return end;
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

/** Adds one block and answers with the line behind it. */
function add(placed: PlacedBlock[], raw: string, firstLine: number): number {
  const known = blocks.get(raw);
  const block = known ?? readBlock(raw);
  if (known === undefined) blocks.set(raw, block);
  let height = 0;
  for (let at = raw.indexOf('\n'); 0 <= at; at = raw.indexOf('\n', at + 1)) height++;
  placed.push({ firstLine, block, raw, height });
  return firstLine + height;
}

function opensStep(text: string, lineStart: number): boolean {
  let at = lineStart;
  while (text[at] === ' ' || text[at] === '\t' || text[at] === '\uFEFF') at++;
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

/** What may stand for a declared compound in a name: a quoted one as a whole, else the first word; and the parts of a mixture. */
export function mentionsOf({ kind, text, words }: NameNode): string[] {
  if (kind === 'structure') return [];
  const first = kind === 'string' ? text : words[0]!.text;
  if (!text.includes('/')) return [first];
  return [first, ...text.split('/').map((part) => part.trim().split(/\s/, 1)[0]!)];
}
