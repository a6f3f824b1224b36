/**
 * All tables as the program holds them, with the indexes that look-ups need.
 *
 * Knows: rows.  Must not know: what they mean, where they are stored.
 * Invariant: reading works out no key and parses no pattern; the build has done both.
 */
import { foldName } from './fold-name.ts';
import type {
  ActivationRow,
  CautionRow,
  ChoiceRow,
  ElectrophileRow,
  EnthalpyRow,
  GasRow,
  GroupRow,
  HeatRow,
  HydrideRow,
  KineticsRow,
  LimitRow,
  MeasuredRow,
  ReagentRow,
  ScaleRow,
  SolventRow,
  SourceRow,
  SpreadRow,
  StabilityRow,
  SubstituentRow,
  TermRow,
} from './rows.ts';

interface Built {
  readonly version: string;
  readonly activation: readonly ActivationRow[];
  readonly groups: readonly GroupRow[];
  readonly substituents: readonly SubstituentRow[];
  readonly terms: readonly TermRow[];
  readonly spreads: readonly SpreadRow[];
  readonly measured: readonly MeasuredRow[];
  readonly scales: readonly ScaleRow[];
  readonly solvents: readonly SolventRow[];
  readonly reagents: readonly ReagentRow[];
  readonly cautions: readonly CautionRow[];
  readonly limits: readonly LimitRow[];
  readonly stability: readonly StabilityRow[];
  readonly kinetics: readonly KineticsRow[];
  readonly heats: readonly HeatRow[];
  readonly enthalpies: readonly EnthalpyRow[];
  readonly gases: readonly GasRow[];
  readonly hydrides: readonly HydrideRow[];
  readonly choices: readonly ChoiceRow[];
  readonly electrophiles: readonly ElectrophileRow[];
  readonly sources: readonly SourceRow[];
}

/** A table as the build writes it: the names of the columns once, then the cells of each row in their order. */
export interface FoldedTable {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly unknown[])[];
}

/** The different parts of all patterns, each written once. */
export interface PatternPool {
  readonly atoms: unknown[];
  readonly bonds: unknown[];
}

/** A pattern by the places of its parts in the pool. */
export interface FoldedPattern {
  readonly atoms: readonly number[];
  readonly bonds: readonly number[];
}

export interface Tables extends Built {
  readonly reagentByName: ReadonlyMap<string, ReagentRow>;
  readonly solventByName: ReadonlyMap<string, SolventRow>;
  readonly reagentByKey: ReadonlyMap<string, ReagentRow>;
  readonly solventByKey: ReadonlyMap<string, SolventRow>;
  /** One way of writing each folded name. */
  readonly nameByFolded: ReadonlyMap<string, string>;
  /** Words of the longest name. */
  readonly longestName: number;
  readonly measuredByKey: ReadonlyMap<string, readonly MeasuredRow[]>;
  readonly groupById: ReadonlyMap<string, GroupRow>;
  readonly sourceById: ReadonlyMap<string, SourceRow>;
}

/** Indexes the generated tables. */
export function readTables(json: unknown): Tables {
  return indexed(unfolded(json as Readonly<Record<string, unknown>>));
}

/** Rows of a house's own, which come before those of the tables. */
export interface HouseRows {
  readonly measured: readonly MeasuredRow[];
  readonly reagents: readonly ReagentRow[];
  readonly solvents: readonly SolventRow[];
}

/** The tables with the house's own rows in front; `mark` tells this set of rows from every other. */
export function withHouseRows(
  tables: Tables,
  { measured, reagents, solvents }: HouseRows,
  mark: string,
): Tables {
  return indexed({
    ...tables,
    version: `${tables.version}+${mark}`,
    measured: [...measured, ...tables.measured],
    reagents: [...reagents, ...tables.reagents],
    solvents: [...solvents, ...tables.solvents],
  });
}

/** Where two rows share a name or a key, the first one holds. */
function indexed(built: Built): Tables {
  const nameByFolded = new Map<string, string>();
  let longestName = 1;
  const byName = <Row extends { name: string; synonyms: readonly string[] }>(rows: readonly Row[]) => {
    const index = new Map<string, Row>();
    for (const row of rows) {
      for (const name of [row.name, ...row.synonyms]) {
        const folded = foldName(name);
        if (!index.has(folded)) index.set(folded, row);
        if (!nameByFolded.has(folded)) nameByFolded.set(folded, name);
        longestName = Math.max(longestName, name.split(/\s+/).length);
      }
    }
    return index;
  };
  const byKey = <Row extends { key: string | null }>(rows: readonly Row[]) => {
    const index = new Map<string, Row>();
    for (const row of rows) if (row.key !== null && !index.has(row.key)) index.set(row.key, row);
    return index;
  };
  const measuredByKey = new Map<string, MeasuredRow[]>();
  for (const row of built.measured) {
    const list = measuredByKey.get(row.key);
    if (list === undefined) measuredByKey.set(row.key, [row]);
    else list.push(row);
  }
  const reagentByName = byName(built.reagents);
  const solventByName = byName(built.solvents);
  return {
    ...built,
    reagentByName,
    solventByName,
    reagentByKey: byKey(built.reagents),
    solventByKey: byKey(built.solvents),
    nameByFolded,
    longestName,
    measuredByKey,
    groupById: new Map(built.groups.map((row) => [row.id, row])),
    sourceById: new Map(built.sources.map((row) => [row.id, row])),
  };
}

function unfolded({ patternParts, ...json }: Readonly<Record<string, unknown>>): Built {
  const tables = Object.entries(json).map(([name, table]) => [
    name,
    isFolded(table) ? rowsOf(table, patternParts as PatternPool) : table,
  ]);
  return Object.fromEntries(tables) as Built;
}

function isFolded(table: unknown): table is FoldedTable {
  return typeof table === 'object' && table !== null && 'columns' in table;
}

function rowsOf({ columns, rows }: FoldedTable, pool: PatternPool): unknown[] {
  return rows.map((cells) => {
    const row: Record<string, unknown> = {};
    columns.forEach((column, place) => {
      const cell = cells[place];
      row[column] = column === 'pattern' && cell != null ? patternOf(cell as FoldedPattern, pool) : cell;
    });
    return row;
  });
}

function patternOf({ atoms, bonds }: FoldedPattern, pool: PatternPool): unknown {
  return { atoms: atoms.map((place) => pool.atoms[place]), bonds: bonds.map((place) => pool.bonds[place]) };
}
