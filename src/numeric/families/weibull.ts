// The Weibull distribution in double precision. With L = log(x / scale), t = shape · L and w = exp(t) its survival
// function is exp(−w). L keeps its relative accuracy where x is close to the scale, so that w keeps its own
// for large shapes. Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 21.
import { EULER } from '../constants.js';
import { logRatio } from '../deviance.js';
import { digamma } from '../digamma.js';
import { digammaDifference } from '../digammaDifference.js';
import { heldPositive } from '../heldPositive.js';
import { log1mexp } from '../log1mexp.js';
import { logGamma1p } from '../logGamma.js';
import { outside } from '../outside.js';
import { stretched } from '../stretched.js';
import { extremeKl, extremeKlDistance, extremeKlRatio, extremeKlUnit } from './extremeKl.js';
import { gumbelQuantile, gumbelUpperQuantile } from './gumbel.js';

/** Whether x is a point at which the formulas in log x hold. */
function inner(x: number): boolean {
  return x > 0.0 && x < Infinity;
}

/**
 * Log density, log shape − log scale + (shape − 1) L − w for x > 0. At 0 its limit: +∞ below shape 1, −∞ above;
 * where it is infinite its partials are zero. @kernel
 */
export function weibullLogDensity(x: number, scale: number, shape: number): number {
  if (!inner(x)) {
    if (x !== 0.0) return outside(x);
    return shape < 1.0 ? Infinity : shape > 1.0 ? -Infinity : -Math.log(scale);
  }
  const l = logRatio(x, scale);
  return Math.log(shape) + (shape - 1.0) * l - Math.exp(shape * l) - Math.log(scale);
}
export function weibullLogDensity_x(x: number, scale: number, shape: number): number {
  if (!inner(x)) return x === 0.0 && shape === 1.0 ? -1.0 / scale : 0.0;
  return (shape - 1.0 - shape * Math.exp(shape * logRatio(x, scale))) / x;
}
export function weibullLogDensity_scale(x: number, scale: number, shape: number): number {
  if (!inner(x)) return x === 0.0 && shape === 1.0 ? -1.0 / scale : 0.0;
  return (shape * Math.expm1(shape * logRatio(x, scale))) / scale;
}
export function weibullLogDensity_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return 1.0 / shape - l * Math.expm1(shape * l);
}

// w exp(−w), the derivative of the distribution function in t.
function slope(t: number): number {
  return Math.exp(t - Math.exp(t));
}

/** Distribution function, 1 − exp(−w). @kernel */
export function weibullCdf(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? 0.0 : -Math.expm1(-Math.exp(shape * logRatio(x, scale)));
}
export function weibullCdf_x(x: number, scale: number, shape: number): number {
  if (!inner(x)) return x === 0.0 ? (shape < 1.0 ? Infinity : shape > 1.0 ? 0.0 : 1.0 / scale) : 0.0;
  return (slope(shape * logRatio(x, scale)) * shape) / x;
}
export function weibullCdf_scale(x: number, scale: number, shape: number): number {
  return inner(x) ? (-slope(shape * logRatio(x, scale)) * shape) / scale : 0.0;
}
export function weibullCdf_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return l * slope(shape * l);
}

/** Survival function, exp(−w). @kernel */
export function weibullSurvival(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? 1.0 : Math.exp(-Math.exp(shape * logRatio(x, scale)));
}
export function weibullSurvival_x(x: number, scale: number, shape: number): number {
  return -weibullCdf_x(x, scale, shape);
}
export function weibullSurvival_scale(x: number, scale: number, shape: number): number {
  return -weibullCdf_scale(x, scale, shape);
}
export function weibullSurvival_shape(x: number, scale: number, shape: number): number {
  return -weibullCdf_shape(x, scale, shape);
}

// w / (exp(w) − 1), the derivative of log(1 − exp(−w)) in t = log w.
function logSlope(t: number): number {
  const w = Math.exp(t);
  return w > 750.0 ? 0.0 : w === 0.0 ? 1.0 : w / Math.expm1(w);
}

/** Log distribution function, log(1 − exp(−w)); below t = −40 it is t to the last place. @kernel */
export function weibullLogCdf(x: number, scale: number, shape: number): number {
  if (x <= 0.0) return -Infinity;
  const t = shape * logRatio(x, scale);
  return t < -40.0 ? t : log1mexp(-Math.exp(t));
}
export function weibullLogCdf_x(x: number, scale: number, shape: number): number {
  return inner(x) ? (logSlope(shape * logRatio(x, scale)) * shape) / x : 0.0;
}
export function weibullLogCdf_scale(x: number, scale: number, shape: number): number {
  return inner(x) ? (-logSlope(shape * logRatio(x, scale)) * shape) / scale : 0.0;
}
export function weibullLogCdf_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return l * logSlope(shape * l);
}

