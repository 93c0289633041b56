// Loops over one lower-triangular matrix of size d, row-major, starting at `at` in `l`. Double precision.

/** Solves L y = b in place: `y` holds b on entry. */
export function solveLower(l: ArrayLike<number>, at: number, d: number, y: Float64Array): void {
  for (let i = 0; i < d; i++) {
    let sum = y[i]!;
    for (let j = 0; j < i; j++) sum -= l[at + i * d + j]! * y[j]!;
    y[i] = sum / l[at + i * d + i]!;
  }
}

/** Solves Lᵀ y = b in place: `y` holds b on entry. */
export function solveLowerTransposed(l: ArrayLike<number>, at: number, d: number, y: Float64Array): void {
  for (let i = d - 1; i >= 0; i--) {
    let sum = y[i]!;
    for (let j = i + 1; j < d; j++) sum -= l[at + j * d + i]! * y[j]!;
    y[i] = sum / l[at + i * d + i]!;
  }
}
