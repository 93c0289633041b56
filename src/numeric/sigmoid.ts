import { softplus } from './softplus.js';

/**
 * 1 / (1 + e^−x), the logistic function; relative accuracy is kept in the left tail. @kernel
 * @example
 * ```ts
 * import { sigmoid } from 'leadline/numeric';
 * console.log(sigmoid(-20).toPrecision(6));
 * // 2.06115e-9
 * ```
 */
export function sigmoid(x: number): number {
  // e^−|x| never overflows, and the left tail is e^x itself instead of 1 minus something near 1.
  if (x >= 0.0) return 1.0 / (1.0 + Math.exp(-x));
  const e = Math.exp(x);
  return e / (1.0 + e);
}
/**
 * The partial derivative of `sigmoid` in `x`.
 * @example
 * ```ts
 * import { sigmoid_x } from 'leadline/numeric';
 * console.log(sigmoid_x(-20).toPrecision(6));
 * // 2.06115e-9
 * ```
 */
export function sigmoid_x(x: number): number {
  const e = Math.exp(-Math.abs(x));
  return e / ((1.0 + e) * (1.0 + e));
}

/**
 * log(1 / (1 + e^−x)) = −softplus(−x). @kernel
 * @example
 * ```ts
 * import { logSigmoid } from 'leadline/numeric';
 * console.log(logSigmoid(-20).toPrecision(6));
 * // -20.0000
 * ```
 */
export function logSigmoid(x: number): number {
  return -softplus(-x);
}
/**
 * The partial derivative of `logSigmoid` in `x`.
 * @example
 * ```ts
 * import { logSigmoid_x } from 'leadline/numeric';
 * console.log(logSigmoid_x(-20).toPrecision(6));
 * // 1.00000
 * ```
 */
export function logSigmoid_x(x: number): number {
  return sigmoid(-x);
}
