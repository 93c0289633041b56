// The Laplace distribution in double precision, with z = (x − location) / scale.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 24.
import { logRatio } from '../deviance.js';
import { exponentialRemainder } from '../exponentialRemainder.js';
import { log1pmx } from '../log1pmx.js';

const log2 = 0.69314718055994530942;

function sign(v: number): number {
  return v > 0.0 ? 1.0 : v < 0.0 ? -1.0 : 0.0;
}

/** Log density, −|z| − log(2 scale). @kernel */
export function laplaceLogDensity(x: number, location: number, scale: number): number {
  return -Math.abs(x - location) / scale - Math.log(scale) - log2;
}
export function laplaceLogDensity_x(x: number, location: number, scale: number): number {
  return -sign(x - location) / scale;
}
export function laplaceLogDensity_location(x: number, location: number, scale: number): number {
  return sign(x - location) / scale;
}
export function laplaceLogDensity_scale(x: number, location: number, scale: number): number {
  return (Math.abs(x - location) / scale - 1.0) / scale;
}

/** Variance, 2 scale². @kernel */
export function laplaceVariance(scale: number): number {
  return 2.0 * scale * scale;
}
export function laplaceVariance_scale(scale: number): number {
  return 4.0 * scale;
}

/** Entropy, 1 + log(2 scale). @kernel */
export function laplaceEntropy(scale: number): number {
  return 1.0 + log2 + Math.log(scale);
}
export function laplaceEntropy_scale(scale: number): number {
  return 1.0 / scale;
}

/** Distribution function, ½ exp(z) below the location and 1 − ½ exp(−z) above. @kernel */
export function laplaceCdf(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  return z < 0.0 ? 0.5 * Math.exp(z) : 1.0 - 0.5 * Math.exp(-z);
}
export function laplaceCdf_x(x: number, location: number, scale: number): number {
  return (0.5 * Math.exp(-Math.abs(x - location) / scale)) / scale;
}
export function laplaceCdf_location(x: number, location: number, scale: number): number {
  return (-0.5 * Math.exp(-Math.abs(x - location) / scale)) / scale;
}
export function laplaceCdf_scale(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  // Zero at the ends, where the product of the two is not a number.
  return Math.abs(z) > 800.0 ? 0.0 : (-0.5 * z * Math.exp(-Math.abs(z))) / scale;
}

// Quantile of the standard member; its two branches meet at zero.
function standardQuantile(p: number): number {
  return p < 0.5 ? Math.log(2.0 * p) : -Math.log(2.0 * (1.0 - p));
}

/** Quantile, location + scale · log 2p below one half and location − scale · log 2(1 − p) above. @kernel */
export function laplaceQuantile(p: number, location: number, scale: number): number {
  return location + scale * standardQuantile(p);
}
export function laplaceQuantile_p(p: number, _location: number, scale: number): number {
  return scale / (p < 0.5 ? p : 1.0 - p);
}
export function laplaceQuantile_location(_p: number, _location: number, _scale: number): number {
  return 1.0;
}
export function laplaceQuantile_scale(p: number, _location: number, _scale: number): number {
  return standardQuantile(p);
}

// scale / otherScale · (exp(−d) − 1 + d) with d = gap / scale, which may overflow where the ratio underflows.
function shift(gap: number, scale: number, otherScale: number): number {
  const d = gap / scale;
  if (d > 0.5) return (scale * Math.expm1(-d) + gap) / otherScale;
  const rest = exponentialRemainder(-d);
  return rest === 0.0 ? 0.0 : (scale / otherScale) * rest;
}

/**
 * Divergence, with d = |location − otherLocation| / scale and r = scale / otherScale:
 * (r − 1 − log r) + r (exp(−d) − 1 + d). Both parts are sums of positive terms, so nothing cancels.
 * @kernel
 */
export function laplaceKl(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const t = (scale - otherScale) / otherScale;
  const spread = t < -0.5 ? t - logRatio(scale, otherScale) : -log1pmx(t);
  return spread + shift(Math.abs(location - otherLocation), scale, otherScale);
}
export function laplaceKl_location(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const gap = location - otherLocation;
  return (-sign(gap) * Math.expm1(-Math.abs(gap) / scale)) / otherScale;
}
export function laplaceKl_scale(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  // 1/otherScale · (1 − otherScale/scale + exp(−d)(1 + d) − 1); the tail is −1 long before d overflows.
  const d = Math.min(Math.abs(location - otherLocation) / scale, 800.0);
  const tail = exponentialRemainder(-d) + d * Math.expm1(-d);
  return (scale - otherScale) / otherScale / scale + tail / otherScale;
}
export function laplaceKl_otherLocation(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const gap = location - otherLocation;
  return (sign(gap) * Math.expm1(-Math.abs(gap) / scale)) / otherScale;
}
export function laplaceKl_otherScale(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const gap = Math.abs(location - otherLocation);
  return -((scale - otherScale) / otherScale + shift(gap, scale, otherScale)) / otherScale;
}

/** Survival function, by symmetry the distribution function at −z. @kernel located probability */
export function laplaceSurvival(z: number): number {
  return z > 0.0 ? 0.5 * Math.exp(-z) : 1.0 - 0.5 * Math.exp(z);
}
export function laplaceSurvival_z(z: number): number {
  return -0.5 * Math.exp(-Math.abs(z));
}

/** Log distribution function, z − log 2 below the location and log(1 − ½ exp(−z)) above. @kernel located probability */
export function laplaceLogCdf(z: number): number {
  return z < 0.0 ? z - log2 : Math.log1p(-0.5 * Math.exp(-z));
}
export function laplaceLogCdf_z(z: number): number {
  return z < 0.0 ? 1.0 : 1.0 / (2.0 * Math.exp(z) - 1.0);
}

/** Log survival function. @kernel located probability */
export function laplaceLogSurvival(z: number): number {
  return laplaceLogCdf(-z);
}
export function laplaceLogSurvival_z(z: number): number {
  return -laplaceLogCdf_z(-z);
}

/** Upper quantile. @kernel located point */
export function laplaceUpperQuantile(p: number): number {
  return -standardQuantile(p);
}
export function laplaceUpperQuantile_p(p: number): number {
  return -1.0 / (p < 0.5 ? p : 1.0 - p);
}
