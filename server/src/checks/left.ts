/**
 * How much of a base is still a base at a line.
 *
 * Knows: solved flasks.  Must not know: findings.
 */
import type { Ingredient } from '../flask/state.ts';
import type { Moment } from './facts.ts';

/** Share that holds no proton, by the strongest couple: the bromide of a Grignard reagent is none; 0 without a couple. */
export function shareLeft({ id }: Ingredient, { state }: Moment): number {
  const own = state().couples.filter(({ ingredient }) => ingredient === id);
  const strongest = [...own].sort((a, b) => b.constant.value - a.constant.value)[0];
  return strongest === undefined ? 0 : 1 - strongest.protonated;
}
