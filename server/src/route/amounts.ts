/**
 * Reads names, strengths and amounts inside a statement.
 *
 * A name ends before the first amount: a number with a unit, `excess`, `catalytic`, `sat.`, or a small word that the
 * statement reserves. The first word always belongs to the name, so that a compound may be called `1`.
 * Knows: tokens, units.  Must not know: tables, compounds, structures.
 */
import type { Span } from '../chemistry/molecule.ts';
import type { LineReader } from './line-reader.ts';
import { stringText, type Token } from './scan.ts';
import type { AmountNode, NameNode, SiteNode, Strength, Word } from './tree.ts';
import { type Dimension, dimensionOf, leadingNumber, numberOf, type Quantity, quantityOf } from './units.ts';

const STRENGTHS: ReadonlySet<Dimension> = new Set([
  'molarity',
  'mass-share',
  'mass-concentration',
  'percent',
]);
const AMOUNTS: ReadonlySet<Dimension> = new Set([
  ...STRENGTHS,
  'substance',
  'mass',
  'volume',
  'equiv',
  'mol-share',
  'relative-volume',
]);
export const QUALIFIERS: Readonly<Record<string, 'excess' | 'catalytic' | 'saturated'>> = {
  excess: 'excess',
  catalytic: 'catalytic',
  'cat.': 'catalytic',
  'sat.': 'saturated',
};
export const SATURATED: ReadonlySet<string> = new Set(['sat.', 'sat', 'saturated']);
/** Words before a name that only say it comes dissolved, as bought. */
export const DISSOLVED: ReadonlySet<string> = new Set([
  'aq.',
  'aq',
  'aqueous',
  'conc.',
  'conc',
  'concentrated',
]);
/** No plan of the trade handles more, in the program's unit of each dimension. */
const LARGEST = 1e9;

/** A NAME that ends before the first amount or one of the reserved words. */
export function readName(reader: LineReader, what: string, reserved: readonly string[] = []): NameNode {
  const first = reader.peek();
  if (first === undefined || (first.kind === 'word' && reserved.includes(first.text)))
    throw reader.missing(what);
  const strength = first.kind === 'word' ? readStrength(reader, reserved) : null;
  const next = reader.peek()!;
  const name =
    next.kind === 'word' ? readWords(reader, strength, reserved) : readDelimited(reader, next, strength);
  reader.names.push(name);
  return name;
}

function readDelimited(reader: LineReader, token: Token, strength: Strength | null): NameNode {
  const isString = token.kind === 'string';
  reader.take(isString ? 'string' : 'structure');
  if (!token.closed) {
    reader.report('unreadable-line', `This ${isString ? 'quote' : 'angle bracket'} is not closed.`, {
      start: token.start,
      end: token.start + 1,
    });
  }
  const inner = { start: token.start + 1, end: token.end - (token.closed ? 1 : 0) };
  const text = isString ? stringText(token) : reader.line.slice(inner.start, inner.end);
  const { start, end } = token;
  return {
    kind: isString ? 'string' : 'structure',
    text,
    inner,
    words: isString ? wordsOf(text, inner.start) : [],
    strength,
    start,
    end,
  };
}

/** The words of a quoted name with their places; escapes make the places inexact, never wrong by more than themselves. */
function wordsOf(text: string, offset: number): Word[] {
  return [...text.matchAll(/\S+/g)].map(({ 0: word, index }) => ({
    text: word,
    start: offset + index,
    end: offset + index + word.length,
  }));
}

function readWords(reader: LineReader, strength: Strength | null, reserved: readonly string[]): NameNode {
  const words: Word[] = [];
  while (words.length === 0 || !nameEnds(reader, reserved)) {
    const { text, start, end } = reader.take('name');
    words.push({ text, start, end });
  }
  const start = words[0]!.start;
  const end = words.at(-1)!.end;
  return {
    kind: 'words',
    text: reader.line.slice(start, end),
    inner: { start, end },
    words,
    strength,
    start,
    end,
  };
}

