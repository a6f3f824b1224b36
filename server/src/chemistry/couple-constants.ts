/**
 * The constant of every couple of a molecule on one scale, from the most trusted value that reaches it.
 *
 * Trust falls in this order: the plan's own value, the house's, a measured value on this scale, a measured value
 * carried over, an estimate on this scale, an estimate carried over. Each hop adds its variance and a printable line.
 * Knows: couples, estimates.  Must not know: where values are stored, flasks, plans.
 * Invariants:
 *  1. `couples` is parallel to the molecule's couples; `steps` of a component rise.   (tests/chemistry/couple-constants.test.ts)
 *  2. A measured value is returned unchanged on its own scale.
 */
import type { ScaleId } from '../tables/rows.ts';
import { basesFactor, chargePull, donationFactor, makesTautomer } from './charges.ts';
import type { Constant, Couple, OwnValue, Perceived, ProtonStep } from './couple.ts';
import { type EstimatorTables, estimateInWater } from './estimate.ts';
import type { Graph } from './graph.ts';
import { type MicroSite, macroscopicSteps } from './microstates.ts';
import { neutralForm } from './neutral.ts';

export interface ConstantOptions {
  /** Leaves out every measured value, to judge the estimates. */
  readonly estimateOnly?: boolean;
  readonly own?: readonly OwnValue[];
}

/** A measured value found for a couple; `step` counts protons lost by the fully protonated form, from 1. */
export interface MeasuredConstant {
  readonly couple: number;
  readonly step: number | null;
  readonly constant: Constant;
}

/** Where values other than estimates in water come from. */
export interface ConstantSources {
  readonly measured: (perceived: Perceived) => readonly MeasuredConstant[];
  /** A value taken to another scale; null where no correlation leads there. */
  readonly carry: (constant: Constant, couple: Couple, to: ScaleId) => Constant | null;
  /** An estimate made directly on a scale other than water; null where there is none. */
  readonly estimateElsewhere: (perceived: Perceived, couple: Couple, scale: ScaleId) => Constant | null;
}

export interface MoleculeConstants {
  /** Parallel to the molecule's couples; null where no value is known. */
  readonly couples: readonly (Constant | null)[];
  /** For each component its stepwise constants from the most acidic proton of the fully protonated form. */
  readonly steps: readonly (readonly ProtonStep[])[];
}

/** Couples outside this range of water never change their state in a flask together with others. */
const LOWEST_COUPLED = -3;
const HIGHEST_COUPLED = 21;
const WATER = 'water';
/** Opposite charges pull less than equal ones push, as amino acids against diamines show. */
const OPPOSITE_SHARE = 0.85;
/** sd that the pull between charges adds to an estimated step. */
const PULL_SD = 0.35;
/** sd of an own value that names none. */
const OWN_SD = 0.1;

export function coupleConstants(
  perceived: Perceived,
  scale: ScaleId,
  tables: EstimatorTables,
  sources: ConstantSources,
  options: ConstantOptions = {},
): MoleculeConstants {
  if (perceived.graph === null)
    return { couples: perceived.couples.map(() => null), steps: perceived.components.map(() => []) };
  const known = options.estimateOnly ? [] : sources.measured(perceived);
  const measured = known.filter(({ constant }) => constant.origin !== 'house');
  const house = known.filter(({ constant }) => constant.origin === 'house');
  // The house's values go in first, so that the plan's have the last word.
  const own = [
    ...house,
    ...[...(options.own ?? [])]
      .sort((a, b) => rank(a) - rank(b))
      .flatMap((value) => ownConstants(perceived, value)),
  ];
  const water = estimatedSteps(perceived, neutralForm(perceived.graph).graph, tables);
  const steps =
    scale === WATER
      ? overridden(perceived, water, WATER, measured, own, sources)
      : elsewhere(perceived, water, scale, measured, own, sources);
  return {
    couples: perceived.couples.map((couple) => reported(couple, steps[couple.component] ?? [])),
    steps,
  };
}

function rank({ origin }: OwnValue): number {
  return origin === 'house' ? 0 : 1;
}

/** Every value on another scale stands alone; further steps of one couple are carried from water. */
function elsewhere(
  perceived: Perceived,
  water: readonly (readonly ProtonStep[])[],
  scale: ScaleId,
  measured: readonly MeasuredConstant[],
  own: readonly MeasuredConstant[],
  sources: ConstantSources,
): ProtonStep[][] {
  const inWater = overridden(perceived, water, WATER, measured, own, sources);
  const carried = inWater.map((list) => {
    const seen = new Set<Couple>();
    return list.flatMap((step): ProtonStep[] => {
      const first = !seen.has(step.couple);
      seen.add(step.couple);
      const direct =
        first && step.constant.origin === 'estimated'
          ? sources.estimateElsewhere(perceived, step.couple, scale)
          : null;
      const constant = direct ?? sources.carry(step.constant, step.couple, scale);
      return constant === null ? [] : [{ couple: step.couple, constant }];
    });
  });
  return overridden(perceived, carried, scale, measured, own, sources);
}