/** Log survival function, −w. @kernel */
export function weibullLogSurvival(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? 0.0 : -Math.exp(shape * logRatio(x, scale));
}
export function weibullLogSurvival_x(x: number, scale: number, shape: number): number {
  return inner(x) ? (-shape * Math.exp(shape * logRatio(x, scale))) / x : 0.0;
}
export function weibullLogSurvival_scale(x: number, scale: number, shape: number): number {
  return inner(x) ? (shape * Math.exp(shape * logRatio(x, scale))) / scale : 0.0;
}
export function weibullLogSurvival_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return -l * Math.exp(shape * l);
}

/** Quantile, scale · (−log(1 − p))^(1 / shape). @kernel */
export function weibullQuantile(p: number, scale: number, shape: number): number {
  return stretched(scale, -gumbelUpperQuantile(p) / shape);
}
export function weibullQuantile_p(p: number, scale: number, shape: number): number {
  return -weibullQuantile(p, scale, shape) / (shape * Math.log1p(-p) * (1.0 - p));
}
export function weibullQuantile_scale(p: number, _scale: number, shape: number): number {
  return Math.exp(-gumbelUpperQuantile(p) / shape);
}
export function weibullQuantile_shape(p: number, scale: number, shape: number): number {
  const y = -gumbelUpperQuantile(p) / shape;
  return (-stretched(scale, y) * y) / shape;
}

/** Upper quantile, scale · (−log p)^(1 / shape). @kernel */
export function weibullUpperQuantile(p: number, scale: number, shape: number): number {
  return stretched(scale, -gumbelQuantile(p) / shape);
}
export function weibullUpperQuantile_p(p: number, scale: number, shape: number): number {
  return weibullUpperQuantile(p, scale, shape) / (shape * Math.log(p) * p);
}
export function weibullUpperQuantile_scale(p: number, _scale: number, shape: number): number {
  return Math.exp(-gumbelQuantile(p) / shape);
}
export function weibullUpperQuantile_shape(p: number, scale: number, shape: number): number {
  const y = -gumbelQuantile(p) / shape;
  return (-stretched(scale, y) * y) / shape;
}

/** Draw, scale · noise^(1 / shape) of standard exponential noise, kept above zero. @kernel */
export function weibullDraw(noise: number, scale: number, shape: number): number {
  return heldPositive(stretched(scale, Math.log(noise) / shape));
}
export function weibullDraw_scale(noise: number, _scale: number, shape: number): number {
  return Math.exp(Math.log(noise) / shape);
}
export function weibullDraw_shape(noise: number, scale: number, shape: number): number {
  const y = Math.log(noise) / shape;
  return (-stretched(scale, y) * y) / shape;
}

/** Mean, scale · Γ(1 + 1 / shape). @kernel */
export function weibullMean(scale: number, shape: number): number {
  return stretched(scale, logGamma1p(1.0 / shape));
}
export function weibullMean_scale(_scale: number, shape: number): number {
  return Math.exp(logGamma1p(1.0 / shape));
}
export function weibullMean_shape(scale: number, shape: number): number {
  return -(weibullMean(scale, shape) / shape / shape) * digammaOfReciprocal(shape);
}

// ψ(1 + 1 / k). Its zero at k = 2.1662…: there the distance of 1 / k from the zero is taken before it is rounded,
// with the zero's fraction in two parts, and ψ by two terms of its Taylor series.
function digammaOfReciprocal(k: number): number {
  const d = (1.0 - k * 0.4616321437060833 - k * 1.2622790435331673548e-9) / k;
  if (Math.abs(d) < 1.0e-5)
    return d * (0.9676722454476212 - d * (0.4427631689835921 - d * 0.258499760955651));
  return digamma(1.0 + 1.0 / k);
}

// log(Γ(1 + 2u) / Γ(1 + u)²) ≥ 0; its series (DLMF 5.7.3) where the two logarithms nearly cancel.
export function logMomentRatio(u: number): number {
  if (u < 1.0e-3) {
    let p = -6.22156653086021956;
    p = 3.78813131798898367 + u * p;
    p = -2.40411380631918857 + u * p;
    return u * u * (1.64493406684822644 + u * p);
  }
  return logGamma1p(2.0 * u) - 2.0 * logGamma1p(u);
}

