// Student's t distribution, location 0 and scale 1, in double precision: its density, moments and entropy. The
// integrals stand in ../studentTCore.ts.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 28.
import { HALF_LOG_2PI, LOG_PI } from '../constants.js';
import { digammaDifference } from '../digammaDifference.js';
import { log1pmx } from '../log1pmx.js';
import { logGammaDifference } from '../logGammaDifference.js';
import {
  studentTLogCdf as logShareBelow,
  studentTLogCdf_z as logShareBelow_z,
  studentTQuantile as pointOf,
  studentTQuantile_degreesOfFreedom as pointOf_degreesOfFreedom,
  studentTQuantile_p as pointOf_p,
  studentTCdf as shareBelow,
  studentTDrawDerivative,
} from '../studentT.js';
import { trigamma } from '../trigamma.js';

/** From here on series in 1/ν (of DLMF 5.11.2 and 5.11.8) take the place of differences. */
const LARGE: number = 100.0;

/** log Γ((ν + 1)/2) − log Γ(ν/2) − ½ log(πν). */
function norm(nu: number): number {
  if (nu < LARGE) return logGammaDifference(0.5 * nu, 0.5) - 0.5 * (Math.log(nu) + LOG_PI);
  const r = 1.0 / nu;
  const u = r * r;
  return r * (-0.25 + u * (1.0 / 24.0 + u * (-0.05 + u * (17.0 / 112.0)))) - HALF_LOG_2PI;
}

/** ψ((ν + 1)/2) − ψ(ν/2) − 1/ν, twice the derivative of `norm`. */
function normSlopeTwice(nu: number): number {
  if (nu < LARGE) return digammaDifference(0.5 * nu, 0.5) - 1.0 / nu;
  const u = 1.0 / (nu * nu);
  return u * (0.5 + u * (-0.25 + u * (0.5 - 2.125 * u)));
}

/** log(1 + z²/ν), also where the square overflows. */
function logGrowth(z: number, nu: number): number {
  const q = (z * z) / nu;
  return q < 1.0e200 ? Math.log1p(q) : 2.0 * Math.log(Math.abs(z)) - Math.log(nu);
}

/** q / (1 + q) with q = z²/ν. */
function growthShare(z: number, nu: number): number {
  return Math.abs(z) < 1.0 ? (z * z) / (nu + z * z) : 1.0 / (1.0 + nu / z / z);
}

/** Log density, log Γ((ν + 1)/2) − log Γ(ν/2) − ½ log(πν) − ½ (ν + 1) log(1 + z²/ν). @kernel located density */
export function studentTLogDensity(z: number, degreesOfFreedom: number): number {
  return norm(degreesOfFreedom) - 0.5 * (degreesOfFreedom + 1.0) * logGrowth(z, degreesOfFreedom);
}
export function studentTLogDensity_z(z: number, degreesOfFreedom: number): number {
  if (Math.abs(z) < 1.0) return (-(degreesOfFreedom + 1.0) * z) / (degreesOfFreedom + z * z);
  return -((degreesOfFreedom + 1.0) / z) / (1.0 + degreesOfFreedom / z / z);
}
/** 1 + z times the derivative, ν (1 − z²) / (ν + z²). */
export function studentTLogDensity_spread(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (s < 1.0) return ((1.0 - s) * (1.0 + s)) / (1.0 + (z * z) / degreesOfFreedom);
  return (degreesOfFreedom * (1.0 / s - 1.0) * (1.0 / s + 1.0)) / (1.0 + degreesOfFreedom / s / s);
}
/** Every term is of the order of 1/ν² or z⁴/ν², so that nothing cancels for large ν. */
export function studentTLogDensity_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  const q = (z * z) / degreesOfFreedom;
  const share = growthShare(z, degreesOfFreedom);
  const change = q < 0.5 ? -log1pmx(q) - q * share : share - logGrowth(z, degreesOfFreedom);
  return 0.5 * (normSlopeTwice(degreesOfFreedom) + change + share / degreesOfFreedom);
}

