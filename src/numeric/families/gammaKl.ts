// Divergences of gamma distributions, from one another and from their relatives, in double precision.
import { EULER } from '../constants.js';
import { logRatio } from '../deviance.js';
import { digamma } from '../digamma.js';
import { digammaDifference, digammaMinusLogDifference } from '../digammaDifference.js';
import { gammaRemainder } from '../gammaRemainder.js';
import { logGamma } from '../logGamma.js';
import { trigamma, trigammaSeries } from '../trigamma.js';
import { gammaDistance } from './gamma.js';

const MOST = 1e290;

/**
 * Divergence between gamma distributions of shapes a, b and scales s, t: that at equal means, `gammaRemainder`, and
 * b (ρ − 1 − log ρ) with the ratio of the means ρ = a s / (b t). Both are at least zero, so nothing cancels.
 * Source: by E log x = ψ(a) + log s; Johnson, Kotz and Balakrishnan 1, section 17.8 has the moments. @kernel
 */
export function gammaKl(shape: number, scale: number, otherShape: number, otherScale: number): number {
  const m = shape * scale;
  const n = otherShape * otherScale;
  // A gamma's distance is symmetric in what it compares: x is one mean, the mean the other.
  const means =
    Math.max(m, n) < MOST && Math.min(m, n) > 1.0 / MOST
      ? gammaDistance(m, n)
      : (scale / otherScale) * (shape / otherShape) -
        1.0 -
        (Math.log(scale) - Math.log(otherScale) + Math.log(shape / otherShape));
  return gammaRemainder(shape, otherShape) + otherShape * means;
}
export function gammaKl_shape(shape: number, scale: number, otherShape: number, otherScale: number): number {
  const d = otherShape - shape;
  if (shape < 8.0) return (scale - otherScale) / otherScale - d * trigamma(shape);
  // ψ′(a) − 1/a, as the 1/a is in the difference of the means.
  const rest = (0.5 / shape / shape + trigammaSeries(shape)) * d;
  const m = shape * scale;
  if (!(m < MOST && m > 1.0 / MOST)) return scale / otherScale - otherShape / shape - rest;
  return (m - otherShape * otherScale) / shape / otherScale - rest;
}
export function gammaKl_scale(shape: number, scale: number, otherShape: number, otherScale: number): number {
  const m = shape * scale;
  if (!(m < MOST && m > 1.0 / MOST)) return shape / otherScale - otherShape / scale;
  return (m - otherShape * otherScale) / otherScale / scale;
}
export function gammaKl_otherShape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  const d = otherShape - shape;
  const m = shape * scale;
  const n = otherShape * otherScale;
  if (Math.min(shape, otherShape) >= 8.0 && Math.max(m, n) < MOST && Math.min(m, n) > 1.0 / MOST) {
    return digammaMinusLogDifference(shape, d) - logRatio(m, n);
  }
  const psi = d < 0.0 ? -digammaDifference(otherShape, -d) : digammaDifference(shape, d);
  return psi - logRatio(scale, otherScale);
}
export function gammaKl_otherScale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  const m = shape * scale;
  if (!(m < MOST && m > 1.0 / MOST)) return (otherShape - (scale / otherScale) * shape) / otherScale;
  return (otherShape * otherScale - m) / otherScale / otherScale;
}

/** Divergence of an exponential from a gamma distribution. @kernel */
export function exponentialGammaKl(rate: number, otherShape: number, otherScale: number): number {
  return gammaKl(1.0, 1.0 / rate, otherShape, otherScale);
}
export function exponentialGammaKl_rate(rate: number, otherShape: number, otherScale: number): number {
  return -gammaKl_scale(1.0, 1.0 / rate, otherShape, otherScale) / rate / rate;
}
export function exponentialGammaKl_otherShape(rate: number, otherShape: number, otherScale: number): number {
  return gammaKl_otherShape(1.0, 1.0 / rate, otherShape, otherScale);
}
export function exponentialGammaKl_otherScale(rate: number, otherShape: number, otherScale: number): number {
  return gammaKl_otherScale(1.0, 1.0 / rate, otherShape, otherScale);
}

