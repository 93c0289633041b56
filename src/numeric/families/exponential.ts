// The exponential distribution in double precision.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 19.
import { logRatio } from '../deviance.js';
import { log1mexp } from '../log1mexp.js';
import { log1pmx } from '../log1pmx.js';
import { outside } from '../outside.js';

/** Log density, log rate − rate · x for x ≥ 0, −∞ below. @kernel */
export function exponentialLogDensity(x: number, rate: number): number {
  return x >= 0.0 ? Math.log(rate) - rate * x : outside(x);
}
export function exponentialLogDensity_x(x: number, rate: number): number {
  return x >= 0.0 ? -rate : 0.0;
}
export function exponentialLogDensity_rate(x: number, rate: number): number {
  return x >= 0.0 ? 1.0 / rate - x : 0.0;
}

/** Draw, standard exponential noise / rate. @kernel */
export function exponentialDraw(noise: number, rate: number): number {
  return noise / rate;
}
export function exponentialDraw_rate(noise: number, rate: number): number {
  return -noise / rate / rate;
}

/** Variance, 1 / rate². @kernel */
export function exponentialVariance(rate: number): number {
  return 1.0 / (rate * rate);
}
export function exponentialVariance_rate(rate: number): number {
  return -2.0 / (rate * rate * rate);
}

/** Mode, zero whatever the rate. @kernel */
export function exponentialMode(_rate: number): number {
  return 0.0;
}
export function exponentialMode_rate(_rate: number): number {
  return 0.0;
}

/** Entropy, 1 − log rate. @kernel */
export function exponentialEntropy(rate: number): number {
  return 1.0 - Math.log(rate);
}
export function exponentialEntropy_rate(rate: number): number {
  return -1.0 / rate;
}

/** Distribution function, 1 − exp(−rate · x). @kernel */
export function exponentialCdf(x: number, rate: number): number {
  return x <= 0.0 ? 0.0 : -Math.expm1(-rate * x);
}
export function exponentialCdf_x(x: number, rate: number): number {
  return x >= 0.0 ? rate * Math.exp(-rate * x) : 0.0;
}
export function exponentialCdf_rate(x: number, rate: number): number {
  return x >= 0.0 && x < Infinity ? x * Math.exp(-rate * x) : 0.0;
}

/** Survival function, exp(−rate · x). @kernel */
export function exponentialSurvival(x: number, rate: number): number {
  return x <= 0.0 ? 1.0 : Math.exp(-rate * x);
}
export function exponentialSurvival_x(x: number, rate: number): number {
  return -exponentialCdf_x(x, rate);
}
export function exponentialSurvival_rate(x: number, rate: number): number {
  return -exponentialCdf_rate(x, rate);
}

/** Log distribution function, log(1 − exp(−rate · x)). @kernel */
export function exponentialLogCdf(x: number, rate: number): number {
  return x <= 0.0 ? -Infinity : log1mexp(-rate * x);
}
export function exponentialLogCdf_x(x: number, rate: number): number {
  return x > 0.0 ? rate / Math.expm1(rate * x) : 0.0;
}
export function exponentialLogCdf_rate(x: number, rate: number): number {
  if (!(x > 0.0) || x === Infinity) return 0.0;
  return x / Math.expm1(rate * x);
}

/** Log survival function, −rate · x. @kernel */
export function exponentialLogSurvival(x: number, rate: number): number {
  return x <= 0.0 ? 0.0 : -rate * x;
}
export function exponentialLogSurvival_x(x: number, rate: number): number {
  return x >= 0.0 ? -rate : 0.0;
}
export function exponentialLogSurvival_rate(x: number, _rate: number): number {
  return x >= 0.0 ? -x : 0.0;
}

/** Quantile, −log(1 − p) / rate. @kernel */
export function exponentialQuantile(p: number, rate: number): number {
  return -Math.log1p(-p) / rate;
}
export function exponentialQuantile_p(p: number, rate: number): number {
  return 1.0 / ((1.0 - p) * rate);
}
export function exponentialQuantile_rate(p: number, rate: number): number {
  return Math.log1p(-p) / rate / rate;
}

/** Upper quantile, −log p / rate. @kernel */
export function exponentialUpperQuantile(p: number, rate: number): number {
  return -Math.log(p) / rate;
}
export function exponentialUpperQuantile_p(p: number, rate: number): number {
  return -1.0 / (p * rate);
}
export function exponentialUpperQuantile_rate(p: number, rate: number): number {
  return Math.log(p) / rate / rate;
}

/** Divergence, r − 1 − log r with r = otherRate / rate. @kernel */
export function exponentialKl(rate: number, otherRate: number): number {
  const t = (otherRate - rate) / rate;
  return t < -0.5 ? t - logRatio(otherRate, rate) : 0.0 - log1pmx(t);
}
export function exponentialKl_rate(rate: number, otherRate: number): number {
  return (rate - otherRate) / rate / rate;
}
export function exponentialKl_otherRate(rate: number, otherRate: number): number {
  return (otherRate - rate) / rate / otherRate;
}
