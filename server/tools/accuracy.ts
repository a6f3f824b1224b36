/**
 * States how well constants are estimated, against files of measured values that are no part of the project.
 *
 * Run: `npm run accuracy [-- FILE] [--other FILE] [--worst N] [--unseen]`. FILE holds values in water, the other one in
 * further solvents; without them the usual place beside the checkout is tried. Prints for each set and class: number, share
 * covered, mean absolute error, root mean square, shares within 0.5, 1.0 and 1.64 sd, from estimates alone and with the
 * project's tables of measured values. `--unseen` fits the estimator anew (a minute) to predict whole scaffolds that
 * are left out of the fit. Values in DMSO are those of the project's own table, each left out of the fit that predicts it.
 */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import type { ScaleId } from '../src/tables/rows.ts';
import { readTables } from '../src/tables/tables.ts';
import { leftOutInDmso } from './activation-fit.ts';
import { type CalibrationRow, familyFits, readCalibration } from './calibration.ts';
import { judge, type Reference, type Verdict } from './judge-tables.ts';
import { otherValues, ownValues } from './other-values.ts';
import { moleculeKey, readParents } from './rule-sites.ts';
import { figures, HEADER, type Met } from './statistics.ts';
import { fitWater, type Item, novelty, scaffoldsLeftOut, target } from './water-fit.ts';

// A reader that has seen enough, such as `head`, closes the pipe.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});

const { values: options, positionals } = parseArgs({
  allowPositionals: true,
  options: {
    other: { type: 'string' },
    worst: { type: 'string', default: '20' },
    unseen: { type: 'boolean', default: false },
  },
});
const root = process.cwd();
const beside = (name: string) => join(root, '..', 'shared', 'values', name);
const file = positionals[0] ?? beside('water_calibration.csv');
const other = options.other ?? beside('nonaqueous_calibration.csv');
const tables = readTables(JSON.parse(readFileSync(join(root, 'server/generated/tables.json'), 'utf8')));

if (existsSync(file)) reportWater(file);
else print(`No file of measured values in water at ${file}: nothing to compare with.`);
if (options.unseen && existsSync(file)) reportUnseen(file);
reportDmso();
reportOwn();
if (existsSync(other)) reportOther(other);
else print(`No file of measured values in other solvents at ${other}: nothing to compare with.`);

function reportWater(path: string): void {
  const used = new Set(readParents(join(root, 'data/frames.csv')).map(({ smiles }) => moleculeKey(smiles)));
  const verdicts = readCalibration(path)
    // A molecule kept aside whose published constant the fit has used tells nothing.
    .filter(({ singleSite, heldOut, smiles }) => singleSite && !(heldOut && used.has(moleculeKey(smiles))))
    .map((row) =>
      judge({ ...row, scale: 'water', fits: (family: string) => familyFits(row, family) }, tables),
    );
  const fitted = verdicts.filter(({ reference }) => !reference.heldOut);
  const aside = verdicts.filter(({ reference }) => reference.heldOut);
  const frames = new Set(fitted.map(({ frame }) => frame));
  const scaffolds = new Set(fitted.map(({ scaffold }) => scaffold));
  print('Water, one-site molecules, estimate only', HEADER);
  print(figures('molecules of the fit', fitted.map(estimate)));
  print(figures('kept aside', aside.map(estimate)));
  const among = (title: string, holds: (verdict: (typeof aside)[number]) => boolean) =>
    print(figures(`  ${title}`, aside.filter(holds).map(estimate)));
  among('frame seen', ({ frame }) => frames.has(frame));
  among('frame not seen', ({ frame }) => !frames.has(frame));
  among('scaffold seen', ({ scaffold }) => scaffolds.has(scaffold));
  among('scaffold not seen', ({ scaffold }) => !scaffolds.has(scaffold));
  print('', 'Water, one-site molecules, with the tables', HEADER);
  print(figures('all', verdicts.map(tabled)), figures('kept aside', aside.map(tabled)));
  const classOf = ({ reference }: Verdict<CalibrationRow & Reference>) => reference.siteClass;
  print('', 'Water by class, kept aside, estimate only', HEADER, ...byClass(aside, classOf, estimate));
  print('', 'Water by class, all, estimate only', HEADER, ...byClass(verdicts, classOf, estimate));
  print('', 'Water by class, all, with the tables', HEADER, ...byClass(verdicts, classOf, tabled));
  print('', `Worst ${options.worst} of those kept aside`);
  for (const { reference, estimated, group } of worst(aside, Number(options.worst))) {
    const said =
      estimated === null ? 'not at all' : `${estimated.value.toFixed(2)} ± ${estimated.sd.toFixed(2)}`;
    print(
      `  ${reference.smiles}  ${reference.pKa}  estimated ${said}  ${group} ${reference.flags.join('|')}`,
    );
  }
}

