// The gamma distribution in double precision, z = x / scale with shape a. The incomplete gamma functions and the
// draw's implicit derivative stand in files of their own.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 17.
import { HALF_LOG_2PI } from '../constants.js';
import { logRatio } from '../deviance.js';
import { digamma, digammaMinusLog } from '../digamma.js';
import { gammaDrawDerivative, gammaLogDrawDerivative } from '../gammaDraw.js';
import {
  gammaP,
  gammaP_a,
  gammaP_x,
  gammaQ,
  logGammaP,
  logGammaP_a,
  logGammaP_x,
  logGammaQ,
  logGammaQ_a,
  logGammaQ_x,
} from '../incompleteGamma.js';
import {
  gammaPInverse,
  gammaPInverse_a,
  gammaPInverse_p,
  gammaQInverse,
  gammaQInverse_a,
  gammaQInverse_q,
} from '../incompleteGammaInverse.js';
import { log1mexp } from '../log1mexp.js';
import { log1pmx } from '../log1pmx.js';
import { logGamma, logGamma1p } from '../logGamma.js';
import { stirlingError, stirlingError_n } from '../stirlingError.js';
import { digammaSeries, stirlingSeries } from '../stirlingSeries.js';
import { trigamma, trigammaSeries } from '../trigamma.js';

// Below this z its logarithm is carried instead: with an extreme logScale z leaves the doubles.
const TINY = 1e-290;
const MOST = 1e290;
// Beyond this z the upper tail is its leading term, and the continued fraction would leave the doubles.
const HUGE = 1e100;

/**
 * u − log(1 + u) with u = (x − mean) / mean: what a point far from the mean costs, per unit of shape. The difference
 * is taken first, as it is exact for float32 numbers.
 */
export function gammaDistance(x: number, mean: number): number {
  const u = (x - mean) / mean;
  return u < -0.5 ? u - logRatio(x, mean) : 0.0 - log1pmx(u);
}

/** The log density at x > 0 by Stirling's formula for Γ(a), whose large parts have cancelled. */
export function gammaSaddle(x: number, shape: number, mean: number): number {
  return (
    0.5 * Math.log(shape) - HALF_LOG_2PI - stirlingError(shape) - shape * gammaDistance(x, mean) - Math.log(x)
  );
}

/** At x = 0, where the density is a pole, a step or zero. */
export function gammaAtZero(shape: number, logScale: number): number {
  return shape < 1.0 ? Infinity : shape === 1.0 ? -logScale : -Infinity;
}

/**
 * Log density, (a − 1) log z − z − log Γ(a) − log scale for x > 0, in saddle-point form. Source of the form: Loader
 * (2000), "Fast and accurate computation of binomial probabilities". @kernel
 */
export function gammaLogDensity(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return x === 0.0 ? gammaAtZero(shape, Math.log(scale)) : isNaN(x) ? NaN : -Infinity;
  if (shape === 1.0) return -x / scale - Math.log(scale);
  const mean = shape * scale;
  if (!(mean > TINY && mean < MOST)) {
    const logZ = Math.log(x) - Math.log(scale);
    return shape * logZ - Math.exp(logZ) - logGamma(shape) - Math.log(x);
  }
  return gammaSaddle(x, shape, mean);
}
export function gammaLogDensity_x(x: number, shape: number, scale: number): number {
  if (!(x > 0.0))
    return x === 0.0 && shape !== 1.0 ? (shape - 1.0) * Infinity : x === 0.0 ? -1.0 / scale : 0.0;
  // For a ≥ 1 the product is exact at float32 numbers, and so is its difference to x but for one rounding.
  const mode = (shape - 1.0) * scale;
  return Math.abs(mode) < MOST ? (mode - x) / x / scale : (shape - 1.0 - x / scale) / x;
}
export function gammaLogDensity_shape(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return x === 0.0 ? -Infinity : 0.0;
  const mean = shape * scale;
  if (shape < 10.0 || !(mean > TINY && mean < MOST)) return logRatio(x, scale) - digamma(shape);
  return logRatio(x, mean) - digammaMinusLog(shape);
}
export function gammaLogDensity_scale(x: number, shape: number, scale: number): number {
  if (!(x >= 0.0)) return 0.0;
  const mean = shape * scale;
  return mean < MOST ? (x - mean) / scale / scale : (x / scale - shape) / scale;
}

// log z, for a z that underflows.
function logOf(x: number, scale: number): number {
  return Math.log(x) - Math.log(scale);
}

