/** The built tables, for tests that ask about real molecules. */
import { readFileSync } from 'node:fs';
import { readTables } from '../../server/src/tables/tables.ts';

export const tables = readTables(
  JSON.parse(readFileSync(new URL('../../server/generated/tables.json', import.meta.url), 'utf8')),
);
