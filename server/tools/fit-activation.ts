/**
 * Fits what activating groups are worth in DMSO to `data/measured.csv` and writes `data/activation.csv`.
 *
 * `node server/tools/run.mjs fit-activation` reads the built tables; it prints how far off each molecule is when it and
 * a tenth of the others are left out of the fit, which is the honest measure of the estimator.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import {
  activatedValue,
  type Centre,
  LIMIT,
  PARENT,
  pairsOf,
  SCREENING,
  SPREAD,
  WELL_KNOWN,
} from '../src/chemistry/carbon-acids.ts';
import { readTables } from '../src/tables/tables.ts';
import {
  commonPairs,
  fit,
  leftOutInDmso,
  type Miss,
  modelOf,
  onlyKnown,
  pointsOf,
  unknownsOf,
} from './activation-fit.ts';
import { PRIORS } from './activation-priors.ts';

const tables = readTables(JSON.parse(readFileSync('server/generated/tables.json', 'utf8')));
const lines = ['centre,name,field,resonance,sigma,n,sources,basis,note'];
for (const centre of ['C', 'N'] as const) lines.push(...fitCentre(centre));
writeFileSync('data/activation.csv', `${lines.join('\n')}\n`);

function fitCentre(centre: Centre): string[] {
  const { points, unnamed } = pointsOf(centre, tables);
  if (unnamed.length !== 0) process.stdout.write(`without prior: ${unnamed.join(', ')}\n`);
  const unknowns = unknownsOf(centre, points);
  const errors = leftOutInDmso(centre, tables);
  report(centre, errors);
  const found = fit(centre, points, unknowns);
  const model = modelOf(centre, unknowns, found);
  const inside = mean(
    points.map(({ activators, value }) => Math.abs(activatedValue(activators, model) - value)),
  );
  process.stdout.write(`  ${inside.toFixed(2)} with all in the fit\n`);
  const sorted = onlyKnown(errors)
    .map(({ error }) => Math.abs(error))
    .sort((a, b) => a - b);
  // Nine in ten of the errors left out lie inside 1.64 sd.
  const spread = (sorted[Math.floor(0.9 * sorted.length)] ?? 1.5) / 1.64;
  const count = (name: string) =>
    points.filter(
      ({ activators }) => activators.some((one) => one.name === name) || pairsOf(activators).includes(name),
    ).length;
  const special = (name: string, value: number, note: string) =>
    `${centre},${name},${value.toFixed(2)},0,0,${points.length},bordwell-1988,derived,${note}`;
  return [
    special(PARENT, model.parent, centre === 'C' ? 'methane' : 'ammonia'),
    special(LIMIT, model.limit, 'what resonance alone can reach'),
    special(SCREENING, model.screening, 'resonance that leaves 1/e of the field'),
    special(
      SPREAD,
      spread,
      `from molecules left out in turn: ${mean(sorted).toFixed(2)} mean absolute error of ${sorted.length} whose groups are well known`,
    ),
    ...[...Object.keys(PRIORS[centre]), ...commonPairs(points)].map((name) => {
      const { field, resonance, sigma } = model.groups.get(name)!;
      const n = count(name);
      const note = n === 0 ? 'as its kin' : '';
      return `${centre},${name},${field.toFixed(2)},${resonance.toFixed(2)},${sigma.toFixed(2)},${n},bordwell-1988,derived,${note}`;
    }),
  ];
}

function report(centre: Centre, errors: readonly Miss[]): void {
  const sizes = errors.map(({ error }) => Math.abs(error));
  const share = (limit: number) =>
    `${Math.round((100 * sizes.filter((size) => size <= limit).length) / sizes.length)} %`;
  process.stdout.write(
    `${centre}: ${errors.length} molecules left out in turn, mean absolute error ${mean(sizes).toFixed(2)}, ${share(1)} within 1, ${share(2)} within 2\n`,
  );
  const known = onlyKnown(errors);
  process.stdout.write(
    `  ${known.length} of them carry only groups that ${WELL_KNOWN} molecules carry: ${mean(known.map(({ error }) => Math.abs(error))).toFixed(2)}\n`,
  );
  const worst = [...errors].sort((a, b) => Math.abs(b.error) - Math.abs(a.error)).slice(0, 25);
  for (const { point, error } of worst) {
    process.stdout.write(
      `  ${error.toFixed(1).padStart(6)}  ${point.value}  ${point.name}  ${point.activators.map(({ name, count }) => `${count}${name}`).join(' ')}\n`,
    );
  }
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
