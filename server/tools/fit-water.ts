/**
 * Fits the terms of the estimator in water and writes `data/terms.csv` and `data/spreads.csv`.
 *
 * Run: `npm run fit-water -- FILE` with a file of aqueous values (see calibration.ts). A fifth of the molecules is
 * never used. Prior variances were chosen on the other four fifths, by errors with single molecules and with whole frames left out; terms seen in
 * fewer than two molecules are left out, so that no single measurement stands in the table.
 */
import { writeFileSync } from 'node:fs';
import { MIDDLE } from '../src/chemistry/estimate.ts';
import { readSubstituents, type Substituents } from '../src/chemistry/substituents.ts';
import { type Term, termClass, termsOf } from '../src/chemistry/terms.ts';
import { type CalibrationRow, familyFits, readCalibration } from './calibration.ts';
import { fitRidge, type Observation, withoutGroup } from './ridge.ts';
import {
  type ParentValue,
  type Rule,
  type RuleSite,
  readParents,
  readRules,
  readSubstituentRows,
  sitesByRule,
} from './rule-sites.ts';
import { siteFrame } from './site-frame.ts';

/** Prior variances by class of term. */
const VARIANCES: Readonly<Record<string, number>> = {
  series: 52.6,
  group: 1.0,
  near1: 0.717,
  near3: 0.027,
  frameany: 0.062,
  'sigma-m-any': 2.5,
  'sigma-p-any': 0.106,
  'sigma-p': 0.02,
  'sigma-minus-any': 0.267,
  'sigma-plus-any': 0.051,
  'sigma-minus': 0.04,
  'sigma-plus': 0.024,
  'sub0-any': 0.0031,
  sub0: 0.0056,
  sub1: 0.0016,
  sub2: 0.052,
  bend: 0.03,
  bendany: 0.0025,
  crowd: 0.025,
  bay: 0.15,
  fused: 0.091,
  'fused-any': 0.108,
  tied: 0.004,
  'tied-any': 0.272,
  aza: 0.535,
  'aza-any': 0.422,
  beside: 0.5,
  pair: 0.105,
  'chain-any': 0.584,
  chain: 0.167,
  chainj: 1.14,
  chain2j: 0.076,
  chains: 0.013,
  chain2s: 0.036,
  ring: 0.116,
  rings: 0.056,
  ringside: 1.64,
  'charge-any': 0.025,
  charge: 0.033,
};
/** Variance of a single value about the sum, by family; 0.15 for families that are not named. */
const NOISE: Readonly<Record<string, number>> = {
  'azole-nh': 0.1,
  pyridinium: 0.26,
  azolium: 0.04,
  'carboxylic-acid': 0.033,
  ammonium: 0.058,
  amidinium: 0.04,
  imide: 0.04,
  'carbon-acid': 0.28,
  anilinium: 0.15,
  phenol: 0.13,
  oxime: 0.4,
  thiol: 0.4,
  sulfonamide: 0.04,
  imine: 0.05,
  'amide-nh': 0.06,
  peracid: 0.05,
  phosphoric: 0.06,
  enol: 0.15,
  thiophenol: 0.12,
  lactam: 0.04,
  'sulfonic-acid': 0.3,
  'aniline-nh': 0.06,
  'boronic-acid': 0.05,
  'n-oxide': 0.06,
};
/** Families that only rest on the values of their groups. */
const BEYOND = new Set([
  'mineral-acid',
  'dihydrogen',
  'alkyne',
  'hydrogen-cyanide',
  'phosphine-ph',
  'phosphazenium',
  'silanol',
  'amine-nh',
  'oxygen-base',
  'water',
]);
const FEWEST = 2;
const FIT_SOURCES = 'hansch-1991;iupac-pka-2024';
const REWEIGHTINGS = 3;
/** Standardised residuals beyond this count less. */
const SOUND = 2.5;

interface Candidate {
  readonly site: RuleSite;
  readonly terms: readonly Term[];
  readonly frame: string;
}

interface Item {
  readonly row: CalibrationRow | null;
  readonly candidates: readonly Candidate[];
  chosen: Candidate;
  readonly pKa: number;
  readonly noise: number;
}

const [file, root = '.'] = process.argv.slice(2);
if (file === undefined) {
  process.stderr.write('Name the file of aqueous values to fit to.\n');
  process.exit(2);
}
const rules = readRules(`${root}/data/groups.csv`);
const substituents = readSubstituents(readSubstituentRows(`${root}/data/substituents.csv`));
const rows = readCalibration(file);
const items = [
  ...rows.flatMap((row) => itemOf(row, substituents)),
  ...rules.flatMap((rule) => parentOf(rule, substituents)),
  ...readParents(`${root}/data/frames.csv`).flatMap((parent) => publishedOf(parent, substituents)),
];
const fitted = items.filter(({ row }) => row === null || !row.heldOut);

