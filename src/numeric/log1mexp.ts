import { LN2 } from './constants.js';

/**
 * log(1 − e^x) for x ≤ 0: the logarithm of the complement of a probability given by its logarithm; −Infinity
 * at 0 and NaN for x > 0.
 *
 * Switches at −log 2, where e^x = 1/2: nearer to 0 the small quantity is 1 − e^x, which expm1 gives exactly;
 * farther out it is e^x itself, which log1p takes. Source: Mächler (2012), "Accurately computing
 * log(1 − exp(−|a|))", equation 7. @kernel
 * @example
 * ```ts
 * import { log1mexp } from 'leadline/numeric';
 * console.log(log1mexp(-1e-10).toPrecision(6));
 * // -23.0259
 * ```
 */
export function log1mexp(x: number): number {
  if (x > -LN2) return Math.log(-Math.expm1(x));
  return Math.log1p(-Math.exp(x));
}
/**
 * The partial derivative of `log1mexp` in `x`.
 * @example
 * ```ts
 * import { log1mexp_x } from 'leadline/numeric';
 * console.log(log1mexp_x(-1e-10).toPrecision(6));
 * // -1.00000e+10
 * ```
 */
export function log1mexp_x(x: number): number {
  if (x > 0.0) return NaN;
  return -1.0 / Math.expm1(-x);
}
