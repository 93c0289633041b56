import { betaSlopeA, betaSlopeB, incompleteBeta } from './incompleteBetaCore.js';
import { log1mexp } from './log1mexp.js';
import { sigmoid } from './sigmoid.js';
import { softplus } from './softplus.js';

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

/** d(log z)/da, or d(log z)/db, from log z < 0: right where z underflows, or where 1 − z does. */
export function betaLogDrawSlope(logZ: number, a: number, b: number, inA: boolean): number {
  if (!(logZ < 0.0)) return logZ === 0.0 ? 0.0 : NaN;
  const y = -Math.expm1(logZ);
  incompleteBeta(a, b, Math.exp(logZ), y, logZ, log1mexp(logZ));
  return -y * (inA ? betaSlopeA : betaSlopeB);
}

/** The derivative of the log odds log z − log(1 − z) in a, or in b, from the log odds. */
export function betaLogOddsSlope(logOdds: number, a: number, b: number, inA: boolean): number {
  incompleteBeta(a, b, sigmoid(logOdds), sigmoid(-logOdds), -softplus(-logOdds), -softplus(logOdds));
  return inA ? -betaSlopeA : -betaSlopeB;
}
