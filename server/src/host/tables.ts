/**
 * The tables that were built into the program.
 *
 * Must not know: how they are used.
 */
import built from '../../generated/tables.json';
import { readTables, type Tables } from '../tables/tables.ts';

let tables: Tables | undefined;

/** Read once, on first asking. */
export function builtTables(): Tables {
  tables ??= readTables(built);
  return tables;
}
