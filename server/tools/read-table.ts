/**
 * Reads one CSV table against its schema; a fault names file, line, column and what was expected.
 *
 * Must not know: what the values mean.
 */
import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { type Row, readRows, type Schema } from '../src/answers/csv-rows.ts';

export type { Cell, Row } from '../src/answers/csv-rows.ts';

export class TableFault extends Error {}

/** All rows of a table. @throws TableFault with every fault found, one a line */
export function readTable(file: string, schemaFile: string, sources: ReadonlySet<string>): Row[] {
  const schema = JSON.parse(readFileSync(schemaFile, 'utf8')) as Schema;
  const name = basename(file);
  const { rows, faults } = readRows(readFileSync(file, 'utf8'), schema, 'exact');
  const lines = faults.map(({ line, message }) => `${name}:${line}: ${message}`);
  for (const { line, cells } of rows) {
    const cited = cells.sources;
    const keys = typeof cited === 'string' ? cited.split(';') : ((cited ?? []) as readonly string[]);
    for (const key of keys.map((each) => each.trim())) {
      if (key !== '' && !sources.has(key))
        lines.push(`${name}:${line}: sources "${key}" is not in sources.json`);
    }
  }
  if (lines.length !== 0) throw new TableFault(lines.join('\n'));
  return rows;
}
