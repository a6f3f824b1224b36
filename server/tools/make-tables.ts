/**
 * Reads the tables under `data/`, checks them, works out keys and patterns, and writes one generated file.
 *
 * Run by `server/tools/build.mjs`; the only argument is the project's root.
 */
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { markedSite, substanceIdentity } from '../src/chemistry/row-keys.ts';
import { type Pattern, parseSmarts } from '../src/chemistry/smarts.ts';
import { foldName } from '../src/tables/fold-name.ts';
import type { CautionRow, ChoiceRow, Trigger } from '../src/tables/rows.ts';
import type { FoldedPattern, FoldedTable, PatternPool } from '../src/tables/tables.ts';
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
  'choices',
  'electrophiles',
] as const;

const TRIGGER_KINDS = new Set(['reagent', 'role', 'solvent', 'kind', 'group']);

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
  refuseUnknownTriggers(tables as unknown as TriggeredTables);
  refuseUnknownChoices(tables as unknown as ChosenTables);
  const pool: PatternPool = { atoms: [], bonds: [] };
  for (const name of TABLES) tables[name] = folded(tables[name] as Record<string, unknown>[], pool);
  tables.patternParts = pool;
  const text = JSON.stringify(tables);
  const version = createHash('sha256').update(text).digest('hex').slice(0, 12);
  mkdirSync(join(root, 'server/generated'), { recursive: true });
  writeFileSync(join(root, 'server/generated/tables.json'), JSON.stringify({ version, ...tables }));
}

/** Names each column once: the names alone would make up a fifth of the bundle. */
function folded(rows: readonly Record<string, unknown>[], pool: PatternPool): FoldedTable {
  const columns = [...new Set(rows.flatMap((row) => Object.keys(row)))];
  const cell = (row: Record<string, unknown>, column: string) =>
    column === 'pattern' && row.pattern != null ? pooled(row.pattern as Pattern, pool) : row[column];
  return { columns, rows: rows.map((row) => columns.map((column) => cell(row, column))) };
}

/** A pattern by the places of its parts: a few hundred different ones make up all rules. */
function pooled({ atoms, bonds }: Pattern, pool: PatternPool): FoldedPattern {
  return {
    atoms: atoms.map((atom) => placeIn(pool.atoms, atom)),
    bonds: bonds.map((bond) => placeIn(pool.bonds, bond)),
  };
}

function placeIn<Part>(parts: Part[], part: Part): number {
  const text = JSON.stringify(part);
  const place = parts.findIndex((other) => JSON.stringify(other) === text);
  return place === -1 ? parts.push(part) - 1 : place;
}

/** Adds what is worked out once, at build: canonical keys, parsed patterns, masses. */
function complete(table: string, { line, cells }: Row): Record<string, unknown> {
  const row: Record<string, unknown> = { ...cells };
  try {
    if (typeof cells.smarts === 'string') row.pattern = parseSmarts(cells.smarts);
    if (table === 'solvents' || table === 'reagents') Object.assign(row, identity(cells.smiles ?? null));
    if (table === 'reagents' && cells.molarMass === null) row.molarMass = row.mass;
    if (table === 'cautions')
      Object.assign(row, { first: triggersOf(cells.first), second: triggersOf(cells.second) });
    if (table === 'measured') Object.assign(row, markedSite(String(cells.smiles)));
  } catch (error) {
    throw new TableFault(`${table}.csv:${line}: ${(error as Error).message}`);
  }
  delete row.mass;
  // All terms come from one fit; naming its sources thousands of times would make up a tenth of the bundle.
  if (table === 'terms') return { name: row.name, value: row.value, n: row.n };
  return row;
}

/** `reagent:NAME | role:ROLE | group:SMARTS …`, the patterns parsed. */
function triggersOf(cell: Cell | undefined): Trigger[] {
  if (typeof cell !== 'string' || cell === '') return [];
  return cell.split(' | ').map((part) => {
    const place = part.indexOf(':');
    const [kind, name] = [part.slice(0, place), part.slice(place + 1)];
    if (!TRIGGER_KINDS.has(kind)) throw new Error(`"${part}" is no trigger`);
    return { kind: kind as Trigger['kind'], name, pattern: kind === 'group' ? parseSmarts(name) : null };
  });
}

/** Key and mass of a substance; none where it has no one structure. */
function identity(smiles: Cell): { key: string | null; mass: number | null } {
  return typeof smiles === 'string' ? substanceIdentity(smiles) : { key: null, mass: null };
}

interface TriggeredTables {
  readonly solvents: readonly { readonly name: string; readonly kind: string }[];
  readonly reagents: readonly { readonly name: string; readonly roles: readonly string[] }[];
  readonly cautions: readonly Pick<CautionRow, 'id' | 'first' | 'second'>[];
}

/** A caution that names what no table holds could never speak. */
function refuseUnknownTriggers({ solvents, reagents, cautions }: TriggeredTables): void {
  const known: Record<Trigger['kind'], ReadonlySet<string> | null> = {
    reagent: new Set(reagents.map(({ name }) => name)),
    role: new Set(reagents.flatMap(({ roles }) => roles)),
    solvent: new Set(solvents.map(({ name }) => name)),
    kind: new Set(solvents.map(({ kind }) => kind)),
    group: null,
  };
  const faults = cautions.flatMap(({ id, first, second }) =>
    [...first, ...second]
      .filter(({ kind, name }) => known[kind]?.has(name) === false)
      .map(({ kind, name }) => `cautions.csv: ${id} speaks of ${kind}:${name}, which no table holds`),
  );
  if (faults.length !== 0) throw new TableFault(faults.join('\n'));
}

interface ChosenTables extends TriggeredTables {
  readonly choices: readonly Pick<ChoiceRow, 'what' | 'usedIn' | 'attacks'>[];
  readonly electrophiles: readonly { readonly id: string }[];
}

/** The same for what may be proposed. */
function refuseUnknownChoices({ solvents, reagents, choices, electrophiles }: ChosenTables): void {
  const known = new Set([
    ...reagents.flatMap(({ name, roles }) => [`reagent:${name}`, ...roles.map((role) => `role:${role}`)]),
    ...solvents.map(({ name }) => `solvent:${name}`),
  ]);
  const places = new Set(solvents.flatMap(({ name, kind }) => [name, kind]));
  const groups = new Set(electrophiles.map(({ id }) => id));
  const faults = choices.flatMap(({ what, usedIn, attacks }) => [
    ...(known.has(what) ? [] : [`choices.csv: ${what} is in no table`]),
    ...usedIn
      .filter((place) => !places.has(place))
      .map((place) => `choices.csv: ${what} in unknown ${place}`),
    ...attacks.filter((id) => !groups.has(id)).map((id) => `choices.csv: ${what} attacks unknown ${id}`),
  ]);
  if (faults.length !== 0) throw new TableFault(faults.join('\n'));
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
