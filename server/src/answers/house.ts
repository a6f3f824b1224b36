/**
 * A house's own rows: measured constants, reagents and solvents from CSV files with the columns of the tables.
 *
 * Knows: text, schemas, tables.  Must not know: where a file is.
 * Invariants:                                                              (tests/answers/house.test.ts)
 *  1. Never throws; a line with a fault brings no row and has its fault reported at that line.
 *  2. A house row stands before every row of the tables with the same name or the same molecule.
 */
import measuredSchema from '../../../data/schema/measured.json' with { type: 'json' };
import reagentSchema from '../../../data/schema/reagents.json' with { type: 'json' };
import solventSchema from '../../../data/schema/solvents.json' with { type: 'json' };
import { markedSite, substanceIdentity } from '../chemistry/row-keys.ts';
import type { TextProblem } from '../route/plan.ts';
import { foldName } from '../tables/fold-name.ts';
import type { MeasuredRow, ReagentRow, SolventRow } from '../tables/rows.ts';
import type { HouseRows, Tables } from '../tables/tables.ts';
import { type Cell, type Row, type RowFault, readRows, type Schema } from './csv-rows.ts';

export type HouseKind = 'values' | 'reagents' | 'solvents';

/** One file as the configuration names it. */
export interface HouseFile {
  readonly kind: HouseKind;
  readonly file: string;
  readonly text: string;
}

/** Columns that the tables must fill and a house may leave out. */
const OPTIONAL = new Set(['sources', 'basis', 'sd', 'scale_sd', 'checked_against']);
/** sd of a value that names none, as for those written into plans. */
const USUAL_SD = 0.1;
const USUAL_SCALE_SD = 0.5;

const SCHEMAS: Readonly<Record<HouseKind, Schema>> = {
  values: lenient(measuredSchema as Schema),
  reagents: lenient(reagentSchema as Schema),
  solvents: lenient(solventSchema as Schema),
};

/** The rows of all files in their order, and the problems of each file under its name. */
export function readHouse(
  files: readonly HouseFile[],
  tables: Tables,
): { rows: HouseRows; problems: ReadonlyMap<string, readonly TextProblem[]> } {
  const rows = { measured: [] as MeasuredRow[], reagents: [] as ReagentRow[], solvents: [] as SolventRow[] };
  const problems = new Map<string, TextProblem[]>();
  const names = new Map<string, string>();
  for (const { kind, file, text } of files) {
    const read = readRows(text, SCHEMAS[kind], 'named');
    const faults = [...read.faults];
    for (const row of read.rows) {
      const fault = add(kind, row, file, rows, tables, names);
      if (fault !== null) faults.push(fault);
    }
    problems.set(
      file,
      faults.sort((a, b) => a.line - b.line).map((fault) => problemAt(fault, text)),
    );
  }
  return { rows, problems };
}

/** Adds what a row says; answers with what is wrong with it. */
function add(
  kind: HouseKind,
  { line, cells }: Row,
  file: string,
  rows: { measured: MeasuredRow[]; reagents: ReagentRow[]; solvents: SolventRow[] },
  tables: Tables,
  names: Map<string, string>,
): RowFault | null {
  const sources = listOf(cells.sources);
  const own = {
    ...cells,
    sources: sources.length === 0 ? [file] : sources,
    basis: cells.basis ?? 'recalled',
  };
  try {
    if (kind === 'values') {
      refuseUnknownScale(String(cells.scale), tables);
      const { key, classes } = markedSite(String(cells.smiles));
      const sd = cells.sd ?? USUAL_SD;
      rows.measured.push({ ...own, sd, key, classes, house: true } as unknown as MeasuredRow);
      return null;
    }
    refuseTakenNames(kind, cells, names);
    const { key, mass } =
      typeof cells.smiles === 'string' ? substanceIdentity(cells.smiles) : { key: null, mass: null };
    if (kind === 'reagents') {
      rows.reagents.push({ ...own, key, molarMass: cells.molarMass ?? mass } as unknown as ReagentRow);
    } else {
      refuseUnknownScale(String(cells.scale), tables);
      const scaleSd = cells.scaleSd ?? USUAL_SCALE_SD;
      rows.solvents.push({ ...own, key, scaleSd } as unknown as SolventRow);
    }
    return null;
  } catch (error) {
    return { line, column: null, message: (error as Error).message };
  }
}

function refuseUnknownScale(scale: string, { solvents, scales, measured }: Tables): void {
  const known = new Set([
    ...solvents.map((row) => row.scale),
    ...scales.flatMap(({ from, to }) => [from, to]),
    ...measured.map((row) => row.scale),
  ]);
  if (!known.has(scale))
    throw new Error(`scale "${scale}" is not known; possible are ${[...known].sort().join(', ')}`);
}

function refuseTakenNames(kind: HouseKind, cells: Row['cells'], names: Map<string, string>): void {
  const name = String(cells.name);
  for (const word of new Set([name, ...listOf(cells.synonyms)].map(foldName))) {
    const key = `${kind} ${word}`;
    const other = names.get(key);
    if (other !== undefined) throw new Error(`"${name}" and "${other}" are one name to a reader of plans`);
    names.set(key, name);
  }
}

function listOf(cell: Cell | undefined): readonly string[] {
  return Array.isArray(cell) ? (cell as readonly string[]) : [];
}

function problemAt({ line, message }: RowFault, text: string): TextProblem {
  const width = (text.split(/\r\n|\n|\r/)[line - 1] ?? '').length;
  const range = {
    start: { line: line - 1, character: 0 },
    end: { line: line - 1, character: Math.max(1, width) },
  };
  return { check: 'bad-configuration', range, message: `This line brings nothing: ${message}.` };
}

function lenient(schema: Schema): Schema {
  const columns = Object.entries(schema.columns).map(([name, column]) => [
    name,
    OPTIONAL.has(name) ? { ...column, required: false } : column,
  ]);
  return { ...schema, columns: Object.fromEntries(columns) };
}
