/**
 * The fit of what activating groups are worth in DMSO to the measured values of the tables, in memory.
 *
 * `leftOutInDmso` predicts each molecule from a fit without it and a tenth of the others: the honest measure of the
 * estimator, whose own figures stand on all of them.
 */
import { type Activator, activatorsOf } from '../src/chemistry/activators.ts';
import {
  type ActivationModel,
  activatedValue,
  type Centre,
  LIMIT,
  onlyHalogens,
  PARENT,
  pairsOf,
  SCREENING,
  WELL_KNOWN,
} from '../src/chemistry/carbon-acids.ts';
import { measuredConstants } from '../src/chemistry/measured.ts';
import { neutralForm } from '../src/chemistry/neutral.ts';
import { perceive } from '../src/chemistry/perceive.ts';
import { readSubstituents } from '../src/chemistry/substituents.ts';
import type { Tables } from '../src/tables/tables.ts';
import { LIMIT_START, PARENTS, PRIORS, SCREENING_START } from './activation-priors.ts';
import { solve } from './solve.ts';

const FOLDS = 10;
const ROUNDS = 25;
const POINT_SD = 0.5;
/** How far a group may go from its prior, sd. */
const FIELD_SD = 2;
const RESONANCE_SD = 3;
const SIGMA_SD = 5;
/** Substituent constants of strong acceptors say little of what they do to a carbanion. */
const ACCEPTOR_SD = 15;
const SMALL_SD = 1.5;
/** How far a pair of groups may differ from what both do alone, sd. */
const PAIR_SD = 1;
/** Fewest molecules of a pair that has a row. */
const PAIR_COUNT = 3;
/** Step of the numerical slopes. */
const STEP = 1e-4;

export interface Point {
  readonly name: string;
  readonly key: string;
  readonly group: string;
  readonly activators: readonly Activator[];
  readonly value: number;
  readonly sd: number;
}

interface Unknown {
  readonly group: string;
  readonly part: 'field' | 'resonance' | 'sigma';
  readonly prior: number;
  readonly sd: number;
}

/** A molecule and how far off the fit without it is. */
export interface Miss {
  readonly point: Point;
  readonly error: number;
}

/** Every molecule predicted by a fit without it. */
export function leftOutInDmso(centre: Centre, tables: Tables): Miss[] {
  const { points } = pointsOf(centre, tables);
  const unknowns = unknownsOf(centre, points);
  return Array.from({ length: FOLDS }, (_, fold) => {
    const inside = points.filter(({ key }) => foldOf(key) !== fold);
    const model = modelOf(centre, unknowns, fit(centre, inside, unknowns));
    return points
      .filter(({ key }) => foldOf(key) === fold)
      .map((point) => ({ point, error: activatedValue(point.activators, model) - point.value }));
  }).flat();
}

/** Those whose every group is carried by enough molecules. */
export function onlyKnown(errors: readonly Miss[]): Miss[] {
  const count = (name: string) =>
    errors.filter(({ point }) => point.activators.some((one) => one.name === name)).length;
  return errors.filter(({ point }) => point.activators.every(({ name }) => WELL_KNOWN <= count(name)));
}

/** Every site of the kind with a value in DMSO, one for each molecule and class of atoms. */
export function pointsOf(centre: Centre, tables: Tables): { points: Point[]; unnamed: string[] } {
  const substituents = readSubstituents(tables.substituents);
  const points = new Map<string, Point>();
  const unnamed = new Set<string>();
  for (const { smiles, name, key } of tables.measured) {
    const perceived = perceive(smiles, tables);
    for (const { couple: index, constant } of measuredConstants(perceived, tables)) {
      const couple = perceived.couples[index]!;
      if (constant.scale !== 'DMSO' || couple.element !== centre || couple.kind !== 'acid') continue;
      const activators = activatorsOf(neutralForm(perceived.graph!).graph, couple.atom, substituents);
      if (activators === null || onlyHalogens(activators)) continue;
      const missing = activators.filter((one) => PRIORS[centre][one.name] === undefined);
      for (const one of missing) unnamed.add(`${one.name} (${name})`);
      if (missing.length === 0) {
        points.set(`${key} ${couple.group}`, {
          name,
          key,
          group: couple.group,
          activators,
          value: constant.value,
          sd: constant.sd,
        });
      }
    }
  }
  return { points: [...points.values()], unnamed: [...unnamed] };
}

