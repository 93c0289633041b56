import { HALF_LOG_2PI } from './constants.js';
import { digammaDifference } from './digammaDifference.js';
import { logGamma } from './logGamma.js';
import { stirlingSeries } from './stirlingSeries.js';

/**
 * log B(a, b) = log Γ(a) + log Γ(b) − log Γ(a + b) for a, b > 0.
 *
 * Where the larger argument is 10 or more the large parts of Stirling's formula are subtracted in closed form,
 * so that nothing of the size of log Γ(a + b) is left to cancel. On the curve B(a, b) = 1 the result crosses
 * zero and only its absolute error is small. Source: DLMF 5.12.1, 5.11.1. @kernel
 * @example
 * ```ts
 * import { logBeta } from 'leadline/numeric';
 * console.log(logBeta(2, 1e8).toPrecision(6));
 * // -36.8414
 * ```
 */
export function logBeta(a: number, b: number): number {
  const p = Math.min(a, b);
  const q = Math.max(a, b);
  if (!(p >= 0.0)) return NaN;
  if (q < 10.0) return logGamma(p) + logGamma(q) - logGamma(p + q);
  if (q === Infinity) return -Infinity;
  const h = p / q;
  const rest = stirlingSeries(q) - stirlingSeries(p + q) - (q - 0.5) * Math.log1p(h);
  if (p < 10.0) return logGamma(p) + rest + p - p * Math.log(p + q);
  return stirlingSeries(p) + rest + HALF_LOG_2PI - p * Math.log1p(q / p) - 0.5 * Math.log(p);
}
/**
 * The partial derivative of `logBeta` in `a`.
 * @example
 * ```ts
 * import { logBeta_a } from 'leadline/numeric';
 * console.log(logBeta_a(2, 1e8).toPrecision(6));
 * // -17.9979
 * ```
 */
export function logBeta_a(a: number, b: number): number {
  return -digammaDifference(a, b);
}
/**
 * The partial derivative of `logBeta` in `b`.
 * @example
 * ```ts
 * import { logBeta_b } from 'leadline/numeric';
 * console.log(logBeta_b(2, 1e8).toPrecision(6));
 * // -2.00000e-8
 * ```
 */
export function logBeta_b(a: number, b: number): number {
  return -digammaDifference(b, a);
}
