/**
 * The range of acidity that a solvent allows, on its own scale and on the absolute one.
 *
 * Knows: rows of solvents.  Must not know: flasks, text.
 * Units: pH on the solvent's own scale; absolute pH counted from the standard proton in water (pH_abs − pH_abs(H+, water, 1 M)).
 * Source: D. Himmel, S. K. Goll, I. Leito, I. Krossing, Angew. Chem. Int. Ed. 2010, 49, 6885.
 * Invariant: the absolute window is as wide as the own one.   (tests/flask/shares.test.ts)
 */
import type { SolventRow } from '../tables/rows.ts';

export interface SolventWindow {
  /** From 1 M lyonium to 1 M lyate; null without an autoprotolysis constant. */
  readonly own: { readonly low: number; readonly high: number } | null;
  /** The same against water; null without a transfer energy of the proton. */
  readonly absolute: { readonly low: number; readonly high: number; readonly sd: number } | null;
}

/** kJ/mol for one unit of pH at 25 °C. */
export const KJ_PER_UNIT = 8.314462618e-3 * 298.15 * Math.LN10;

/** The window of a solvent. */
export function solventWindow({ pKs, protonTransferEnergy, transferSd }: SolventRow): SolventWindow {
  if (pKs === null) return { own: null, absolute: null };
  const own = { low: 0, high: pKs };
  if (protonTransferEnergy === null) return { own, absolute: null };
  // A proton that is less at home than in water (positive transfer energy) is the more acidic: its pH counts lower.
  const shift = -protonTransferEnergy / KJ_PER_UNIT;
  const sd = (transferSd ?? 0) / KJ_PER_UNIT;
  return { own, absolute: { low: own.low + shift, high: own.high + shift, sd } };
}