export function unknownsOf(centre: Centre, points: readonly Point[]): Unknown[] {
  const list: Unknown[] = [
    { group: PARENT, part: 'field', prior: PARENTS[centre], sd: 0.7 },
    { group: LIMIT, part: 'field', prior: LIMIT_START, sd: 8 },
    { group: SCREENING, part: 'field', prior: SCREENING_START, sd: 25 },
  ];
  for (const [group, [field, resonance, sigma]] of Object.entries(PRIORS[centre])) {
    const small =
      group.includes('+') ||
      group.includes('ring') ||
      group === 'crowded' ||
      group.startsWith('beta') ||
      group === 'alkyl';
    const onlySigma = group.startsWith('para-');
    if (!onlySigma) list.push({ group, part: 'field', prior: field, sd: small ? SMALL_SD : FIELD_SD });
    if (!onlySigma && (!small || resonance !== 0))
      list.push({ group, part: 'resonance', prior: resonance, sd: RESONANCE_SD });
    if (sigma !== undefined)
      list.push({
        group,
        part: 'sigma',
        prior: sigma,
        sd: group.startsWith('para-') ? ACCEPTOR_SD : SIGMA_SD,
      });
  }
  for (const group of commonPairs(points)) list.push({ group, part: 'field', prior: 0, sd: PAIR_SD });
  return list;
}

/** Pairs of groups that meet in enough molecules. */
export function commonPairs(points: readonly Point[]): string[] {
  const counts = new Map<string, number>();
  for (const { activators } of points) {
    for (const pair of pairsOf(activators)) counts.set(pair, (counts.get(pair) ?? 0) + 1);
  }
  return [...counts]
    .filter(([, count]) => PAIR_COUNT <= count)
    .map(([pair]) => pair)
    .sort();
}

export function modelOf(
  centre: Centre,
  unknowns: readonly Unknown[],
  values: readonly number[],
): ActivationModel {
  const groups = new Map<string, { field: number; resonance: number; sigma: number; n: number }>();
  for (const name of Object.keys(PRIORS[centre]))
    groups.set(name, { field: 0, resonance: 0, sigma: 0, n: 0 });
  unknowns.forEach(({ group, part }, index) => {
    let own = groups.get(group);
    if (own === undefined && group.includes('&')) {
      own = { field: 0, resonance: 0, sigma: 0, n: 0 };
      groups.set(group, own);
    }
    if (own !== undefined) own[part] = values[index]!;
  });
  return { parent: values[0]!, limit: values[1]!, screening: values[2]!, sd: 0, groups };
}

/** Gauss–Newton with the priors as further observations. */
export function fit(centre: Centre, points: readonly Point[], unknowns: readonly Unknown[]): number[] {
  const values = unknowns.map(({ prior }) => prior);
  for (let round = 0; round < ROUNDS; round++) {
    const size = unknowns.length;
    const matrix = Array.from({ length: size }, () => new Array<number>(size).fill(0));
    const right = new Array<number>(size).fill(0);
    unknowns.forEach(({ prior, sd }, index) => {
      matrix[index]![index]! += 1 / sd ** 2;
      right[index]! += (prior - values[index]!) / sd ** 2;
    });
    const model = modelOf(centre, unknowns, values);
    const touched = points.map(
      ({ activators }) =>
        new Set([PARENT, LIMIT, SCREENING, ...activators.map(({ name }) => name), ...pairsOf(activators)]),
    );
    const slopes = points.map(() => new Map<number, number>());
    unknowns.forEach(({ group }, index) => {
      const moved = values.map((value, place) => (place === index ? value + STEP : value));
      const other = modelOf(centre, unknowns, moved);
      points.forEach(({ activators }, place) => {
        if (!touched[place]!.has(group)) return;
        slopes[place]!.set(
          index,
          (activatedValue(activators, other) - activatedValue(activators, model)) / STEP,
        );
      });
    });
    points.forEach(({ activators, value, sd }, place) => {
      // Far-off molecules pull with less than their full weight.
      const residual = value - activatedValue(activators, model);
      const variance = (sd ** 2 + POINT_SD ** 2) * Math.max(1, Math.abs(residual) / 2);
      for (const [one, slope] of slopes[place]!) {
        right[one]! += (slope * residual) / variance;
        for (const [two, factor] of slopes[place]!) matrix[one]![two]! += (slope * factor) / variance;
      }
    });
    const step = solve(matrix, right);
    step.forEach((by, index) => {
      values[index]! += 0.7 * by;
    });
  }
  return values;
}

function foldOf(key: string): number {
  let hash = 7;
  for (const letter of key) hash = (hash * 31 + letter.charCodeAt(0)) >>> 0;
  return hash % FOLDS;
}
