/**
 * Compares the aqueous rows of `data/measured.csv` with an independent compilation and marks those that agree.
 *
 * Run: `node server/tools/run.mjs check-measured FILE [WORD]` with a file of aqueous values (see calibration.ts); WORD is
 * the name of the compilation as the table shall cite it. A row agrees when the file has a value of the same molecule and kind
 * within AGREEMENT; disagreements are printed, and a mark that no longer holds is taken away. No value is copied.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { moleculeKey } from './rule-sites.ts';

const AGREEMENT = 0.3;
const TABLE = 'data/measured.csv';

const [file, word = 'IUPAC Digitized pKa Dataset v1.0'] = process.argv.slice(2);
if (file === undefined) {
  process.stderr.write('Name the file of aqueous values to compare with.\n');
  process.exit(2);
}
const known = valuesByMolecule(file);
const [header, ...lines] = readFileSync(TABLE, 'utf8').trimEnd().split('\n');
let [checked, met] = [0, 0];
const marked = lines.map((line) => {
  const [cells] = parse(line) as string[][];
  const row = Object.fromEntries(header!.split(',').map((name, place) => [name, cells![place]!]));
  if (row.scale !== 'water') return line;
  const values = known
    .get(moleculeKey(row.smiles!))
    ?.filter(({ kind }) => kind === '' || kind === row.direction);
  if (values === undefined || values.length === 0) return line;
  met++;
  const off = (value: number) => Math.abs(value - Number(row.value));
  const nearest = values.map(({ value }) => value).sort((a, b) => off(a) - off(b))[0]!;
  const agrees = off(nearest) <= AGREEMENT + 1e-9;
  if (agrees) checked++;
  else
    process.stdout.write(
      `${row.name}  ${row.smiles}  step ${row.step || '-'}  table ${row.value}, compilation ${nearest}\n`,
    );
  cells![9] = agrees ? 'checked' : 'recalled';
  cells![10] = agrees ? word : '';
  return cells!.map(quoted).join(',');
});
writeFileSync(TABLE, `${[header, ...marked].join('\n')}\n`);
process.stdout.write(`${met} aqueous rows can be checked, ${checked} agree within ${AGREEMENT}\n`);

interface Value {
  /** Empty where the file leaves open whether it is an acid's or a base's. */
  readonly kind: string;
  readonly value: number;
}

function valuesByMolecule(path: string): ReadonlyMap<string, readonly Value[]> {
  const records = parse(readFileSync(path, 'utf8'), {
    columns: true,
    bom: true,
    relax_column_count: true,
  }) as Record<string, string>[];
  const found = new Map<string, Value[]>();
  for (const { smiles, pka, kind, zwitterion_risk } of records) {
    const key = moleculeKey(smiles!);
    // Of ampholytes each constant may be called either.
    const value = { kind: kind === 'unknown' || zwitterion_risk === '1' ? '' : kind!, value: Number(pka) };
    found.set(key, [...(found.get(key) ?? []), value]);
  }
  return found;
}

function quoted(cell: string): string {
  return /[",]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
