import { betaLogOddsQuantile } from './incompleteBetaInverse.js';
import { normalQuantile } from './normalQuantile.js';
import { studentT, studentTLogDensity, studentTPart, studentTSide, studentTSlope } from './studentTCore.js';

// The distribution function, quantile and draw derivative of Student's t law with ν degrees of freedom, location 0
// and scale 1. The integrals stand in studentTCore.ts.

/** The share beyond s ≥ 0, after a call of `studentT` at s. */
function upperShare(s: number, nu: number): number {
  const part = Math.exp(studentTLogDensity(s, nu)) * studentTPart;
  return studentTSide === 0.0 ? 0.5 - part : part;
}

/**
 * F(z) = ∫_{−∞}^z p(t) dt, with relative accuracy in the lower tail; F(z) = 1 − F(−z). DLMF 8.17.2.
 * @example
 * ```ts
 * import { studentTCdf } from 'leadline/numeric';
 * console.log(studentTCdf(-3, 4).toPrecision(6));
 * // 0.0199710
 * ```
 */
export function studentTCdf(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (!(s < Infinity)) return z > 0.0 ? 1.0 : z < 0.0 ? 0.0 : NaN;
  studentT(s, degreesOfFreedom);
  const upper = upperShare(s, degreesOfFreedom);
  return z <= 0.0 ? upper : 1.0 - upper;
}
/**
 * The partial derivative of `studentTCdf` in `z`.
 * @example
 * ```ts
 * import { studentTCdf_z } from 'leadline/numeric';
 * console.log(studentTCdf_z(-3, 4).toPrecision(6));
 * // 0.0196935
 * ```
 */
export function studentTCdf_z(z: number, degreesOfFreedom: number): number {
  return Math.exp(studentTLogDensity(z, degreesOfFreedom));
}
/**
 * The partial derivative of `studentTCdf` in `degreesOfFreedom`.
 * @example
 * ```ts
 * import { studentTCdf_degreesOfFreedom } from 'leadline/numeric';
 * console.log(studentTCdf_degreesOfFreedom(-3, 4).toPrecision(6));
 * // -0.00637342
 * ```
 */
export function studentTCdf_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  if (Math.abs(z) === Infinity) return 0.0;
  return -studentTCdf_z(z, degreesOfFreedom) * studentTDrawDerivative(z, degreesOfFreedom);
}

/**
 * log F(z), right also where F underflows.
 * @example
 * ```ts
 * import { studentTLogCdf } from 'leadline/numeric';
 * console.log(studentTLogCdf(-50, 1000).toPrecision(6));
 * // -630.587
 * ```
 */
export function studentTLogCdf(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (!(s < Infinity)) return z > 0.0 ? 0.0 : z < 0.0 ? -Infinity : NaN;
  studentT(s, degreesOfFreedom);
  if (z > 0.0) return Math.log1p(-upperShare(s, degreesOfFreedom));
  if (studentTSide === 0.0) return Math.log(upperShare(s, degreesOfFreedom));
  return Math.log(studentTPart) + studentTLogDensity(s, degreesOfFreedom);
}
/**
 * The partial derivative of `studentTLogCdf` in `z`.
 * @example
 * ```ts
 * import { studentTLogCdf_z } from 'leadline/numeric';
 * console.log(studentTLogCdf_z(-50, 1000).toPrecision(6));
 * // 14.2914
 * ```
 */
export function studentTLogCdf_z(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (!(s < Infinity)) return s === Infinity ? 0.0 : NaN;
  studentT(s, degreesOfFreedom);
  if (z <= 0.0 && studentTSide === 1.0) return 1.0 / studentTPart;
  const upper = upperShare(s, degreesOfFreedom);
  return Math.exp(studentTLogDensity(s, degreesOfFreedom)) / (z <= 0.0 ? upper : 1.0 - upper);
}
/**
 * The partial derivative of `studentTLogCdf` in `degreesOfFreedom`.
 * @example
 * ```ts
 * import { studentTLogCdf_degreesOfFreedom } from 'leadline/numeric';
 * console.log(studentTLogCdf_degreesOfFreedom(-50, 1000).toPrecision(6));
 * // -0.269596
 * ```
 */
