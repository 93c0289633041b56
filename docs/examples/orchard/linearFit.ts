/** A table of regressors, one row per case. */
export type Rows = readonly ArrayLike<number>[];

/**
 * Least squares with an intercept, by the normal equations: coefficients, the intercept first. A regressor that
 * the ones before it already tell gets none.
 */
export function leastSquares(rows: Rows, y: ArrayLike<number>): number[] {
  const width = (rows[0]?.length ?? 0) + 1;
  const system = Array.from({ length: width }, () => new Array<number>(width + 1).fill(0));
  for (const [i, row] of rows.entries()) {
    const full = [1, ...Array.from(row)];
    for (let a = 0; a < width; a++) {
      for (let b = 0; b < width; b++) system[a]![b]! += full[a]! * full[b]!;
      system[a]![width]! += full[a]! * y[i]!;
    }
  }
  // The matrix is positive semidefinite, so its diagonal serves as pivots.
  const sizes = system.map((row, k) => row[k]!);
  const useful = sizes.map((size, k) => {
    const pivot = system[k]!;
    if (!(pivot[k]! > 1e-9 * size)) return false;
    for (let j = 0; j < width; j++) {
      const factor = j === k ? 0 : system[j]![k]! / pivot[k]!;
      for (let m = k; m <= width; m++) system[j]![m]! -= factor * pivot[m]!;
    }
    return true;
  });
  return system.map((row, k) => (useful[k] ? row[width]! / row[k]! : 0));
}

/** The share of y's variance that the coefficients explain, on rows they need not have been fitted to; NaN if y does not vary. */
export function explained(coefficients: readonly number[], rows: Rows, y: ArrayLike<number>): number {
  const values = Array.from(y);
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  let left = 0;
  let all = 0;
  for (const [i, row] of rows.entries()) {
    const guess = Array.from(row).reduce(
      (sum, value, k) => sum + value * coefficients[k + 1]!,
      coefficients[0]!,
    );
    left += (values[i]! - guess) ** 2;
    all += (values[i]! - mean) ** 2;
  }
  return 1 - left / all;
}