/** `1 M HCl`, `sat. NH4Cl`: only where a name follows, for `1 M` alone could be anything. */
function readStrength(reader: LineReader, reserved: readonly string[]): Strength | null {
  const first = reader.peek()!;
  if (SATURATED.has(first.text) || DISSOLVED.has(first.text)) {
    if (!nameFollows(reader, 1, reserved)) return null;
    reader.take('value');
    while (DISSOLVED.has(reader.word() ?? '') && nameFollows(reader, 1, reserved)) reader.take('value');
    return { quantity: null, saturated: SATURATED.has(first.text), start: first.start, end: reader.end };
  }
  const length = leadingNumber(first.text);
  if (length === 0) return null;
  const attached = length < first.text.length;
  const unit = attached ? first.text.slice(length) : reader.word(1);
  const dimension = unit === undefined ? null : dimensionOf(unit);
  const used = attached ? 1 : 2;
  if (dimension === null || !STRENGTHS.has(dimension) || !nameFollows(reader, used, reserved)) return null;
  const quantity = readQuantity(reader);
  while (DISSOLVED.has(reader.word() ?? '') && nameFollows(reader, 1, reserved)) reader.take('value');
  return { quantity, saturated: false, start: first.start, end: reader.end };
}

function nameFollows(reader: LineReader, ahead: number, reserved: readonly string[]): boolean {
  const token = reader.peek(ahead);
  return token !== undefined && (token.kind !== 'word' || !endsName(reader, ahead, reserved));
}

function nameEnds(reader: LineReader, reserved: readonly string[]): boolean {
  return endsName(reader, 0, reserved);
}

function endsName(reader: LineReader, ahead: number, reserved: readonly string[]): boolean {
  const word = reader.word(ahead);
  if (word === undefined || reserved.includes(word) || word === 'in' || word === 'of') return true;
  if (Object.hasOwn(QUALIFIERS, word)) return true;
  if (ratioOf(word) !== null) return true;
  const length = leadingNumber(word);
  if (length === 0) return false;
  if (length < word.length) return isPortions(word) || dimensionOf(withoutComma(word.slice(length))) !== null;
  // A bare number belongs to the name only where another number follows it, as in `Aliquat 336 5 g`.
  const next = reader.word(ahead + 1);
  return next === undefined || leadingNumber(next) === 0;
}

function isPortions(word: string): boolean {
  return /^\d+[x×]$/.test(word);
}

/** Volume ratio as in `3:1:1`; null for other words. */
export function ratioOf(word: string): number[] | null {
  if (!word.includes(':')) return null;
  const parts = word.split(':').map(numberOf);
  return parts.every((part) => 0 < part && Number.isFinite(part)) ? parts : null;
}

/** Takes a ratio, with `v/v` behind it, if one comes. */
export function readRatio(reader: LineReader): number[] | null {
  const ratio = ratioOf(reader.word() ?? '');
  if (ratio === null) return null;
  reader.take('number');
  reader.takeWord('v/v', 'unit');
  return ratio;
}

/** All amounts up to the end of the line or a word that none of them can begin with. */
export function readAmounts(reader: LineReader): AmountNode[] {
  const amounts: AmountNode[] = [];
  for (let next = reader.peek(); next !== undefined; next = reader.peek()) {
    if (next.kind !== 'word') break;
    const start = next.start;
    if (next.text === 'in') {
      reader.take('link');
      const name = readName(reader, 'A solvent');
      const ratio = readRatio(reader);
      amounts.push({ kind: 'carrier', name, ratio, start, end: reader.end });
    } else if (Object.hasOwn(QUALIFIERS, next.text)) {
      reader.take('value');
      amounts.push({ kind: QUALIFIERS[next.text]!, start, end: reader.end });
    } else if (next.text === 'of') {
      reader.take('link');
    } else if (0 < leadingNumber(next.text)) {
      const node = readPortionsAndQuantity(reader);
      if (node !== null) amounts.push({ ...node, start, end: reader.end });
    } else {
      break;
    }
  }
  return amounts;
}

function readPortionsAndQuantity(
  reader: LineReader,
): { kind: 'quantity'; quantity: Quantity; portions: number } | null {
  let portions = 1;
  const next = reader.word(1);
  const first = reader.peek()!;
  if (isPortions(first.text) || (!Number.isNaN(numberOf(first.text)) && (next === 'x' || next === '×'))) {
    portions = Number.parseInt(first.text, 10);
    const separate = !isPortions(first.text);
    if (separate) {
      reader.take('number');
      reader.take('operator');
    } else {
      const cut = first.end - 1;
      reader.takePieces([
        { kind: 'number', start: first.start, end: cut },
        { kind: 'operator', start: cut, end: first.end },
      ]);
    }
    const whole = separate ? numberOf(first.text) : portions;
    if (!Number.isInteger(whole) || whole < 1 || 1000 < whole) {
      reader.report('bad-unit', 'A number of portions is a whole number from 1 to 1000.', first);
      portions = 1;
    }
    if (leadingNumber(reader.word() ?? '') === 0) throw reader.missing('A volume');
  }
  const quantity = readQuantity(reader);
  return quantity === null ? null : { kind: 'quantity', quantity, portions };
}

