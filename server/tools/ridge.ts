/**
 * Least squares with a prior variance for each unknown, solved among the observations.
 *
 * Must not know: chemistry.
 */

export interface Observation {
  readonly target: number;
  readonly noise: number;
  /** Unknowns with their factors. */
  readonly factors: readonly { readonly unknown: number; readonly factor: number }[];
}

export interface Fit {
  readonly values: Float64Array;
  /** What each observation would be predicted as by all others. */
  readonly leftOut: Float64Array;
  /** Inverse of the covariance of the observations, row by row. */
  readonly inverse: Float64Array;
  /** The inverse times the targets. */
  readonly dual: Float64Array;
}

/** @param variances prior variance of each unknown */
export function fitRidge(observations: readonly Observation[], variances: Float64Array): Fit {
  const n = observations.length;
  const byUnknown: { row: number; factor: number }[][] = Array.from({ length: variances.length }, () => []);
  observations.forEach(({ factors }, row) => {
    for (const { unknown, factor } of factors) byUnknown[unknown]!.push({ row, factor });
  });
  const matrix = new Float64Array(n * n);
  byUnknown.forEach((list, unknown) => {
    const variance = variances[unknown]!;
    for (const one of list)
      for (const other of list) matrix[one.row * n + other.row]! += variance * one.factor * other.factor;
  });
  observations.forEach(({ noise }, row) => {
    matrix[row * n + row]! += noise;
  });
  const inverse = invert(matrix, n);
  const dual = new Float64Array(n);
  for (let row = 0; row < n; row++) {
    let sum = 0;
    for (let column = 0; column < n; column++)
      sum += inverse[row * n + column]! * observations[column]!.target;
    dual[row] = sum;
  }
  const values = new Float64Array(variances.length);
  observations.forEach(({ factors }, row) => {
    for (const { unknown, factor } of factors) values[unknown]! += variances[unknown]! * factor * dual[row]!;
  });
  const leftOut = Float64Array.from(
    observations,
    ({ target }, row) => target - dual[row]! / inverse[row * n + row]!,
  );
  return { values, leftOut, inverse, dual };
}

/** What the observations of a group would be predicted as by all outside it. */
export function withoutGroup(
  { inverse, dual }: Fit,
  observations: readonly Observation[],
  group: readonly number[],
): number[] {
  const n = observations.length;
  const k = group.length;
  const block = new Float64Array(k * k);
  group.forEach((row, i) => {
    group.forEach((column, j) => {
      block[i * k + j] = inverse[row * n + column]!;
    });
  });
  const inner = invert(block, k);
  return group.map((row, i) => {
    let residual = 0;
    for (let j = 0; j < k; j++) residual += inner[i * k + j]! * dual[group[j]!]!;
    return observations[row]!.target - residual;
  });
}

/** Inverse of a symmetric positive matrix by Cholesky's method. */
function invert(matrix: Float64Array, n: number): Float64Array {
  const lower = Float64Array.from(matrix);
  for (let column = 0; column < n; column++) {
    for (let row = column; row < n; row++) {
      let sum = lower[row * n + column]!;
      const [a, b] = [row * n, column * n];
      for (let k = 0; k < column; k++) sum -= lower[a + k]! * lower[b + k]!;
      lower[a + column] = row === column ? Math.sqrt(sum) : sum / lower[b + column]!;
    }
  }
  const rows = new Float64Array(n * n);
  // Rows of the inverse of the triangle, transposed so that the inner loop runs along memory.
  for (let column = 0; column < n; column++) {
    const at = column * n;
    rows[at + column] = 1 / lower[at + column]!;
    for (let row = column + 1; row < n; row++) {
      let sum = 0;
      const a = row * n;
      for (let k = column; k < row; k++) sum -= lower[a + k]! * rows[at + k]!;
      rows[at + row] = sum / lower[a + row]!;
    }
  }
  const inverse = new Float64Array(n * n);
  for (let row = 0; row < n; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = 0;
      const [a, b] = [row * n, column * n];
      for (let k = row; k < n; k++) sum += rows[a + k]! * rows[b + k]!;
      inverse[a + column] = sum;
      inverse[b + row] = sum;
    }
  }
  return inverse;
}
