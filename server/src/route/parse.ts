/**
 * Turns one line of text into a tree; the first thing that looks at a plan.
 *
 * Knows: text, keywords, units.  Must not know: tables, compounds, structures, other lines.
 * Invariants:
 *  1. Never throws; any string gives a tree.                                  (tests/route/parse.test.ts)
 *  2. Leaves joined in order give back the line exactly.                      (same)
 *  3. The keywords are those of GRAMMAR.md.                                   (tests/route/grammar.test.ts)
 * Cost: linear in length; lines beyond a limit are not looked into.
 */
import type { Span } from '../chemistry/molecule.ts';
import { boundedCache } from '../tables/cache.ts';
import { readAmounts, readMeasure, readName, readRatio, readSites } from './amounts.ts';
import { readCompound } from './compound-line.ts';
import { LineReader, UnreadableLine } from './line-reader.ts';
import { isBlank, scanLine, stringText } from './scan.ts';
import type { CountedName, Leaf, LineTree, Syntax } from './tree.ts';
import { leadingNumber, numberOf } from './units.ts';

/** UTF-16 units; a longer line is one problem. */
export const LONGEST_LINE = 65_536;
const LAYERS = ['organic', 'aqueous'] as const;
const STATES = ['neutral', 'salt', 'anion', 'cation', 'zwitterion'] as const;
const ABSOLUTE_ZERO_C = 273.15;
/** K; what `rt` stands for. */
export const ROOM_TEMPERATURE = 298.15;

/** Reads what follows a keyword. */
type StatementReader = (reader: LineReader) => Syntax;

/** Every keyword of the language. */
export const STATEMENTS: Readonly<Record<string, StatementReader>> = {
  plan: (reader) => ({ keyword: 'plan', title: readString(reader, 'A title in quotes').text }),
  use: (reader) => {
    const { text, span } = readString(reader, 'A file in quotes');
    return { keyword: 'use', path: text, pathSpan: span };
  },
  measured: readMeasured,
  step: readStep,
  solvent: (reader) => {
    const name = readName(reader, 'A solvent');
    const ratio = readRatio(reader);
    return { keyword: 'solvent', name, ratio, amounts: readAmounts(reader) };
  },
  charge: addition('charge'),
  base: addition('base'),
  acid: addition('acid'),
  inert: addition('inert'),
  quench: addition('quench'),
  wash: addition('wash'),
  temperature: readTemperatures,
  deprotonate: transfer('deprotonate'),
  protonate: transfer('protonate'),
  convert: readConvert,
  adjust: (reader) => {
    reader.expectWord('pH', 'link');
    const { value, span } = readPlainNumber(reader, 'A pH');
    reader.expectWord('with', 'link');
    const name = readName(reader, 'An acid or a base');
    return { keyword: 'adjust', pH: value, pHSpan: span, name, amounts: readAmounts(reader) };
  },
  extract: (reader) => {
    const name = readName(reader, 'A compound', ['into']);
    reader.expectWord('into', 'link');
    const into = readName(reader, 'A solvent');
    return { keyword: 'extract', name, into, amounts: readAmounts(reader) };
  },
  keep: (reader) => {
    const name = readName(reader, 'A compound', ['in']);
    reader.expectWord('in', 'link');
    const { value, span } = reader.expectOneOf(LAYERS, 'value');
    return { keyword: 'keep', name, layer: value, layerSpan: span };
  },
  isolate: (reader) => {
    const name = readName(reader, 'A compound', ['as']);
    reader.expectWord('as', 'link');
    const { value, span } = reader.expectOneOf(STATES, 'value');
    return { keyword: 'isolate', name, state: value, stateSpan: span };
  },
  accept: (reader) => {
    if (reader.word() === undefined) throw reader.missing('The name of a check');
    const { text, start, end } = reader.take('check');
    const reason = readString(reader, 'A reason in quotes').text;
    return { keyword: 'accept', check: text, checkSpan: { start, end }, reason };
  },
  note: (reader) => ({ keyword: 'note', text: readString(reader, 'Text in quotes').text }),
};
/** Keywords that are read on their own: a structure is no word, and a temperature may stand alone. */
export const KEYWORDS: readonly string[] = ['compound', ...Object.keys(STATEMENTS), 'rt', 'reflux'];

const trees = boundedCache<string, LineTree>(50_000);

/** The tree of one line without its line break. */
export function parseLine(line: string): LineTree {
  const known = trees.get(line);
  if (known !== undefined) return known;
  const tree = LONGEST_LINE < line.length ? tooLong(line) : readLine(line);
  if (line.length < 1000) trees.set(line, tree);
  return tree;
}