// Beyond these z² leaves the doubles: F is ½ + p(0) z inside, and p(z) |z| / ν from the end outside.
const INSIDE: number = 1.0e-100;
const OUTSIDE: number = 1.0e100;

function isUsual(z: number): boolean {
  const s = Math.abs(z);
  return s > INSIDE && s < OUTSIDE;
}

/** log(p(z) |z| / ν). */
function logFarShare(z: number, nu: number): number {
  const s = Math.abs(z);
  return s === Infinity ? -Infinity : studentTLogDensity(z, nu) + Math.log(s) - Math.log(nu);
}

/** d log z / dν at a fixed share, for z ≥ `OUTSIDE`. */
function farRate(z: number, nu: number): number {
  const log = 0.5 * Math.log(nu) - Math.log(z);
  return (0.5 * normSlopeTwice(nu) + 0.5 - 0.5 / nu + log) / nu;
}

/** Distribution function. @kernel located probability */
export function studentTCdf(z: number, degreesOfFreedom: number): number {
  if (isUsual(z)) return shareBelow(z, degreesOfFreedom);
  if (Math.abs(z) < 1.0) return 0.5 + Math.exp(norm(degreesOfFreedom)) * z;
  const far = Math.exp(logFarShare(z, degreesOfFreedom));
  return z > 0.0 ? 1.0 - far : far;
}
export function studentTCdf_z(z: number, degreesOfFreedom: number): number {
  return Math.exp(studentTLogDensity(z, degreesOfFreedom));
}
export function studentTCdf_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (s === Infinity) return 0.0;
  if (s >= OUTSIDE) {
    const share =
      Math.exp(logFarShare(z, degreesOfFreedom)) * degreesOfFreedom * farRate(s, degreesOfFreedom);
    return z > 0.0 ? -share : share;
  }
  return -studentTCdf_z(z, degreesOfFreedom) * studentTDraw_degreesOfFreedom(z, degreesOfFreedom);
}

/** Survival function, the distribution function at −z. @kernel located probability */
export function studentTSurvival(z: number, degreesOfFreedom: number): number {
  return studentTCdf(-z, degreesOfFreedom);
}
export function studentTSurvival_z(z: number, degreesOfFreedom: number): number {
  return -studentTCdf_z(z, degreesOfFreedom);
}
export function studentTSurvival_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  return studentTCdf_degreesOfFreedom(-z, degreesOfFreedom);
}

/** Log distribution function. @kernel located probability */
export function studentTLogCdf(z: number, degreesOfFreedom: number): number {
  if (isUsual(z)) return logShareBelow(z, degreesOfFreedom);
  if (Math.abs(z) < 1.0) return Math.log(0.5 + Math.exp(norm(degreesOfFreedom)) * z);
  const far = logFarShare(z, degreesOfFreedom);
  return z > 0.0 ? Math.log1p(-Math.exp(far)) : far;
}
export function studentTLogCdf_z(z: number, degreesOfFreedom: number): number {
  if (isUsual(z)) return logShareBelow_z(z, degreesOfFreedom);
  if (z < -1.0) return -degreesOfFreedom / z;
  return studentTCdf_z(z, degreesOfFreedom) / studentTCdf(z, degreesOfFreedom);
}
export function studentTLogCdf_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  const s = Math.abs(z);
  if (s === Infinity) return 0.0;
  if (z <= -OUTSIDE) return degreesOfFreedom * farRate(s, degreesOfFreedom);
  if (s >= OUTSIDE) {
    return studentTCdf_degreesOfFreedom(z, degreesOfFreedom) / studentTCdf(z, degreesOfFreedom);
  }
  return -studentTLogCdf_z(z, degreesOfFreedom) * studentTDraw_degreesOfFreedom(z, degreesOfFreedom);
}

/** Log survival function. @kernel located probability */
export function studentTLogSurvival(z: number, degreesOfFreedom: number): number {
  return studentTLogCdf(-z, degreesOfFreedom);
}
export function studentTLogSurvival_z(z: number, degreesOfFreedom: number): number {
  return -studentTLogCdf_z(-z, degreesOfFreedom);
}
export function studentTLogSurvival_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  return studentTLogCdf_degreesOfFreedom(-z, degreesOfFreedom);
}

