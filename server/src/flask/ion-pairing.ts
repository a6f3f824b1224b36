/**
 * Lets acids pair with the amine that acts in an aprotic flask: what the balance is solved with there.
 *
 * Knows: acids of a flask, their constants in water.  Must not know: verdicts, text.
 * Units: pKa.
 * Invariant: without an amine as the strongest base nothing is moved.   (tests/flask/uptake.test.ts)
 */
import type { Constant, Couple } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import { formsIonPair } from './allowances/ion-pair.ts';
import type { FlaskAcid } from './flask-acid.ts';
import type { ConstantsIn, Contents, Medium, Site } from './state.ts';

/** Share of the amine's amount from which another, stronger base is the one that acts. */
const ACTING_SHARE = 0.05;
const WATER = 'water';

/** The acids with the shifts of O–H, N–H and S–H steps that pair with the acting amine. */
export function withIonPairs(
  acids: readonly FlaskAcid[],
  contents: Contents,
  medium: Medium,
  tables: Tables,
  constantsIn: ConstantsIn,
): FlaskAcid[] {
  if (medium.protic || medium.aqueous) return [...acids];
  const amine = actingAmine(acids, medium);
  if (amine === null) return [...acids];
  const base = constantInWater(amine, contents, tables, constantsIn)?.value ?? null;
  if (base === null) return [...acids];
  return acids.map((acid) => {
    const shifts = acid.steps.map(({ couple, constant }, step) => {
      const before = acid.shifts[step]!;
      if (!formsIonPair(couple, amine.couple, medium)) return before;
      const site = { ingredient: acid.ingredient, couple, constant };
      const own = constantInWater(site, contents, tables, constantsIn)?.value ?? null;
      if (own === null) return before;
      // Pairing only ever helps; where the scale already says more, it stands.
      return before + Math.min(0, amine.constant.value - (base - own) - constant.value);
    });
    return { ...acid, shifts };
  });
}

/** The strongest base as charged, if it is a neutral amine. */
function actingAmine(acids: readonly FlaskAcid[], medium: Medium): Site | null {
  const free = acids.flatMap(({ ingredient, steps, amount, protonsCharged, isSolvent }) => {
    if (isSolvent) return [];
    // The highest step that has lost its proton is the base that acts.
    const step = steps[steps.length - 1 - protonsCharged];
    return step === undefined ? [] : [{ ingredient, ...step, amount }];
  });
  const probe = { element: 'O', kind: 'acid' } as const;
  const amines = free.filter(({ couple }) => formsIonPair({ ...couple, ...probe }, couple, medium));
  if (amines.length === 0) return null;
  const best = amines.reduce((most, one) => (most.constant.value < one.constant.value ? one : most));
  const isOutdone = free.some(
    (one) => best.constant.value < one.constant.value && ACTING_SHARE * best.amount <= one.amount,
  );
  return isOutdone ? null : best;
}

/** The constant in water of a site of the flask; null where there is none. */
export function constantInWater(
  { ingredient, couple }: Site,
  { ingredients }: Contents,
  tables: Tables,
  constantsIn: ConstantsIn,
): Constant | null {
  const one = ingredients.find(({ id }) => id === ingredient);
  // A remembered answer may point at couples of an earlier perception of the same text.
  const place = one?.molecule?.couples.findIndex((own) => isOne(own, couple)) ?? -1;
  if (one?.molecule == null || place === -1) return null;
  const { couples } = constantsIn(one.molecule, WATER, tables, one.own ? { own: one.own } : {});
  return couples[place] ?? null;
}

function isOne(a: Couple, b: Couple): boolean {
  return a.kind === b.kind && a.atom === b.atom && a.holdsProton === b.holdsProton;
}
