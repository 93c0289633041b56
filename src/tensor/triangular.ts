// Loops over one lower-triangular float32 matrix of size d, row-major, starting at `at` in `l`.

/** Solves L y = b in place: `y` holds b on entry. */
export function solveLower(l: ArrayLike<number>, at: number, d: number, y: Float64Array): void {
  solve({ l, at, d, row: d, column: 1, first: 0, step: 1 }, y);
}

/** Solves Lᵀ y = b in place: `y` holds b on entry. */
export function solveLowerTransposed(l: ArrayLike<number>, at: number, d: number, y: Float64Array): void {
  // The transpose swaps the strides, and substitution starts from the other end.
  solve({ l, at, d, row: 1, column: d, first: d - 1, step: -1 }, y);
}

interface System {
  readonly l: ArrayLike<number>;
  readonly at: number;
  readonly d: number;
  /** How far a row and a column lie apart. */
  readonly row: number;
  readonly column: number;
  /** The unknown that stands alone, and the direction of the others. */
  readonly first: number;
  readonly step: number;
}

// Where a sum keeps less than this of the sizes of its terms, double precision no longer carries a float32.
const lostShare = 2 ** -20;

function solve(system: System, y: Float64Array): void {
  const { l, at, d, row, column, first, step } = system;
  const b = y.slice();
  for (let n = 0, i = first; n < d; n++, i += step) {
    let sum = b[i]!;
    let size = Math.abs(sum);
    for (let m = 0, j = first; m < n; m++, j += step) {
      const term = l[at + i * row + j * column]! * y[j]!;
      sum -= term;
      size += Math.abs(term);
    }
    if (Math.abs(sum) < lostShare * size) {
      y.set(b);
      solveTwice(system, y);
      return;
    }
    y[i] = sum / l[at + i * (row + column)]!;
  }
}

/**
 * The same in twice the precision, each unknown a sum of two doubles: for matrices so near to singular that the
 * sums cancel. Products with a float32 are exact once the double is split in two (Dekker 1971), and sums keep
 * what their rounding loses (Knuth, The Art of Computer Programming 2, section 4.2.2, theorem B).
 */
function solveTwice({ l, at, d, row, column, first, step }: System, y: Float64Array): void {
  const low = new Float64Array(d);
  for (let n = 0, i = first; n < d; n++, i += step) {
    let sum = y[i]!;
    let rest = 0;
    const subtract = (value: number): void => {
      const next = sum - value;
      const back = next - sum;
      rest += sum - (next - back) - (value + back);
      sum = next;
    };
    for (let m = 0, j = first; m < n; m++, j += step) {
      const factor = l[at + i * row + j * column]!;
      const head = upperHalf(y[j]!);
      subtract(factor * head);
      subtract(factor * (y[j]! - head));
      rest -= factor * low[j]!;
    }
    const pivot = l[at + i * (row + column)]!;
    const quotient = (sum + rest) / pivot;
    const head = upperHalf(quotient);
    low[i] = (sum - head * pivot - (quotient - head) * pivot + rest) / pivot;
    y[i] = quotient;
  }
}

function upperHalf(value: number): number {
  const split = value * 134217729;
  return Number.isFinite(split) ? split - (split - value) : value;
}
