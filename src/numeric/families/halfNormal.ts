// The standard half-normal distribution in double precision: the size of a standard normal number.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 13, section 10.
import { LN2, SQRT_HALF } from '../constants.js';
import { logRatio } from '../deviance.js';
import { erf, erfc } from '../errorFunction.js';
import { log1pmx } from '../log1pmx.js';
import { logNormalCdf, logNormalCdfDerivative, normalDensity } from '../normalCdf.js';
import { centralQuantile, normalQuantile } from '../normalQuantile.js';
import { outside } from '../outside.js';

/** Log density, log(2 / π) / 2 − z² / 2 for z ≥ 0. @kernel scaled density */
export function halfNormalLogDensity(z: number): number {
  return z >= 0.0 ? -0.22579135264472743236 - 0.5 * z * z : outside(z);
}
export function halfNormalLogDensity_z(z: number): number {
  return z >= 0.0 ? -z : 0.0;
}
export function halfNormalLogDensity_spread(z: number): number {
  return z >= 0.0 ? (1.0 - z) * (1.0 + z) : 0.0;
}

/** Distribution function, erf(z / √2). @kernel scaled probability */
export function halfNormalCdf(z: number): number {
  return z <= 0.0 ? 0.0 : erf(z * SQRT_HALF);
}
export function halfNormalCdf_z(z: number): number {
  return z >= 0.0 && z < 60.0 ? 2.0 * normalDensity(z) : 0.0;
}

/** Survival function, erfc(z / √2). @kernel scaled probability */
export function halfNormalSurvival(z: number): number {
  return z <= 0.0 ? 1.0 : erfc(z * SQRT_HALF);
}
export function halfNormalSurvival_z(z: number): number {
  return -halfNormalCdf_z(z);
}

/** Log distribution function, from the smaller of the two probabilities; near 0 it is log √(2/π) z. @kernel */
export function halfNormalLogCdf(x: number, scale: number): number {
  if (x <= 0.0) return -Infinity;
  const z = x / scale;
  if (z < 1.0e-9) return logRatio(x, scale) - 0.22579135264472743236;
  return z < 0.7 ? Math.log(erf(z * SQRT_HALF)) : Math.log1p(-erfc(z * SQRT_HALF));
}
export function halfNormalLogCdf_x(x: number, scale: number): number {
  return x > 0.0 ? logSlope(x / scale) / x : 0.0;
}
export function halfNormalLogCdf_scale(x: number, scale: number): number {
  return x > 0.0 ? -logSlope(x / scale) / scale : 0.0;
}
// The derivative in log z.
function logSlope(z: number): number {
  return z < 1.0e-9 ? 1.0 : z > 60.0 ? 0.0 : (2.0 * z * normalDensity(z)) / erf(z * SQRT_HALF);
}

/** Log survival function: log1p near 0, where it vanishes, else log 2Φ(−z). @kernel scaled probability */
export function halfNormalLogSurvival(z: number): number {
  if (z <= 0.0) return 0.0;
  return z < 0.7 ? Math.log1p(-erf(z * SQRT_HALF)) : LN2 + logNormalCdf(-z);
}
export function halfNormalLogSurvival_z(z: number): number {
  return z >= 0.0 ? -logNormalCdfDerivative(-z) : 0.0;
}

/** Quantile, √2 erf⁻¹(p). @kernel scaled point */
export function halfNormalQuantile(p: number): number {
  return p <= 0.5 ? centralQuantile(p) : -normalQuantile(0.5 * (1.0 - p));
}
export function halfNormalQuantile_p(p: number): number {
  return 0.5 / normalDensity(halfNormalQuantile(p));
}

/** Upper quantile, √2 erfc⁻¹(p). @kernel scaled point */
export function halfNormalUpperQuantile(p: number): number {
  return p < 0.5 ? -normalQuantile(0.5 * p) : centralQuantile(1.0 - p);
}
export function halfNormalUpperQuantile_p(p: number): number {
  return -0.5 / normalDensity(halfNormalUpperQuantile(p));
}

/** Draw, |noise| of standard normal noise. @kernel scaled point */
export function halfNormalDraw(noise: number): number {
  return Math.abs(noise);
}

/** Mean, √(2 / π). @kernel scaled center */
export function halfNormalMean(): number {
  return 0.79788456080286535588;
}

/** Mode, 0. @kernel scaled center */
export function halfNormalMode(): number {
  return 0.0;
}

/** Variance, 1 − 2 / π. @kernel scaled spread */
export function halfNormalVariance(): number {
  return 0.36338022763241865692;
}

/** Entropy, log(π / 2) / 2 + 1 / 2. @kernel scaled entropy */
export function halfNormalEntropy(): number {
  return 0.72579135264472743236;
}

/**
 * Divergence, (v − 1 − log v) / 2 with v = (scale / otherScale)²: that of normal distributions with one mean, as
 * the sign says nothing of the scale. Source: Kullback, Information Theory and Statistics (1959), chapter 9. @kernel
 */
export function halfNormalKl(scale: number, otherScale: number): number {
  const t = (scale - otherScale) / otherScale;
  const u = t * (2.0 + t);
  return u < -0.5 ? 0.5 * u - logRatio(scale, otherScale) : 0.0 - 0.5 * log1pmx(u);
}
export function halfNormalKl_scale(scale: number, otherScale: number): number {
  const t = (scale - otherScale) / otherScale;
  return (t * (2.0 + t)) / scale;
}
export function halfNormalKl_otherScale(scale: number, otherScale: number): number {
  const t = (scale - otherScale) / otherScale;
  return (-t * (2.0 + t)) / otherScale;
}