/** What scaffolds are worth that no molecule of the fit shows, from those that it has. */
function reportUnseen(path: string): void {
  const solved = fitWater(path, join(root, 'data'));
  const weight = tables.spreads.find(({ name }) => name === 'novelty')?.value ?? 1;
  const floor = new Map(tables.spreads.map(({ name, value }) => [name, value]));
  const met = (item: Item, error: number, doubt: number) => {
    const { kind, family } = item.chosen.site;
    const sd = Math.sqrt((floor.get(`${kind[0]}.${family}`) ?? 1) ** 2 + weight * doubt);
    return { family, error, sd };
  };
  const unseen = scaffoldsLeftOut(solved).map(({ item, error, novelty }) => met(item, error, novelty));
  const single = solved.used.flatMap((item, k) => {
    const error = target(item) - solved.fit.leftOut[k]!;
    return item.row?.singleSite ? [met(item, error, novelty(item.chosen, solved.counts, 1))] : [];
  });
  print('', 'Water, left out of the fit, estimate only', HEADER);
  print(figures('molecules one by one', single), figures('whole scaffolds', unseen));
  print(
    ...byClass(
      unseen,
      ({ family }) => family,
      (one) => one,
    ),
  );
}

function reportDmso(): void {
  print('', 'DMSO, values of the table left out of the fit in turn', HEADER);
  const floors = { C: spread('C'), N: spread('N') };
  for (const centre of ['C', 'N'] as const) {
    const misses = leftOutInDmso(centre, tables).map(({ point, error }) => ({
      group: point.group,
      error,
      sd: floors[centre],
    }));
    print(figures(centre === 'C' ? 'carbon acids' : 'N–H acids', misses));
    print(
      ...byClass(
        misses,
        ({ group }) => group,
        (one) => one,
      ).slice(0, 15),
    );
  }
}

function spread(centre: 'C' | 'N'): number {
  return tables.activation.find((row) => row.centre === centre && row.name === '(spread)')?.field ?? 2;
}

function reportOwn(): void {
  for (const scale of ['DMSO', 'MeCN', 'THF']) {
    const verdicts = ownValues(scale, tables);
    print(
      '',
      `${scale}, values of the table, estimate only (lines between scales were fitted to them)`,
      HEADER,
    );
    print(
      figures('all', verdicts),
      ...byClass(
        verdicts,
        ({ family }) => family,
        (one) => one,
      ),
    );
  }
}

function reportOther(path: string): void {
  const references = otherValues(path, tables);
  print('', 'Other solvents, estimate only', HEADER);
  const verdicts = references.map((reference) => judge(reference, tables));
  print(figures('all', verdicts.map(estimate)));
  const scaleOf = ({ reference }: Verdict<Reference>): ScaleId => reference.scale;
  print(...byClass(verdicts, scaleOf, estimate));
  print('', 'Other solvents, with the tables', HEADER, ...byClass(verdicts, scaleOf, tabled));
}

function estimate({ reference, estimated }: Verdict<Reference>): Met {
  return { error: estimated === null ? null : estimated.value - reference.pKa, sd: estimated?.sd ?? 0 };
}

function tabled({ reference, withTables }: Verdict<Reference>): Met {
  return { error: withTables === null ? null : withTables.value - reference.pKa, sd: withTables?.sd ?? 0 };
}

/** One line for each class, the largest first. */
function byClass<T>(list: readonly T[], classOf: (one: T) => string, met: (one: T) => Met): string[] {
  const classes = new Map<string, T[]>();
  for (const one of list) {
    const name = classOf(one);
    const known = classes.get(name);
    if (known === undefined) classes.set(name, [one]);
    else known.push(one);
  }
  return [...classes]
    .sort((a, b) => b[1].length - a[1].length)
    .map(([name, members]) => figures(`  ${name}`, members.map(met)));
}

function worst<R extends Reference>(list: readonly Verdict<R>[], count: number): Verdict<R>[] {
  const size = (one: Verdict<R>) => Math.abs(estimate(one).error ?? Number.POSITIVE_INFINITY);
  return [...list].sort((a, b) => size(b) - size(a)).slice(0, count);
}

function print(...lines: readonly string[]): void {
  for (const line of lines) process.stdout.write(`${line}\n`);
}
