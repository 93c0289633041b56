/** A table of regressors, one row per case. */
export type Rows = readonly ArrayLike<number>[];

/** Least squares with an intercept, by the normal equations: coefficients, the intercept first. */
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
  for (let k = 0; k < width; k++) {
    const pivot = system
      .slice(k)
      .reduce((best, row) => (Math.abs(row[k]!) > Math.abs(best[k]!) ? row : best));
    system.splice(system.indexOf(pivot), 1);
    system.splice(k, 0, pivot);
    for (let j = 0; j < width; j++) {
      const factor = j === k ? 0 : system[j]![k]! / pivot[k]!;
      for (let m = k; m <= width; m++) system[j]![m]! -= factor * pivot[m]!;
    }
  }
  return system.map((row, k) => row[width]! / row[k]!);
}

/** The share of y's variance that the coefficients explain, on rows they need not have been fitted to. */
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
