/**
 * Solves one flask: the pH, what holds its proton, what has left as gas.
 *
 * Knows: systems of acids.  Must not know: intended transfers, text.
 * Units: mol, litre, kelvin.
 * Invariants:
 *  1. The protons bound equal the protons charged within rounding.            (tests/flask/judge.test.ts)
 *  2. The same contents give the same bits; nothing is remembered.             (same)
 *  3. Ionic strength is iterated to a fixed point in a set number of turns.    (same)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Tables } from '../tables/tables.ts';
import { activityVariance, mixedConstants } from './activity.ts';
import { formShares, HIGHEST_PH, LOWEST_PH, type Polyprotic, solveBalance, stepShares } from './balance.ts';
import type { FlaskAcid, FlaskSystem, Participation } from './flask-acid.ts';
import { isCalled } from './kinetics.ts';
import { mediumFor } from './scale-choice.ts';
import type { ConstantsIn, Contents, CoupleState, FlaskState, Ingredient, Medium } from './state.ts';
import { systemOf } from './system.ts';

const MOST_TURNS = 100;
/** mol/L within which the ionic strength has settled; it moves the pH by less than 1e-10. */
const FIXED = 1e-11;
/** Share of an organometallic or hydride that must be left for it to be the one that reacts. */
const LEFT_OVER = 0.01;
const EDGE = 1e-6;
const HYDRIDE = 'hydride';
/** Less of a hydride than this eaten is not told as gas. */
const LEAST_SHARE = 1e-3;

/** A system with its balance: what the judge and the fates read. */
export interface Solved {
  readonly contents: Contents;
  readonly medium: Medium;
  readonly system: FlaskSystem;
  /** Parallel to the acids of the system, with the constants that hold between pH and concentrations. */
  readonly acids: readonly Polyprotic[];
  /** Parallel to them: for each step the share that holds its proton, gases counted with the form that left. */
  readonly shares: readonly (readonly number[])[];
  readonly left: readonly number[];
  readonly pH: number;
  readonly ionicStrength: number | null;
  /** mol */
  readonly residual: number;
}

/** The state of a flask once the protons have come to rest. */
export function solveFlask(
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): FlaskState {
  return stateOf(solveContents(contents, tables, constantsIn));
}

/** Solves contents with everything that takes part in them. */
export function solveContents(
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn,
  participation: Participation = {},
): Solved {
  const medium = mediumFor(contents, tables, constantsIn);
  const solve = (how: Participation) =>
    solveSystem(contents, medium, systemOf(contents, medium, tables, constantsIn, how));
  const adders = contents.ingredients.filter((one) => addsToCarbonyls(one, tables));
  if (adders.length === 0) return solve(participation);
  // What nothing acidic has eaten adds to carbonyl groups; once it is eaten, its successor enolises them.
  const sparing = solve({ ...participation, sparingCarbonyls: true });
  const isLeft = adders.some(({ id }) => LEFT_OVER < shareUnprotonated(sparing, id));
  return isLeft ? sparing : solve(participation);
}

/** Whether a reagent adds to a carbonyl group rather than taking the proton beside it. */
function addsToCarbonyls(one: Ingredient, tables: Tables): boolean {
  if (isCalled(one, 'role:organometallic')) return true;
  return tables.hydrides.find(({ reagent }) => isCalled(one, reagent))?.carbon === false;
}

/** Solves a system in its medium. */
export function solveSystem(contents: Contents, medium: Medium, system: FlaskSystem): Solved {
  let ionicStrength = 0;
  let acids = atStrength(system, medium, contents.temperature, 0);
  let balance = solveBalance(acids);
  for (let turn = 0; medium.aqueous && turn < MOST_TURNS; turn++) {
    const next = strengthOf(system, acids, balance.pH, balance.left, medium);
    if (Math.abs(next - ionicStrength) < FIXED) break;
    ionicStrength = next;
    acids = atStrength(system, medium, contents.temperature, ionicStrength);
    balance = solveBalance(acids);
  }
  const shares = acids.map((acid, place) => sharesOf(acid, balance.pH, balance.left[place]!));
  return {
    contents,
    medium,
    system,
    acids,
    shares,
    left: balance.left,
    pH: balance.pH,
    ionicStrength: medium.aqueous ? ionicStrength : null,
    residual: balance.residual,
  };
}