/** Distribution function, P(a, z). @kernel */
export function gammaCdf(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return isNaN(x) ? NaN : 0.0;
  const z = x / scale;
  return z < TINY ? Math.exp(logPower(shape, logOf(x, scale))) : gammaP(shape, z);
}
export function gammaCdf_x(x: number, shape: number, scale: number): number {
  if (!(x >= 0.0)) return 0.0;
  const z = x / scale;
  if (x === 0.0 || z >= TINY) return gammaP_x(shape, z) / scale;
  return (shape / x) * Math.exp(logPower(shape, logOf(x, scale)));
}
export function gammaCdf_shape(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = x / scale;
  if (z >= TINY) return gammaP_a(shape, z);
  const logZ = logOf(x, scale);
  return (logZ - digamma(1.0 + shape)) * Math.exp(logPower(shape, logZ));
}
export function gammaCdf_scale(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = x / scale;
  if (z === Infinity) return 0.0;
  if (z >= TINY) return -(z * gammaP_x(shape, z)) / scale;
  return -(shape / scale) * Math.exp(logPower(shape, logOf(x, scale)));
}

// P(a, z) = z^a / Γ(a + 1) for tiny z.
function logPower(shape: number, logZ: number): number {
  return shape * logZ - logGamma1p(shape);
}

/** Survival function, Q(a, z). @kernel */
export function gammaSurvival(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return isNaN(x) ? NaN : 1.0;
  const z = x / scale;
  return z < TINY ? -Math.expm1(logPower(shape, logOf(x, scale))) : gammaQ(shape, z);
}
export function gammaSurvival_x(x: number, shape: number, scale: number): number {
  return -gammaCdf_x(x, shape, scale);
}
export function gammaSurvival_shape(x: number, shape: number, scale: number): number {
  return -gammaCdf_shape(x, shape, scale);
}
export function gammaSurvival_scale(x: number, shape: number, scale: number): number {
  return -gammaCdf_scale(x, shape, scale);
}

/** Log distribution function. @kernel */
export function gammaLogCdf(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return isNaN(x) ? NaN : -Infinity;
  const z = x / scale;
  return z < TINY ? logPower(shape, logOf(x, scale)) : logGammaP(shape, z);
}
export function gammaLogCdf_x(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return x === 0.0 ? Infinity : 0.0;
  const z = x / scale;
  return z < TINY ? shape / x : logGammaP_x(shape, z) / scale;
}
export function gammaLogCdf_shape(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return x === 0.0 ? -Infinity : 0.0;
  const z = x / scale;
  return z < TINY ? logOf(x, scale) - digamma(1.0 + shape) : logGammaP_a(shape, z);
}
export function gammaLogCdf_scale(x: number, shape: number, scale: number): number {
  if (!(x >= 0.0)) return 0.0;
  const z = x / scale;
  if (z === Infinity) return 0.0;
  return z < TINY ? -shape / scale : -(z * logGammaP_x(shape, z)) / scale;
}

/** Log survival function. @kernel */
export function gammaLogSurvival(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return isNaN(x) ? NaN : 0.0;
  const z = x / scale;
  return z < TINY ? log1mexp(logPower(shape, logOf(x, scale))) : logGammaQ(shape, z);
}
export function gammaLogSurvival_x(x: number, shape: number, scale: number): number {
  if (!(x >= 0.0)) return 0.0;
  const z = x / scale;
  if (z > HUGE) return -1.0 / scale;
  if (x === 0.0 || z >= TINY) return logGammaQ_x(shape, z) / scale;
  return gammaCdf_x(x, shape, scale) / Math.expm1(logPower(shape, logOf(x, scale)));
}
export function gammaLogSurvival_shape(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = x / scale;
  if (z > HUGE) return logOf(x, scale) - digamma(shape);
  if (z >= TINY) return logGammaQ_a(shape, z);
  return gammaCdf_shape(x, shape, scale) / Math.expm1(logPower(shape, logOf(x, scale)));
}
export function gammaLogSurvival_scale(x: number, shape: number, scale: number): number {
  if (!(x > 0.0)) return 0.0;
  const z = x / scale;
  if (z > HUGE) return z / scale;
  if (z >= TINY) return -(z * logGammaQ_x(shape, z)) / scale;
  return gammaCdf_scale(x, shape, scale) / Math.expm1(logPower(shape, logOf(x, scale)));
}

/** log z at a lower share whose logarithm is given, where z is tiny: then z^a = P Γ(a + 1). Else NaN. */
export function tinyLogQuantile(shape: number, logP: number): number {
  const w = (logP + logGamma1p(shape)) / shape;
  return w < -600.0 && w > -Infinity ? w : NaN;
}

function quantileAt(w: number, scale: number): number {
  return Math.exp(w + Math.log(scale));
}

/** Quantile. @kernel */
export function gammaQuantile(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log(p));
  return isNaN(w) ? scale * gammaPInverse(shape, p) : quantileAt(w, scale);
}
export function gammaQuantile_p(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log(p));
  return isNaN(w) ? scale * gammaPInverse_p(shape, p) : quantileAt(w, scale) / p / shape;
}
export function gammaQuantile_shape(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log(p));
  if (isNaN(w)) return scale * gammaPInverse_a(shape, p);
  return (quantileAt(w, scale) * (digamma(1.0 + shape) - w)) / shape;
}
export function gammaQuantile_scale(p: number, shape: number, _scale: number): number {
  return gammaPInverse(shape, p);
}

