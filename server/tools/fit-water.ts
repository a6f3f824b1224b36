/**
 * Fits the terms of the estimator in water and writes `data/terms.csv` and `data/spreads.csv`.
 *
 * Prints errors with single molecules and with whole scaffolds left out of the fit.
 * Run: `npm run fit-water -- FILE` with a file of aqueous values (see calibration.ts).
 */
import { writeFileSync } from 'node:fs';
import {
  fitWater,
  type Item,
  novelty,
  type Solved,
  scaffoldsLeftOut,
  target,
  type Unseen,
  VARIANCES,
} from './water-fit.ts';

const FIT_SOURCES = 'hansch-1991;iupac-pka-2024';
/** Families with fewer molecules are judged together with their errors on scaffolds left out. */
const MANY = 20;
const WEIGHTS = [0.5, 0.7, 1, 1.5, 2, 2.5, 3];
const INSIDE = 0.9;
/** With fewer errors of its own a family is trusted less than the mean of all. */
const FEW = 8;
const FEW_FACTOR = 2.25;

const [file, root = '.'] = process.argv.slice(2);
if (file === undefined) {
  process.stderr.write('Name the file of aqueous values to fit to.\n');
  process.exit(2);
}
const final = fitWater(file, `${root}/data`);
const unseen = scaffoldsLeftOut(final);
const spreads = spreadsOf(final, unseen);
writeFileSync(
  `${root}/data/terms.csv`,
  table(
    ['name', 'value', 'n', 'sources', 'basis'],
    final.names.map((name, k) => [
      name,
      rounded(final.fit.values[k]!),
      final.counts.get(name)!,
      FIT_SOURCES,
      'derived',
    ]),
  ),
);
writeFileSync(
  `${root}/data/spreads.csv`,
  table(
    ['kind', 'name', 'value', 'n', 'sources', 'basis'],
    spreads.map((line) => [...line, FIT_SOURCES, 'derived']),
  ),
);
process.stdout.write(`${final.used.length} values of the fit, ${final.names.length} terms\n`);
const leftOut = final.used.map((item, k): [Item, number] => [item, target(item) - final.fit.leftOut[k]!]);
const withoutScaffolds = unseen.map(({ item, error }): [Item, number] => [item, error]);
summary('left out one by one', leftOut);
summary('scaffolds left out', withoutScaffolds);
for (const family of new Set(final.used.map(({ chosen }) => chosen.site.family))) {
  summary(
    `  ${family}, one by one`,
    leftOut.filter(([{ chosen }]) => chosen.site.family === family),
  );
  summary(
    `  ${family}, by scaffolds`,
    withoutScaffolds.filter(([{ chosen }]) => chosen.site.family === family),
  );
}

interface Miss {
  readonly family: string;
  readonly error: number;
  readonly novelty: number;
}

function missOf(item: Item, error: number, novelty: number): Miss {
  const { kind, family } = item.chosen.site;
  return { family: `${kind[0]}.${family}`, error: Math.abs(error), novelty };
}

/** The sd of each family and the weight of novelty, so that nine of ten errors lie inside 1.64 sd, on scaffolds never seen too. */
function spreadsOf(solved: Solved, unseen: readonly Unseen[]): (string | number)[][] {
  const seen = solved.used.flatMap((item, k) => {
    const error = target(item) - solved.fit.leftOut[k]!;
    return item.row?.singleSite ? [missOf(item, error, novelty(item.chosen, solved.counts, 1))] : [];
  });
  const odd = unseen.map(({ item, error, novelty }) => missOf(item, error, novelty));
  const names = [
    ...new Set(solved.used.map(({ chosen }) => `${chosen.site.kind[0]}.${chosen.site.family}`)),
  ].sort();
  const judged = WEIGHTS.map((weight) => {
    const variances = familyVariances(names, seen, odd, weight);
    const inside = odd.filter((miss) => isInside(miss, variances.get(miss.family)!, weight)).length;
    return { weight, variances, share: inside / odd.length };
  });
  const chosen = judged.find(({ share }) => INSIDE <= share) ?? judged.at(-1)!;
  process.stdout.write(
    `novelty counts ${chosen.weight}, ${(100 * chosen.share).toFixed(0)} % inside on scaffolds left out\n`,
  );
  return [
    ...names.map((name) => [
      'family',
      name,
      rounded(Math.sqrt(chosen.variances.get(name)!)),
      seen.filter(({ family }) => family === name).length,
    ]),
    ['term', 'novelty', chosen.weight, seen.length],
    ...Object.entries(VARIANCES).map(([name, value]) => ['term', name, value, 0]),
  ];
}

function familyVariances(
  names: readonly string[],
  seen: readonly Miss[],
  odd: readonly Miss[],
  weight: number,
): Map<string, number> {
  const pooled = varianceOf(seen, weight);
  return new Map(
    names.map((name) => {
      const own = seen.filter(({ family }) => family === name);
      if (MANY <= own.length) return [name, varianceOf(own, weight)];
      const all = [...own, ...odd.filter(({ family }) => family === name)];
      return [
        name,
        all.length < FEW ? Math.max(FEW_FACTOR * pooled, varianceOf(all, weight)) : varianceOf(all, weight),
      ];
    }),
  );
}

function varianceOf(misses: readonly Miss[], weight: number): number {
  let variance = 0.02;
  const inside = () => misses.filter((miss) => isInside(miss, variance, weight)).length;
  while (variance < 9 && inside() < INSIDE * misses.length) variance *= 1.1;
  return variance;
}

function isInside({ error, novelty }: Miss, variance: number, weight: number): boolean {
  return error <= 1.64 * Math.sqrt(variance + weight * novelty);
}

function summary(title: string, errors: readonly (readonly [Item, number])[]): void {
  const single = errors
    .filter(([{ row }]) => row?.singleSite)
    .map(([, error]) => Math.abs(error))
    .sort((a, b) => a - b);
  if (single.length < 5) return;
  const mean = single.reduce((sum, error) => sum + error, 0) / single.length;
  process.stdout.write(
    `${title}: n ${single.length}, mean absolute error ${mean.toFixed(3)}, median ${single[single.length >> 1]!.toFixed(3)}\n`,
  );
}

function rounded(value: number): number {
  return Number(value.toFixed(3));
}

function table(header: readonly string[], lines: readonly (readonly (string | number)[])[]): string {
  const cell = (value: string | number) =>
    /[",\n]/.test(String(value)) ? `"${String(value).replaceAll('"', '""')}"` : String(value);
  return `${[header, ...lines].map((line) => line.map(cell).join(',')).join('\n')}\n`;
}
