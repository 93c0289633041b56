import { digamma } from './digamma.js';
import { gammaSlope, incompleteGamma } from './incompleteGammaCore.js';

/**
 * dz/da of a gamma draw z with shape a and rate 1 at a fixed uniform, −(∂P/∂a) / p(z; a).
 *
 * The exponential factor of P's derivative and that of the density are the same number, so it is left out of
 * both: the ratio neither underflows in the tails nor carries the factor's rounding. Source: Figurnov, Mohamed
 * and Mnih (2018), "Implicit reparameterization gradients", equation 6.
 * @example
 * ```ts
 * import { gammaDrawDerivative } from 'leadline/numeric';
 * console.log(gammaDrawDerivative(2, 2.5).toPrecision(6));
 * // 0.953463
 * ```
 */
export function gammaDrawDerivative(z: number, a: number): number {
  if (!(z > 0.0)) return z === 0.0 ? 0.0 : NaN;
  if (z === Infinity) return Infinity;
  incompleteGamma(a, z, true);
  return (-z / a) * gammaSlope;
}

/**
 * d(log z)/da of a gamma draw with shape a and rate 1, from log z: right for small shapes too, where z itself
 * underflows. For z → 0 it is (ψ(a + 1) − log z) / a.
 * @example
 * ```ts
 * import { gammaLogDrawDerivative } from 'leadline/numeric';
 * console.log(gammaLogDrawDerivative(-500, 0.001).toPrecision(6));
 * // 499424
 * ```
 */
export function gammaLogDrawDerivative(logZ: number, a: number): number {
  if (logZ < -40.0) return (digamma(a + 1.0) - logZ) / a;
  incompleteGamma(a, Math.exp(logZ), true);
  return -gammaSlope / a;
}
