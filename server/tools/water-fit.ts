/**
 * The fit of the estimator's terms to aqueous values, in memory.
 *
 * A fifth of the molecules is never used. Prior variances were chosen on the other four fifths, by errors with single
 * molecules and with whole scaffolds left out; terms seen in fewer than two molecules are left out, so that no single
 * measurement stands in the table.
 * Must not know: files of the project other than its tables.
 */
import { doubtLeft, MIDDLE } from '../src/chemistry/estimate.ts';
import { readSubstituents, type Substituents } from '../src/chemistry/substituents.ts';
import { type Term, termClass, termsOf } from '../src/chemistry/terms.ts';
import { type CalibrationRow, familyFits, readCalibration } from './calibration.ts';
import { type Fit, fitRidge, type Observation, withoutGroup } from './ridge.ts';
import {
  type ParentValue,
  type Rule,
  type RuleSite,
  readParents,
  readRules,
  readSubstituentRows,
  sitesByRule,
} from './rule-sites.ts';
import { siteScaffold } from './scaffold.ts';

/** Prior variances by class of term. */
export const VARIANCES: Readonly<Record<string, number>> = {
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
const REWEIGHTINGS = 3;
/** Standardised residuals beyond this count less. */
const SOUND = 2.5;

export interface Candidate {
  readonly site: RuleSite;
  readonly terms: readonly Term[];
}

/** A value with the sites that it may belong to. */
export interface Item {
  readonly row: CalibrationRow | null;
  readonly candidates: readonly Candidate[];
  chosen: Candidate;
  readonly pKa: number;
  readonly noise: number;
}

const GREAT_SCAFFOLD = 40;
/** A value of a molecule with several sites that is farther off belongs to another site. */
const FAR_OFF = 1.6;

export interface Solved {
  readonly fit: Fit;
  readonly observations: readonly Observation[];
  readonly names: readonly string[];
  /** Items in which each term occurs. */
  readonly counts: ReadonlyMap<string, number>;
  readonly score: (candidate: Candidate) => number;
  readonly used: readonly Item[];
}

/** How far a value is off when values of other scaffolds predict it. */
export interface Unseen {
  readonly item: Item;
  readonly error: number;
  readonly novelty: number;
}

/** @param data folder of the tables */
export function fitWater(file: string, data: string): Solved {
  const rules = readRules(`${data}/groups.csv`);
  const substituents = readSubstituents(readSubstituentRows(`${data}/substituents.csv`));
  const items = [
    ...readCalibration(file).flatMap((row) => itemOf(row, rules, substituents)),
    ...rules.flatMap((rule) => parentOf(rule, rules, substituents)),
    ...readParents(`${data}/frames.csv`).flatMap((parent) => publishedOf(parent, rules, substituents)),
  ];
  const fitted = items.filter(({ row }) => row === null || !row.heldOut);
  const rough = solve(fitted.filter(({ row }) => row === null || row.singleSite));
  for (const item of items) choose(item, rough.score);
  const kept = fitted.filter(
    (item) => item.row === null || item.row.singleSite || Math.abs(residual(item, rough.score)) < FAR_OFF,
  );
  return solve(kept);
}

/** Errors of one-site molecules with all of their scaffold and family left out of the fit; molecules without rings are no test. */
export function scaffoldsLeftOut({ fit, observations, used, counts }: Solved): Unseen[] {
  return scaffoldsOf(used).flatMap((group) => {
    const rest = new Map(counts);
    for (const k of group) {
      for (const { name } of used[k]!.chosen.terms) rest.set(name, rest.get(name)! - 1);
    }
    const predicted = withoutGroup(fit, observations, group);
    return group.map((k, i): Unseen => {
      const item = used[k]!;
      return { item, error: target(item) - predicted[i]!, novelty: novelty(item.chosen, rest, 0) };
    });
  });
}

/** Places of the one-site molecules of each scaffold; one that holds a great part of all values is no test of novelty. */
function scaffoldsOf(used: readonly Item[]): number[][] {
  const scaffolds = new Map<string, number[]>();
  used.forEach(({ row, chosen }, k) => {
    const name = row?.singleSite ? siteScaffold(row.smiles, chosen.site.family) : null;
    if (name !== null) scaffolds.set(name, [...(scaffolds.get(name) ?? []), k]);
  });
  return [...scaffolds.values()].filter((group) => group.length < GREAT_SCAFFOLD);
}

function itemOf(row: CalibrationRow, rules: readonly Rule[], table: Substituents): Item[] {
  const found = sitesByRule(row.smiles, rules);
  if (found === null) return [];
  const ofKind = found.sites.filter(({ kind }) => kind === row.kind);
  const fitting = ofKind.filter(({ family }) => familyFits(row, family));
  if (fitting.length === 0) return [];
  const candidates = fitting.map(
    (site): Candidate => ({
      site,
      terms: termsOf(found.graph, site, table),
    }),
  );
  const byParent = (one: Candidate) => one.site.rule.water ?? MIDDLE;
  const noise = (NOISE[candidates[0]!.site.family] ?? 0.15) / row.weight;
  const item = { row, candidates, chosen: candidates[0]!, pKa: row.pKa, noise };
  choose(item, byParent);
  return [item];
}

/** A group's own value on its example counts as a measurement with the group's sd. */
function parentOf(rule: Rule, rules: readonly Rule[], table: Substituents): Item[] {
  if (rule.water === null || BEYOND.has(rule.family) || 20 < rule.water || 2.2 < (rule.waterSd ?? 0.8))
    return [];
  const found = sitesByRule(rule.example, rules);
  const site = found?.sites.find(({ group }) => group === rule.id);
  if (found === null || site === undefined) return [];
  const candidate = {
    site: { ...site, equivalents: 1 },
    terms: termsOf(found.graph, site, table),
  };
  const noise = (NOISE[rule.family] ?? 0.15) * (((rule.waterSd ?? 0.8) ** 2 + 0.1) / 0.15);
  return [{ row: null, candidates: [candidate], chosen: candidate, pKa: rule.water, noise }];
}

/** A published constant of a marked site. */
function publishedOf(
  { smiles, kind, pKa, sd }: ParentValue,
  rules: readonly Rule[],
  table: Substituents,
): Item[] {
  const found = sitesByRule(smiles, rules);
  const site = found?.sites.find((one) => one.kind === kind && one.marked);
  if (found === null || site === undefined) {
    process.stdout.write(`no rule finds the marked site of ${smiles}\n`);
    return [];
  }
  const candidate = {
    site,
    terms: termsOf(found.graph, site, table),
  };
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

/** What the sum of terms should be for an item, counted from the middle of the scale. */
export function target({ chosen, pKa }: Item): number {
  return pKa - MIDDLE - Math.log10(chosen.site.equivalents) * (chosen.site.kind === 'acid' ? -1 : 1);
}

function residual(item: Item, score: (candidate: Candidate) => number): number {
  return target(item) + MIDDLE - score(item.chosen);
}

function solve(used: readonly Item[]): Solved {
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
  return { fit, observations, names, counts, score, used };
}

/** Prior variance of what a site shows, by how few other molecules have shown it. */
export function novelty(candidate: Candidate, counts: ReadonlyMap<string, number>, own: number): number {
  return candidate.terms.reduce((sum, { name, factor }) => {
    const others = (counts.get(name) ?? 0) - own;
    const doubt = doubtLeft(others < FEWEST ? 0 : others);
    return sum + (VARIANCES[termClass(name)] ?? 0) * doubt * factor ** 2;
  }, 0);
}
