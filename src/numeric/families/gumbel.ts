// The standard Gumbel distribution, for maxima, in double precision: distribution function exp(−exp(−z)).
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 22.
import { EULER } from '../constants.js';
import { logRatio } from '../deviance.js';
import { log1mexp, log1mexp_x } from '../log1mexp.js';
import { logDistance } from '../logDistance.js';
import { extremeKl, extremeKlDistance, extremeKlRatio, extremeKlUnit } from './extremeKl.js';

/** Log density, −z − exp(−z). @kernel located density */
export function gumbelLogDensity(z: number): number {
  return z < -800.0 ? -Infinity : -z - Math.exp(-z);
}
export function gumbelLogDensity_z(z: number): number {
  return Math.expm1(-z);
}

/** Distribution function, exp(−exp(−z)). @kernel located probability */
export function gumbelCdf(z: number): number {
  return Math.exp(-Math.exp(-z));
}
export function gumbelCdf_z(z: number): number {
  return z < -7.0 ? 0.0 : Math.exp(-z - Math.exp(-z));
}

/** Survival function, 1 − exp(−exp(−z)). @kernel located probability */
export function gumbelSurvival(z: number): number {
  return -Math.expm1(-Math.exp(-z));
}
export function gumbelSurvival_z(z: number): number {
  return -gumbelCdf_z(z);
}

/** Log distribution function, −exp(−z). @kernel located probability */
export function gumbelLogCdf(z: number): number {
  return -Math.exp(-z);
}
export function gumbelLogCdf_z(z: number): number {
  return Math.exp(-z);
}

/** Log survival function, log(1 − exp(−exp(−z))); from z = 40 on, −z to the last place. @kernel located probability */
export function gumbelLogSurvival(z: number): number {
  return z > 40.0 ? -z : log1mexp(-Math.exp(-z));
}
export function gumbelLogSurvival_z(z: number): number {
  return z > 40.0 ? -1.0 : z < -7.0 ? -0.0 : Math.exp(-z) * log1mexp_x(-Math.exp(-z));
}

// −log(−l) for l = log p, from l + 1 where that is small: the logarithm crosses zero there.
function minusLogMinus(l: number, fromMinusOne: number): number {
  return Math.abs(fromMinusOne) < 0.01 ? -Math.log1p(-fromMinusOne) : -Math.log(-l);
}

/** Quantile, −log(−log p). @kernel located point */
export function gumbelQuantile(p: number): number {
  return minusLogMinus(Math.log(p), logDistance(p, -1.0));
}
export function gumbelQuantile_p(p: number): number {
  return -1.0 / (p * Math.log(p));
}

/** Upper quantile, −log(−log(1 − p)). @kernel located point */
export function gumbelUpperQuantile(p: number): number {
  return p < 0.5 ? -Math.log(-Math.log1p(-p)) : minusLogMinus(Math.log(1.0 - p), logDistance(1.0 - p, -1.0));
}
export function gumbelUpperQuantile_p(p: number): number {
  return 1.0 / ((1.0 - p) * Math.log1p(-p));
}

/** Mean, Euler's constant. @kernel located center */
export function gumbelMean(): number {
  return EULER;
}

/** Variance, π² / 6. @kernel located spread */
export function gumbelVariance(): number {
  return 1.6449340668482264365;
}

/** Entropy, 1 + Euler's constant. @kernel located entropy */
export function gumbelEntropy(): number {
  return 1.0 + EULER;
}

/**
 * Divergence, exp(−d) Γ(1 + r) − 1 + d − log r + γ (r − 1) with r = scale / otherScale and d = (location −
 * otherLocation) / otherScale, arranged as in extremeKl; by direct integration, with E exp(−s Z) = Γ(1 + s). @kernel
 */
export function gumbelKl(location: number, scale: number, otherLocation: number, otherScale: number): number {
  const d = (location - otherLocation) / otherScale;
  const logR = logRatio(scale, otherScale);
  return extremeKl(scale / otherScale, (scale - otherScale) / otherScale, d, logR);
}
export function gumbelKl_location(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const d = (location - otherLocation) / otherScale;
  return extremeKlDistance(scale / otherScale, (scale - otherScale) / otherScale, d) / otherScale;
}
export function gumbelKl_scale(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const d = (location - otherLocation) / otherScale;
  return extremeKlRatio(scale / otherScale, (scale - otherScale) / otherScale, d) / scale;
}
export function gumbelKl_otherLocation(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  return -gumbelKl_location(location, scale, otherLocation, otherScale);
}
export function gumbelKl_otherScale(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const d = (location - otherLocation) / otherScale;
  return -extremeKlUnit(scale / otherScale, (scale - otherScale) / otherScale, d) / otherScale;
}