function tooLong(text: string): LineTree {
  const span = { start: 0, end: text.length };
  const message = `This line is longer than ${LONGEST_LINE} characters and is left out.`;
  return {
    text,
    leaves: [{ kind: 'text', ...span }],
    syntax: null,
    keyword: null,
    span,
    names: [],
    problems: [{ check: 'unreadable-line', message, ...span }],
  };
}

function readLine(line: string): LineTree {
  let start = 0;
  while (start < line.length && isBlank(line, start)) start++;
  if (start === line.length || line.startsWith('//', start)) return silent(line, start);
  let end = start;
  while (end < line.length && !isBlank(line, end)) end++;
  const keyword = { start, end };
  const word = line.slice(start, end);
  if (word === 'compound') return readCompound(line, keyword);
  const { tokens, comment } = scanLine(line, start);
  const reader = new LineReader(line, tokens, keyword);
  let syntax: Syntax | null = null;
  try {
    syntax = readStatement(reader, word, keyword);
    const rest = reader.rest();
    if (rest !== null) {
      reader.report(
        'unreadable-line',
        'This is neither part of the name nor an amount; it is left out.',
        rest,
      );
    }
  } catch (error) {
    if (!(error instanceof UnreadableLine)) throw error;
    reader.rest();
    reader.problems.length = 0;
    reader.report('unreadable-line', error.message, error.span);
  }
  return {
    text: line,
    leaves: reader.leaves(comment),
    syntax,
    keyword: syntax === null ? null : keyword,
    span: { start, end: reader.end },
    names: reader.names,
    problems: reader.problems.slice(0, 1),
  };
}

function readStatement(reader: LineReader, word: string, keyword: Span): Syntax {
  if (word === 'rt' || word === 'reflux') {
    reader.take('keyword');
    const value = word === 'rt' ? ROOM_TEMPERATURE : word;
    return { keyword: 'temperature', from: value, to: value };
  }
  const read = Object.hasOwn(STATEMENTS, word) ? STATEMENTS[word] : undefined;
  if (read === undefined) throw new UnreadableLine(unknownKeyword(word), keyword);
  reader.take('keyword');
  return read(reader);
}

function unknownKeyword(word: string): string {
  const lower = word.toLowerCase().replace(/:$/, '');
  if (KEYWORDS.includes(lower)) return `Keywords are lower case and stand alone: ${lower}.`;
  const shown = 40 < word.length ? `${word.slice(0, 40)}…` : word;
  return `“${shown}” is no keyword; a line begins with one such as charge, base or solvent, or with // for a remark.`;
}

function silent(line: string, start: number): LineTree {
  const leaves: Leaf[] = [];
  if (0 < start) leaves.push({ kind: 'blank', start: 0, end: start });
  if (start < line.length) leaves.push({ kind: 'comment', start, end: line.length });
  const span = { start, end: start };
  return { text: line, leaves, syntax: null, keyword: null, span, names: [], problems: [] };
}

function readString(reader: LineReader, what: string): { text: string; span: Span } {
  const token = reader.peek();
  if (token?.kind !== 'string') throw reader.missing(what);
  reader.take('string');
  if (!token.closed) {
    reader.report('unreadable-line', 'This quote is not closed.', {
      start: token.start,
      end: token.start + 1,
    });
  }
  return { text: stringText(token), span: { start: token.start, end: token.end } };
}

function readPlainNumber(reader: LineReader, what: string): { value: number; span: Span } {
  const value = numberOf(reader.word() ?? '');
  if (Number.isNaN(value)) throw reader.missing(what);
  const { start, end } = reader.take('number');
  const span = { start, end };
  if (!Number.isFinite(value)) {
    reader.report('bad-unit', 'This number is beyond all measure.', span);
    return { value: 0, span };
  }
  return { value, span };
}

function addition(keyword: 'charge' | 'base' | 'acid' | 'inert' | 'quench' | 'wash'): StatementReader {
  return (reader) => ({ keyword, name: readName(reader, 'A name'), amounts: readAmounts(reader) });
}

function transfer(keyword: 'deprotonate' | 'protonate'): StatementReader {
  return (reader) => ({ keyword, name: readName(reader, 'A compound', ['at']), sites: readSites(reader) });
}

