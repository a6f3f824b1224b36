/**
 * Reads the tables under `data/`, checks them, works out keys and patterns, and writes one generated file.
 *
 * Run by `server/tools/build.mjs`; the only argument is the project's root.
 */
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { buildGraph } from '../src/chemistry/build-graph.ts';
import { neutralForm } from '../src/chemistry/neutral.ts';
import { siteNames } from '../src/chemistry/site-names.ts';
import { parseSmarts } from '../src/chemistry/smarts.ts';
import { readSmiles } from '../src/chemistry/smiles.ts';
import { canonicalKey, molarMass } from '../src/chemistry/toolkit.ts';
import { foldName } from '../src/tables/names.ts';
import type { FoldedTable } from '../src/tables/tables.ts';
import { type Cell, type Row, readTable, TableFault } from './read-table.ts';

const TABLES = [
  'activation',
  'groups',
  'substituents',
  'terms',
  'spreads',
  'measured',
  'scales',
  'solvents',
  'reagents',
  'cautions',
  'limits',
  'stability',
  'kinetics',
  'heats',
  'enthalpies',
  'gases',
  'hydrides',
] as const;

interface SourceEntry {
  readonly id: string;
}

try {
  write(process.argv[2] ?? '.');
} catch (error) {
  if (!(error instanceof TableFault)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
}

function write(root: string): void {
  const at = (...path: string[]) => join(root, 'data', ...path);
  const sources = JSON.parse(readFileSync(at('sources.json'), 'utf8')) as SourceEntry[];
  const keys = new Set(sources.map(({ id }) => id));
  const tables: Record<string, unknown> = { sources };
  for (const name of TABLES) {
    if (!existsSync(at(`${name}.csv`))) {
      tables[name] = [];
      continue;
    }
    tables[name] = readTable(at(`${name}.csv`), at('schema', `${name}.json`), keys).map((row) =>
      complete(name, row),
    );
  }
  refuseSharedNames(tables as { solvents: Named[]; reagents: Named[] });
  for (const name of TABLES) tables[name] = folded(tables[name] as Record<string, unknown>[]);
  const text = JSON.stringify(tables);
  const version = createHash('sha256').update(text).digest('hex').slice(0, 12);
  mkdirSync(join(root, 'server/generated'), { recursive: true });
  writeFileSync(join(root, 'server/generated/tables.json'), JSON.stringify({ version, ...tables }));
}

/** Names each column once: the names alone would make up a fifth of the bundle. */
function folded(rows: readonly Record<string, unknown>[]): FoldedTable {
  const columns = [...new Set(rows.flatMap((row) => Object.keys(row)))];
  return { columns, rows: rows.map((row) => columns.map((column) => row[column])) };
}

/** Adds what is worked out once, at build: canonical keys, parsed patterns, masses. */
function complete(table: string, { line, cells }: Row): Record<string, unknown> {
  const row: Record<string, unknown> = { ...cells };
  try {
    if (typeof cells.smarts === 'string') row.pattern = parseSmarts(cells.smarts);
    if (table === 'solvents' || table === 'reagents') Object.assign(row, identity(cells.smiles ?? null));
    if (table === 'reagents' && cells.molarMass === null) row.molarMass = row.mass;
    if (table === 'measured') Object.assign(row, measuredSite(String(cells.smiles)));
  } catch (error) {
    throw new TableFault(`${table}.csv:${line}: ${(error as Error).message}`);
  }
  delete row.mass;
  // All terms come from one fit; naming its sources thousands of times would make up a tenth of the bundle.
  if (table === 'terms') return { name: row.name, value: row.value, n: row.n };
  return row;
}

/** Key of a substance: the keys of its fragments in order, metals and counterions included. */
function identity(smiles: Cell): { key: string | null; mass: number | null } {
  if (typeof smiles !== 'string') return { key: null, mass: null };
  const graph = graphOf(smiles);
  const neutral = neutralForm(graph);
  const keys = neutral.graph.fragments
    .filter((fragment) => !fragment.every((atom) => neutral.absorbed.has(atom)))
    .map((fragment) => canonicalKey(neutral.graph, fragment) ?? '?')
    .sort();
  return { key: keys.join(' '), mass: molarMass(graph) };
}

/** Key of the neutral molecule of a measured row and the names of its mapped atoms. */
function measuredSite(smiles: string): { key: string; atoms: readonly number[]; classes: readonly number[] } {
  const neutral = neutralForm(graphOf(smiles));
  const fragment = neutral.graph.fragments.find(
    (atoms) => !atoms.every((atom) => neutral.absorbed.has(atom)),
  )!;
  const names = siteNames(neutral.graph, fragment);
  const atoms = neutral.graph.atoms.filter(({ mapNumber }) => mapNumber === 1).map(({ index }) => index);
  if (atoms.length === 0) throw new Error(`${smiles} marks no site with :1`);
  return {
    key: canonicalKey(neutral.graph, fragment) ?? '?',
    atoms,
    classes: [...new Set(atoms.flatMap((atom) => names.get(atom) ?? []))],
  };
}

function graphOf(smiles: string) {
  const { structure, problem } = readSmiles(smiles);
  if (structure === undefined) throw new Error(`${smiles}: ${problem.message}`);
  const built = buildGraph(structure);
  if (built.graph === undefined) throw new Error(`${smiles}: ${built.problem.message}`);
  return built.graph;
}

interface Named {
  readonly name: string;
  readonly synonyms: readonly string[];
  readonly key: string | null;
}

/** Two names that fold together must mean one substance, or a reader could not tell which is meant. */
function refuseSharedNames({ solvents, reagents }: { solvents: Named[]; reagents: Named[] }): void {
  const faults: string[] = [];
  for (const [table, rows] of [
    ['solvents', solvents],
    ['reagents', reagents],
  ] as const) {
    const seen = new Map<string, string>();
    for (const { name, synonyms } of rows) {
      for (const word of new Set([name, ...synonyms].map(foldName))) {
        const other = seen.get(word);
        if (other !== undefined && other !== name)
          faults.push(`${table}.csv: "${word}" is a name of ${other} and of ${name}`);
        seen.set(word, name);
      }
    }
  }
  if (faults.length !== 0) throw new TableFault(faults.join('\n'));
}
