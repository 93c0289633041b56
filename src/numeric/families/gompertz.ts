// The Gompertz distribution in double precision, of hazard shape · rate · exp(rate · x): with z = rate · x, which is exact
// for float32 numbers, and H = shape · (exp(z) − 1) its survival function is exp(−H).
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 22, section 8; mean and
// entropy by direct integration.
import { heldPositive } from '../heldPositive.js';
import { log1mexp } from '../log1mexp.js';
import { logProduct } from '../logProduct.js';
import { outside } from '../outside.js';
import { scaledExponentialIntegral, scaledExponentialIntegral_x } from '../scaledExponentialIntegral.js';

function inner(x: number): boolean {
  return x >= 0.0 && x < Infinity;
}

/** Log density, log shape + log rate + z − H for x ≥ 0. @kernel */
export function gompertzLogDensity(x: number, shape: number, rate: number): number {
  if (!inner(x)) return outside(x);
  const z = rate * x;
  return Math.log(shape) + Math.log(rate) + (z - shape * Math.expm1(z));
}
export function gompertzLogDensity_x(x: number, shape: number, rate: number): number {
  return inner(x) ? rate * (1.0 - shape - shape * Math.expm1(rate * x)) : 0.0;
}
export function gompertzLogDensity_shape(x: number, shape: number, rate: number): number {
  return inner(x) ? 1.0 / shape - Math.expm1(rate * x) : 0.0;
}
export function gompertzLogDensity_rate(x: number, shape: number, rate: number): number {
  if (!inner(x)) return 0.0;
  return x === 0.0 ? 1.0 / rate : 1.0 / rate + x * (1.0 - shape - shape * Math.expm1(rate * x));
}

// exp(z − H), which nothing makes infinite.
function fall(z: number, shape: number): number {
  return Math.exp(z - shape * Math.expm1(z));
}

/** Distribution function, 1 − exp(−H). @kernel */
export function gompertzCdf(x: number, shape: number, rate: number): number {
  return x <= 0.0 ? 0.0 : -Math.expm1(-shape * Math.expm1(rate * x));
}
export function gompertzCdf_x(x: number, shape: number, rate: number): number {
  return inner(x) ? fall(rate * x, shape) * shape * rate : 0.0;
}
export function gompertzCdf_shape(x: number, shape: number, rate: number): number {
  if (!inner(x)) return 0.0;
  const growth = Math.expm1(rate * x);
  const hazard = shape * growth;
  return hazard > 750.0 ? 0.0 : growth * Math.exp(-hazard);
}
export function gompertzCdf_rate(x: number, shape: number, rate: number): number {
  return inner(x) ? fall(rate * x, shape) * shape * x : 0.0;
}

/** Survival function, exp(−H). @kernel */
export function gompertzSurvival(x: number, shape: number, rate: number): number {
  return x <= 0.0 ? 1.0 : Math.exp(-shape * Math.expm1(rate * x));
}
export function gompertzSurvival_x(x: number, shape: number, rate: number): number {
  return -gompertzCdf_x(x, shape, rate);
}
export function gompertzSurvival_shape(x: number, shape: number, rate: number): number {
  return -gompertzCdf_shape(x, shape, rate);
}
export function gompertzSurvival_rate(x: number, shape: number, rate: number): number {
  return -gompertzCdf_rate(x, shape, rate);
}

// Whether H is shape · z to the last place, and so small that it may underflow.
function early(x: number, shape: number, rate: number): boolean {
  const z = rate * x;
  return z < 1.0e-100 && shape * z < 1.0e-30;
}

// exp(z) / (exp(H) − 1): the derivative of the log distribution function in H, times exp(z).
function logSlope(x: number, shape: number, rate: number): number {
  const z = rate * x;
  const hazard = shape * Math.expm1(z);
  return hazard < 750.0 ? Math.exp(z) / Math.expm1(hazard) : 0.0;
}

/** Log distribution function, log(1 − exp(−H)); log H where that is tiny. @kernel */
export function gompertzLogCdf(x: number, shape: number, rate: number): number {
  if (x <= 0.0) return -Infinity;
  if (early(x, shape, rate)) return Math.log(shape) + logProduct(rate, x);
  return log1mexp(-shape * Math.expm1(rate * x));
}
export function gompertzLogCdf_x(x: number, shape: number, rate: number): number {
  if (!(x > 0.0)) return 0.0;
  return early(x, shape, rate) ? 1.0 / x : logSlope(x, shape, rate) * shape * rate;
}
export function gompertzLogCdf_shape(x: number, shape: number, rate: number): number {
  if (!(x > 0.0)) return 0.0;
  if (early(x, shape, rate)) return 1.0 / shape;
  const growth = Math.expm1(rate * x);
  const hazard = shape * growth;
  return hazard < 750.0 ? growth / Math.expm1(hazard) : 0.0;
}
export function gompertzLogCdf_rate(x: number, shape: number, rate: number): number {
  if (!(x > 0.0 && x < Infinity)) return 0.0;
  return early(x, shape, rate) ? 1.0 / rate : logSlope(x, shape, rate) * shape * x;
}

