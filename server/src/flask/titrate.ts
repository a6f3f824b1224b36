/**
 * How much of a reagent brings an aqueous phase to a pH.
 *
 * At a given pH every form's share is known, so the needed amount follows from the balance without searching for the pH;
 * only gases and ionic strength make it a search over the amount.
 * Knows: systems of acids.  Must not know: text.
 * Units: mol.  The volume that the reagent brings is not added.
 * Invariant: adding the amount and solving gives the pH asked for within 0.01.   (tests/flask/titrate.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Tables } from '../tables/tables.ts';
import { mixedConstants } from './activity.ts';
import { formShares, gasLeft, type Polyprotic, protonExcess } from './balance.ts';
import type { FlaskSystem } from './flask-acid.ts';
import { mediumOf } from './medium.ts';
import { fallingRoot } from './numbers.ts';
import { solveFlask } from './solve.ts';
import type { ConstantsIn, Contents, FlaskState, Ingredient } from './state.ts';
import { systemOf } from './system.ts';

export interface Titration {
  /** mol needed; null where no amount reaches the pH. */
  readonly mol: number | null;
  /** Why not: no aqueous phase, the flask lies already beyond, or the reagent is too weak. */
  readonly obstacle: 'no-water' | 'already-beyond' | 'out-of-reach' | null;
  /** pH before the addition. */
  readonly before: number | null;
  /** The pH that a great excess of the reagent gives. */
  readonly limit: number | null;
  /** The flask with the needed amount in it. */
  readonly after: FlaskState | null;
}

/** Within this of the pH asked for there is nothing to add. */
const NEAR = 0.05;
/** More than this many mol for each litre of water can't be poured in. */
const MOST_MOLAR = 30;
const MOST_TURNS = 60;
const SETTLED = 1e-9;

/** The amount of `reagent` (its own `mol` does not count) that brings the flask's aqueous phase to `pH`. */
export function titrateTo(
  contents: Contents,
  pH: number,
  reagent: Ingredient,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): Titration {
  const medium = mediumOf(contents);
  const nothing = { mol: null, before: null, limit: null, after: null };
  if (!medium.aqueous) return { ...nothing, obstacle: 'no-water' };
  const before = solveFlask(contents, tables, constantsIn).pH;
  if (before !== null && Math.abs(before - pH) < NEAR) {
    return { mol: 0, obstacle: null, before, limit: null, after: solveFlask(contents, tables, constantsIn) };
  }
  const most = MOST_MOLAR * medium.volume;
  const withAmount = (mol: number): Contents => ({
    ...contents,
    ingredients: [...contents.ingredients, { ...reagent, mol }],
  });
  const limit = solveFlask(withAmount(most), tables, constantsIn).pH;
  const reached = { before, limit };
  if (before !== null && limit !== null && (pH - before) * (limit - before) < 0) {
    return { ...nothing, ...reached, obstacle: 'already-beyond' };
  }
  if (before !== null && limit !== null && Math.abs(limit - before) < Math.abs(pH - before)) {
    return { ...nothing, ...reached, obstacle: 'out-of-reach' };
  }
  const system = systemOf(withAmount(1), medium, tables, constantsIn);
  const ions = systemOf(contents, medium, tables, constantsIn).spectatorCharges;
  const spectators = (amount: number) => ions + (system.spectatorCharges - ions) * amount;
  const question = { system, id: reagent.id, pH, most, volume: medium.volume, spectators };
  const mol = amountAt(question, contents.temperature);
  if (mol === null) return { ...nothing, ...reached, obstacle: 'out-of-reach' };
  return { mol, obstacle: null, ...reached, after: solveFlask(withAmount(mol), tables, constantsIn) };
}

interface Question {
  readonly system: FlaskSystem;
  readonly id: number;
  readonly pH: number;
  readonly most: number;
  readonly volume: number;
  /** Sum of amount × charge² of ions without protons, for an amount of reagent. */
  readonly spectators: (amount: number) => number;
}

/** The amount at which the balance closes at a pH, ionic strength settled with it. */
function amountAt(question: Question, temperature: number): number | null {
  const { system, id, pH, most, volume, spectators } = question;
  let strength = 0;
  let amount = 0;
  for (let turn = 0; turn < MOST_TURNS; turn++) {
    const at = (mol: number): Polyprotic[] =>
      system.acids.map((acid) => {
        const values = acid.steps.map(({ constant }) => constant.value);
        const pKa = mixedConstants(values, acid.fullCharge, strength, temperature).map(
          (value, step) => value + acid.shifts[step]!,
        );
        const share = acid.ingredient === id ? mol : acid.amount;
        return { pKa, amount: share, protonsCharged: acid.protonsCharged, gas: acid.gas };
      });
    const start = protonExcess(at(0), pH);
    const end = protonExcess(at(most), pH);
    if (0 < start * end) return null;
    const sign = end < start ? 1 : -1;
    const next = fallingRoot((mol) => sign * protonExcess(at(mol), pH), 0, most);
    const now = (chargesOf(system, at(next), pH) + spectators(next)) / (2 * volume);
    const isSettled = Math.abs(next - amount) <= SETTLED * next && Math.abs(now - strength) < SETTLED;
    amount = next;
    strength = now;
    if (isSettled) break;
  }
  return amount;
}

/** Sum of amount × charge² of the forms in solution. */
function chargesOf({ acids: flaskAcids }: FlaskSystem, acids: readonly Polyprotic[], pH: number): number {
  let charges = 0;
  acids.forEach((acid, place) => {
    const { fullCharge } = flaskAcids[place]!;
    const dissolved = acid.amount - gasLeft(acid, pH);
    formShares(acid.pKa, pH).forEach((share, held) => {
      charges += dissolved * share * (fullCharge - acid.pKa.length + held) ** 2;
    });
  });
  return charges;
}
