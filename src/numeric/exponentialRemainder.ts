/**
 * exp(x) − 1 − x, to full relative accuracy; cancels to nothing near zero when written out.
 * Below 0.5 in magnitude the Taylor polynomial to x¹⁶, which reaches the last place; direct above.
 * @example
 * ```ts
 * import { exponentialRemainder } from 'leadline/numeric';
 * console.log(exponentialRemainder(0.001).toPrecision(6));
 * // 5.00167e-7
 * ```
 */
export function exponentialRemainder(x: number): number {
  if (Math.abs(x) > 0.5) return Math.expm1(x) - x;
  let p = 1.0 / 20922789888000.0;
  p = 1.0 / 1307674368000.0 + x * p;
  p = 1.0 / 87178291200.0 + x * p;
  p = 1.0 / 6227020800.0 + x * p;
  p = 1.0 / 479001600.0 + x * p;
  p = 1.0 / 39916800.0 + x * p;
  p = 1.0 / 3628800.0 + x * p;
  p = 1.0 / 362880.0 + x * p;
  p = 1.0 / 40320.0 + x * p;
  p = 1.0 / 5040.0 + x * p;
  p = 1.0 / 720.0 + x * p;
  p = 1.0 / 120.0 + x * p;
  p = 1.0 / 24.0 + x * p;
  p = 1.0 / 6.0 + x * p;
  p = 1.0 / 2.0 + x * p;
  return x * x * p;
}
