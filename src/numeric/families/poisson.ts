// The Poisson distribution in double precision.
// Source: Loader, Fast and Accurate Computation of Binomial Probabilities (2000): the log mass as
// −stirlingError(k) − deviance(k, rate) − ½ log 2πk, free of the cancellation of k log rate − rate − log k!.
import { deviance, logRatio } from '../deviance.js';
import { gammaQ, gammaQ_x } from '../incompleteGamma.js';
import { outside } from '../outside.js';
import { stirlingError } from '../stirlingError.js';

const halfLogTwoPi = 0.91893853320467274178;

/** Log mass, k log rate − rate − log k! at whole numbers from zero, −∞ elsewhere. @kernel */
export function poissonLogDensity(x: number, rate: number): number {
  if (!(x >= 0.0) || x !== Math.floor(x) || x === Infinity) return outside(x);
  if (x === 0.0) return -rate;
  if (rate === 0.0) return -Infinity;
  return -stirlingError(x) - deviance(x, rate) - 0.5 * Math.log(x) - halfLogTwoPi;
}
export function poissonLogDensity_rate(x: number, rate: number): number {
  if (!(x >= 0.0) || x !== Math.floor(x) || x === Infinity) return 0.0;
  return (x - rate) / rate;
}

/** Distribution function, Q(⌊x⌋ + 1, rate) by the upper incomplete gamma function; its slope is minus a mass. @kernel */
export function poissonCdf(x: number, rate: number): number {
  if (!(x >= 0.0)) return x < 0.0 ? 0.0 : NaN;
  return x === Infinity ? 1.0 : gammaQ(Math.floor(x) + 1.0, rate);
}
export function poissonCdf_rate(x: number, rate: number): number {
  return x >= 0.0 && x < Infinity ? gammaQ_x(Math.floor(x) + 1.0, rate) : 0.0;
}

/** Mode, the largest whole number up to the rate. @kernel */
export function poissonMode(rate: number): number {
  return Math.floor(rate);
}
export function poissonMode_rate(_rate: number): number {
  return 0.0;
}

/** Divergence, rate · log(rate / otherRate) − rate + otherRate. @kernel */
export function poissonKl(rate: number, otherRate: number): number {
  return rate === 0.0 ? otherRate : deviance(rate, otherRate);
}
export function poissonKl_rate(rate: number, otherRate: number): number {
  return logRatio(rate, otherRate);
}
export function poissonKl_otherRate(rate: number, otherRate: number): number {
  return (otherRate - rate) / otherRate;
}
