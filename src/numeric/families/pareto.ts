// The Pareto distribution (of the first kind) in double precision. With L = log(x / scale) its survival function is
// exp(−shape · L); L keeps its relative accuracy near the end of the support, and with it all else.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 20.
import { logRatio } from '../deviance.js';
import { log1mexp } from '../log1mexp.js';
import { log1pmx } from '../log1pmx.js';
import { outside } from '../outside.js';
import { stretched } from '../stretched.js';

/** Log density, log shape − shape · L − log x for x ≥ scale. @kernel */
export function paretoLogDensity(x: number, scale: number, shape: number): number {
  if (!(x >= scale) || x === Infinity) return outside(x);
  return Math.log(shape) - shape * logRatio(x, scale) - Math.log(x);
}
export function paretoLogDensity_x(x: number, scale: number, shape: number): number {
  return x >= scale ? -(shape + 1.0) / x : 0.0;
}
export function paretoLogDensity_scale(x: number, scale: number, shape: number): number {
  return x >= scale ? shape / scale : 0.0;
}
export function paretoLogDensity_shape(x: number, scale: number, shape: number): number {
  return x >= scale && x < Infinity ? 1.0 / shape - logRatio(x, scale) : 0.0;
}

/** Distribution function, 1 − exp(−shape · L). @kernel */
export function paretoCdf(x: number, scale: number, shape: number): number {
  return x <= scale ? 0.0 : -Math.expm1(-shape * logRatio(x, scale));
}
export function paretoCdf_x(x: number, scale: number, shape: number): number {
  return x >= scale ? (Math.exp(-shape * logRatio(x, scale)) * shape) / x : 0.0;
}
export function paretoCdf_scale(x: number, scale: number, shape: number): number {
  return x >= scale ? (-Math.exp(-shape * logRatio(x, scale)) * shape) / scale : 0.0;
}
export function paretoCdf_shape(x: number, scale: number, shape: number): number {
  if (!(x >= scale) || x === Infinity) return 0.0;
  const l = logRatio(x, scale);
  return l * Math.exp(-shape * l);
}

/** Survival function, exp(−shape · L). @kernel */
export function paretoSurvival(x: number, scale: number, shape: number): number {
  return x <= scale ? 1.0 : Math.exp(-shape * logRatio(x, scale));
}
export function paretoSurvival_x(x: number, scale: number, shape: number): number {
  return -paretoCdf_x(x, scale, shape);
}
export function paretoSurvival_scale(x: number, scale: number, shape: number): number {
  return -paretoCdf_scale(x, scale, shape);
}
export function paretoSurvival_shape(x: number, scale: number, shape: number): number {
  return -paretoCdf_shape(x, scale, shape);
}

// 1 / (exp(shape · L) − 1), the derivative of log(1 − exp(−shape · L)) in shape · L, inside the support.
function logSlope(x: number, scale: number, shape: number): number {
  return x > scale ? 1.0 / Math.expm1(shape * logRatio(x, scale)) : 0.0;
}

/** Log distribution function, log(1 − exp(−shape · L)). @kernel */
export function paretoLogCdf(x: number, scale: number, shape: number): number {
  return x <= scale ? -Infinity : log1mexp(-shape * logRatio(x, scale));
}
export function paretoLogCdf_x(x: number, scale: number, shape: number): number {
  return x > scale ? (logSlope(x, scale, shape) * shape) / x : 0.0;
}
export function paretoLogCdf_scale(x: number, scale: number, shape: number): number {
  return (-logSlope(x, scale, shape) * shape) / scale;
}
export function paretoLogCdf_shape(x: number, scale: number, shape: number): number {
  return x > scale && x < Infinity ? logSlope(x, scale, shape) * logRatio(x, scale) : 0.0;
}

/** Log survival function, −shape · L. @kernel */
export function paretoLogSurvival(x: number, scale: number, shape: number): number {
  return x <= scale ? 0.0 : -shape * logRatio(x, scale);
}
export function paretoLogSurvival_x(x: number, scale: number, shape: number): number {
  return x >= scale ? -shape / x : 0.0;
}
export function paretoLogSurvival_scale(x: number, scale: number, shape: number): number {
  return x >= scale ? shape / scale : 0.0;
}
export function paretoLogSurvival_shape(x: number, scale: number, _shape: number): number {
  return x >= scale ? -logRatio(x, scale) : 0.0;
}

/** Quantile, scale · (1 − p)^(−1 / shape). @kernel */
export function paretoQuantile(p: number, scale: number, shape: number): number {
  return stretched(scale, -Math.log1p(-p) / shape);
}
export function paretoQuantile_p(p: number, scale: number, shape: number): number {
  return paretoQuantile(p, scale, shape) / (shape * (1.0 - p));
}
export function paretoQuantile_scale(p: number, _scale: number, shape: number): number {
  return Math.exp(-Math.log1p(-p) / shape);
}
export function paretoQuantile_shape(p: number, scale: number, shape: number): number {
  return ((paretoQuantile(p, scale, shape) / shape) * Math.log1p(-p)) / shape;
}

