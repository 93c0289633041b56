// The inverse gamma distribution in double precision: scale / x has a gamma distribution of scale 1. As functions of
// scale and x its tails are a gamma's of the two exchanged.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), section 17.2.
import { HALF_LOG_2PI } from '../constants.js';
import { logRatio } from '../deviance.js';
import { digamma, digammaMinusLog } from '../digamma.js';
import { gammaDrawDerivative, gammaLogDrawDerivative } from '../gammaDraw.js';
import {
  gammaPInverse,
  gammaPInverse_a,
  gammaPInverse_p,
  gammaQInverse,
  gammaQInverse_a,
  gammaQInverse_q,
} from '../incompleteGammaInverse.js';
import { logGamma } from '../logGamma.js';
import { outside } from '../outside.js';
import { stirlingError } from '../stirlingError.js';
import { digammaSeries, stirlingSeries } from '../stirlingSeries.js';
import { trigamma, trigammaSeries } from '../trigamma.js';
import {
  gammaCdf,
  gammaCdf_scale,
  gammaCdf_shape,
  gammaCdf_x,
  gammaDistance,
  gammaLogCdf,
  gammaLogCdf_scale,
  gammaLogCdf_shape,
  gammaLogCdf_x,
  gammaLogSurvival,
  gammaLogSurvival_scale,
  gammaLogSurvival_shape,
  gammaLogSurvival_x,
  gammaSurvival,
  tinyLogQuantile,
} from './gamma.js';
import { gammaKl, gammaKl_otherScale, gammaKl_otherShape, gammaKl_scale, gammaKl_shape } from './gammaKl.js';

// Between these a product of shape and x is as exact as it is in float32 numbers.
const LEAST = 1e-290;
const MOST = 1e290;

/**
 * Log density, a log z − z − log Γ(a) − log x with z = scale / x for x > 0, in saddle-point form. Source of the form:
 * Loader (2000), "Fast and accurate computation of binomial probabilities". @kernel
 */
export function inverseGammaLogDensity(x: number, shape: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return outside(x);
  if (!(scale > LEAST && scale < MOST)) {
    // With an extreme logScale z may leave the doubles.
    const logZ = Math.log(scale) - Math.log(x);
    return shape * logZ - Math.exp(logZ) - logGamma(shape) - Math.log(x);
  }
  const distance = shape * gammaDistance(scale, shape * x);
  return 0.5 * Math.log(shape) - HALF_LOG_2PI - stirlingError(shape) - distance - Math.log(x);
}
export function inverseGammaLogDensity_x(x: number, shape: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  // scale − (a + 1) x, in the order in which float32 numbers round once.
  const d = shape < 0.5 ? scale - x - shape * x : scale - (shape + 1.0) * x;
  return d / x / x;
}
export function inverseGammaLogDensity_shape(x: number, shape: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  if (shape < 10.0) return logRatio(scale, x) - digamma(shape);
  return logRatio(scale, shape * x) - digammaMinusLog(shape);
}
export function inverseGammaLogDensity_scale(x: number, shape: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  return (shape * x - scale) / scale / x;
}

/** Distribution function, Q(a, scale / x). @kernel */
export function inverseGammaCdf(x: number, shape: number, scale: number): number {
  return x > 0.0 ? gammaSurvival(scale, shape, x) : isNaN(x) ? NaN : 0.0;
}
export function inverseGammaCdf_x(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? -gammaCdf_scale(scale, shape, x) : 0.0;
}
export function inverseGammaCdf_shape(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? -gammaCdf_shape(scale, shape, x) : 0.0;
}
export function inverseGammaCdf_scale(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? -gammaCdf_x(scale, shape, x) : 0.0;
}

/** Survival function, P(a, scale / x). @kernel */
export function inverseGammaSurvival(x: number, shape: number, scale: number): number {
  return x > 0.0 ? gammaCdf(scale, shape, x) : isNaN(x) ? NaN : 1.0;
}
export function inverseGammaSurvival_x(x: number, shape: number, scale: number): number {
  return -inverseGammaCdf_x(x, shape, scale);
}
export function inverseGammaSurvival_shape(x: number, shape: number, scale: number): number {
  return -inverseGammaCdf_shape(x, shape, scale);
}
export function inverseGammaSurvival_scale(x: number, shape: number, scale: number): number {
  return -inverseGammaCdf_scale(x, shape, scale);
}