/** Puts measured and own values in the place of less trusted ones, step by step, and brings the steps into order. */
function overridden(
  perceived: Perceived,
  steps: readonly (readonly ProtonStep[])[],
  scale: ScaleId,
  measured: readonly MeasuredConstant[],
  own: readonly MeasuredConstant[],
  sources: ConstantSources,
): ProtonStep[][] {
  const result = steps.map((list) => [...list]);
  const counted = countedSteps(perceived, steps, [...measured, ...own]);
  /** Which measured step each place holds. */
  const settled = perceived.components.map(() => new Map<number, number | null>());
  const put = ({ couple: index, step, constant }: MeasuredConstant) => {
    const couple = perceived.couples[index]!;
    const list = result[couple.component]!;
    const known = step === null ? undefined : counted[couple.component]!.get(step);
    const nearest = known?.place ?? nearestPlace(list, couple, constant);
    // A molecule may have more measured steps than the estimate gives its couple: sulfuric acid has one.
    const other = settled[couple.component]!.get(nearest);
    const place = other == null || step === null || other === step ? nearest : -1;
    settled[couple.component]!.set(place === -1 ? list.length : place, step);
    if (place === -1) list.push({ couple, constant });
    else
      list[place] = {
        couple: known?.couples.has(list[place]!.couple) ? list[place]!.couple : couple,
        constant,
      };
  };
  const here = measured.filter(({ constant }) => constant.scale === scale);
  const covered = new Set(here.map(({ couple, step }) => `${couple} ${step}`));
  const carried = measured
    .filter(({ couple, step, constant }) => constant.scale !== scale && !covered.has(`${couple} ${step}`))
    .flatMap((value) => {
      const constant = sources.carry(value.constant, perceived.couples[value.couple]!, scale);
      return constant === null ? [] : [{ ...value, constant }];
    });
  // The surest comes last and stays.
  for (const value of carried.sort((a, b) => b.constant.sd - a.constant.sd)) put(value);
  for (const value of here) put(value);
  for (const value of own) {
    const constant =
      value.constant.scale === scale
        ? value.constant
        : sources.carry(value.constant, perceived.couples[value.couple]!, scale);
    if (constant !== null) put({ ...value, constant });
  }
  for (const list of result) list.sort((a, b) => a.constant.value - b.constant.value);
  return result;
}

interface CountedStep {
  readonly place: number;
  /** Couples of the row's site: one, or the equivalent atoms of which only some have lost their proton. */
  readonly couples: ReadonlySet<Couple>;
}

/**
 * Where in the list of each component the measured steps belong.
 *
 * They count the protons of the sites that the rows name; the weakly basic oxygens of an acid, say, are not among them.
 */
function countedSteps(
  { couples, components }: Perceived,
  steps: readonly (readonly ProtonStep[])[],
  measured: readonly MeasuredConstant[],
): ReadonlyMap<number, CountedStep>[] {
  return components.map(({ index }) => {
    const sites = new Map<number, Set<Couple>>();
    for (const { couple, step } of measured) {
      if (step === null || couples[couple]!.component !== index) continue;
      sites.set(step, (sites.get(step) ?? new Set()).add(couples[couple]!));
    }
    const named = new Set([...sites.values()].flatMap((set) => [...set]));
    const places = steps[index]!.flatMap(({ couple }, place) => (named.has(couple) ? [place] : []));
    const numbers = [...sites.keys()].sort((a, b) => a - b);
    const placeOf = (step: number) => {
      if ((numbers.at(-1) ?? 0) <= places.length) return places[step - 1];
      return numbers.length === places.length ? places[numbers.indexOf(step)] : undefined;
    };
    return new Map(
      numbers.flatMap((step) => {
        const place = placeOf(step);
        return place === undefined ? [] : [[step, { place, couples: sites.get(step)! }] as const];
      }),
    );
  });
}

/** The step of a couple that lies nearest to a value; −1 where the couple has none. */
function nearestPlace(list: readonly ProtonStep[], couple: Couple, constant: Constant): number {
  let best = -1;
  list.forEach((one, place) => {
    if (one.couple !== couple) return;
    const nearer =
      best === -1 ||
      Math.abs(one.constant.value - constant.value) < Math.abs(list[best]!.constant.value - constant.value);
    if (nearer) best = place;
  });
  return best;
}

