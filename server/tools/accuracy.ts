/**
 * States how well constants in water are estimated, against a file of measured values that is no part of the project.
 *
 * Run: `npm run accuracy [-- FILE]`. Without a file the usual place beside the checkout is tried.
 * Prints, for molecules of the fit and for the fifth kept aside: number, coverage, mean absolute error, root mean
 * square, shares within 0.5 and 1.0, share inside 1.64 sd; by class; and the twenty worst.
 */
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { estimateInWater } from '../src/chemistry/estimate.ts';
import { type CalibrationRow, familyFits, readCalibration } from './calibration.ts';
import { moleculeKey, readEstimatorTables, readParents, readRules, sitesByRule } from './rule-sites.ts';
import { siteFrame } from './site-frame.ts';

interface Judged {
  readonly row: CalibrationRow;
  readonly frame: string;
  readonly group: string;
  readonly value: number | null;
  readonly sd: number;
}

const root = process.cwd();
const file = process.argv[2] ?? join(root, '../shared/values/water_calibration.csv');
if (!existsSync(file)) {
  process.stdout.write(`No file of measured values at ${file}: nothing to compare with.\n`);
  process.exit(0);
}
const rules = readRules(join(root, 'data/groups.csv'));
const tables = readEstimatorTables(join(root, 'data'), rules);
// Molecules whose published constant the fit has used cannot judge it.
const used = new Set(readParents(join(root, 'data/frames.csv')).map(({ smiles }) => moleculeKey(smiles)));
const judged = readCalibration(file)
  .filter(({ singleSite, heldOut, smiles }) => singleSite && !(heldOut && used.has(moleculeKey(smiles))))
  .map(judge);
const seen = new Set(judged.filter(({ row }) => !row.heldOut).map(({ frame }) => frame));
const aside = judged.filter(({ row }) => row.heldOut);

print(
  'molecules of the fit',
  judged.filter(({ row }) => !row.heldOut),
);
print('kept aside', aside);
print(
  'kept aside, frame seen',
  aside.filter(({ frame }) => seen.has(frame)),
);
print(
  'kept aside, frame not seen',
  aside.filter(({ frame }) => !seen.has(frame)),
);
for (const name of [...new Set(judged.map(({ row }) => row.siteClass))].sort(bySize)) {
  print(
    `  ${name}`,
    judged.filter(({ row }) => row.siteClass === name),
  );
}
process.stdout.write('\nworst of those kept aside\n');
for (const { row, value, sd, group } of [...aside].sort((a, b) => error(b) - error(a)).slice(0, 20)) {
  process.stdout.write(
    `  ${row.smiles}  ${row.pKa}  estimated ${value?.toFixed(2) ?? 'not at all'} ± ${sd.toFixed(2)}  ${group} ${row.flags.join('|')}\n`,
  );
}

/** The outermost of the sites that are of the row's kind, among those of its class where there are any. */
function judge(row: CalibrationRow): Judged {
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

function error({ row, value }: Judged): number {
  return value === null ? 99 : Math.abs(value - row.pKa);
}

function bySize(a: string, b: string): number {
  const count = (name: string) => judged.filter(({ row }) => row.siteClass === name).length;
  return count(b) - count(a);
}

function print(title: string, list: readonly Judged[]): void {
  const found = list.filter(({ value }) => value !== null);
  const errors = found.map(error).sort((a, b) => a - b);
  const share = (count: number) => `${Math.round((100 * count) / Math.max(1, errors.length))} %`;
  const mean = errors.reduce((sum, one) => sum + one, 0) / errors.length;
  const square = Math.sqrt(errors.reduce((sum, one) => sum + one ** 2, 0) / errors.length);
  const inside = found.filter((one) => error(one) <= 1.64 * one.sd).length;
  const cells = [
    title.padEnd(34),
    `n ${String(list.length).padStart(4)}`,
    `covered ${Math.round((100 * errors.length) / Math.max(1, list.length))} %`,
    `mean ${mean.toFixed(2)}`,
    `median ${(errors[errors.length >> 1] ?? 0).toFixed(2)}`,
    `rms ${square.toFixed(2)}`,
    `≤0.5 ${share(errors.filter((one) => one <= 0.5).length)}`,
    `≤1 ${share(errors.filter((one) => one <= 1).length)}`,
    `inside 1.64 sd ${share(inside)}`,
  ];
  process.stdout.write(`${cells.join('  ')}\n`);
}
