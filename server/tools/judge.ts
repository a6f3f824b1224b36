/**
 * Holds estimates in water against measured values of one-site molecules.
 *
 * Must not know: how estimates are made.
 */
import { join } from 'node:path';
import { type EstimatorTables, estimateInWater } from '../src/chemistry/estimate.ts';
import { type CalibrationRow, familyFits, readCalibration } from './calibration.ts';
import {
  moleculeKey,
  type Rule,
  readEstimatorTables,
  readParents,
  readRules,
  sitesByRule,
} from './rule-sites.ts';
import { siteFrame } from './site-frame.ts';

export interface Judged {
  readonly row: CalibrationRow;
  readonly frame: string;
  readonly group: string;
  readonly value: number | null;
  readonly sd: number;
}

/** Every one-site molecule of a file with its estimate; held-out molecules whose published constant the fit has used are left out. */
export function judgeFile(file: string, data: string): Judged[] {
  const rules = readRules(join(data, 'groups.csv'));
  const tables = readEstimatorTables(data, rules);
  const used = new Set(readParents(join(data, 'frames.csv')).map(({ smiles }) => moleculeKey(smiles)));
  return readCalibration(file)
    .filter(({ singleSite, heldOut, smiles }) => singleSite && !(heldOut && used.has(moleculeKey(smiles))))
    .map((row) => judge(row, rules, tables));
}

/** How far an estimate is off; null where there is none. */
export function errorOf({ row, value }: Judged): number | null {
  return value === null ? null : Math.abs(value - row.pKa);
}

/** The outermost of the sites that are of the row's kind, among those of its class where there are any. */
function judge(row: CalibrationRow, rules: readonly Rule[], tables: EstimatorTables): Judged {
  const nothing = { row, frame: '', group: '', value: null, sd: 0 };
  const found = sitesByRule(row.smiles, rules);
  if (found === null) return nothing;
  const ofKind = found.sites.filter(({ kind }) => kind === row.kind);
  const fitting = ofKind.filter(({ family }) => familyFits(row, family));
  const sign = row.kind === 'base' ? 1 : -1;
  let best: Judged = nothing;
  for (const site of fitting.length === 0 ? ofKind : fitting) {
    const constant = estimateInWater(found.graph, site, site.equivalents, tables);
    if (constant === null) continue;
    if (best.value !== null && sign * constant.value <= sign * best.value) continue;
    best = {
      row,
      frame: siteFrame(found.graph, site),
      group: site.group,
      value: constant.value,
      sd: constant.sd,
    };
  }
  return best;
}