/** Log distribution function. @kernel */
export function inverseGammaLogCdf(x: number, shape: number, scale: number): number {
  return x > 0.0 ? gammaLogSurvival(scale, shape, x) : isNaN(x) ? NaN : -Infinity;
}
export function inverseGammaLogCdf_x(x: number, shape: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return x === 0.0 ? Infinity : 0.0;
  return gammaLogSurvival_scale(scale, shape, x);
}
export function inverseGammaLogCdf_shape(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? gammaLogSurvival_shape(scale, shape, x) : 0.0;
}
export function inverseGammaLogCdf_scale(x: number, shape: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return x === 0.0 ? -Infinity : 0.0;
  return gammaLogSurvival_x(scale, shape, x);
}

/** Log survival function. @kernel */
export function inverseGammaLogSurvival(x: number, shape: number, scale: number): number {
  return x > 0.0 ? gammaLogCdf(scale, shape, x) : isNaN(x) ? NaN : 0.0;
}
export function inverseGammaLogSurvival_x(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? gammaLogCdf_scale(scale, shape, x) : 0.0;
}
export function inverseGammaLogSurvival_shape(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? gammaLogCdf_shape(scale, shape, x) : 0.0;
}
export function inverseGammaLogSurvival_scale(x: number, shape: number, scale: number): number {
  return x > 0.0 && x < Infinity ? gammaLogCdf_x(scale, shape, x) : 0.0;
}

// scale / z where only log z can be held.
function farPoint(w: number, scale: number): number {
  return Math.exp(Math.log(scale) - w);
}

/** Quantile, scale over the gamma's upper quantile. @kernel */
export function inverseGammaQuantile(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log1p(-p));
  return isNaN(w) ? scale / gammaQInverse(shape, p) : farPoint(w, scale);
}
export function inverseGammaQuantile_p(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log1p(-p));
  if (!isNaN(w)) return farPoint(w, scale) / (1.0 - p) / shape;
  const z = gammaQInverse(shape, p);
  return (-scale / z / z) * gammaQInverse_q(shape, p);
}
export function inverseGammaQuantile_shape(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log1p(-p));
  if (!isNaN(w)) return (-farPoint(w, scale) * (digamma(1.0 + shape) - w)) / shape;
  const z = gammaQInverse(shape, p);
  return (-scale / z) * (gammaQInverse_a(shape, p) / z);
}
export function inverseGammaQuantile_scale(p: number, shape: number, scale: number): number {
  return inverseGammaQuantile(p, shape, scale) / scale;
}

/** Upper quantile, scale over the gamma's quantile. @kernel */
export function inverseGammaUpperQuantile(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log(p));
  return isNaN(w) ? scale / gammaPInverse(shape, p) : farPoint(w, scale);
}
export function inverseGammaUpperQuantile_p(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log(p));
  if (!isNaN(w)) return -farPoint(w, scale) / p / shape;
  const z = gammaPInverse(shape, p);
  return (-scale / z / z) * gammaPInverse_p(shape, p);
}
export function inverseGammaUpperQuantile_shape(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log(p));
  if (!isNaN(w)) return (-farPoint(w, scale) * (digamma(1.0 + shape) - w)) / shape;
  const z = gammaPInverse(shape, p);
  return (-scale / z) * (gammaPInverse_a(shape, p) / z);
}
export function inverseGammaUpperQuantile_scale(p: number, shape: number, scale: number): number {
  return inverseGammaUpperQuantile(p, shape, scale) / scale;
}

/** Mean, scale / (a − 1) for a > 1, infinite below. @kernel */
export function inverseGammaMean(shape: number, scale: number): number {
  return shape > 1.0 ? scale / (shape - 1.0) : Infinity;
}
export function inverseGammaMean_shape(shape: number, scale: number): number {
  return shape > 1.0 ? -scale / (shape - 1.0) / (shape - 1.0) : 0.0;
}
export function inverseGammaMean_scale(shape: number, _scale: number): number {
  return shape > 1.0 ? 1.0 / (shape - 1.0) : 0.0;
}