function readMeasured(reader: LineReader): Syntax {
  reader.expectWord('pKa', 'link');
  const { value } = readPlainNumber(reader, 'A number');
  let sd: number | null = null;
  if (reader.takeWord('±', 'operator') || reader.takeWord('+/-', 'operator')) {
    const read = readPlainNumber(reader, 'A standard deviation');
    sd = read.value;
    if (!(0 < sd)) reader.report('bad-unit', 'A standard deviation is a number above 0.', read.span);
  }
  const sites = readSites(reader);
  reader.expectWord('in', 'link');
  const medium = readName(reader, 'A solvent', ['source']);
  const source = reader.takeWord('source', 'link') ? readString(reader, 'A source in quotes').text : '';
  return { keyword: 'measured', value, sd, sites, medium, source };
}

function readStep(reader: LineReader): Syntax {
  const { text: label, span: labelSpan } = readLabel(reader);
  let continues: { label: string; span: Span; layer: 'organic' | 'aqueous' | null } | null = null;
  if (reader.takeWord('continues', 'link')) {
    const before = readLabel(reader);
    const layer = LAYERS.find((candidate) => candidate === reader.word()) ?? null;
    if (layer !== null) reader.take('value');
    continues = { label: before.text, span: before.span, layer };
  }
  const title = reader.peek()?.kind === 'string' ? readString(reader, 'A title').text : null;
  return { keyword: 'step', label, labelSpan, title, continues };
}

function readLabel(reader: LineReader): { text: string; span: Span } {
  const token = reader.peek();
  if (token === undefined || token.kind === 'structure') throw reader.missing('A label');
  reader.take('definition');
  return {
    text: token.kind === 'string' ? stringText(token) : token.text,
    span: { start: token.start, end: token.end },
  };
}

function readTemperatures(reader: LineReader): Syntax {
  const from = readTemperature(reader);
  const to = reader.takeWord('to', 'link') ? readTemperature(reader) : from;
  return { keyword: 'temperature', from, to };
}

function readTemperature(reader: LineReader): number | 'reflux' {
  if (reader.takeWord('rt', 'value')) return ROOM_TEMPERATURE;
  if (reader.takeWord('reflux', 'value')) return 'reflux';
  const word = reader.word() ?? '';
  if (leadingNumber(word) === 0) throw reader.missing('A temperature');
  // In `-78 to 0 °C` the unit stands once for both.
  if (reader.word(1) === 'to' && leadingNumber(word) === word.length) {
    const { start, end } = reader.take('number');
    const value = Math.round((numberOf(word) + ABSOLUTE_ZERO_C) * 1e6) / 1e6;
    return kelvin(reader, value, { start, end });
  }
  const measure = readMeasure(reader);
  if (measure === null) return ROOM_TEMPERATURE;
  if (measure.quantity.dimension !== 'temperature') {
    reader.report('bad-unit', 'This unit measures no temperature; write °C or K.', measure.span);
    return ROOM_TEMPERATURE;
  }
  return kelvin(reader, measure.quantity.value, measure.numberSpan);
}

function kelvin(reader: LineReader, value: number, span: Span): number {
  if (0 < value && value < 5000) return value;
  const why = 0 < value ? 'No flask is as hot as this.' : 'No flask is as cold as this.';
  reader.report('bad-unit', why, span);
  return ROOM_TEMPERATURE;
}

function readConvert(reader: LineReader): Syntax {
  const from = readCounted(reader, ['+', 'to']);
  reader.expectWord('to', 'link');
  const to = readCounted(reader, ['+', 'yield']);
  let share: number | null = null;
  if (reader.takeWord('yield', 'link')) {
    if (leadingNumber(reader.word() ?? '') === 0) throw reader.missing('A yield in %');
    const measure = readMeasure(reader);
    if (measure !== null) {
      const { quantity, numberSpan, span } = measure;
      if (quantity.dimension !== 'percent') reader.report('bad-unit', 'A yield is written in %.', span);
      else if (!(0 < quantity.value && quantity.value <= 1)) {
        reader.report('bad-unit', 'A yield lies above 0 % and up to 100 %.', numberSpan);
      } else share = quantity.value;
    }
  }
  return { keyword: 'convert', from, to, yield: share };
}

function readCounted(reader: LineReader, reserved: readonly string[]): CountedName[] {
  const list: CountedName[] = [];
  do {
    let count = 1;
    const times = reader.word(1);
    if (times === 'x' || times === '×') {
      const { text, start, end } = reader.take('number');
      count = numberOf(text);
      reader.take('operator');
      if (!(0 < count && count <= 1000)) {
        reader.report('bad-unit', 'A count is a number above 0 and up to 1000.', { start, end });
        count = 1;
      }
    }
    list.push({ name: readName(reader, 'A compound', reserved), count });
  } while (reader.takeWord('+', 'operator'));
  return list;
}