/** Quantile. @kernel located point */
export function studentTQuantile(p: number, degreesOfFreedom: number): number {
  return pointOf(p, degreesOfFreedom);
}
export function studentTQuantile_p(p: number, degreesOfFreedom: number): number {
  return pointOf_p(p, degreesOfFreedom);
}
export function studentTQuantile_degreesOfFreedom(p: number, degreesOfFreedom: number): number {
  return pointOf_degreesOfFreedom(p, degreesOfFreedom);
}

/** Upper quantile, minus the quantile. @kernel located point */
export function studentTUpperQuantile(p: number, degreesOfFreedom: number): number {
  return -pointOf(p, degreesOfFreedom);
}
export function studentTUpperQuantile_p(p: number, degreesOfFreedom: number): number {
  return -pointOf_p(p, degreesOfFreedom);
}
export function studentTUpperQuantile_degreesOfFreedom(p: number, degreesOfFreedom: number): number {
  return -pointOf_degreesOfFreedom(p, degreesOfFreedom);
}

/** A draw that an exact sampler made; its derivative in ν is at a fixed uniform. @kernel located slope */
export function studentTDraw(z: number, _degreesOfFreedom: number): number {
  return z;
}
export function studentTDraw_degreesOfFreedom(z: number, degreesOfFreedom: number): number {
  if (isUsual(z)) return studentTDrawDerivative(z, degreesOfFreedom);
  const slope = 0.5 * normSlopeTwice(degreesOfFreedom);
  if (Math.abs(z) < 1.0) return -z * slope;
  return z * farRate(Math.abs(z), degreesOfFreedom);
}

/** Mean: zero for ν > 1, and none for ν ≤ 1. @kernel located center */
export function studentTMean(degreesOfFreedom: number): number {
  return degreesOfFreedom > 1.0 ? 0.0 : NaN;
}
export function studentTMean_degreesOfFreedom(_degreesOfFreedom: number): number {
  return 0.0;
}

/** Variance, ν / (ν − 2); infinite for 1 < ν ≤ 2, and none for ν ≤ 1. @kernel located spread */
export function studentTVariance(degreesOfFreedom: number): number {
  if (!(degreesOfFreedom > 2.0)) return degreesOfFreedom > 1.0 ? Infinity : NaN;
  return 1.0 / (1.0 - 2.0 / degreesOfFreedom);
}
export function studentTVariance_degreesOfFreedom(degreesOfFreedom: number): number {
  if (!(degreesOfFreedom > 2.0)) return 0.0;
  return -2.0 / (degreesOfFreedom - 2.0) / (degreesOfFreedom - 2.0);
}

/** Entropy, ½ (ν + 1) (ψ((ν + 1)/2) − ψ(ν/2)) less the normalizing term. @kernel located entropy */
export function studentTEntropy(degreesOfFreedom: number): number {
  const difference = normSlopeTwice(degreesOfFreedom) + 1.0 / degreesOfFreedom;
  return 0.5 * (degreesOfFreedom + 1.0) * difference - norm(degreesOfFreedom);
}
export function studentTEntropy_degreesOfFreedom(degreesOfFreedom: number): number {
  if (degreesOfFreedom < 25.0) {
    const a = 0.5 * degreesOfFreedom;
    return 0.5 / degreesOfFreedom + 0.25 * (degreesOfFreedom + 1.0) * (trigamma(a + 0.5) - trigamma(a));
  }
  // −1/ν² − 1/(2ν³) + …, from the same series: the leading terms of the two parts cancel.
  const r = 1.0 / degreesOfFreedom;
  const u = r * r;
  const even = -0.5 + u * (0.5 + u * (-1.5 + u * (8.5 + u * (-77.5 + u * 1036.5))));
  return u * ((1.0 + r) * even - 0.5);
}
