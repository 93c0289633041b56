// The standard Rayleigh distribution in double precision: the length of a vector of two standard normal numbers.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 18, section 10.
import { LN2 } from '../constants.js';
import { logRatio } from '../deviance.js';
import { log1mexp } from '../log1mexp.js';
import { log1pmx } from '../log1pmx.js';
import { outside } from '../outside.js';

/** Log density, log z − z² / 2 − log scale with z = x / scale > 0. @kernel */
export function rayleighLogDensity(x: number, scale: number): number {
  if (!(x > 0.0 && x < Infinity)) return x === 0.0 ? -Infinity : outside(x);
  const z = x / scale;
  return logRatio(x, scale) - 0.5 * z * z - Math.log(scale);
}
export function rayleighLogDensity_x(x: number, scale: number): number {
  return x > 0.0 ? 1.0 / x - x / scale / scale : 0.0;
}
export function rayleighLogDensity_scale(x: number, scale: number): number {
  const z = x / scale;
  return x > 0.0 ? (z * z - 2.0) / scale : 0.0;
}

/** Distribution function, 1 − exp(−z² / 2). @kernel scaled probability */
export function rayleighCdf(z: number): number {
  return z <= 0.0 ? 0.0 : -Math.expm1(-0.5 * z * z);
}
export function rayleighCdf_z(z: number): number {
  return z > 0.0 && z < 60.0 ? z * Math.exp(-0.5 * z * z) : 0.0;
}

/** Survival function, exp(−z² / 2). @kernel scaled probability */
export function rayleighSurvival(z: number): number {
  return z <= 0.0 ? 1.0 : Math.exp(-0.5 * z * z);
}
export function rayleighSurvival_z(z: number): number {
  return -rayleighCdf_z(z);
}

/** Log distribution function, log(1 − exp(−z² / 2)); near 0 it is log(z² / 2). @kernel */
export function rayleighLogCdf(x: number, scale: number): number {
  if (x <= 0.0) return -Infinity;
  const z = x / scale;
  return z < 1.0e-9 ? 2.0 * logRatio(x, scale) - LN2 : log1mexp(-0.5 * z * z);
}
export function rayleighLogCdf_x(x: number, scale: number): number {
  return x > 0.0 ? logSlope(x / scale) / x : 0.0;
}
export function rayleighLogCdf_scale(x: number, scale: number): number {
  return x > 0.0 ? -logSlope(x / scale) / scale : 0.0;
}
// The derivative in log z.
function logSlope(z: number): number {
  const h = 0.5 * z * z;
  return z < 1.0e-9 ? 2.0 : h > 750.0 ? 0.0 : (2.0 * h) / Math.expm1(h);
}

/** Log survival function, −z² / 2. @kernel scaled probability */
export function rayleighLogSurvival(z: number): number {
  return z <= 0.0 ? 0.0 : -0.5 * z * z;
}
export function rayleighLogSurvival_z(z: number): number {
  return z > 0.0 ? -z : 0.0;
}

/** Quantile, √(−2 log(1 − p)). @kernel scaled point */
export function rayleighQuantile(p: number): number {
  return Math.sqrt(-2.0 * Math.log1p(-p));
}
export function rayleighQuantile_p(p: number): number {
  return 1.0 / ((1.0 - p) * rayleighQuantile(p));
}

/** Upper quantile, √(−2 log p). @kernel scaled point */
export function rayleighUpperQuantile(p: number): number {
  return Math.sqrt(-2.0 * Math.log(p));
}
export function rayleighUpperQuantile_p(p: number): number {
  return -1.0 / (p * rayleighUpperQuantile(p));
}

/** Draw, √(2 noise) of standard exponential noise. @kernel scaled point */
export function rayleighDraw(noise: number): number {
  return Math.sqrt(2.0 * noise);
}

/** Mean, √(π / 2). @kernel scaled center */
export function rayleighMean(): number {
  return 1.2533141373155002512;
}

/** Mode, 1. @kernel scaled center */
export function rayleighMode(): number {
  return 1.0;
}

/** Variance, (4 − π) / 2. @kernel scaled spread */
export function rayleighVariance(): number {
  return 0.42920367320510338077;
}

/** Entropy, 1 + γ / 2 − log(2) / 2 with Euler's constant γ. @kernel scaled entropy */
export function rayleighEntropy(): number {
  return 0.94203424217079377559;
}

/**
 * Divergence, v − 1 − log v with v = (scale / otherScale)²: by direct integration, or as that of exponential
 * distributions, which the squares follow. @kernel
 */
export function rayleighKl(scale: number, otherScale: number): number {
  const t = (scale - otherScale) / otherScale;
  const u = t * (2.0 + t);
  return u < -0.5 ? u - 2.0 * logRatio(scale, otherScale) : 0.0 - log1pmx(u);
}
export function rayleighKl_scale(scale: number, otherScale: number): number {
  const t = (scale - otherScale) / otherScale;
  return (2.0 * t * (2.0 + t)) / scale;
}
export function rayleighKl_otherScale(scale: number, otherScale: number): number {
  const t = (scale - otherScale) / otherScale;
  return (-2.0 * t * (2.0 + t)) / otherScale;
}
