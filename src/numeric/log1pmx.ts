/**
 * log(1 + x) − x without the cancellation at small x.
 *
 * With r = x / (2 + x), log(1 + x) = 2 atanh r, and 2r − x = −x r exactly, so that
 * log(1 + x) − x = r (2 r² (1/3 + r²/5 + r⁴/7 + …) − x). The series is used where the direct difference would
 * lose more than two bits; fifteen terms reach 1e-16 at its edges (|r| ≤ 0.23).
 * Source: DLMF 4.6.4 and the definition of atanh. @kernel
 * @example
 * ```ts
 * import { log1pmx } from 'leadline/numeric';
 * console.log(log1pmx(0.001).toPrecision(6));
 * // -4.99667e-7
 * ```
 */
export function log1pmx(x: number): number {
  if (x < -0.37 || x > 0.6) {
    if (x === Infinity) return -Infinity;
    return Math.log1p(x) - x;
  }
  const r = x / (2.0 + x);
  return r * (2.0 * atanhTail(r * r) - x);
}

/**
 * s (1/3 + s/5 + s²/7 + …) = atanh(√s)/√s − 1, for 0 ≤ s ≤ 0.06: what is left of a logarithm in the variable
 * r = √s after its linear term.
 */
export function atanhTail(s: number): number {
  let p = 1.0 / 25.0;
  p = 1.0 / 23.0 + s * p;
  p = 1.0 / 21.0 + s * p;
  p = 1.0 / 19.0 + s * p;
  p = 1.0 / 17.0 + s * p;
  p = 1.0 / 15.0 + s * p;
  p = 1.0 / 13.0 + s * p;
  p = 1.0 / 11.0 + s * p;
  p = 1.0 / 9.0 + s * p;
  p = 1.0 / 7.0 + s * p;
  p = 1.0 / 5.0 + s * p;
  p = 1.0 / 3.0 + s * p;
  return s * p;
}

/**
 * d/dx (log(1 + x) − x) = −x / (1 + x).
 * @example
 * ```ts
 * import { log1pmx_x } from 'leadline/numeric';
 * console.log(log1pmx_x(0.001).toPrecision(6));
 * // -0.000999001
 * ```
 */
export function log1pmx_x(x: number): number {
  if (x === Infinity) return -1.0;
  return -x / (1.0 + x);
}