/** Log survival function, −H. @kernel */
export function gompertzLogSurvival(x: number, shape: number, rate: number): number {
  return x <= 0.0 ? 0.0 : -shape * Math.expm1(rate * x);
}
export function gompertzLogSurvival_x(x: number, shape: number, rate: number): number {
  return inner(x) ? -shape * rate * Math.exp(rate * x) : 0.0;
}
export function gompertzLogSurvival_shape(x: number, _shape: number, rate: number): number {
  return inner(x) ? -Math.expm1(rate * x) : 0.0;
}
export function gompertzLogSurvival_rate(x: number, shape: number, rate: number): number {
  return inner(x) && x > 0.0 ? -shape * x * Math.exp(rate * x) : 0.0;
}

// The quantile at the cumulated hazard h, log(1 + h / shape) / rate, and its derivatives.
function atHazard(h: number, shape: number, rate: number): number {
  return Math.log1p(h / shape) / rate;
}
function atHazardShape(h: number, shape: number, rate: number): number {
  return -(h / shape / (shape + h)) / rate;
}

/** Quantile, log(1 − log(1 − p) / shape) / rate. @kernel */
export function gompertzQuantile(p: number, shape: number, rate: number): number {
  return atHazard(-Math.log1p(-p), shape, rate);
}
export function gompertzQuantile_p(p: number, shape: number, rate: number): number {
  return 1.0 / ((1.0 - p) * (shape - Math.log1p(-p))) / rate;
}
export function gompertzQuantile_shape(p: number, shape: number, rate: number): number {
  return atHazardShape(-Math.log1p(-p), shape, rate);
}
export function gompertzQuantile_rate(p: number, shape: number, rate: number): number {
  return -gompertzQuantile(p, shape, rate) / rate;
}

/** Upper quantile, log(1 − log(p) / shape) / rate. @kernel */
export function gompertzUpperQuantile(p: number, shape: number, rate: number): number {
  return atHazard(-Math.log(p), shape, rate);
}
export function gompertzUpperQuantile_p(p: number, shape: number, rate: number): number {
  return -1.0 / (p * (shape - Math.log(p))) / rate;
}
export function gompertzUpperQuantile_shape(p: number, shape: number, rate: number): number {
  return atHazardShape(-Math.log(p), shape, rate);
}
export function gompertzUpperQuantile_rate(p: number, shape: number, rate: number): number {
  return -gompertzUpperQuantile(p, shape, rate) / rate;
}

/** Draw, log(1 + noise / shape) / rate of standard exponential noise, kept above zero. @kernel */
export function gompertzDraw(noise: number, shape: number, rate: number): number {
  return heldPositive(atHazard(noise, shape, rate));
}
export function gompertzDraw_shape(noise: number, shape: number, rate: number): number {
  return atHazardShape(noise, shape, rate);
}
export function gompertzDraw_rate(noise: number, shape: number, rate: number): number {
  return -atHazard(noise, shape, rate) / rate;
}

/** Mean, e^shape E₁(shape) / rate. @kernel */
export function gompertzMean(shape: number, rate: number): number {
  return scaledExponentialIntegral(shape) / rate;
}
export function gompertzMean_shape(shape: number, rate: number): number {
  return scaledExponentialIntegral_x(shape) / rate;
}
export function gompertzMean_rate(shape: number, rate: number): number {
  return -scaledExponentialIntegral(shape) / rate / rate;
}

/** Mode, −log(shape) / rate below shape 1, else 0. @kernel */
export function gompertzMode(shape: number, rate: number): number {
  return shape < 1.0 ? -Math.log(shape) / rate : 0.0;
}
export function gompertzMode_shape(shape: number, rate: number): number {
  return shape < 1.0 ? -1.0 / shape / rate : 0.0;
}
export function gompertzMode_rate(shape: number, rate: number): number {
  return shape < 1.0 ? Math.log(shape) / rate / rate : 0.0;
}

/** Entropy, 1 − log shape − log rate − e^shape E₁(shape). @kernel */
export function gompertzEntropy(shape: number, rate: number): number {
  return 1.0 - Math.log(shape) - Math.log(rate) - scaledExponentialIntegral(shape);
}
export function gompertzEntropy_shape(shape: number, _rate: number): number {
  return -scaledExponentialIntegral(shape);
}
export function gompertzEntropy_rate(_shape: number, rate: number): number {
  return -1.0 / rate;
}
