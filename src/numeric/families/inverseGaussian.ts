// The inverse Gaussian distribution in double precision: with c = √(shape / x), t = x / mean − 1, a = c t and
// b = c (2 + t), its distribution function Φ(a) + exp(2 shape / mean) Φ(−b) is
// ½ exp(−a²/2) (erfcx(−a/√2) + erfcx(b/√2)), and its survival function the same with a difference.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 15.
import { EULER, HALF_LOG_2PI, LN2, SQRT_HALF, SQRT_PI } from '../constants.js';
import { erfcxDrop } from '../erfcxDrop.js';
import { erf, erfcx, erfcx_x } from '../errorFunction.js';
import { normalQuantile } from '../normalQuantile.js';
import { outside } from '../outside.js';
import { scaledExponentialIntegral } from '../scaledExponentialIntegral.js';
import { exponentialKl, exponentialKl_otherRate, exponentialKl_rate } from './exponential.js';

/** a² = shape (x − mean)² / (mean² x); in this order it overflows only where it should. */
function square(x: number, mean: number, shape: number): number {
  const t = (x - mean) / mean;
  return t * shape * (t / x);
}

/** Log density, ½ log(shape / (2π x³)) − shape (x − mean)² / (2 mean² x) for x > 0, −∞ elsewhere. @kernel */
export function inverseGaussianLogDensity(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return outside(x);
  return 0.5 * Math.log(shape) - 1.5 * Math.log(x) - HALF_LOG_2PI - 0.5 * square(x, mean, shape);
}
export function inverseGaussianLogDensity_x(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  const t = (x - mean) / mean;
  return -1.5 / x - 0.5 * ((t * shape) / x) * (1.0 / mean + 1.0 / x);
}
export function inverseGaussianLogDensity_mean(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  return ((((x - mean) / mean) * shape) / mean) * (1.0 / mean);
}
export function inverseGaussianLogDensity_shape(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  const t = (x - mean) / mean;
  return 0.5 / shape - 0.5 * t * (t / x);
}

/** a / √2. */
let near: number = 0.0;
/** b / √2. */
let far: number = 0.0;
/** (b − a) / √2 = c √2. */
let apart: number = 0.0;
/** exp(−a² / 2) / 2. */
let bell: number = 0.0;

function place(x: number, mean: number, shape: number): void {
  const t = (x - mean) / mean;
  const c = Math.sqrt(0.5 * shape) / Math.sqrt(x);
  near = c * t;
  far = c * (2.0 + t);
  apart = 2.0 * c;
  bell = 0.5 * Math.exp(-near * near);
}

/**
 * The same from v = log(x / mean) and root = √(2 shape / mean): a = root √2 sinh(v/2), b = root √2 cosh(v/2), which
 * tell x from the mean also where the two round to one number.
 */
function placeAt(v: number, root: number): void {
  const h = 0.5 * Math.abs(v);
  const rise = Math.expm1(h);
  const s = 0.5 * root * (rise + rise / (1.0 + rise));
  near = v < 0.0 ? -s : s;
  apart = root * Math.exp(-0.5 * v);
  far = near + apart;
  bell = 0.5 * Math.exp(-near * near);
}

/** exp(a²/2) times twice the share below x, where x is below the mean. */
function scaledLower(): number {
  return erfcx(-near) + erfcx(far);
}

/** The share below x, which is at least a half from the mean on. */
function lowerFirst(): number {
  return near < 0.0 ? bell * scaledLower() : 1.0;
}

/** The share below x, by whichever of the two is the smaller. */
function lower(): number {
  const below = lowerFirst();
  return below < 0.5 ? below : 1.0 - bell * erfcxDrop(near, apart);
}

/** The share above x. */
function upper(): number {
  const below = lowerFirst();
  return below < 0.5 ? 1.0 - below : bell * erfcxDrop(near, apart);
}

/** x times the density at x. */
function weight(): number {
  return (bell * apart) / SQRT_PI;
}

/** The logarithm of the share below x. */
function logLower(): number {
  if (lowerFirst() < 0.5) return Math.log(0.5 * scaledLower()) - near * near;
  return Math.log1p(-bell * erfcxDrop(near, apart));
}

/** x times its derivative. */
function logLowerSlope(): number {
  if (lowerFirst() < 0.5) return apart / (SQRT_PI * scaledLower());
  return weight() / lower();
}

/** The logarithm of the share above x. */
function logUpper(): number {
  const below = lowerFirst();
  return below < 0.5 ? Math.log1p(-below) : Math.log(0.5 * erfcxDrop(near, apart)) - near * near;
}

