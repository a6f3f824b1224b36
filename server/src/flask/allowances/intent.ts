/**
 * Intent: what becomes of the anion decides whether an uphill transfer is a mistake.
 *
 * A conversion that uses it up needs only a small steady amount (Michael, Henry, Knoevenagel, aldol); a product with a
 * site more acidic than the base's conjugate acid pulls the whole reaction (Claisen, Dieckmann) and then needs a full
 * equivalent of base.
 */
import type { Constant, Couple } from '../../chemistry/couple.ts';

/** Below this log K, its sd in its favour, not even a steady amount is enough; common practice. */
export const STEADY_FROM = -8;

/** The most acidic site of a product that a base takes for good; null where it has none more acidic than the base's acid. */
export function endSite(
  couples: readonly Couple[],
  constants: readonly (Constant | null)[],
  basePKa: number,
): { readonly couple: Couple; readonly constant: Constant } | null {
  let best: { couple: Couple; constant: Constant } | null = null;
  couples.forEach((couple, place) => {
    const constant = constants[place];
    if (couple.kind !== 'acid' || constant == null || basePKa <= constant.value) return;
    if (best === null || constant.value < best.constant.value) best = { couple, constant };
  });
  return best;
}
