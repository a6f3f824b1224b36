/**
 * Reads one CSV table against its schema; a fault names file, line, column and what was expected.
 *
 * Must not know: what the values mean.
 */
import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { parse } from 'csv-parse/sync';
import { parseSmarts } from '../src/chemistry/smarts.ts';
import { readSmiles } from '../src/chemistry/smiles.ts';

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

export class TableFault extends Error {}

/** All rows of a table. @throws TableFault with every fault found, one a line */
export function readTable(file: string, schemaFile: string, sources: ReadonlySet<string>): Row[] {
  const schema = JSON.parse(readFileSync(schemaFile, 'utf8')) as Schema;
  const name = basename(file);
  const faults: string[] = [];
  const records = parse(readFileSync(file, 'utf8'), {
    info: true,
    bom: true,
    relax_column_count: true,
    skip_empty_lines: true,
  }) as unknown as {
    record: string[];
    info: { lines: number };
  }[];
  const header = records[0]?.record ?? [];
  const wanted = Object.keys(schema.columns);
  if (header.join() !== wanted.join()) {
    throw new TableFault(
      `${name}:1: the columns are ${header.join(', ')}; they must be ${wanted.join(', ')}`,
    );
  }
  const seen = new Map<string, number>();
  const rows = records.slice(1).map(({ record, info }): Row => {
    const at = (column: string) => `${name}:${info.lines}: ${column}`;
    if (record.length !== wanted.length)
      faults.push(`${name}:${info.lines}: ${record.length} cells where ${wanted.length} are expected`);
    const cells: Record<string, Cell> = {};
    wanted.forEach((column, place) => {
      const rule = schema.columns[column]!;
      const text = (record[place] ?? '').trim();
      const fault = faultOf(text, rule);
      if (fault !== null) faults.push(`${at(column)} "${text}" ${fault}`);
      if (rule.unique && text !== '') {
        const key = `${column}\0${text}`;
        const first = seen.get(key);
        if (first !== undefined) faults.push(`${at(column)} "${text}" stands already on line ${first}`);
        seen.set(key, info.lines);
      }
      cells[camel(column)] = cellOf(text, rule);
      if (column === 'sources') {
        for (const source of text.split(';').map((key) => key.trim())) {
          if (source !== '' && !sources.has(source))
            faults.push(`${at(column)} "${source}" is not in sources.json`);
        }
      }
    });
    return { line: info.lines, cells };
  });
  if (faults.length !== 0) throw new TableFault(faults.join('\n'));
  return rows;
}

function faultOf(text: string, { type, required, low, high, of }: Column): string | null {
  if (text === '') return required ? 'must not be empty' : null;
  switch (type) {
    case 'number': {
      const value = Number(text);
      if (Number.isNaN(value)) return 'is not a number';
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