/** x times its derivative. */
function logUpperSlope(): number {
  const below = lowerFirst();
  if (below < 0.5) return -weight() / (1.0 - below);
  return -apart / (SQRT_PI * erfcxDrop(near, apart));
}

/** 1 − w with w = √π y erfcx(y), which goes like 1 / (2y²). */
function shortfall(y: number): number {
  return -0.5 * SQRT_PI * erfcx_x(y);
}

/** d log x / d log shape at a fixed share: 1 − w − w a/b at y = b/√2, where a/b = (x − mean) / (x + mean). */
function shapeRate(share: number): number {
  const short = shortfall(far);
  return short - share * (1.0 - short);
}

/** d x / d mean at a fixed share, 2 r² w / (1 + r) for r = x / mean. */
function meanRate(r: number, inverse: number): number {
  const w = far > 6.0 ? 1.0 - shortfall(far) : SQRT_PI * far * erfcx(far);
  return (2.0 * r * w) / (1.0 + inverse);
}

/** Distribution function. @kernel */
export function inverseGaussianCdf(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return x <= 0.0 ? 0.0 : x > 0.0 ? 1.0 : NaN;
  place(x, mean, shape);
  return lower();
}
export function inverseGaussianCdf_x(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  place(x, mean, shape);
  return bell === 0.0 ? 0.0 : weight() / x;
}
export function inverseGaussianCdf_mean(x: number, mean: number, shape: number): number {
  const density = inverseGaussianCdf_x(x, mean, shape);
  return density === 0.0 ? -0.0 : -density * inverseGaussianDraw_mean(x, mean, shape);
}
export function inverseGaussianCdf_shape(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  place(x, mean, shape);
  return bell === 0.0 ? 0.0 : (-weight() * shapeRate((x - mean) / (x + mean))) / shape;
}

/** Survival function, accurate where it is small. @kernel */
export function inverseGaussianSurvival(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return x <= 0.0 ? 1.0 : x > 0.0 ? 0.0 : NaN;
  place(x, mean, shape);
  return upper();
}
export function inverseGaussianSurvival_x(x: number, mean: number, shape: number): number {
  return -inverseGaussianCdf_x(x, mean, shape);
}
export function inverseGaussianSurvival_mean(x: number, mean: number, shape: number): number {
  return -inverseGaussianCdf_mean(x, mean, shape);
}
export function inverseGaussianSurvival_shape(x: number, mean: number, shape: number): number {
  return -inverseGaussianCdf_shape(x, mean, shape);
}

/** Log distribution function, right also where the function underflows. @kernel */
export function inverseGaussianLogCdf(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return x <= 0.0 ? -Infinity : x > 0.0 ? 0.0 : NaN;
  place(x, mean, shape);
  return logLower();
}
export function inverseGaussianLogCdf_x(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return x <= 0.0 ? Infinity : 0.0;
  place(x, mean, shape);
  return logLowerSlope() / x;
}
export function inverseGaussianLogCdf_mean(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  const slope = inverseGaussianLogCdf_x(x, mean, shape);
  return slope === 0.0 ? -0.0 : -slope * inverseGaussianDraw_mean(x, mean, shape);
}
export function inverseGaussianLogCdf_shape(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  place(x, mean, shape);
  const slope = logLowerSlope();
  return slope === 0.0 ? 0.0 : (-slope * shapeRate((x - mean) / (x + mean))) / shape;
}

/** Log survival function, right also where the function underflows. @kernel */
export function inverseGaussianLogSurvival(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return x <= 0.0 ? 0.0 : x > 0.0 ? -Infinity : NaN;
  place(x, mean, shape);
  return logUpper();
}
export function inverseGaussianLogSurvival_x(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  place(x, mean, shape);
  return logUpperSlope() / x;
}
export function inverseGaussianLogSurvival_mean(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  const slope = inverseGaussianLogSurvival_x(x, mean, shape);
  return slope === 0.0 ? 0.0 : -slope * inverseGaussianDraw_mean(x, mean, shape);
}
export function inverseGaussianLogSurvival_shape(x: number, mean: number, shape: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  place(x, mean, shape);
  const slope = logUpperSlope();
  return slope === 0.0 ? 0.0 : (-slope * shapeRate((x - mean) / (x + mean))) / shape;
}

/**
 * A draw that an exact sampler made. With F from above, −F_mean / p = 2 r² w / (1 + r) for r = x / mean and
 * w = √π y erfcx(y) at y = b/√2, and −F_shape / p = (x / shape) (1 − w − w (x − mean) / (x + mean)): the exponentials
 * have left. Figurnov, Mohamed and Mnih (2018), "Implicit reparameterization gradients", equation 6. @kernel
 */
