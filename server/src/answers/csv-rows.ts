/**
 * Reads the rows of a table from CSV text against its schema; a fault names line, column and what was expected.
 *
 * Knows: text and schemas.  Must not know: files, what the values mean.
 * Invariant: never throws; every record is either a row without faults or has its faults reported.   (tests/answers/house.test.ts)
 */
import { parse } from 'csv-parse/sync';
import { parseSmarts } from '../chemistry/smarts.ts';
import { readSmiles } from '../chemistry/smiles.ts';

export interface Column {
  readonly type: 'text' | 'number' | 'list' | 'smiles' | 'smarts' | 'choice' | 'choices' | 'flag';
  readonly required?: boolean;
  readonly low?: number;
  readonly high?: number;
  readonly of?: readonly string[];
  readonly unique?: boolean;
  readonly about: string;
}

export interface Schema {
  readonly about: string;
  readonly columns: Readonly<Record<string, Column>>;
}

export type Cell = string | number | boolean | null | readonly string[];
export interface Row {
  readonly line: number;
  readonly cells: Readonly<Record<string, Cell>>;
}

export interface RowFault {
  /** From 1. */
  readonly line: number;
  readonly column: string | null;
  readonly message: string;
}

/**
 * exact: every column of the schema, in its order.
 * named: columns in any order, those that are not required may be left out.
 */
export type Layout = 'exact' | 'named';

interface Parsed {
  readonly record: readonly string[];
  readonly line: number;
}

/** All rows that are in order, and what is wrong with the others. */
export function readRows(text: string, schema: Schema, layout: Layout): { rows: Row[]; faults: RowFault[] } {
  const { records, fault } = recordsOf(text);
  if (fault !== null) return { rows: [], faults: [fault] };
  const [header, ...body] = records;
  const columns = (header?.record ?? []).map((name) => name.trim());
  const faults = headerFaults(columns, schema, layout);
  if (faults.length !== 0) return { rows: [], faults };
  const seen = new Map<string, number>();
  const rows: Row[] = [];
  for (const { record, line } of body) {
    const before: number = faults.length;
    const cells: Record<string, Cell> = {};
    if (record.length !== columns.length) {
      const message = `${record.length} cells where ${columns.length} are expected`;
      faults.push({ line, column: null, message });
    }
    for (const [column, rule] of Object.entries(schema.columns)) {
      const place = columns.indexOf(column);
      const cell = (record[place] ?? '').trim();
      if (place !== -1) {
        const problem = faultOf(cell, rule) ?? repeated(column, cell, rule, line, seen);
        if (problem !== null) faults.push({ line, column, message: `${column} "${cell}" ${problem}` });
      }
      cells[camel(column)] = cellOf(cell, rule);
    }
    if (faults.length === before) rows.push({ line, cells });
  }
  return { rows, faults };
}

function recordsOf(text: string): { records: Parsed[]; fault: RowFault | null } {
  try {
    const records = parse(text, {
      info: true,
      bom: true,
      relax_column_count: true,
      skip_empty_lines: true,
    }) as unknown as { record: string[]; info: { lines: number } }[];
    return { records: records.map(({ record, info }) => ({ record, line: info.lines })), fault: null };
  } catch (error) {
    const { lines, message } = error as Error & { lines?: number };
    return { records: [], fault: { line: lines ?? 1, column: null, message: `is no CSV: ${message}` } };
  }
}

function headerFaults(columns: readonly string[], schema: Schema, layout: Layout): RowFault[] {
  const wanted = Object.keys(schema.columns);
  if (layout === 'exact') {
    if (columns.join() === wanted.join()) return [];
    const message = `the columns are ${columns.join(', ')}; they must be ${wanted.join(', ')}`;
    return [{ line: 1, column: null, message }];
  }
  const unknown = columns
    .filter((column) => !Object.hasOwn(schema.columns, column))
    .map((column) => `there is no column "${column}"; possible are ${wanted.join(', ')}`);
  const missing = wanted
    .filter((column) => schema.columns[column]!.required && !columns.includes(column))
    .map((column) => `the column ${column} is missing`);
  const twice = columns
    .filter((column, place) => columns.indexOf(column) !== place)
    .map((column) => `the column ${column} stands twice`);
  return [...unknown, ...missing, ...twice].map((message) => ({ line: 1, column: null, message }));
}

function repeated(
  column: string,
  cell: string,
  { unique }: Column,
  line: number,
  seen: Map<string, number>,
): string | null {
  if (!unique || cell === '') return null;
  const key = `${column}\0${cell}`;
  const first = seen.get(key);
  seen.set(key, line);
  return first === undefined ? null : `stands already on line ${first}`;
}

function faultOf(text: string, { type, required, low, high, of }: Column): string | null {
  if (text === '') return required ? 'must not be empty' : null;
  switch (type) {
    case 'number': {
      const value = Number(text);
      if (!Number.isFinite(value)) return 'is not a number';
      if (low !== undefined && value < low) return `is below ${low}`;
      return high !== undefined && high < value ? `is above ${high}` : null;
    }
    case 'smiles':
      return readSmiles(text).problem?.message ?? null;
    case 'smarts':
      try {
        parseSmarts(text);
        return null;
      } catch (error) {
        return (error as Error).message;
      }
    case 'flag':
      return text === 'yes' || text === 'no' ? null : 'must be yes or no';
    case 'choice':
      return of!.includes(text) ? null : `must be one of ${of!.join(', ')}`;
    case 'choices': {
      const odd = split(text).find((part) => !of!.includes(part));
      return odd === undefined ? null : `holds ${odd}; possible are ${of!.join(', ')}`;
    }
    default:
      return null;
  }
}

function cellOf(text: string, { type }: Column): Cell {
  if (type === 'list' || type === 'choices') return split(text);
  if (type === 'flag') return text === 'yes';
  if (text === '') return type === 'text' ? '' : null;
  return type === 'number' ? Number(text) : text;
}

function split(text: string): string[] {
  return text
    .split(';')
    .map((part) => part.trim())
    .filter((part) => part !== '');
}

function camel(column: string): string {
  return column.replace(/_(\w)/g, (_, letter: string) => letter.toUpperCase());
}
