/**
 * Reads aqueous values to fit and to judge the estimator by; a file of values is an argument, never part of the project.
 *
 * Columns: smiles, pka, kind (acid, base), step, single_site, site_class, flags, zwitterion_risk, temperature_C.
 * Must not know: how estimates are made.
 */
import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';

export interface CalibrationRow {
  readonly smiles: string;
  readonly pKa: number;
  readonly kind: 'acid' | 'base';
  readonly singleSite: boolean;
  readonly siteClass: string;
  readonly flags: readonly string[];
  /** How far the conditions of the measurement are to be trusted, up to 1. */
  readonly weight: number;
  /** Kept aside from every fit. */
  readonly heldOut: boolean;
}

const TRUST: Readonly<Record<string, number>> = {
  acidity_function: 0.4,
  'cosolvent<=10%': 0.8,
  'calculated?': 0.4,
  extrap: 0.5,
  T_assumed: 0.8,
  'I>=0.1': 0.9,
};

/** The families of couples to which the file's site classes can belong. */
const FAMILIES: Readonly<Record<string, string>> = {
  carboxylic_acid: 'carboxylic-acid',
  diazine_triazine_N: 'pyridinium azolium',
  phenol: 'phenol',
  aniline: 'anilinium',
  pyridine_N: 'pyridinium',
  aliphatic_amine_tertiary: 'ammonium',
  aliphatic_amine_primary: 'ammonium',
  aliphatic_amine_secondary: 'ammonium',
  hydroxyheteroaryl: 'lactam phenol enol alcohol',
  phosphorus_acid: 'phosphoric phosphine-ph',
  imidazole_N: 'azolium pyridinium',
  imide: 'imide amide-nh',
  pyrazole_N: 'azolium',
  hydrazine: 'ammonium anilinium',
  lactam_NH_heteroaryl: 'lactam imide azole-nh amide-nh',
  azole_NH: 'azole-nh',
  imine: 'imine amidinium',
  exocyclic_imine_heteroaryl: 'imine amidinium',
  sulfonic_acid: 'sulfonic-acid',
  amidine: 'amidinium imine',
  carbon_acid_diactivated: 'carbon-acid',
  thiol: 'thiol',
  alcohol: 'alcohol',
  mercaptoheteroaryl: 'thiophenol thiol',
  carbon_acid_nitro: 'carbon-acid',
  thiophenol: 'thiophenol',
  sulfonamide: 'sulfonamide',
  thiazole_oxazole_N: 'azolium',
  isourea_isothiourea: 'imine amidinium',
  oxime: 'oxime',
  vinylogous_lactam_NH: 'lactam aniline-nh amide-nh',
  triazole_N: 'azolium',
  guanidine: 'amidinium',
  As_Se_Te_acid: 'phosphoric thiol sulfonic-acid',
  aryl_NH_activated: 'aniline-nh',
  enol: 'enol carbon-acid',
  hydroxamic_acid: 'hydroxamic',
  amidoxime_oxime_hydrazone_N: 'imine amidinium',
  amide_NH: 'amide-nh',
  thio_acid: 'thiophenol thiol',
  tetrazole_N: 'azolium',
  purine_NH: 'azole-nh',
  diarylamine: 'anilinium',
  aryl_or_azole_NH: 'aniline-nh azole-nh',
  enamine: 'imine ammonium',
  sulfinic_acid: 'sulfonic-acid',
  peroxy_acid_hydroperoxide: 'peracid',
  triazole_NH: 'azole-nh',
  acyl_hydrazide_urea_NH: 'amide-nh',
  thioamide_thiourea_NH: 'amide-nh',
  azadiazole_N: 'azolium pyridinium',
  selenol: 'thiol',
  isoxazole_isothiazole_N: 'azolium',
  N_acylsulfonamide: 'sulfonamide',
  N_hydroxy: 'hydroxamic',
  N_halo_amine: 'ammonium',
  hydroxylamine_N: 'ammonium',
  phosphine: 'phosphonium',
  boronic_acid: 'boronic-acid',
};

/** Whether a couple's family is one to which the row's site can belong. */
export function familyFits(row: CalibrationRow, family: string): boolean {
  return (FAMILIES[row.siteClass] ?? '').split(' ').includes(family);
}

interface Record_ {
  readonly [column: string]: string;
}

/** One-site molecules, and of others the step that leaves every other site neutral. */
export function readCalibration(file: string): CalibrationRow[] {
  const records = (
    parse(readFileSync(file, 'utf8'), { columns: true, bom: true, relax_column_count: true }) as Record_[]
  ).map(asMeasured);
  const outermost = new Map<string, number>();
  for (const record of records) {
    const key = `${record.kind} ${record.smiles}`;
    const value = Number(record.pka);
    const known = outermost.get(key);
    if (known === undefined || (record.kind === 'base' ? known < value : value < known))
      outermost.set(key, value);
  }
  return records
    .filter((record) => isSingle(record) || isFirstStep(record, outermost))
    .map((record) => {
      const flags = record.flags!.split('|').filter((flag) => flag !== '');
      const season = Math.abs(Number(record.temperature_C) - 25) <= 8 ? 1 : 0.8;
      return {
        smiles: record.smiles!,
        pKa: Number(record.pka),
        kind: record.kind === 'base' ? 'base' : 'acid',
        singleSite: isSingle(record),
        siteClass: record.site_class!,
        flags,
        weight: flags.reduce(
          (weight, flag) => weight * (TRUST[flag] ?? 1),
          season * (isSingle(record) ? 1 : 0.5),
        ),
        heldOut: isHeldOut(record.smiles!),
      };
    });
}

/** A fifth of all molecules, by the hash of their text, takes no part in any fit. */
export function isHeldOut(smiles: string): boolean {
  return Number(BigInt(`0x${createHash('md5').update(smiles).digest('hex')}`) % 5n) === 0;
}

/** A first constant that is called a base's is an acid's: the constants of bases are named after the conjugate acid. */
function asMeasured(record: Record_): Record_ {
  return record.kind === 'base' && record.pka_type?.startsWith('pK1') ? { ...record, kind: 'acid' } : record;
}

function isSingle(record: Record_): boolean {
  return record.single_site === '1';
}

function isFirstStep(record: Record_, outermost: ReadonlyMap<string, number>): boolean {
  const value = Number(record.pka);
  if (record.zwitterion_risk === '1' || record.step !== '1' || value < -2) return false;
  if (/P|O=S\(=O\)\(O\)|S\(=O\)\(=O\)O/.test(record.smiles!)) return false;
  return outermost.get(`${record.kind} ${record.smiles}`) === value;
}