export function inverseGaussianDraw(x: number, _mean: number, _shape: number): number {
  return x;
}
export function inverseGaussianDraw_x(_x: number, _mean: number, _shape: number): number {
  return 1.0;
}
export function inverseGaussianDraw_mean(x: number, mean: number, shape: number): number {
  if (!(x > 0.0)) return x <= 0.0 ? 0.0 : NaN;
  place(x, mean, shape);
  return meanRate(x / mean, mean / x);
}
export function inverseGaussianDraw_shape(x: number, mean: number, shape: number): number {
  if (!(x > 0.0)) return x <= 0.0 ? 0.0 : NaN;
  place(x, mean, shape);
  return (x / shape) * shapeRate((x - mean) / (x + mean));
}

/** √(2 shape / mean). */
function rootOf(mean: number, shape: number): number {
  return Math.sqrt(2.0 * shape) / Math.sqrt(mean);
}

/**
 * v = log(x / mean) for the x beyond which, or up to which, a share p lies; x is placed afterwards. By Newton's method
 * on the logarithm of the smaller share, which is concave in v, from where Φ(a) is the share.
 */
function solve(p: number, above: boolean, root: number): number {
  const side = p < 0.5 ? above : !above;
  const goal = p < 0.5 ? Math.log(p) : Math.log1p(-p);
  const z = above ? -normalQuantile(p) : normalQuantile(p);
  const s = (Math.abs(z) * SQRT_HALF) / root;
  // 2 asinh s.
  let v = 2.0 * (s > 1.0e8 ? Math.log(s) + LN2 : Math.log1p(s + (s * s) / (1.0 + Math.sqrt(1.0 + s * s))));
  if (z < 0.0) v = -v;
  for (let i = 0; i < 300; i++) {
    placeAt(v, root);
    const step = side ? (goal - logUpper()) / logUpperSlope() : (goal - logLower()) / logLowerSlope();
    // The error is squared in each step; in units of the law's own spread.
    if (isNaN(step)) break;
    v += Math.min(Math.max(step, -40.0), 40.0);
    if (Math.abs(step) * (1.0 + root) < 1.0e-8) break;
  }
  placeAt(v, root);
  // Near the middle from the distance to ½, of which p keeps all: erf(a/√2) + exp(−a²/2) erfcx(b/√2) = ±(2p − 1).
  if (p > 0.25 && p < 0.75 && Math.abs(near) < 0.7) {
    const goalTwice = above ? 1.0 - 2.0 * p : 2.0 * p - 1.0;
    v -= (0.5 * (erf(near) + 2.0 * bell * erfcx(far) - goalTwice)) / weight();
    placeAt(v, root);
  }
  return v;
}

/** tanh(v / 2) = (x − mean) / (x + mean). */
function shareOf(v: number): number {
  return Math.tanh(0.5 * v);
}

/** Quantile, the x below which a share p lies. @kernel */
export function inverseGaussianQuantile(p: number, mean: number, shape: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? 0.0 : p === 1.0 ? Infinity : NaN;
  return mean * Math.exp(solve(p, false, rootOf(mean, shape)));
}
export function inverseGaussianQuantile_p(p: number, mean: number, shape: number): number {
  const v = solve(p, false, rootOf(mean, shape));
  return (mean * Math.exp(v)) / weight();
}
export function inverseGaussianQuantile_mean(p: number, mean: number, shape: number): number {
  const v = solve(p, false, rootOf(mean, shape));
  return meanRate(Math.exp(v), Math.exp(-v));
}
export function inverseGaussianQuantile_shape(p: number, mean: number, shape: number): number {
  const v = solve(p, false, rootOf(mean, shape));
  return ((mean * Math.exp(v)) / shape) * shapeRate(shareOf(v));
}

/** Upper quantile, the x above which a share p lies. @kernel */
export function inverseGaussianUpperQuantile(p: number, mean: number, shape: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? Infinity : p === 1.0 ? 0.0 : NaN;
  return mean * Math.exp(solve(p, true, rootOf(mean, shape)));
}
export function inverseGaussianUpperQuantile_p(p: number, mean: number, shape: number): number {
  const v = solve(p, true, rootOf(mean, shape));
  return -(mean * Math.exp(v)) / weight();
}
export function inverseGaussianUpperQuantile_mean(p: number, mean: number, shape: number): number {
  const v = solve(p, true, rootOf(mean, shape));
  return meanRate(Math.exp(v), Math.exp(-v));
}
export function inverseGaussianUpperQuantile_shape(p: number, mean: number, shape: number): number {
  const v = solve(p, true, rootOf(mean, shape));
  return ((mean * Math.exp(v)) / shape) * shapeRate(shareOf(v));
}