/** Upper quantile, scale · p^(−1 / shape). @kernel */
export function paretoUpperQuantile(p: number, scale: number, shape: number): number {
  return stretched(scale, -Math.log(p) / shape);
}
export function paretoUpperQuantile_p(p: number, scale: number, shape: number): number {
  return -paretoUpperQuantile(p, scale, shape) / (shape * p);
}
export function paretoUpperQuantile_scale(p: number, _scale: number, shape: number): number {
  return Math.exp(-Math.log(p) / shape);
}
export function paretoUpperQuantile_shape(p: number, scale: number, shape: number): number {
  return ((paretoUpperQuantile(p, scale, shape) / shape) * Math.log(p)) / shape;
}

/** Draw, scale · exp(noise / shape) of standard exponential noise, kept finite. @kernel */
export function paretoDraw(noise: number, scale: number, shape: number): number {
  return Math.min(stretched(scale, noise / shape), 3.4028234663852886e38);
}
export function paretoDraw_scale(noise: number, _scale: number, shape: number): number {
  return Math.exp(noise / shape);
}
export function paretoDraw_shape(noise: number, scale: number, shape: number): number {
  return ((-stretched(scale, noise / shape) / shape) * noise) / shape;
}

/** Mean, scale · shape / (shape − 1) above shape 1, infinite below. @kernel */
export function paretoMean(scale: number, shape: number): number {
  return shape > 1.0 ? scale * (shape / (shape - 1.0)) : Infinity;
}
export function paretoMean_scale(_scale: number, shape: number): number {
  return shape > 1.0 ? shape / (shape - 1.0) : 0.0;
}
export function paretoMean_shape(scale: number, shape: number): number {
  return shape > 1.0 ? -scale / (shape - 1.0) / (shape - 1.0) : 0.0;
}

// The variance of the standard member, for shape > 2.
function standardVariance(shape: number): number {
  return shape / ((shape - 1.0) * (shape - 1.0) * (shape - 2.0));
}

/** Variance, scale² · shape / ((shape − 1)² (shape − 2)) above shape 2, infinite below. @kernel */
export function paretoVariance(scale: number, shape: number): number {
  return shape > 2.0 ? scale * standardVariance(shape) * scale : Infinity;
}
export function paretoVariance_scale(scale: number, shape: number): number {
  return shape > 2.0 ? 2.0 * scale * standardVariance(shape) : 0.0;
}
export function paretoVariance_shape(scale: number, shape: number): number {
  if (!(shape > 2.0)) return 0.0;
  const fall = (shape + 1.0) / (shape * (shape - 1.0)) + 1.0 / (shape - 2.0);
  return -scale * standardVariance(shape) * fall * scale;
}

/** Entropy, log(scale / shape) + 1 + 1 / shape. @kernel */
export function paretoEntropy(scale: number, shape: number): number {
  return 1.0 / shape + (1.0 + (Math.log(scale) - Math.log(shape)));
}
export function paretoEntropy_scale(scale: number, _shape: number): number {
  return 1.0 / scale;
}
export function paretoEntropy_shape(_scale: number, shape: number): number {
  return -(1.0 + 1.0 / shape) / shape;
}

/**
 * Divergence, (t − log(1 + t)) + otherShape · log(scale / otherScale) with t = (otherShape − shape) / shape; infinite
 * where the other support begins higher. By direct integration: log(x / scale) is exponential of rate shape. @kernel
 */
export function paretoKl(scale: number, shape: number, otherScale: number, otherShape: number): number {
  if (scale < otherScale) return Infinity;
  const t = (otherShape - shape) / shape;
  const spread = t < -0.5 ? t - logRatio(otherShape, shape) : 0.0 - log1pmx(t);
  return spread + otherShape * logRatio(scale, otherScale);
}
export function paretoKl_scale(
  scale: number,
  _shape: number,
  otherScale: number,
  otherShape: number,
): number {
  return scale < otherScale ? 0.0 : otherShape / scale;
}
export function paretoKl_shape(scale: number, shape: number, otherScale: number, otherShape: number): number {
  return scale < otherScale ? 0.0 : (shape - otherShape) / shape / shape;
}
export function paretoKl_otherScale(
  scale: number,
  _shape: number,
  otherScale: number,
  otherShape: number,
): number {
  return scale < otherScale ? 0.0 : -otherShape / otherScale;
}
export function paretoKl_otherShape(
  scale: number,
  shape: number,
  otherScale: number,
  otherShape: number,
): number {
  if (scale < otherScale) return 0.0;
  return (otherShape - shape) / shape / otherShape + logRatio(scale, otherScale);
}