/** What the outside sees of a solved system. */
export function stateOf(solved: Solved): FlaskState {
  const { medium, system, contents, pH, shares, ionicStrength } = solved;
  const variance = ionicStrength === null ? 0 : activityVariance(ionicStrength);
  const couples: CoupleState[] = system.acids.flatMap((acid, place) =>
    acid.steps.map(({ couple, constant }, step) => ({
      ingredient: acid.ingredient,
      couple,
      constant: variance === 0 ? constant : { ...constant, sd: Math.sqrt(constant.sd ** 2 + variance) },
      amount: acid.amount,
      protonated: shares[place]![step]!,
      charged: chargedShare(acid, step),
    })),
  );
  const hasMeaning =
    medium.solvent !== null && couples.length !== 0 && LOWEST_PH + EDGE < pH && pH < HIGHEST_PH - EDGE;
  return {
    medium,
    temperature: contents.temperature,
    pH: hasMeaning ? pH : null,
    ionicStrength,
    couples,
    gases: gasesOf(solved),
    residual: solved.residual / medium.volume,
  };
}

/** What has left, the hydrogen of complex hydrides included. */
function gasesOf({ system, left, shares }: Solved): FlaskState['gases'] {
  return system.acids.flatMap(({ gas, ingredient, steps, amount }, place) => {
    if (steps[0]!.couple.family === HYDRIDE) {
      const mol = amount * shares[place]![0]!;
      return LEAST_SHARE * amount < mol ? [{ name: 'H2', mol, ingredient }] : [];
    }
    const mol = left[place]!;
    return gas === null || mol <= 0 ? [] : [{ name: gas.name, mol, ingredient }];
  });
}

/** Share of a step's proton that was there as charged: the lowest steps are lost first. */
export function chargedShare({ steps, protonsCharged }: FlaskAcid, step: number): number {
  return Math.min(1, Math.max(0, protonsCharged - (steps.length - step - 1)));
}

function shareUnprotonated({ system, shares }: Solved, ingredient: number): number {
  let share = 0;
  system.acids.forEach((acid, place) => {
    if (acid.ingredient !== ingredient) return;
    acid.steps.forEach(({ couple }, step) => {
      if (!couple.holdsProton) share = Math.max(share, 1 - shares[place]![step]!);
    });
  });
  return share;
}

function atStrength(
  { acids }: FlaskSystem,
  medium: Medium,
  temperature: number,
  ionicStrength: number,
): Polyprotic[] {
  return acids.map(({ steps, shifts, amount, protonsCharged, fullCharge, gas }) => {
    const values = steps.map(({ constant }) => constant.value);
    const mixed = medium.aqueous ? mixedConstants(values, fullCharge, ionicStrength, temperature) : values;
    return { pKa: mixed.map((value, step) => value + shifts[step]!), amount, protonsCharged, gas };
  });
}

/** Half of the sum of concentration × charge². */
function strengthOf(
  { acids: flaskAcids, spectatorCharges }: FlaskSystem,
  acids: readonly Polyprotic[],
  pH: number,
  left: readonly number[],
  { volume }: Medium,
): number {
  let charges = spectatorCharges;
  acids.forEach(({ pKa, amount }, place) => {
    const { fullCharge } = flaskAcids[place]!;
    formShares(pKa, pH).forEach((share, held) => {
      charges += (amount - left[place]!) * share * (fullCharge - pKa.length + held) ** 2;
    });
  });
  return charges / (2 * volume);
}

function sharesOf(acid: Polyprotic, pH: number, left: number): number[] {
  const dissolved = stepShares(acid.pKa, pH);
  if (left === 0) return dissolved;
  const gone = left / acid.amount;
  const protons = acid.gas!.protons;
  return dissolved.map((share, step) => share * (1 - gone) + (acid.pKa.length - step <= protons ? gone : 0));
}
