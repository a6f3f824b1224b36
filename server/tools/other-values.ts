/**
 * Measured values outside water: those of the project's own table, and those of a file.
 *
 * Columns of the file: smiles, pka, kind (acid, base), solvent, pka_type.
 */
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { constantsIn } from '../src/chemistry/constants.ts';
import { measuredConstants } from '../src/chemistry/measured.ts';
import { perceive } from '../src/chemistry/perceive.ts';
import { scaleIds } from '../src/chemistry/scales.ts';
import type { ScaleId } from '../src/tables/rows.ts';
import type { Tables } from '../src/tables/tables.ts';
import type { Reference } from './judge-tables.ts';
import type { Met } from './statistics.ts';

/** How the estimates meet every value of the table on one scale that is no step of several. */
export function ownValues(scale: ScaleId, tables: Tables): (Met & { readonly family: string })[] {
  const seen = new Set<string>();
  return tables.measured.flatMap(({ smiles, key }) => {
    if (seen.has(key)) return [];
    seen.add(key);
    const molecule = perceive(smiles, tables);
    const estimates = constantsIn(molecule, scale, tables, { estimateOnly: true }).couples;
    return measuredConstants(molecule, tables).flatMap(({ couple, step, constant }) => {
      if (constant.scale !== scale || step !== null) return [];
      const said = estimates[couple];
      const error = said == null ? null : said.value - constant.value;
      return [{ family: molecule.couples[couple]!.family, error, sd: said?.sd ?? 0 }];
    });
  });
}

/** Names of the file for solvents that the tables write otherwise. */
const SCALES: Readonly<Record<string, string>> = { DMA: 'DMAc', MiBK: 'MIBK' };

/** First constants of the molecules of a file, on scales that the tables know. */
export function otherValues(file: string, tables: Tables): Reference[] {
  const known = new Map(scaleIds(tables).map((id) => [id.toLowerCase(), id]));
  const records = parse(readFileSync(file, 'utf8'), { columns: true, bom: true }) as Record<string, string>[];
  return records.flatMap((record) => {
    const name = SCALES[record.solvent!] ?? record.solvent!;
    const scale = known.get(name.toLowerCase()) ?? tables.solventByName.get(name.toLowerCase())?.scale;
    if (scale === undefined || record.pka_type!.endsWith('2')) return [];
    const kind = record.kind === 'base' ? 'base' : 'acid';
    return [{ smiles: record.smiles!, kind, pKa: Number(record.pka), scale, fits: () => true }];
  });
}
