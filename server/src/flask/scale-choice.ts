/**
 * Chooses the scale on which a flask is worked, and fills in what no correlation reaches.
 *
 * One balance needs one scale. Where a solvent's own scale lacks a couple that takes part, an aprotic flask falls back to
 * the DMSO scale; in hydroxylic solvents the missing couple is taken over from water by the usual shift, with wide doubt.
 * Knows: constants on several scales.  Must not know: text.
 * Units: pKa.
 * Basis: recalled; neutral acids gain about 4.5 units from water to the lower alcohols, ammonium ions hardly any
 * (M. Rosés, E. Bosch, J. Chromatogr. A 2002, 982, 1); strong acids and bases are levelled, so their figure hardly matters.
 * Invariant: a constant that the chemistry gives on the scale is never replaced.   (tests/flask/fates.test.ts)
 */
import type { Constant, Couple, Perceived, ProtonStep } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import { mediumOf } from './medium.ts';
import type { ConstantsIn, Contents, Ingredient, Medium } from './state.ts';

const DMSO = 'DMSO';
const WATER = 'water';
const BORROWED_SD = 1.5;
/** Couples outside play no part in an aprotic flask. */
const LOWEST = -5;
const HIGHEST = 60;

const TO_ALCOHOL = { acid: { shift: 4.5, sd: 2.5 }, base: { shift: 0.5, sd: 2 } } as const;
/** On an aprotic scale only the extremes can be told without a correlation: strong acids and strong bases of water. */
const STRONG_ACID = { below: -1, value: 2, shift: 8, sd: 3 };
const STRONG_BASE = { above: 25, shift: 3, sd: 4 };

/** What surrounds the couples, on a scale that reaches all that take part. */
export function mediumFor(contents: Contents, tables: Tables, constantsIn: ConstantsIn): Medium {
  const medium = mediumOf(contents);
  if (medium.protic || medium.aqueous || medium.scale === DMSO) return medium;
  const isReached = contents.ingredients.every(
    (one) =>
      one.role === 'solvent' || one.role === 'inert' || isOnScale(one, medium.scale, tables, constantsIn),
  );
  if (isReached) return medium;
  return { ...medium, scale: DMSO, scaleSd: Math.max(medium.scaleSd, BORROWED_SD) };
}

function isOnScale(
  { molecule, own }: Ingredient,
  scale: string,
  tables: Tables,
  constantsIn: ConstantsIn,
): boolean {
  if (molecule === null) return true;
  const options = own ? { own } : {};
  const here = constantsIn(molecule, scale, tables, options).couples;
  const there = constantsIn(molecule, DMSO, tables, options).couples;
  return there.every(
    (constant, place) =>
      constant === null || constant.value < LOWEST || HIGHEST < constant.value || here[place] != null,
  );
}

/** The steps of a molecule on the medium's scale, with those that only water's scale reaches taken over. */
export function stepsIn(
  molecule: Perceived,
  own: Ingredient['own'],
  medium: Medium,
  tables: Tables,
  constantsIn: ConstantsIn,
): readonly (readonly ProtonStep[])[] {
  const options = own ? { own } : {};
  const here = constantsIn(molecule, medium.scale, tables, options).steps;
  if (medium.scale === WATER) return here;
  const inWater = constantsIn(molecule, WATER, tables, options).steps;
  return here.map((list, place) => {
    const known = new Set(list.map(({ couple }) => nameOf(couple)));
    const missing = (inWater[place] ?? []).flatMap((step): ProtonStep[] => {
      if (known.has(nameOf(step.couple))) return [];
      const constant = takenOver(step, medium);
      return constant === null ? [] : [{ couple: step.couple, constant }];
    });
    return missing.length === 0 ? list : [...list, ...missing];
  });
}

function nameOf({ kind, atom, holdsProton }: Couple): string {
  return `${kind} ${atom} ${holdsProton}`;
}

function takenOver({ couple, constant }: ProtonStep, { scale, protic }: Medium): Constant | null {
  const add = ({ shift, sd }: { shift: number; sd: number }) =>
    moved(constant, constant.value + shift, sd, scale);
  if (protic) return add(TO_ALCOHOL[couple.kind]);
  if (couple.kind === 'acid' && constant.value < STRONG_ACID.below) {
    return moved(
      constant,
      Math.min(STRONG_ACID.value, constant.value + STRONG_ACID.shift),
      STRONG_ACID.sd,
      scale,
    );
  }
  return STRONG_BASE.above < constant.value ? add(STRONG_BASE) : null;
}

function moved(constant: Constant, value: number, sd: number, scale: string): Constant {
  const hop = {
    what: `taken over from water to ${scale}, where no correlation leads`,
    value,
    sd,
    sources: ['roses-2002'],
  };
  return {
    ...constant,
    value,
    sd: Math.hypot(constant.sd, sd),
    scale,
    origin: 'carried',
    hops: [...constant.hops, hop],
  };
}
