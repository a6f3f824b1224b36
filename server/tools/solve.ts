/**
 * Solves a set of linear equations by elimination with the largest pivot.
 *
 * Must not know: chemistry.
 */

/** x of matrix · x = right; both are left as they are. */
export function solve(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const size = right.length;
  const rows = matrix.map((row, index) => [...row, right[index]!]);
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column + 1; row < size; row++) {
      if (Math.abs(rows[pivot]![column]!) < Math.abs(rows[row]![column]!)) pivot = row;
    }
    [rows[column], rows[pivot]] = [rows[pivot]!, rows[column]!];
    for (let row = column + 1; row < size; row++) {
      const factor = rows[row]![column]! / rows[column]![column]!;
      if (factor === 0) continue;
      for (let place = column; place <= size; place++) rows[row]![place]! -= factor * rows[column]![place]!;
    }
  }
  const found = new Array<number>(size).fill(0);
  for (let row = size - 1; 0 <= row; row--) {
    const known = rows[row]!.slice(row + 1, size).reduce(
      (sum, factor, place) => sum + factor * found[row + 1 + place]!,
      0,
    );
    found[row] = (rows[row]![size]! - known) / rows[row]![row]!;
  }
  return found;
}