/** Number and unit of an amount; reports and returns null where the amount cannot be. */
export function readQuantity(reader: LineReader): Quantity | null {
  const read = readMeasure(reader);
  if (read === null) return null;
  const { quantity, numberSpan, span } = read;
  if (!AMOUNTS.has(quantity.dimension)) {
    const kind = quantity.dimension === 'temperature' ? 'A temperature' : 'This unit';
    reader.report('bad-unit', `${kind} is no amount; write mmol, g, mL, equiv, mol%, vol, M or wt%.`, span);
    return null;
  }
  if (!(0 < quantity.value) || LARGEST < quantity.value) {
    const why =
      0 < quantity.value
        ? 'is larger than any flask'
        : quantity.value === 0
          ? 'is nothing'
          : 'is below nothing';
    reader.report(
      'bad-unit',
      `An amount of ${reader.line.slice(numberSpan.start, numberSpan.end)} ${why}.`,
      numberSpan,
    );
    return null;
  }
  return quantity.dimension === 'percent' ? { dimension: 'mass-share', value: quantity.value } : quantity;
}

export interface Measure {
  readonly quantity: Quantity;
  readonly numberSpan: Span;
  readonly span: Span;
}

/** A number with a unit behind or attached to it, whatever it measures; reports and returns null where there is no unit. */
export function readMeasure(reader: LineReader): Measure | null {
  const { text, start, end } = reader.peek()!;
  const length = leadingNumber(text);
  const numberSpan = { start, end: start + length };
  const value = numberOf(text.slice(0, length));
  let unit: string | undefined;
  if (length < text.length) {
    unit = withoutComma(text.slice(length));
    const unitEnd = start + length + unit.length;
    reader.takePieces([
      { kind: 'number', ...numberSpan },
      { kind: 'unit', start: start + length, end: unitEnd },
      ...(unitEnd < end ? [{ kind: 'operator' as const, start: unitEnd, end }] : []),
    ]);
  } else {
    reader.take('number');
    const next = reader.word();
    if (
      next !== undefined &&
      leadingNumber(next) === 0 &&
      !Object.hasOwn(QUALIFIERS, next) &&
      next !== 'in'
    ) {
      unit = withoutComma(next);
      takeUnit(reader, unit);
    }
  }
  if (unit === undefined) {
    reader.report('bad-unit', `The number ${text} has no unit.`, { start, end });
    return null;
  }
  const quantity = quantityOf(value, unit);
  if (quantity === null) {
    const unitStart = reader.line.indexOf(unit, start + length);
    reader.report('bad-unit', `“${unit}” is no unit that measures an amount.`, {
      start: unitStart,
      end: unitStart + unit.length,
    });
    return null;
  }
  return { quantity, numberSpan, span: { start, end: reader.end } };
}

/** A unit without the comma that may stand between two amounts; a comma alone is kept. */
function withoutComma(unit: string): string {
  return 1 < unit.length && unit.endsWith(',') ? unit.slice(0, -1) : unit;
}

function takeUnit(reader: LineReader, bare: string): void {
  const { start, end, text } = reader.peek()!;
  if (bare.length === text.length) {
    reader.take('unit');
    return;
  }
  reader.takePieces([
    { kind: 'unit', start, end: end - 1 },
    { kind: 'operator', start: end - 1, end },
  ]);
}

/** `at :1, :2`; empty where no `at` comes. */
export function readSites(reader: LineReader): SiteNode[] {
  if (!reader.takeWord('at', 'link')) return [];
  const sites: SiteNode[] = [];
  for (let next = reader.word(); next?.startsWith(':') || next === ','; next = reader.word()) {
    const { text, start } = reader.peek()!;
    const pieces: { kind: 'site' | 'operator' | 'text'; start: number; end: number }[] = [];
    for (const { 0: piece, index } of text.matchAll(/:\d{1,3}|,|[^:,]+|:/g)) {
      const span = { start: start + index, end: start + index + piece.length };
      const isSite = /^:\d/.test(piece);
      pieces.push({ kind: isSite ? 'site' : piece === ',' ? 'operator' : 'text', ...span });
      if (isSite) sites.push({ map: Number(piece.slice(1)), ...span });
      else if (piece !== ',')
        reader.report('unreadable-line', 'A site is a colon and a map number, as in :1.', span);
    }
    reader.takePieces(pieces);
  }
  if (sites.length === 0 && reader.problems.length === 0) throw reader.missing('A site such as :1');
  return sites;
}