export function studentTLogCdf_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  return -studentTLogCdf_z(z, degreesOfFreedom) * studentTDrawDerivative(z, degreesOfFreedom);
}

/**
 * dz/dν of a draw z at a fixed uniform, −(∂F/∂ν) / p(z; ν): odd in z, −(z + z³) / (4ν²) for large ν.
 * @example
 * ```ts
 * import { studentTDrawDerivative } from 'leadline/numeric';
 * console.log(studentTDrawDerivative(1, 1e6).toPrecision(6));
 * // -5.00000e-13
 * ```
 */
export function studentTDrawDerivative(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (!(s < Infinity)) return s === Infinity ? -z : NaN;
  studentT(s, degreesOfFreedom);
  return z < 0.0 ? -studentTSlope : studentTSlope;
}

/**
 * The s ≥ 0 with share p < ½ beyond it.
 *
 * Below 100 degrees of freedom the log odds of a beta variable, as the law is built on one; from there Newton's
 * method in log s on the logarithm of the share beyond s or of the share between 0 and s. Both are concave, since
 * the density of log s is log-concave, so that it crosses the root at most once. The start is the normal law's.
 */
function pointAbove(p: number, nu: number): number {
  if (nu < 100.0) return Math.sqrt(nu) * Math.exp(-0.5 * betaLogOddsQuantile(0.5 * nu, 0.5, 2.0 * p));
  const x = -normalQuantile(p);
  let s = x;
  for (let i = 0; i < 100; i++) {
    studentT(s, nu);
    const goal = studentTSide === 0.0 ? 0.5 - p : p;
    const move = (studentTLogDensity(s, nu) + Math.log(studentTPart) - Math.log(goal)) * (studentTPart / s);
    const step = studentTSide === 0.0 ? -move : move;
    s *= Math.exp(Math.min(Math.max(step, -1.0), 1.0));
    if (Math.abs(step) < 1e-8) break;
  }
  return s;
}

/**
 * The z with F(z) = p, the quantile function.
 * @example
 * ```ts
 * import { studentTQuantile } from 'leadline/numeric';
 * console.log(studentTQuantile(0.01, 4).toPrecision(6));
 * // -3.74695
 * ```
 */
export function studentTQuantile(p: number, degreesOfFreedom: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? -Infinity : p === 1.0 ? Infinity : NaN;
  if (p === 0.5) return 0.0;
  return p < 0.5 ? -pointAbove(p, degreesOfFreedom) : pointAbove(1.0 - p, degreesOfFreedom);
}
/**
 * The partial derivative of `studentTQuantile` in `p`.
 * @example
 * ```ts
 * import { studentTQuantile_p } from 'leadline/numeric';
 * console.log(studentTQuantile_p(0.01, 4).toPrecision(6));
 * // 115.183
 * ```
 */
export function studentTQuantile_p(p: number, degreesOfFreedom: number): number {
  return Math.exp(-studentTLogDensity(studentTQuantile(p, degreesOfFreedom), degreesOfFreedom));
}
/**
 * The partial derivative of `studentTQuantile` in `degreesOfFreedom`.
 * @example
 * ```ts
 * import { studentTQuantile_degreesOfFreedom } from 'leadline/numeric';
 * console.log(studentTQuantile_degreesOfFreedom(0.01, 4).toPrecision(6));
 * // 0.517573
 * ```
 */
export function studentTQuantile_degreesOfFreedom(p: number, degreesOfFreedom: number): number {
  return studentTDrawDerivative(studentTQuantile(p, degreesOfFreedom), degreesOfFreedom);
}