/** Variance, mean³ / shape. @kernel */
export function inverseGaussianVariance(mean: number, shape: number): number {
  return mean * (mean / shape) * mean;
}
export function inverseGaussianVariance_mean(mean: number, shape: number): number {
  return 3.0 * (mean / shape) * mean;
}
export function inverseGaussianVariance_shape(mean: number, shape: number): number {
  const r = mean / shape;
  return -r * r * mean;
}

/**
 * Mode, mean / (√(1 + q²) + q) with q = 3 mean / (2 shape); for large q written in 1 / q, towards shape / 3. @kernel
 */
export function inverseGaussianMode(mean: number, shape: number): number {
  const q = 1.5 * (mean / shape);
  if (q < 1.0) return mean / (Math.sqrt(1.0 + q * q) + q);
  const v = shape / mean / 1.5;
  return shape / 1.5 / (1.0 + Math.sqrt(1.0 + v * v));
}
export function inverseGaussianMode_mean(mean: number, shape: number): number {
  const q = 1.5 * (mean / shape);
  if (q < 1.0) {
    const root = Math.sqrt(1.0 + q * q);
    return 1.0 / ((root + q) * (root + q) * root);
  }
  const v = shape / mean / 1.5;
  const root = Math.sqrt(1.0 + v * v);
  return (v * v * v) / ((root + 1.0) * (root + 1.0) * root);
}
export function inverseGaussianMode_shape(mean: number, shape: number): number {
  const q = 1.5 * (mean / shape);
  if (q < 1.0) {
    const root = Math.sqrt(1.0 + q * q);
    return (q * q) / (1.5 * root * (root + q));
  }
  const v = shape / mean / 1.5;
  const root = Math.sqrt(1.0 + v * v);
  return 1.0 / (1.5 * root * (root + 1.0));
}

/** s e^s E₁(s), which goes to 1 for large s. */
function scaledMoment(s: number): number {
  return s > 1.0e16 ? 1.0 : s * scaledExponentialIntegral(s);
}

/** Entropy, ½ log(2π e mean³ / shape) − (3/2) e^s E₁(s) with s = 2 shape / mean, from E[log x]. @kernel */
export function inverseGaussianEntropy(mean: number, shape: number): number {
  const s = 2.0 * (shape / mean);
  // Towards s = 0 the mean leaves.
  if (s < 1.0e-100) return 0.5 + HALF_LOG_2PI + Math.log(shape) + 1.5 * (LN2 + EULER);
  const moment = 1.5 * Math.log(mean) - 0.5 * Math.log(shape) + 0.5 + HALF_LOG_2PI;
  return moment - 1.5 * scaledExponentialIntegral(s);
}
export function inverseGaussianEntropy_mean(mean: number, shape: number): number {
  return (1.5 * scaledMoment(2.0 * (shape / mean))) / mean;
}
export function inverseGaussianEntropy_shape(mean: number, shape: number): number {
  return (1.0 - 1.5 * scaledMoment(2.0 * (shape / mean))) / shape;
}

/**
 * Divergence: with r = otherShape / shape, ½ (r − 1 − log r) + otherShape (mean − otherMean)² / (2 mean otherMean²).
 * From E[x] = mean and E[1/x] = 1/mean + 1/shape. @kernel
 */
export function inverseGaussianKl(
  mean: number,
  shape: number,
  otherMean: number,
  otherShape: number,
): number {
  const t = (mean - otherMean) / otherMean;
  return 0.5 * exponentialKl(shape, otherShape) + 0.5 * (t * otherShape) * (t / mean);
}
export function inverseGaussianKl_mean(
  mean: number,
  _shape: number,
  otherMean: number,
  otherShape: number,
): number {
  // d/dm of (m − n)² / m is (m − n)(m + n) / m².
  const t = (mean - otherMean) / otherMean;
  return 0.5 * ((t * otherShape) / mean) * (1.0 / otherMean + 1.0 / mean);
}
export function inverseGaussianKl_shape(
  _mean: number,
  shape: number,
  _otherMean: number,
  otherShape: number,
): number {
  return 0.5 * exponentialKl_rate(shape, otherShape);
}
export function inverseGaussianKl_otherMean(
  mean: number,
  _shape: number,
  otherMean: number,
  otherShape: number,
): number {
  return -((((mean - otherMean) / otherMean) * otherShape) / otherMean) * (1.0 / otherMean);
}
export function inverseGaussianKl_otherShape(
  mean: number,
  shape: number,
  otherMean: number,
  otherShape: number,
): number {
  const t = (mean - otherMean) / otherMean;
  return 0.5 * exponentialKl_otherRate(shape, otherShape) + 0.5 * t * (t / mean);
}
