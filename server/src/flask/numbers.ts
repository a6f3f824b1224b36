/**
 * The little arithmetic that the flask shares: a monotone root and the normal distribution.
 *
 * Must not know: chemistry.
 * Invariant: both are plain functions of their arguments, so the same question has the same bits.   (tests/flask/judge.test.ts)
 */

const MOST_HALVINGS = 200;

/**
 * The argument at which a falling function crosses zero, to the last bit.
 *
 * @returns an end of the interval where the function does not change its sign
 */
export function fallingRoot(f: (x: number) => number, from: number, to: number): number {
  let low = from;
  let high = to;
  for (let halving = 0; halving < MOST_HALVINGS; halving++) {
    const middle = (low + high) / 2;
    if (middle <= low || high <= middle) return middle;
    if (f(middle) < 0) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}

/**
 * Share of a normal distribution below `z`.
 *
 * Accuracy: relative error of the tail below 1.2e-7 (W. H. Press et al., Numerical Recipes, erfc by Chebyshev fit).
 */
export function normalBelow(z: number): number {
  const x = Math.abs(z) / Math.SQRT2;
  const t = 1 / (1 + x / 2);
  const terms = [
    0.17087277, -0.82215223, 1.48851587, -1.13520398, 0.27886807, -0.18628806, 0.09678418, 0.37409196,
    1.00002368, -1.26551223,
  ];
  const exponent = terms.reduce((sum, term) => sum * t + term, 0);
  const tail = (t * Math.exp(-x * x + exponent)) / 2;
  return z < 0 ? tail : 1 - tail;
}
