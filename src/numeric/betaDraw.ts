import { betaSlopeA, betaSlopeB, incompleteBeta } from './incompleteBetaCore.js';

/**
 * dz/da of a beta draw z at a fixed uniform, −(∂I/∂a) / p(z; a, b), with the factor that the two share left out
 * of both. Source: Figurnov, Mohamed and Mnih (2018), "Implicit reparameterization gradients", equation 6.
 * @example
 * ```ts
 * import { betaDrawDerivativeA } from 'leadline/numeric';
 * console.log(betaDrawDerivativeA(0.3, 2, 3).toPrecision(6));
 * // 0.139509
 * ```
 */
export function betaDrawDerivativeA(z: number, a: number, b: number): number {
  if (!(z > 0.0 && z < 1.0)) return z === 0.0 || z === 1.0 ? 0.0 : NaN;
  incompleteBeta(a, b, z, 1.0 - z, Math.log(z), Math.log1p(-z));
  return -z * (1.0 - z) * betaSlopeA;
}

/**
 * dz/db of a beta draw z at a fixed uniform, −(∂I/∂b) / p(z; a, b).
 * @example
 * ```ts
 * import { betaDrawDerivativeB } from 'leadline/numeric';
 * console.log(betaDrawDerivativeB(0.3, 2, 3).toPrecision(6));
 * // -0.0734382
 * ```
 */
export function betaDrawDerivativeB(z: number, a: number, b: number): number {
  if (!(z > 0.0 && z < 1.0)) return z === 0.0 || z === 1.0 ? 0.0 : NaN;
  incompleteBeta(a, b, z, 1.0 - z, Math.log(z), Math.log1p(-z));
  return -z * (1.0 - z) * betaSlopeB;
}
