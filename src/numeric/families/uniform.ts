// The uniform distribution between `lower` and `upper` in double precision.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 26.
import { logRatio } from '../deviance.js';
import { lostBits } from '../lostBits.js';
import { outside } from '../outside.js';

/**
 * log(upper − lower), with the rounding of the difference put back: it decides the value where the width is
 * next to one.
 */
function logWidth(lower: number, upper: number): number {
  const width = upper - lower;
  return Math.log(width) + lostBits(upper, -lower, width) / width;
}

/** Log density, −log(upper − lower) inside the closed interval, −∞ outside. @kernel */
export function uniformLogDensity(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? -logWidth(lower, upper) : outside(x);
}
export function uniformLogDensity_x(_x: number, _lower: number, _upper: number): number {
  return 0.0;
}
export function uniformLogDensity_lower(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? 1.0 / (upper - lower) : 0.0;
}
export function uniformLogDensity_upper(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? -1.0 / (upper - lower) : 0.0;
}

/** Quantile, and the draw from a standard uniform: lower + p (upper − lower). @kernel */
export function uniformQuantile(p: number, lower: number, upper: number): number {
  return lower + p * (upper - lower);
}
export function uniformQuantile_p(_p: number, lower: number, upper: number): number {
  return upper - lower;
}
export function uniformQuantile_lower(p: number, _lower: number, _upper: number): number {
  return 1.0 - p;
}
export function uniformQuantile_upper(p: number, _lower: number, _upper: number): number {
  return p;
}

/** Mean, (lower + upper) / 2. @kernel */
export function uniformMean(lower: number, upper: number): number {
  return 0.5 * (lower + upper);
}
export function uniformMean_lower(_lower: number, _upper: number): number {
  return 0.5;
}
export function uniformMean_upper(_lower: number, _upper: number): number {
  return 0.5;
}

/** Variance, (upper − lower)² / 12. @kernel */
export function uniformVariance(lower: number, upper: number): number {
  return ((upper - lower) * (upper - lower)) / 12.0;
}
export function uniformVariance_lower(lower: number, upper: number): number {
  return (lower - upper) / 6.0;
}
export function uniformVariance_upper(lower: number, upper: number): number {
  return (upper - lower) / 6.0;
}

/** Entropy, log(upper − lower). @kernel */
export function uniformEntropy(lower: number, upper: number): number {
  return logWidth(lower, upper);
}
export function uniformEntropy_lower(lower: number, upper: number): number {
  return -1.0 / (upper - lower);
}
export function uniformEntropy_upper(lower: number, upper: number): number {
  return 1.0 / (upper - lower);
}

/** Distribution function, (x − lower) / (upper − lower) held to [0, 1]. @kernel */
export function uniformCdf(x: number, lower: number, upper: number): number {
  if (x <= lower) return 0.0;
  if (x >= upper) return 1.0;
  return (x - lower) / (upper - lower);
}
export function uniformCdf_x(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? 1.0 / (upper - lower) : 0.0;
}
export function uniformCdf_lower(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? (x - upper) / (upper - lower) / (upper - lower) : 0.0;
}
export function uniformCdf_upper(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? (lower - x) / (upper - lower) / (upper - lower) : 0.0;
}

/** Divergence, log of the ratio of the widths where the other interval covers this one, else +∞. @kernel */
export function uniformKl(lower: number, upper: number, otherLower: number, otherUpper: number): number {
  if (lower < otherLower || upper > otherUpper) return Infinity;
  // log1p of the excess width keeps the accuracy where the intervals nearly agree.
  return Math.log1p((lower - otherLower + (otherUpper - upper)) / (upper - lower));
}
export function uniformKl_lower(
  lower: number,
  upper: number,
  _otherLower: number,
  _otherUpper: number,
): number {
  return 1.0 / (upper - lower);
}
export function uniformKl_upper(
  lower: number,
  upper: number,
  _otherLower: number,
  _otherUpper: number,
): number {
  return -1.0 / (upper - lower);
}
export function uniformKl_otherLower(
  _lower: number,
  _upper: number,
  otherLower: number,
  otherUpper: number,
): number {
  return -1.0 / (otherUpper - otherLower);
}
export function uniformKl_otherUpper(
  _lower: number,
  _upper: number,
  otherLower: number,
  otherUpper: number,
): number {
  return 1.0 / (otherUpper - otherLower);
}

/** Survival function, (upper − x) / (upper − lower) held to [0, 1]. @kernel */
export function uniformSurvival(x: number, lower: number, upper: number): number {
  if (x <= lower) return 1.0;
  if (x >= upper) return 0.0;
  return (upper - x) / (upper - lower);
}
export function uniformSurvival_x(x: number, lower: number, upper: number): number {
  return -uniformCdf_x(x, lower, upper);
}
export function uniformSurvival_lower(x: number, lower: number, upper: number): number {
  return -uniformCdf_lower(x, lower, upper);
}
export function uniformSurvival_upper(x: number, lower: number, upper: number): number {
  return -uniformCdf_upper(x, lower, upper);
}

// log(part / (part + rest)), by the smaller of the two.
function logShare(part: number, rest: number, whole: number): number {
  return rest < part ? Math.log1p(-rest / whole) : logRatio(part, whole);
}

/** Log distribution function. @kernel */
export function uniformLogCdf(x: number, lower: number, upper: number): number {
  if (x <= lower) return -Infinity;
  if (x >= upper) return 0.0;
  return logShare(x - lower, upper - x, upper - lower);
}
export function uniformLogCdf_x(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? 1.0 / (x - lower) : 0.0;
}
export function uniformLogCdf_lower(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? (x - upper) / (upper - lower) / (x - lower) : 0.0;
}
export function uniformLogCdf_upper(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? -1.0 / (upper - lower) : 0.0;
}

/** Log survival function. @kernel */
export function uniformLogSurvival(x: number, lower: number, upper: number): number {
  if (x <= lower) return 0.0;
  if (x >= upper) return -Infinity;
  return logShare(upper - x, x - lower, upper - lower);
}
export function uniformLogSurvival_x(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? -1.0 / (upper - x) : 0.0;
}
export function uniformLogSurvival_lower(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? 1.0 / (upper - lower) : 0.0;
}
export function uniformLogSurvival_upper(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? (x - lower) / (upper - lower) / (upper - x) : 0.0;
}

/** Upper quantile, upper (1 − p) + lower p: either term may be what is left. @kernel */
export function uniformUpperQuantile(p: number, lower: number, upper: number): number {
  return upper * (1.0 - p) + lower * p;
}
export function uniformUpperQuantile_p(_p: number, lower: number, upper: number): number {
  return lower - upper;
}
export function uniformUpperQuantile_lower(p: number, _lower: number, _upper: number): number {
  return p;
}
export function uniformUpperQuantile_upper(p: number, _lower: number, _upper: number): number {
  return 1.0 - p;
}