/** Divergence of a gamma from an exponential distribution. @kernel */
export function gammaExponentialKl(shape: number, scale: number, otherRate: number): number {
  return gammaKl(shape, scale, 1.0, 1.0 / otherRate);
}
export function gammaExponentialKl_shape(shape: number, scale: number, otherRate: number): number {
  return gammaKl_shape(shape, scale, 1.0, 1.0 / otherRate);
}
export function gammaExponentialKl_scale(shape: number, scale: number, otherRate: number): number {
  return gammaKl_scale(shape, scale, 1.0, 1.0 / otherRate);
}
export function gammaExponentialKl_otherRate(shape: number, scale: number, otherRate: number): number {
  return -gammaKl_otherScale(shape, scale, 1.0, 1.0 / otherRate) / otherRate / otherRate;
}

/**
 * Divergence of a Weibull distribution of shape k and scale λ from a gamma one: log k − 1 − γ + b γ / k +
 * b log(t / λ) + (λ / t) Γ(1 + 1/k) + log Γ(b). Source: by E log x = log λ − γ / k and E x = λ Γ(1 + 1/k).
 */
export function weibullGammaKl(shape: number, scale: number, otherShape: number, otherScale: number): number {
  return (
    Math.log(shape) -
    1.0 -
    EULER +
    (otherShape * EULER) / shape +
    otherShape * logRatio(otherScale, scale) +
    meanRatio(shape, scale, otherScale) +
    logGamma(otherShape)
  );
}
export function weibullGammaKl_shape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  const inner = otherShape * EULER + meanRatio(shape, scale, otherScale) * digamma(1.0 + 1.0 / shape);
  return (1.0 - inner / shape) / shape;
}
export function weibullGammaKl_scale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return (meanRatio(shape, scale, otherScale) - otherShape) / scale;
}
export function weibullGammaKl_otherShape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return EULER / shape + logRatio(otherScale, scale) + digamma(otherShape);
}
export function weibullGammaKl_otherScale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return (otherShape - meanRatio(shape, scale, otherScale)) / otherScale;
}

// (λ / t) Γ(1 + 1/k).
function meanRatio(shape: number, scale: number, otherScale: number): number {
  return Math.exp(logRatio(scale, otherScale) + logGamma(1.0 + 1.0 / shape));
}

/**
 * Divergence of a gamma distribution from a Weibull one of shape k and scale λ: −(a + log s + log Γ(a) + (1 − a) ψ(a))
 * − log k + k log λ − (k − 1) (ψ(a) + log s) + (s / λ)^k Γ(a + k) / Γ(a). Source: by the same moments.
 */
export function gammaWeibullKl(shape: number, scale: number, otherShape: number, otherScale: number): number {
  return (
    (shape - otherShape) * digamma(shape) -
    shape -
    logGamma(shape) -
    Math.log(otherShape) -
    otherShape * logRatio(scale, otherScale) +
    powerMean(shape, scale, otherShape, otherScale)
  );
}
export function gammaWeibullKl_shape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  const mean = powerMean(shape, scale, otherShape, otherScale) * digammaDifference(shape, otherShape);
  return (shape - otherShape) * trigamma(shape) - 1.0 + mean;
}
export function gammaWeibullKl_scale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return (otherShape * (powerMean(shape, scale, otherShape, otherScale) - 1.0)) / scale;
}
export function gammaWeibullKl_otherShape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  const log = logRatio(scale, otherScale);
  const mean = powerMean(shape, scale, otherShape, otherScale) * (log + digamma(shape + otherShape));
  return mean - digamma(shape) - 1.0 / otherShape - log;
}
export function gammaWeibullKl_otherScale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return (otherShape * (1.0 - powerMean(shape, scale, otherShape, otherScale))) / otherScale;
}

// (s / λ)^k Γ(a + k) / Γ(a).
function powerMean(shape: number, scale: number, otherShape: number, otherScale: number): number {
  return Math.exp(otherShape * logRatio(scale, otherScale) + logGamma(shape + otherShape) - logGamma(shape));
}
