/** Eigenvalues of a symmetric matrix by Jacobi's rotations (Golub and Van Loan, 4th edition, section 8.5). */
export function eigenvalues(matrix: readonly Float64Array[]): number[] {
  const a = matrix.map((row) => row.slice());
  const n = a.length;
  for (let sweep = 0; sweep < 60; sweep++) {
    let off = 0;
    for (let p = 0; p < n; p++) {
      for (let q = p + 1; q < n; q++) {
        off += a[p]![q]! ** 2;
        if (Math.abs(a[p]![q]!) < 1e-300) continue;
        const theta = (a[q]![q]! - a[p]![p]!) / (2 * a[p]![q]!);
        const t = Math.sign(theta || 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
        const c = 1 / Math.sqrt(t * t + 1);
        const s = t * c;
        for (let k = 0; k < n; k++) {
          const [x, y] = [a[k]![p]!, a[k]![q]!];
          a[k]![p] = c * x - s * y;
          a[k]![q] = s * x + c * y;
        }
        for (let k = 0; k < n; k++) {
          const [x, y] = [a[p]![k]!, a[q]![k]!];
          a[p]![k] = c * x - s * y;
          a[q]![k] = s * x + c * y;
        }
      }
    }
    if (off < 1e-24) break;
  }
  return a.map((row, i) => row[i]!).sort((x, y) => y - x);
}

/** Cholesky factor, lower triangular. */
export function cholesky(matrix: readonly Float64Array[]): Float64Array[] {
  const n = matrix.length;
  const l = Array.from({ length: n }, () => new Float64Array(n));
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i]![j]!;
      for (let k = 0; k < j; k++) sum -= l[i]![k]! * l[j]![k]!;
      l[i]![j] = i === j ? Math.sqrt(sum) : sum / l[j]![j]!;
    }
  }
  return l;
}

/** Log density of a normal with the given Cholesky factor at a residual. */
export function normalLogDensityByFactor(l: readonly Float64Array[], residual: Float64Array): number {
  const y = residual.slice();
  let sum = -0.5 * l.length * Math.log(2 * Math.PI);
  for (let i = 0; i < l.length; i++) {
    for (let k = 0; k < i; k++) y[i]! -= l[i]![k]! * y[k]!;
    y[i]! /= l[i]![i]!;
    sum -= 0.5 * y[i]! ** 2 + Math.log(l[i]![i]!);
  }
  return sum;
}