const rough = solve(fitted.filter(({ row }) => row === null || row.singleSite));
for (const item of items) choose(item, rough.score);
const kept = fitted.filter(
  (item) => item.row === null || item.row.singleSite || Math.abs(residual(item, rough.score)) < 1.6,
);
const final = solve(kept);
const spreads = spreadsOf(final);
writeFileSync(
  `${root}/data/terms.csv`,
  table(
    ['name', 'value', 'n', 'sources', 'basis'],
    final.names.map((name, k) => [
      name,
      rounded(final.values[k]!),
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
process.stdout.write(`${kept.length} values of the fit, ${final.names.length} terms\n`);
const leftOut = kept.map((item, k): [Item, number] => [item, target(item) - final.leftOut[k]!]);
const withoutFrames = framesOut();
summary('left out one by one', leftOut);
summary('frames left out', withoutFrames);
for (const family of new Set(kept.map(({ chosen }) => chosen.site.family))) {
  summary(
    `  ${family}, one by one`,
    leftOut.filter(([{ chosen }]) => chosen.site.family === family),
  );
  summary(
    `  ${family}, by frames`,
    withoutFrames.filter(([{ chosen }]) => chosen.site.family === family),
  );
}

function itemOf(row: CalibrationRow, table: Substituents): Item[] {
  const found = sitesByRule(row.smiles, rules);
  if (found === null) return [];
  const ofKind = found.sites.filter(({ kind }) => kind === row.kind);
  const fitting = ofKind.filter(({ family }) => familyFits(row, family));
  if (fitting.length === 0) return [];
  const candidates = fitting.map(
    (site): Candidate => ({
      site,
      terms: termsOf(found.graph, site, table),
      frame: siteFrame(found.graph, site),
    }),
  );
  const byParent = (one: Candidate) => one.site.rule.water ?? MIDDLE;
  const noise = (NOISE[candidates[0]!.site.family] ?? 0.15) / row.weight;
  const item = { row, candidates, chosen: candidates[0]!, pKa: row.pKa, noise };
  choose(item, byParent);
  return [item];
}

/** A group's own value on its example counts as a measurement with the group's sd. */
function parentOf(rule: Rule, table: Substituents): Item[] {
  if (rule.water === null || BEYOND.has(rule.family) || 20 < rule.water || 2.2 < (rule.waterSd ?? 0.8))
    return [];
  const found = sitesByRule(rule.example, rules);
  const site = found?.sites.find(({ group }) => group === rule.id);
  if (found === null || site === undefined) return [];
  const candidate = {
    site: { ...site, equivalents: 1 },
    terms: termsOf(found.graph, site, table),
    frame: 'parent',
  };
  const noise = (NOISE[rule.family] ?? 0.15) * (((rule.waterSd ?? 0.8) ** 2 + 0.1) / 0.15);
  return [{ row: null, candidates: [candidate], chosen: candidate, pKa: rule.water, noise }];
}

/** A published constant of a marked site. */
function publishedOf({ smiles, kind, pKa, sd }: ParentValue, table: Substituents): Item[] {
  const found = sitesByRule(smiles, rules);
  const site = found?.sites.find((one) => one.kind === kind && one.marked);
  if (found === null || site === undefined) {
    process.stdout.write(`no rule finds the marked site of ${smiles}\n`);
    return [];
  }
  const candidate = { site, terms: termsOf(found.graph, site, table), frame: 'published' };
  return [
    {
      row: null,
      candidates: [candidate],
      chosen: candidate,
      pKa,
      noise: Math.max(NOISE[site.family] ?? 0.15, sd ** 2),
    },
  ];
}

/** The most basic site of a base, the most acidic of an acid. */
function choose(item: Item, score: (candidate: Candidate) => number): void {
  const sign = item.row?.kind === 'base' ? 1 : -1;
  item.chosen = item.candidates.reduce((best, one) => (sign * score(best) < sign * score(one) ? one : best));
}

function target({ chosen, pKa }: Item): number {
  return pKa - MIDDLE - Math.log10(chosen.site.equivalents) * (chosen.site.kind === 'acid' ? -1 : 1);
}

function residual(item: Item, score: (candidate: Candidate) => number): number {
  return target(item) + MIDDLE - score(item.chosen);
}

function solve(used: readonly Item[]) {
  const counts = new Map<string, number>();
  for (const { chosen } of used)
    for (const { name } of chosen.terms) counts.set(name, (counts.get(name) ?? 0) + 1);
  const names = [...counts]
    .filter(([, count]) => FEWEST <= count)
    .map(([name]) => name)
    .sort();
  const places = new Map(names.map((name, place) => [name, place]));
  const variances = Float64Array.from(names, (name) => VARIANCES[termClass(name)] ?? 0);
  const doubt = new Float64Array(used.length).fill(1);
  const observe = (): Observation[] =>
    used.map((item, k) => ({
      target: target(item),
      noise: item.noise * doubt[k]!,
      factors: item.chosen.terms.flatMap(({ name, factor }) => {
        const unknown = places.get(name);
        return unknown === undefined ? [] : [{ unknown, factor }];
      }),
    }));
  let observations = observe();
  let fit = fitRidge(observations, variances);
  for (let turn = 1; turn < REWEIGHTINGS; turn++) {
    used.forEach((_, k) => {
      const z = Math.abs(fit.dual[k]!) / Math.sqrt(fit.inverse[k * used.length + k]!);
      doubt[k] = Math.max(1, z / SOUND);
    });
    observations = observe();
    fit = fitRidge(observations, variances);
  }
  const score = ({ terms }: Candidate) =>
    terms.reduce((sum, { name, factor }) => {
      const place = places.get(name);
      return place === undefined ? sum : sum + factor * fit.values[place]!;
    }, MIDDLE);
  return { ...fit, fit, observations, names, counts, score, used };
}

/** Prior variance of what a site shows and fewer than two other molecules do. */
function novelty(candidate: Candidate, counts: ReadonlyMap<string, number>, own: number): number {
  return candidate.terms.reduce((sum, { name, factor }) => {
    return (counts.get(name) ?? 0) - own < FEWEST
      ? sum + (VARIANCES[termClass(name)] ?? 0) * factor ** 2
      : sum;
  }, 0);
}

/** The sd of each family and the weight of novelty, so that nine of ten errors lie inside 1.64 sd. */
function spreadsOf(solved: ReturnType<typeof solve>): (string | number)[][] {
  const errors = solved.used.flatMap((item, k) =>
    item.row === null
      ? []
      : [
          {
            family: `${item.chosen.site.kind[0]}.${item.chosen.site.family}`,
            error: Math.abs(target(item) - solved.leftOut[k]!),
            novelty: novelty(item.chosen, solved.counts, 1),
          },
        ],
  );
  // How much novelty is worth shows where it is large: single molecules of rare kinds, and whole frames left out.
  const odd = [...errors, ...frameErrors(solved)].filter(({ novelty }) => 0.3 < novelty);
  const share =
    [0.1, 0.15, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.85, 1, 1.2, 1.5].find(
      (weight) =>
        0.9 * odd.length <=
        odd.filter(({ error, novelty }) => error <= 1.64 * Math.sqrt(0.16 + weight * novelty)).length,
    ) ?? 2;
  const pooled = Math.sqrt(familyVariance(errors, share));
  const families = [
    ...new Set(solved.used.map(({ chosen }) => `${chosen.site.kind[0]}.${chosen.site.family}`)),
  ].sort();
  const rows: (string | number)[][] = families.map((family) => {
    const own = errors.filter((one) => one.family === family);
    const sd =
      own.length < 8
        ? Math.max(pooled * 1.5, own.length === 0 ? 0 : Math.sqrt(familyVariance(own, share)))
        : Math.sqrt(familyVariance(own, share));
    return ['family', family, rounded(sd), own.length];
  });
  rows.push(['term', 'novelty', share, errors.length]);
  for (const [name, value] of Object.entries(VARIANCES)) rows.push(['term', name, value, 0]);
  return rows;
}

function familyVariance(
  errors: readonly { readonly error: number; readonly novelty: number }[],
  share: number,
): number {
  const inside = (variance: number) =>
    errors.filter(({ error, novelty }) => error <= 1.64 * Math.sqrt(variance + share * novelty)).length;
  let variance = 0.03;
  while (inside(variance) < 0.91 * errors.length && variance < 9) variance *= 1.1;
  return variance;
}

/** Groups of one-site molecules with one frame; frames that hold a great part of all values are no test of novelty. */
function framesOf(solved: ReturnType<typeof solve>): number[][] {
  const frames = new Map<string, number[]>();
  solved.used.forEach((item, k) => {
    if (item.row?.singleSite) frames.set(item.chosen.frame, [...(frames.get(item.chosen.frame) ?? []), k]);
  });
  return [...frames.values()].filter((group) => group.length < 60);
}

function framesOut(): [Item, number][] {
  return framesOf(final).flatMap((group) => {
    const predicted = withoutGroup(final.fit, final.observations, group);
    return group.map((k, i): [Item, number] => [kept[k]!, target(kept[k]!) - predicted[i]!]);
  });
}

/** Errors of whole frames left out, with the novelty that each molecule has without its frame. */
function frameErrors(
  solved: ReturnType<typeof solve>,
): { readonly error: number; readonly novelty: number }[] {
  return framesOf(solved).flatMap((group) => {
    const rest = new Map(solved.counts);
    for (const k of group) {
      for (const { name } of solved.used[k]!.chosen.terms) rest.set(name, rest.get(name)! - 1);
    }
    return withoutGroup(solved.fit, solved.observations, group).map((predicted, i) => {
      const item = solved.used[group[i]!]!;
      return { error: Math.abs(target(item) - predicted), novelty: novelty(item.chosen, rest, 0) };
    });
  });
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
