/**
 * Fits the lines that carry constants from one scale to another, family by family, and writes them to `data/scales.csv`.
 *
 * `node server/tools/run.mjs fit-scales` reads the built tables, pairs the values that one site has on two scales, and
 * replaces the rows that such a fit made; rows from the literature stay as they are.
 * The slope leans on that of all families together, so that a family of three molecules keeps a sensible one.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { parse } from 'csv-parse/sync';
import { measuredConstants } from '../src/chemistry/measured.ts';
import { perceive } from '../src/chemistry/perceive.ts';
import { ANY_ACID, ANY_BASE } from '../src/chemistry/scales.ts';
import type { ScaleId } from '../src/tables/rows.ts';
import { readTables, type Tables } from '../src/tables/tables.ts';

const PAIRS: readonly (readonly [ScaleId, ScaleId])[] = [
  ['water', 'DMSO'],
  ['DMSO', 'MeCN'],
  ['water', 'MeCN'],
  ['DMSO', 'THF'],
];
const FEWEST = 3;
/** How far the slope of a family may lie from that of all families, sd. */
const SLOPE_SD = 0.6;
/** Noise of one point besides its own sd. */
const POINT_SD = 0.7;
/** A residual sd counted as this many points before any is seen, so that few points do not claim much. */
const PRIOR_SD = 1;
const PRIOR_POINTS = 3;
const MARK = 'fitted to measured.csv';

const MAIN_SOURCES: Readonly<Record<ScaleId, string>> = {
  water: 'serjeant-1979',
  DMSO: 'bordwell-1988',
  MeCN: 'kutt-2021',
  THF: 'streitwieser-1980',
};

interface Point {
  readonly family: string;
  readonly kind: 'acid' | 'base';
  readonly from: number;
  readonly to: number;
  readonly variance: number;
}

interface Line {
  readonly slope: number;
  readonly intercept: number;
  readonly sd: number;
}

const file = join('data', 'scales.csv');
const tables = readTables(JSON.parse(readFileSync('server/generated/tables.json', 'utf8')));
const [header, ...rows] = parse(readFileSync(file, 'utf8')) as string[][];
const kept = rows.filter((row) => !row.at(-1)!.startsWith(MARK));
const fitted = PAIRS.flatMap(([from, to]) => linesBetween(from, to));
writeFileSync(file, [header!, ...kept, ...fitted].map((row) => `${row.map(cell).join(',')}\n`).join(''));
process.stdout.write(`${fitted.length} lines fitted, ${kept.length} kept\n`);

function linesBetween(from: ScaleId, to: ScaleId): string[][] {
  const points = pointsBetween(from, to, tables);
  return (['acid', 'base'] as const).flatMap((kind) => {
    const all = points.filter((point) => point.kind === kind);
    if (all.length < FEWEST) return [];
    const common = fit(all, 1, 5);
    const general = kind === 'acid' ? ANY_ACID : ANY_BASE;
    const families = [...new Set(all.map(({ family }) => family))].sort();
    return [
      row(from, to, general, common, all),
      ...families.flatMap((family) => {
        const own = all.filter((point) => point.family === family);
        return own.length < FEWEST ? [] : [row(from, to, family, fit(own, common.slope, SLOPE_SD), own)];
      }),
    ];
  });
}

/** One point for every couple that has a value on both scales. */
function pointsBetween(from: ScaleId, to: ScaleId, { measured }: Tables): Point[] {
  const points = new Map<string, Point>();
  for (const { smiles, key } of measured) {
    const perceived = perceive(smiles, tables);
    const found = measuredConstants(perceived, tables);
    perceived.couples.forEach((couple, index) => {
      const on = (scale: ScaleId) => {
        const values = found
          .filter((one) => one.couple === index && one.constant.scale === scale)
          .map(({ constant }) => constant)
          .sort((a, b) => a.value - b.value);
        return couple.kind === 'acid' ? values[0] : values.at(-1);
      };
      const [first, second] = [on(from), on(to)];
      if (first === undefined || second === undefined) return;
      points.set(`${key} ${couple.kind} ${couple.group}`, {
        family: couple.family,
        kind: couple.kind,
        from: first.value,
        to: second.value,
        variance: first.sd ** 2 + second.sd ** 2 + POINT_SD ** 2,
      });
    });
  }
  return [...points.values()];
}

/** Weighted least squares with a slope that leans on an expected one. */
function fit(points: readonly Point[], slope: number, slopeSd: number): Line {
  const sum = (of: (point: Point) => number) =>
    points.reduce((total, point) => total + of(point) / point.variance, 0);
  const weight = sum(() => 1);
  const [x, y] = [sum(({ from }) => from) / weight, sum(({ to }) => to) / weight];
  const prior = 1 / slopeSd ** 2;
  const found =
    (sum(({ from, to }) => (from - x) * (to - y)) + prior * slope) /
    (sum(({ from }) => (from - x) ** 2) + prior);
  const intercept = y - found * x;
  const squares = points.reduce((total, { from, to }) => total + (to - intercept - found * from) ** 2, 0);
  const sd = Math.sqrt((squares + PRIOR_POINTS * PRIOR_SD ** 2) / (points.length + PRIOR_POINTS - 1));
  return { slope: found, intercept, sd };
}

function row(
  from: ScaleId,
  to: ScaleId,
  family: string,
  { slope, intercept, sd }: Line,
  points: readonly Point[],
): string[] {
  const starts = points.map((point) => point.from);
  const sources = new Set([from, to].map((scale) => MAIN_SOURCES[scale] ?? 'common-practice'));
  return [
    from,
    to,
    family,
    slope.toFixed(3),
    intercept.toFixed(2),
    sd.toFixed(2),
    String(points.length),
    Math.min(...starts).toFixed(1),
    Math.max(...starts).toFixed(1),
    [...sources].join(';'),
    'derived',
    MARK,
  ];
}

function cell(text: string): string {
  return /[",]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