/** Upper quantile. @kernel */
export function gammaUpperQuantile(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log1p(-p));
  return isNaN(w) ? scale * gammaQInverse(shape, p) : quantileAt(w, scale);
}
export function gammaUpperQuantile_p(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log1p(-p));
  return isNaN(w) ? scale * gammaQInverse_q(shape, p) : -quantileAt(w, scale) / (1.0 - p) / shape;
}
export function gammaUpperQuantile_shape(p: number, shape: number, scale: number): number {
  const w = tinyLogQuantile(shape, Math.log1p(-p));
  if (isNaN(w)) return scale * gammaQInverse_a(shape, p);
  return (quantileAt(w, scale) * (digamma(1.0 + shape) - w)) / shape;
}
export function gammaUpperQuantile_scale(p: number, shape: number, _scale: number): number {
  return gammaQInverse(shape, p);
}

/** Mean, a · scale. @kernel */
export function gammaMean(shape: number, scale: number): number {
  return shape * scale;
}
export function gammaMean_shape(_shape: number, scale: number): number {
  return scale;
}
export function gammaMean_scale(shape: number, _scale: number): number {
  return shape;
}

/** Variance, a · scale². @kernel */
export function gammaVariance(shape: number, scale: number): number {
  return shape * scale * scale;
}
export function gammaVariance_shape(_shape: number, scale: number): number {
  return scale * scale;
}
export function gammaVariance_scale(shape: number, scale: number): number {
  return 2.0 * shape * scale;
}

/** Mode, (a − 1) · scale for a > 1, zero below. @kernel */
export function gammaMode(shape: number, scale: number): number {
  return shape > 1.0 ? (shape - 1.0) * scale : 0.0;
}
export function gammaMode_shape(shape: number, scale: number): number {
  return shape > 1.0 ? scale : 0.0;
}
export function gammaMode_scale(shape: number, _scale: number): number {
  return shape > 1.0 ? shape - 1.0 : 0.0;
}

/** Entropy, a + log Γ(a) + (1 − a) ψ(a) + log scale; from a = 8 on by Stirling's formulas. @kernel */
export function gammaEntropy(shape: number, scale: number): number {
  return gammaEntropyStandard(shape) + Math.log(scale);
}
export function gammaEntropy_shape(shape: number, _scale: number): number {
  if (shape < 8.0) return 1.0 + (1.0 - shape) * trigamma(shape);
  const r = 1.0 / shape;
  return 0.5 * r * (1.0 + r) + (1.0 - shape) * trigammaSeries(shape);
}
export function gammaEntropy_scale(_shape: number, scale: number): number {
  return 1.0 / scale;
}

/** The entropy at scale 1. */
export function gammaEntropyStandard(shape: number): number {
  if (shape < 8.0) return shape + logGamma(shape) + (1.0 - shape) * digamma(shape);
  const rest = (shape - 1.0) * digammaSeries(shape) - 0.5 / shape;
  return 0.5 * Math.log(shape) + HALF_LOG_2PI + 0.5 + stirlingSeries(shape) + rest;
}

/** A draw, which moves with the parameters at a fixed uniform. @kernel */
export function gammaDraw(x: number, _shape: number, _scale: number): number {
  return x;
}
export function gammaDraw_x(_x: number, _shape: number, _scale: number): number {
  return 1.0;
}
export function gammaDraw_shape(x: number, shape: number, scale: number): number {
  const z = x / scale;
  if (z < TINY && x > 0.0) return x * gammaLogDrawDerivative(logOf(x, scale), shape);
  return scale * (z > HUGE ? logOf(x, scale) - digamma(shape) : gammaDrawDerivative(z, shape));
}
export function gammaDraw_scale(x: number, _shape: number, scale: number): number {
  return x / scale;
}

/** The logarithm x of a draw. @kernel */
export function gammaLogDraw(x: number, _shape: number, _scale: number): number {
  return x;
}
export function gammaLogDraw_x(_x: number, _shape: number, _scale: number): number {
  return 1.0;
}
export function gammaLogDraw_shape(x: number, shape: number, scale: number): number {
  const logZ = x - Math.log(scale);
  // Beyond e^650 the derivative, about log z / z, is far below what a float32 holds.
  return logZ > 650.0 ? 0.0 : gammaLogDrawDerivative(logZ, shape);
}
export function gammaLogDraw_scale(_x: number, _shape: number, scale: number): number {
  return 1.0 / scale;
}

/** The part of the log density's derivative in the shape that is left at a fixed mean. */
export function gammaFixedMeanSlope(x: number, shape: number, mean: number): number {
  return 0.5 / shape - stirlingError_n(shape) - gammaDistance(x, mean);
}
