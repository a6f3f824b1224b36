/**
 * Where a compound is when two layers stand over each other: what the checks of work-up share.
 *
 * Knows: facts and solved flasks.  Must not know: findings of single checks.
 * Units: litre; shares 0 … 1; log D decimal.
 * Accuracy: an estimate, by the calculated log P of the neutral form.
 */
import { constantsIn } from '../chemistry/constants.ts';
import { LOG_P_SD, layerForms, organicShare } from '../flask/layers.ts';
import { normalBelow } from '../flask/numbers.ts';
import type { Ingredient } from '../flask/state.ts';
import type { Tables } from '../tables/tables.ts';
import type { Moment } from './facts.ts';

export interface Distributed {
  readonly one: Ingredient;
  /** Share in the organic layer, or in all of them where the water was extracted several times. */
  readonly organic: number;
  readonly logD: number;
  readonly pH: number;
  /** P(less than half is organic), P(less than half is aqueous). */
  readonly doubt: { readonly organic: number; readonly aqueous: number };
}

/** pKa values that are off move log D besides the log P. */
const LOG_D_SD = Math.hypot(LOG_P_SD, 0.3);

/** How a compound shares out at a moment with two layers; null without two, or where its log P is not known. */
export function distributedAt(
  { contents, state }: Moment,
  name: string,
  tables: Tables,
  portions = 1,
): Distributed | null {
  const { medium, pH } = state();
  const one = contents.ingredients.filter((other) => other.name === name).at(-1);
  if (medium.organic === null || pH === null || one?.molecule == null) return null;
  const { logD } = layerForms(one.molecule, pH, tables, constantsIn, one.own ?? []);
  if (logD === null) return null;
  const each = medium.organic.volume / portions;
  // log D at which half is left after all portions.
  const even = Math.log10((2 ** (1 / portions) - 1) * (medium.volume / each));
  const below = normalBelow((even - logD) / LOG_D_SD);
  return {
    one,
    organic: organicShare(logD, each, medium.volume, portions),
    logD,
    pH,
    doubt: { organic: below, aqueous: 1 - below },
  };
}

/** The pH nearest to the present one at which most of a compound is in a layer; null where there is none in water. */
export function betterPH(
  { one, pH }: Distributed,
  layer: 'organic' | 'aqueous',
  { state }: Moment,
  tables: Tables,
): number | null {
  const { medium } = state();
  if (medium.organic === null || one.molecule === null) return null;
  const { volume } = medium.organic;
  const better = WHOLE_PH.filter((value) => {
    const { logD } = layerForms(one.molecule!, value, tables, constantsIn, one.own ?? []);
    if (logD === null) return false;
    const share = organicShare(logD, volume, medium.volume);
    return MOST <= (layer === 'organic' ? share : 1 - share);
  });
  const nearest = better.sort((a, b) => Math.abs(a - pH) - Math.abs(b - pH))[0];
  return nearest ?? null;
}

/** pH values that a work-up is brought to. */
const WHOLE_PH = Array.from({ length: 13 }, (_, place) => place + 1);
/** Share that counts as in the layer. */
const MOST = 0.9;
