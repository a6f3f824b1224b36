/**
 * States how well constants in water are estimated, against a file of measured values that is no part of the project.
 *
 * Run: `npm run accuracy [-- FILE]`. Without a file the usual place beside the checkout is tried.
 * Prints, for molecules of the fit and for the fifth kept aside: number, coverage, mean absolute error, root mean
 * square, shares within 0.5 and 1.0, share inside 1.64 sd; by class; and the twenty worst.
 */
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { errorOf, type Judged, judgeFile } from './judge.ts';

const root = process.cwd();
const file = process.argv[2] ?? join(root, '..', 'shared', 'values', 'water_calibration.csv');
if (!existsSync(file)) {
  process.stdout.write(`No file of measured values at ${file}: nothing to compare with.\n`);
  process.exit(0);
}
const judged = judgeFile(file, join(root, 'data'));
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

function error(judged: Judged): number {
  return errorOf(judged) ?? Number.POSITIVE_INFINITY;
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
