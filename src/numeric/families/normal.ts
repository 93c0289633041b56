// The normal distribution in double precision, with z = (x − mean) / sd.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 13.
import { HALF_LOG_2PI } from '../constants.js';
import { logRatio } from '../deviance.js';
import { log1pmx } from '../log1pmx.js';
import {
  logNormalCdf,
  logNormalCdfDerivative,
  normalCdf,
  normalDensity,
  scaledLogNormalCdfDerivative,
  scaledNormalDensity,
} from '../normalCdf.js';
import { normalQuantile, normalQuantile_x } from '../normalQuantile.js';

/** Log density, −½ z² − log sd − ½ log 2π. @kernel */
export function normalLogDensity(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -0.5 * z * z - Math.log(sd) - HALF_LOG_2PI;
}
export function normalLogDensity_x(x: number, mean: number, sd: number): number {
  return -((x - mean) / sd) / sd;
}
export function normalLogDensity_mean(x: number, mean: number, sd: number): number {
  return (x - mean) / sd / sd;
}
export function normalLogDensity_sd(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return ((z - 1.0) * (z + 1.0)) / sd;
}

/** Draw from a standard one, mean + sd · noise. @kernel */
export function normalDraw(noise: number, mean: number, sd: number): number {
  return mean + sd * noise;
}
export function normalDraw_mean(_noise: number, _mean: number, _sd: number): number {
  return 1.0;
}
export function normalDraw_sd(noise: number, _mean: number, _sd: number): number {
  return noise;
}

/** Variance, sd². @kernel */
export function normalVariance(sd: number): number {
  return sd * sd;
}
export function normalVariance_sd(sd: number): number {
  return 2.0 * sd;
}

/** Entropy, log sd + ½ log 2πe. @kernel */
export function normalEntropy(sd: number): number {
  return Math.log(sd) + HALF_LOG_2PI + 0.5;
}
export function normalEntropy_sd(sd: number): number {
  return 1.0 / sd;
}

/** Distribution function, Φ(z). @kernel */
export function normalCdfOf(x: number, mean: number, sd: number): number {
  return normalCdf((x - mean) / sd);
}
export function normalCdfOf_x(x: number, mean: number, sd: number): number {
  return normalDensity((x - mean) / sd) / sd;
}
export function normalCdfOf_mean(x: number, mean: number, sd: number): number {
  return -normalDensity((x - mean) / sd) / sd;
}
export function normalCdfOf_sd(x: number, mean: number, sd: number): number {
  return -scaledNormalDensity((x - mean) / sd) / sd;
}

/** Quantile, mean + sd · Φ⁻¹(p). @kernel */
export function normalQuantileOf(p: number, mean: number, sd: number): number {
  return mean + sd * normalQuantile(p);
}
export function normalQuantileOf_p(p: number, _mean: number, sd: number): number {
  return sd * normalQuantile_x(p);
}
export function normalQuantileOf_mean(_p: number, _mean: number, _sd: number): number {
  return 1.0;
}
export function normalQuantileOf_sd(p: number, _mean: number, _sd: number): number {
  return normalQuantile(p);
}

/**
 * Divergence, ½ (r² − 1 − log r²) + ½ ((mean − otherMean) / otherSd)² with r = sd / otherSd; the first term
 * is written through log1p(e) − e with e = r² − 1, which keeps it accurate where r is near 1.
 * @kernel
 */
export function normalKl(mean: number, sd: number, otherMean: number, otherSd: number): number {
  const d = (mean - otherMean) / otherSd;
  const t = (sd - otherSd) / otherSd;
  const e = t * (2.0 + t);
  // Far below one, e is −1 to rounding and its logarithm must come from the ratio itself.
  const spread = e < -0.5 ? e - 2.0 * logRatio(sd, otherSd) : -log1pmx(e);
  return 0.5 * spread + 0.5 * d * d;
}
export function normalKl_mean(mean: number, _sd: number, otherMean: number, otherSd: number): number {
  return (mean - otherMean) / otherSd / otherSd;
}
export function normalKl_sd(_mean: number, sd: number, _otherMean: number, otherSd: number): number {
  return (((sd - otherSd) / otherSd) * ((sd + otherSd) / otherSd)) / sd;
}
export function normalKl_otherMean(mean: number, _sd: number, otherMean: number, otherSd: number): number {
  return -((mean - otherMean) / otherSd) / otherSd;
}
export function normalKl_otherSd(mean: number, sd: number, otherMean: number, otherSd: number): number {
  const d = (mean - otherMean) / otherSd;
  return -(((sd - otherSd) / otherSd) * ((sd + otherSd) / otherSd) + d * d) / otherSd;
}

/** Survival function, Φ(−z). @kernel */
export function normalSurvivalOf(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return normalCdf(-z);
}
export function normalSurvivalOf_x(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -normalDensity(z) / sd;
}
export function normalSurvivalOf_mean(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -(-normalDensity(z)) / sd;
}
export function normalSurvivalOf_sd(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -(-scaledNormalDensity(z)) / sd;
}

/** Log distribution function, log Φ(z). @kernel */
export function normalLogCdfOf(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return logNormalCdf(z);
}
export function normalLogCdfOf_x(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return logNormalCdfDerivative(z) / sd;
}
export function normalLogCdfOf_mean(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -logNormalCdfDerivative(z) / sd;
}
export function normalLogCdfOf_sd(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -scaledLogNormalCdfDerivative(z) / sd;
}

/** Log survival function, log Φ(−z). @kernel */
export function normalLogSurvivalOf(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return logNormalCdf(-z);
}
export function normalLogSurvivalOf_x(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -logNormalCdfDerivative(-z) / sd;
}
export function normalLogSurvivalOf_mean(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -(-logNormalCdfDerivative(-z)) / sd;
}
export function normalLogSurvivalOf_sd(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -scaledLogNormalCdfDerivative(-z) / sd;
}

/** Upper quantile, mean − sd · Φ⁻¹(p). @kernel */
export function normalUpperQuantileOf(p: number, mean: number, sd: number): number {
  return mean - sd * normalQuantile(p);
}
export function normalUpperQuantileOf_p(p: number, _mean: number, sd: number): number {
  return -sd * normalQuantile_x(p);
}
export function normalUpperQuantileOf_mean(_p: number, _mean: number, _sd: number): number {
  return 1.0;
}
export function normalUpperQuantileOf_sd(p: number, _mean: number, _sd: number): number {
  return -normalQuantile(p);
}