/** Variance, mean² / (a − 2) for a > 2; infinite down to 1, and none below, where the mean is infinite. @kernel */
export function inverseGammaVariance(shape: number, scale: number): number {
  const mean = scale / (shape - 1.0);
  return shape > 2.0 ? (mean * mean) / (shape - 2.0) : shape > 1.0 ? Infinity : NaN;
}
export function inverseGammaVariance_shape(shape: number, scale: number): number {
  const mean = scale / (shape - 1.0);
  const slope = (2.0 / (shape - 1.0) + 1.0 / (shape - 2.0)) / (shape - 2.0);
  return shape > 2.0 ? -mean * mean * slope : 0.0;
}
export function inverseGammaVariance_scale(shape: number, scale: number): number {
  return shape > 2.0 ? (2.0 * scale) / (shape - 1.0) / (shape - 1.0) / (shape - 2.0) : 0.0;
}

/** Mode, scale / (a + 1). @kernel */
export function inverseGammaMode(shape: number, scale: number): number {
  return scale / (shape + 1.0);
}
export function inverseGammaMode_shape(shape: number, scale: number): number {
  return -scale / (shape + 1.0) / (shape + 1.0);
}
export function inverseGammaMode_scale(shape: number, _scale: number): number {
  return 1.0 / (shape + 1.0);
}

/** Entropy, a + log Γ(a) − (1 + a) ψ(a) + log scale; from a = 8 on by Stirling's formulas. @kernel */
export function inverseGammaEntropy(shape: number, scale: number): number {
  if (shape < 8.0) return shape + logGamma(shape) - (1.0 + shape) * digamma(shape) + Math.log(scale);
  const rest = stirlingSeries(shape) + (shape + 1.0) * digammaSeries(shape) + 0.5 / shape;
  return Math.log(scale) - 1.5 * Math.log(shape) + HALF_LOG_2PI + 0.5 + rest;
}
export function inverseGammaEntropy_shape(shape: number, _scale: number): number {
  if (shape < 8.0) return 1.0 - (1.0 + shape) * trigamma(shape);
  const r = 1.0 / shape;
  return -0.5 * r * (3.0 + r) - (1.0 + shape) * trigammaSeries(shape);
}
export function inverseGammaEntropy_scale(_shape: number, scale: number): number {
  return 1.0 / scale;
}

/** A draw, which moves with the parameters at a fixed uniform. @kernel */
export function inverseGammaDraw(x: number, _shape: number, _scale: number): number {
  return x;
}
export function inverseGammaDraw_x(_x: number, _shape: number, _scale: number): number {
  return 1.0;
}
export function inverseGammaDraw_shape(x: number, shape: number, scale: number): number {
  const z = scale / x;
  if (!(z > LEAST)) return -x * gammaLogDrawDerivative(Math.log(scale) - Math.log(x), shape);
  return z < MOST ? -x * (gammaDrawDerivative(z, shape) / z) : 0.0;
}
export function inverseGammaDraw_scale(x: number, _shape: number, scale: number): number {
  return x / scale;
}

/** The logarithm x of a draw. @kernel */
export function inverseGammaLogDraw(x: number, _shape: number, _scale: number): number {
  return x;
}
export function inverseGammaLogDraw_x(_x: number, _shape: number, _scale: number): number {
  return 1.0;
}
export function inverseGammaLogDraw_shape(x: number, shape: number, scale: number): number {
  return -gammaLogDrawDerivative(Math.log(scale) - x, shape);
}
export function inverseGammaLogDraw_scale(_x: number, _shape: number, scale: number): number {
  return 1.0 / scale;
}

/** Divergence: that of the reciprocals, which are gamma distributions whose scales are these' reciprocals. @kernel */
export function inverseGammaKl(shape: number, scale: number, otherShape: number, otherScale: number): number {
  return gammaKl(shape, otherScale, otherShape, scale);
}
export function inverseGammaKl_shape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return gammaKl_shape(shape, otherScale, otherShape, scale);
}
export function inverseGammaKl_scale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return gammaKl_otherScale(shape, otherScale, otherShape, scale);
}
export function inverseGammaKl_otherShape(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return gammaKl_otherShape(shape, otherScale, otherShape, scale);
}
export function inverseGammaKl_otherScale(
  shape: number,
  scale: number,
  otherShape: number,
  otherScale: number,
): number {
  return gammaKl_scale(shape, otherScale, otherShape, scale);
}
