import { LN2, LN2_LOW } from './constants.js';

/**
 * log(1 + e^x), without overflow for large x and with full relative accuracy in the left tail. @kernel
 * @example
 * ```ts
 * import { softplus } from 'leadline/numeric';
 * console.log(softplus(-20).toPrecision(6));
 * // 2.06115e-9
 * ```
 */
export function softplus(x: number): number {
  return Math.max(x, 0.0) + Math.log1p(Math.exp(-Math.abs(x)));
}
/**
 * The partial derivative of `softplus` in `x`.
 * @example
 * ```ts
 * import { softplus_x } from 'leadline/numeric';
 * console.log(softplus_x(-20).toPrecision(6));
 * // 2.06115e-9
 * ```
 */
export function softplus_x(x: number): number {
  // The logistic function, written as in sigmoid.ts.
  if (x >= 0.0) return 1.0 / (1.0 + Math.exp(-x));
  const e = Math.exp(x);
  return e / (1.0 + e);
}

/**
 * log(e^x − 1) for x ≥ 0, the inverse of softplus; NaN for x < 0.
 *
 * Written as x + log(1 − e^−x) it cannot overflow. It crosses zero at x = log 2, where the sum would lose the
 * small value: there log(e^x − 1) = log1p(2 expm1(x − log 2)), with log 2 subtracted in two parts. @kernel
 * @example
 * ```ts
 * import { softplusInverse } from 'leadline/numeric';
 * console.log(softplusInverse(1).toPrecision(6));
 * // 0.541325
 * ```
 */
export function softplusInverse(x: number): number {
  if (x > 0.5 && x < 0.9) return Math.log1p(2.0 * Math.expm1(x - LN2 - LN2_LOW));
  return x + Math.log(-Math.expm1(-x));
}
/**
 * The partial derivative of `softplusInverse` in `x`.
 * @example
 * ```ts
 * import { softplusInverse_x } from 'leadline/numeric';
 * console.log(softplusInverse_x(1).toPrecision(6));
 * // 1.58198
 * ```
 */
export function softplusInverse_x(x: number): number {
  if (x < 0.0) return NaN;
  return -1.0 / Math.expm1(-x);
}
