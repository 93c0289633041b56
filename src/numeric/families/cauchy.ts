// The standard Cauchy distribution in double precision.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 16.
import { LOG_PI, PI } from '../constants.js';
import { logRatio } from '../deviance.js';

/** log(1 + z²) with z = d / scale, of which nothing overflows. */
export function cauchyLogSquare(d: number, scale: number): number {
  const z = d / scale;
  return Math.abs(z) > 1.0e9 ? 2.0 * logRatio(Math.abs(d), scale) : Math.log1p(z * z);
}
/** Its derivative in d, 2z / (1 + z²) / scale. */
export function cauchyLogSquare_d(d: number, scale: number): number {
  const z = d / scale;
  return Math.abs(z) > 1.0e9 ? 2.0 / d : (2.0 * z) / (1.0 + z * z) / scale;
}
/** (1 − z²) / (1 + z²), one less z times that. */
export function cauchySpread(z: number): number {
  const size = Math.abs(z);
  const inner = size > 1.0 ? 1.0 / size : size;
  const ratio = ((1.0 - inner) * (1.0 + inner)) / (1.0 + inner * inner);
  return size > 1.0 ? -ratio : ratio;
}

/** Log density, −log π − log scale − log(1 + z²) with z = (x − location) / scale. @kernel */
export function cauchyLogDensity(x: number, location: number, scale: number): number {
  return -LOG_PI - cauchyLogSquare(x - location, scale) - Math.log(scale);
}
export function cauchyLogDensity_x(x: number, location: number, scale: number): number {
  return -cauchyLogSquare_d(x - location, scale);
}
export function cauchyLogDensity_location(x: number, location: number, scale: number): number {
  return cauchyLogSquare_d(x - location, scale);
}
export function cauchyLogDensity_scale(x: number, location: number, scale: number): number {
  return -cauchySpread((x - location) / scale) / scale;
}

/** Distribution function, 1/2 + atan(z) / π; below −1 from the angle to the end. @kernel located probability */
export function cauchyCdf(z: number): number {
  return z < -1.0 ? -Math.atan(1.0 / z) / PI : 0.5 + Math.atan(z) / PI;
}
export function cauchyCdf_z(z: number): number {
  return 1.0 / (PI * (1.0 + z * z));
}

/** Survival function, the distribution function at −z. @kernel located probability */
export function cauchySurvival(z: number): number {
  return cauchyCdf(-z);
}
export function cauchySurvival_z(z: number): number {
  return -cauchyCdf_z(z);
}

/** Log distribution function, from the smaller of the two probabilities; far below it is −log(−π z). @kernel */
export function cauchyLogCdf(x: number, location: number, scale: number): number {
  const d = x - location;
  const z = d / scale;
  if (z < -1.0e9) return -logRatio(-d, scale) - LOG_PI;
  return z < 0.0 ? Math.log(cauchyCdf(z)) : Math.log1p(-cauchyCdf(-z));
}
export function cauchyLogCdf_x(x: number, location: number, scale: number): number {
  const d = x - location;
  const z = d / scale;
  return z < -1.0e9 ? -1.0 / d : cauchyCdf_z(z) / cauchyCdf(z) / scale;
}
export function cauchyLogCdf_location(x: number, location: number, scale: number): number {
  return -cauchyLogCdf_x(x, location, scale);
}
export function cauchyLogCdf_scale(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  if (z < -1.0e9) return 1.0 / scale;
  const slope = cauchyCdf_z(z) / cauchyCdf(z);
  return slope === 0.0 ? 0.0 : (-z * slope) / scale;
}

/** Log survival function, the log distribution function with x and location exchanged. @kernel */
export function cauchyLogSurvival(x: number, location: number, scale: number): number {
  return cauchyLogCdf(location, x, scale);
}
export function cauchyLogSurvival_x(x: number, location: number, scale: number): number {
  return -cauchyLogCdf_x(location, x, scale);
}
export function cauchyLogSurvival_location(x: number, location: number, scale: number): number {
  return cauchyLogCdf_x(location, x, scale);
}
export function cauchyLogSurvival_scale(x: number, location: number, scale: number): number {
  return cauchyLogCdf_scale(location, x, scale);
}

/** Quantile, tan(π (p − 1/2)), or the cotangent of the angle to the nearer end. @kernel located point */
export function cauchyQuantile(p: number): number {
  if (p < 0.25) return -1.0 / Math.tan(PI * p);
  return p > 0.75 ? 1.0 / Math.tan(PI * (1.0 - p)) : Math.tan(PI * (p - 0.5));
}
export function cauchyQuantile_p(p: number): number {
  const q = cauchyQuantile(p);
  return PI * (1.0 + q * q);
}

/** Upper quantile, minus the quantile. @kernel located point */
export function cauchyUpperQuantile(p: number): number {
  return -cauchyQuantile(p);
}
export function cauchyUpperQuantile_p(p: number): number {
  return -cauchyQuantile_p(p);
}

/** Entropy, log 4π. @kernel located entropy */
export function cauchyEntropy(): number {
  return 2.531024246969290793;
}

/**
 * Divergence, log(((scale + otherScale)² + gap²) / (4 scale otherScale)), as log1p of
 * ((scale − otherScale)² + gap²) / (4 scale otherScale). Source: Chyzak and Nielsen (2019), "A closed-form formula
 * for the Kullback–Leibler divergence between Cauchy distributions", arXiv:1905.10965, theorem 1. @kernel
 */
export function cauchyKl(location: number, scale: number, otherLocation: number, otherScale: number): number {
  const excess = cauchyExcess(location - otherLocation, scale, otherScale);
  if (excess < 1.0e300) return Math.log1p(excess);
  const apart = Math.max(Math.abs(location - otherLocation), Math.abs(scale - otherScale));
  const near = Math.min(Math.abs(location - otherLocation), Math.abs(scale - otherScale)) / apart;
  return 2.0 * Math.log(0.5 * apart) + Math.log1p(near * near) - Math.log(scale) - Math.log(otherScale);
}
/** ((scale − otherScale)² + gap²) / (4 scale otherScale). */
function cauchyExcess(gap: number, scale: number, otherScale: number): number {
  const d = scale - otherScale;
  return 0.25 * ((gap / scale) * (gap / otherScale) + (d / scale) * (d / otherScale));
}
// v w / ((scale + otherScale)² + gap²), whose parts may overflow.
function overNumerator(v: number, w: number, gap: number, sum: number): number {
  const most = Math.max(Math.abs(gap), sum);
  const a = gap / most;
  const b = sum / most;
  return ((v / most) * (w / most)) / (a * a + b * b);
}
export function cauchyKl_location(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const gap = location - otherLocation;
  const most = Math.max(Math.abs(gap), scale + otherScale);
  return overNumerator(2.0 * gap, most, gap, scale + otherScale) / most;
}
export function cauchyKl_scale(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  const gap = location - otherLocation;
  const sum = scale + otherScale;
  return (overNumerator(scale - otherScale, sum, gap, sum) - overNumerator(gap, gap, gap, sum)) / scale;
}
export function cauchyKl_otherLocation(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  return -cauchyKl_location(location, scale, otherLocation, otherScale);
}
export function cauchyKl_otherScale(
  location: number,
  scale: number,
  otherLocation: number,
  otherScale: number,
): number {
  return cauchyKl_scale(otherLocation, otherScale, location, scale);
}