/** An own value with its couple: the one at its atoms, or the molecule's only one. */
function ownConstants(perceived: Perceived, own: OwnValue): MeasuredConstant[] {
  const at = perceived.couples
    .map((couple, index) => ({ couple, index }))
    .filter(
      ({ couple }) => own.atoms.length === 0 || couple.equivalents.some((atom) => own.atoms.includes(atom)),
    );
  const chosen = at.find(({ couple }) => couple.holdsProton) ?? at[0];
  if (chosen === undefined) return [];
  const sd = own.sd ?? OWN_SD;
  const what = own.origin === 'plan' ? 'measured, as the plan says' : 'measured, from the house file';
  const sources = own.source === '' ? [] : [own.source];
  const hop = { what, value: own.value, sd, sources };
  return [
    {
      couple: chosen.index,
      step: null,
      constant: { value: own.value, sd, scale: own.scale, origin: own.origin, sources, hops: [hop] },
    },
  ];
}

/** Steps in water from the estimates of all couples and the pull of their charges. */
function estimatedSteps(perceived: Perceived, graph: Graph, tables: EstimatorTables): ProtonStep[][] {
  const estimates = perceived.couples.map((couple) => estimateInWater(graph, couple, 1, tables));
  return perceived.components.map(({ index: component }) => {
    const places: Place[] = [];
    const alone: ProtonStep[] = [];
    perceived.couples.forEach((couple, index) => {
      const constant = estimates[index];
      if (couple.component !== component || constant === null || constant === undefined) return;
      const coupled =
        LOWEST_COUPLED < constant.value && constant.value < HIGHEST_COUPLED && couple.element !== 'C';
      if (!coupled) {
        alone.push({ couple, constant: withStatistics(constant, couple) });
        return;
      }
      for (const atom of couple.equivalents) {
        places.push({
          atom,
          site: { pK: constant.value, kind: couple.kind, couple: index, held: couple.holdsProton },
        });
      }
    });
    const steps = macroscopicSteps(
      places.map(({ site }) => site),
      (first, second) => pull(perceived, graph, places[first]!, places[second]!),
    ).map(
      ({ pK, couple }): ProtonStep => ({
        couple: perceived.couples[couple]!,
        constant: moved(estimates[couple]!, pK),
      }),
    );
    return [...steps, ...alone].sort((a, b) => a.constant.value - b.constant.value);
  });
}

interface Place {
  readonly site: MicroSite;
  readonly atom: number;
}

/** The pull over two bonds, below every pull over fewer. */
const BY_TWO_BONDS = 4.5;
/** Acids whose anion is no tautomer of anything, even beside a base of the same π system. */
const ZWITTERIONIC = new Set(['carboxylic-acid', 'sulfonic-acid', 'phosphoric', 'boronic-acid']);

/** The pull between two sites; none where acid and base only exchange a proton within one π system. */
function pull({ couples }: Perceived, graph: Graph, one: Place, other: Place): number {
  const alone = chargePull(graph, one.atom, other.atom);
  if (alone === 0) return 0;
  if (one.site.kind === other.site.kind) {
    return one.site.kind === 'acid' ? alone : alone * basesFactor(graph, one.atom, other.atom);
  }
  const acid = one.site.kind === 'acid' ? one : other;
  // Two atoms on a third share one proton in either place.
  if (BY_TWO_BONDS <= alone) return 0;
  const keepsZwitterion = ZWITTERIONIC.has(couples[acid.site.couple]!.family);
  if (!keepsZwitterion && makesTautomer(graph, one.atom, other.atom)) return 0;
  return OPPOSITE_SHARE * alone * donationFactor(graph, one.atom, other.atom);
}

function withStatistics(constant: Constant, couple: Couple): Constant {
  const shift = Math.log10(couple.equivalents.length) * (couple.kind === 'acid' ? -1 : 1);
  return shift === 0 ? constant : moved(constant, constant.value + shift);
}

/** The estimate of a site moved to the step of the whole molecule. */
function moved(constant: Constant, value: number): Constant {
  const shift = value - constant.value;
  if (Math.abs(shift) < 0.005) return constant;
  const added = PULL_SD * Math.min(2, Math.abs(shift));
  const hop = {
    what: 'charges and equal sites of the same molecule',
    value: shift,
    sd: added,
    sources: ['perrin-1981'],
  };
  return { ...constant, value, sd: Math.hypot(constant.sd, added), hops: [...constant.hops, hop] };
}

/** A couple that holds its proton loses it in the lowest of its steps; one that has lost it takes one in the highest. */
function reported(couple: Couple, steps: readonly ProtonStep[]): Constant | null {
  const own = steps.filter((step) => step.couple === couple);
  const step = couple.holdsProton ? own[0] : own.at(-1);
  return step?.constant ?? null;
}
