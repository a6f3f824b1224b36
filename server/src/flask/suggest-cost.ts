/**
 * What speaks against an option, so that a list can be put in order: one figure in units of pKa, lower is better.
 *
 * Knows: verdicts, neighbouring sites.  Must not know: reagents, solvents, text.
 * The weights are choices of the trade, not measurements; the order they give is held to everyday steps.
 * Invariant: written choices that work come first in nine everyday steps of ten.   (tests/answers/suggest-practice.test.ts)
 */
import type { OtherSite } from './fates.ts';
import type { Verdict } from './state.ts';

/** Weights in units of pKa. */
export const COST = {
  newReagent: 0.6,
  otherTemperature: 0.2,
  limit: 1.5,
  ahead: 2,
  undecided: 4,
  steady: 3,
  slimMargin: { below: 1.5, unit: 0.8 },
  idleMargin: { above: 6, unit: 0.03 },
  nextSite: { below: 3, unit: 0.7 },
} as const;
/** Hours. */
const WORKING_DAY = 10;

/** Units to spare; where the product gives its proton instead, those of the net reaction. */
export function marginOf({ margin, net }: Verdict): number {
  return net === null ? margin : net.logK;
}

/** What the transfer itself speaks against an option. */
export function costOf(verdict: Verdict, next: OtherSite | null, loses: boolean): number {
  const { answer, allowances, probability, partner, net } = verdict;
  const margin = marginOf(verdict);
  const { slimMargin, idleMargin, nextSite } = COST;
  let cost = net === null ? 2 * probability : 0;
  if (answer === 'undecided') cost += COST.undecided;
  if (allowances.includes('steady-amount')) cost += COST.steady;
  cost += slimMargin.unit * Math.max(0, Math.min(slimMargin.below - margin, 6));
  cost += idleMargin.unit * Math.max(0, margin - idleMargin.above);
  if (next !== null && partner !== null) {
    const gap = partner.constant.value - next.site.constant.value;
    // A base that cannot take the next site leaves it alone even in excess.
    if (0 < (loses ? gap : -gap)) cost += nextSite.unit * Math.max(0, nextSite.below - next.difference);
  }
  return cost;
}

/** Whether half of the reagent is known to be gone within a working day. */
export function isShort(halfLife: number | null): boolean {
  return halfLife !== null && halfLife < WORKING_DAY;
}
