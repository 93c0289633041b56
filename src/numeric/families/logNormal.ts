// The log-normal distribution in double precision: log x is normal with mean `location` and deviation `scale`.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 14.
import { HALF_LOG_2PI } from '../constants.js';
import { logDistance } from '../logDistance.js';
import {
  logNormalCdf,
  logNormalCdfDerivative,
  normalCdf,
  normalDensity,
  scaledLogNormalCdfDerivative,
  scaledNormalDensity,
} from '../normalCdf.js';
import { normalQuantile, normalQuantile_x } from '../normalQuantile.js';
import { outside } from '../outside.js';

/** Log density, −½ z² − log x − log scale − ½ log 2π with z = (log x − location) / scale; −∞ for x ≤ 0. @kernel */
export function logNormalLogDensity(x: number, location: number, scale: number): number {
  if (!(x > 0.0) || x === Infinity) return outside(x);
  const z = logDistance(x, location) / scale;
  return -0.5 * z * z - Math.log(x) - Math.log(scale) - HALF_LOG_2PI;
}
export function logNormalLogDensity_x(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  return -(logDistance(x, location) / scale / scale + 1.0) / x;
}
export function logNormalLogDensity_location(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  return logDistance(x, location) / scale / scale;
}
export function logNormalLogDensity_scale(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return ((z - 1.0) * (z + 1.0)) / scale;
}

/** Draw, exp(location + scale · noise). @kernel */
export function logNormalDraw(noise: number, location: number, scale: number): number {
  return Math.exp(location + scale * noise);
}
export function logNormalDraw_location(noise: number, location: number, scale: number): number {
  return Math.exp(location + scale * noise);
}
export function logNormalDraw_scale(noise: number, location: number, scale: number): number {
  return noise * Math.exp(location + scale * noise);
}

/** Mean, exp(location + ½ scale²). @kernel */
export function logNormalMean(location: number, scale: number): number {
  return Math.exp(location + 0.5 * scale * scale);
}
export function logNormalMean_location(location: number, scale: number): number {
  return Math.exp(location + 0.5 * scale * scale);
}
export function logNormalMean_scale(location: number, scale: number): number {
  return scale * Math.exp(location + 0.5 * scale * scale);
}

/**
 * Variance, (exp(scale²) − 1) exp(2 location + scale²), with exp(scale²) moved into the second factor: one may
 * overflow where the other underflows.
 * @kernel
 */
export function logNormalVariance(location: number, scale: number): number {
  const v = scale * scale;
  return -Math.expm1(-v) * Math.exp(2.0 * (location + v));
}
export function logNormalVariance_location(location: number, scale: number): number {
  return 2.0 * logNormalVariance(location, scale);
}
export function logNormalVariance_scale(location: number, scale: number): number {
  const v = scale * scale;
  return 2.0 * scale * Math.exp(2.0 * (location + v)) * (1.0 - Math.expm1(-v));
}

/** Mode, exp(location − scale²). @kernel */
export function logNormalMode(location: number, scale: number): number {
  return Math.exp(location - scale * scale);
}
export function logNormalMode_location(location: number, scale: number): number {
  return Math.exp(location - scale * scale);
}
export function logNormalMode_scale(location: number, scale: number): number {
  return -2.0 * scale * Math.exp(location - scale * scale);
}

/** Entropy, location + log scale + ½ log 2πe. @kernel */
export function logNormalEntropy(location: number, scale: number): number {
  return location + Math.log(scale) + HALF_LOG_2PI + 0.5;
}
export function logNormalEntropy_location(_location: number, _scale: number): number {
  return 1.0;
}
export function logNormalEntropy_scale(_location: number, scale: number): number {
  return 1.0 / scale;
}

/** Distribution function, Φ((log x − location) / scale). @kernel */
export function logNormalCdfOf(x: number, location: number, scale: number): number {
  if (x <= 0.0) return 0.0;
  return normalCdf(logDistance(x, location) / scale);
}
export function logNormalCdfOf_x(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  return normalDensity(logDistance(x, location) / scale) / scale / x;
}
export function logNormalCdfOf_location(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  return -normalDensity(logDistance(x, location) / scale) / scale;
}
export function logNormalCdfOf_scale(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  return -scaledNormalDensity(logDistance(x, location) / scale) / scale;
}

/** Quantile, exp(location + scale · Φ⁻¹(p)). @kernel */
export function logNormalQuantileOf(p: number, location: number, scale: number): number {
  return Math.exp(location + scale * normalQuantile(p));
}
export function logNormalQuantileOf_p(p: number, location: number, scale: number): number {
  return Math.exp(location + scale * normalQuantile(p)) * scale * normalQuantile_x(p);
}
export function logNormalQuantileOf_location(p: number, location: number, scale: number): number {
  return Math.exp(location + scale * normalQuantile(p));
}
export function logNormalQuantileOf_scale(p: number, location: number, scale: number): number {
  const q = normalQuantile(p);
  return q * Math.exp(location + scale * q);
}

/** Survival function, Φ(−z). @kernel */
export function logNormalSurvivalOf(x: number, location: number, scale: number): number {
  if (x <= 0.0) return 1.0;
  const z = logDistance(x, location) / scale;
  return normalCdf(-z);
}
export function logNormalSurvivalOf_x(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -normalDensity(z) / scale / x;
}
export function logNormalSurvivalOf_location(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -(-normalDensity(z)) / scale;
}
export function logNormalSurvivalOf_scale(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -(-scaledNormalDensity(z)) / scale;
}

/** Log distribution function, log Φ(z). @kernel */
export function logNormalLogCdfOf(x: number, location: number, scale: number): number {
  if (x <= 0.0) return -Infinity;
  const z = logDistance(x, location) / scale;
  return logNormalCdf(z);
}
export function logNormalLogCdfOf_x(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return logNormalCdfDerivative(z) / scale / x;
}
export function logNormalLogCdfOf_location(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -logNormalCdfDerivative(z) / scale;
}
export function logNormalLogCdfOf_scale(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -scaledLogNormalCdfDerivative(z) / scale;
}

/** Log survival function, log Φ(−z). @kernel */
export function logNormalLogSurvivalOf(x: number, location: number, scale: number): number {
  if (x <= 0.0) return 0.0;
  const z = logDistance(x, location) / scale;
  return logNormalCdf(-z);
}
export function logNormalLogSurvivalOf_x(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -logNormalCdfDerivative(-z) / scale / x;
}
export function logNormalLogSurvivalOf_location(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -(-logNormalCdfDerivative(-z)) / scale;
}
export function logNormalLogSurvivalOf_scale(x: number, location: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = logDistance(x, location) / scale;
  return -scaledLogNormalCdfDerivative(-z) / scale;
}

/** Upper quantile, exp(location − scale · Φ⁻¹(p)). @kernel */
export function logNormalUpperQuantileOf(p: number, location: number, scale: number): number {
  return Math.exp(location - scale * normalQuantile(p));
}
export function logNormalUpperQuantileOf_p(p: number, location: number, scale: number): number {
  return -Math.exp(location - scale * normalQuantile(p)) * scale * normalQuantile_x(p);
}
export function logNormalUpperQuantileOf_location(p: number, location: number, scale: number): number {
  return Math.exp(location - scale * normalQuantile(p));
}
export function logNormalUpperQuantileOf_scale(p: number, location: number, scale: number): number {
  const q = -normalQuantile(p);
  return q * Math.exp(location + scale * q);
}
