/**
 * How sure the difference of two constants is.
 *
 * Knows: constants and how they were derived.  Must not know: flasks, text.
 * Units: pKa.
 * Invariant: a wider sd of either constant never narrows the difference.   (tests/flask/fates.test.ts)
 * The two shares below are derived: a correlation line shifts all values it carries together, by about half of its
 * residual variance, and a borrowed scale errs alike on two couples of one class.
 */
import type { Constant, Couple } from '../chemistry/couple.ts';

/** Part of a carry-over's variance that two values carried by the same line share. */
const SHARED_BY_LINE = 0.5;
/** Part of a borrowed scale's sd that is left between couples of one family. */
const LEFT_IN_FAMILY = 0.5;

interface Placed {
  readonly couple: Couple;
  readonly constant: Constant;
}

/** The sd of the difference between two constants in a medium whose scale itself has `scaleSd`. */
export function differenceSd(a: Placed, b: Placed, scaleSd: number): number {
  const scale = a.couple.family === b.couple.family ? LEFT_IN_FAMILY * scaleSd : scaleSd;
  const own = a.constant.sd ** 2 + b.constant.sd ** 2 - sharedVariance(a, b);
  return Math.sqrt(Math.max(own, 0) + scale ** 2);
}

/** What cancels in the difference because both values came over the same line. */
function sharedVariance(a: Placed, b: Placed): number {
  if (a.constant.origin !== 'carried' || b.constant.origin !== 'carried') return 0;
  if (a.couple.family !== b.couple.family) return 0;
  const last = (constant: Constant) => constant.hops.at(-1);
  const [one, other] = [last(a.constant), last(b.constant)];
  if (one === undefined || other === undefined || one.what !== other.what) return 0;
  const smaller = Math.min(a.constant.sd, b.constant.sd);
  return 2 * SHARED_BY_LINE * smaller ** 2;
}
