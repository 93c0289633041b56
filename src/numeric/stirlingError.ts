import { HALF_LOG_2PI } from './constants.js';
import { digamma } from './digamma.js';
import { logGamma1p } from './logGamma.js';
import { digammaSeries, stirlingSeries } from './stirlingSeries.js';

/**
 * δ(n) = log Γ(n + 1) − (n + ½) log n + n − ½ log 2π for real n > 0: what Stirling's approximation leaves. It
 * takes the large terms out of log densities, which would cancel otherwise; falls like 1/(12n).
 *
 * From 6 on Stirling's series; below, the definition, whose terms are of the value's own order there.
 * Source: Loader (2000), "Fast and accurate computation of binomial probabilities", section 3; DLMF 5.11.1. @kernel
 * @example
 * ```ts
 * import { stirlingError } from 'leadline/numeric';
 * console.log(stirlingError(10).toPrecision(6));
 * // 0.00833056
 * ```
 */
export function stirlingError(n: number): number {
  if (n >= 6.0) return stirlingSeries(n);
  return logGamma1p(n) - (n + 0.5) * Math.log(n) + n - HALF_LOG_2PI;
}

/**
 * δ′(n) = ψ(n) + 1/(2n) − log n, negative; −1/(12n²) for large n.
 * @example
 * ```ts
 * import { stirlingError_n } from 'leadline/numeric';
 * console.log(stirlingError_n(10).toPrecision(6));
 * // -0.000832504
 * ```
 */
export function stirlingError_n(n: number): number {
  if (n >= 6.0) return -digammaSeries(n);
  return digamma(n) + 0.5 / n - Math.log(n);
}