/** Variance, scale² (Γ(1 + 2u) − Γ(1 + u)²) with u = 1 / shape. @kernel */
export function weibullVariance(scale: number, shape: number): number {
  const u = 1.0 / shape;
  const root = stretched(scale, 0.5 * logGamma1p(2.0 * u));
  return -root * root * Math.expm1(-logMomentRatio(u));
}
export function weibullVariance_scale(scale: number, shape: number): number {
  const u = 1.0 / shape;
  const half = 0.5 * logGamma1p(2.0 * u);
  return -2.0 * stretched(scale, half) * Math.exp(half) * Math.expm1(-logMomentRatio(u));
}
export function weibullVariance_shape(scale: number, shape: number): number {
  // The derivative in u is 2 scale² Γ(1 + 2u) (ψ(1 + 2u) − ψ(1 + u) + (1 − Γ(1 + u)² / Γ(1 + 2u)) ψ(1 + u)).
  const u = 1.0 / shape;
  const root = stretched(scale, 0.5 * logGamma1p(2.0 * u)) / shape;
  const rest = Math.expm1(-logMomentRatio(u)) * digamma(1.0 + u);
  return -2.0 * root * root * (digammaDifference(1.0 + u, u) - rest);
}

/** Mode, scale · ((shape − 1) / shape)^(1 / shape) above shape 1, else 0. @kernel */
export function weibullMode(scale: number, shape: number): number {
  return shape > 1.0 ? scale * Math.exp(logRatio(shape - 1.0, shape) / shape) : 0.0;
}
export function weibullMode_scale(_scale: number, shape: number): number {
  return shape > 1.0 ? Math.exp(logRatio(shape - 1.0, shape) / shape) : 0.0;
}
export function weibullMode_shape(scale: number, shape: number): number {
  if (!(shape > 1.0)) return 0.0;
  const rest = 1.0 / (shape - 1.0) - logRatio(shape - 1.0, shape);
  return (weibullMode(scale, shape) * rest) / shape / shape;
}

/** Entropy, γ (1 − 1 / shape) − log shape + 1 + log scale with Euler's constant γ. @kernel */
export function weibullEntropy(scale: number, shape: number): number {
  return (EULER * (shape - 1.0)) / shape - Math.log(shape) + 1.0 + Math.log(scale);
}
export function weibullEntropy_scale(scale: number, _shape: number): number {
  return 1.0 / scale;
}
export function weibullEntropy_shape(_scale: number, shape: number): number {
  return (EULER - shape) / shape / shape;
}

/**
 * Divergence. Minus the logarithm of a Weibull variable follows a Gumbel distribution, under which the divergence
 * does not change. Source: Bauckhage (2013), "Computing the Kullback–Leibler divergence between two Weibull
 * distributions", arXiv:1310.3713, equation 18. @kernel
 */
export function weibullKl(scale: number, shape: number, otherScale: number, otherShape: number): number {
  const d = -otherShape * logRatio(scale, otherScale);
  const logR = logRatio(otherShape, shape);
  return extremeKl(otherShape / shape, (otherShape - shape) / shape, d, logR);
}
export function weibullKl_scale(
  scale: number,
  shape: number,
  otherScale: number,
  otherShape: number,
): number {
  const d = -otherShape * logRatio(scale, otherScale);
  return (-otherShape * extremeKlDistance(otherShape / shape, (otherShape - shape) / shape, d)) / scale;
}
export function weibullKl_shape(
  scale: number,
  shape: number,
  otherScale: number,
  otherShape: number,
): number {
  const d = -otherShape * logRatio(scale, otherScale);
  return -extremeKlRatio(otherShape / shape, (otherShape - shape) / shape, d) / shape;
}
export function weibullKl_otherScale(
  scale: number,
  shape: number,
  otherScale: number,
  otherShape: number,
): number {
  const d = -otherShape * logRatio(scale, otherScale);
  return (otherShape * extremeKlDistance(otherShape / shape, (otherShape - shape) / shape, d)) / otherScale;
}
export function weibullKl_otherShape(
  scale: number,
  shape: number,
  otherScale: number,
  otherShape: number,
): number {
  const d = -otherShape * logRatio(scale, otherScale);
  return extremeKlUnit(otherShape / shape, (otherShape - shape) / shape, d) / otherShape;
}
