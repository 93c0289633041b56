// The logistic distribution in double precision, with z = (x − location) / scale.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 23.
import { logSigmoid, sigmoid, sigmoid_x } from '../sigmoid.js';
import { logOdds } from '../transforms.js';

const piSquaredThird = 3.28986813369645287294;

/** Log density, −|z| − 2 log(1 + exp(−|z|)) − log scale; the absolute value is exact by symmetry. @kernel */
export function logisticLogDensity(x: number, location: number, scale: number): number {
  const z = Math.abs(x - location) / scale;
  return -z - 2.0 * Math.log1p(Math.exp(-z)) - Math.log(scale);
}
export function logisticLogDensity_x(x: number, location: number, scale: number): number {
  return -Math.tanh((0.5 * (x - location)) / scale) / scale;
}
export function logisticLogDensity_location(x: number, location: number, scale: number): number {
  return Math.tanh((0.5 * (x - location)) / scale) / scale;
}
export function logisticLogDensity_scale(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  return (z * Math.tanh(0.5 * z) - 1.0) / scale;
}

/** Variance, π² scale² / 3. @kernel */
export function logisticVariance(scale: number): number {
  return piSquaredThird * scale * scale;
}
export function logisticVariance_scale(scale: number): number {
  return 2.0 * piSquaredThird * scale;
}

/** Entropy, log scale + 2. @kernel */
export function logisticEntropy(scale: number): number {
  return Math.log(scale) + 2.0;
}
export function logisticEntropy_scale(scale: number): number {
  return 1.0 / scale;
}

/** Distribution function, 1 / (1 + exp(−z)). @kernel */
export function logisticCdf(x: number, location: number, scale: number): number {
  return sigmoid((x - location) / scale);
}
export function logisticCdf_x(x: number, location: number, scale: number): number {
  return sigmoid_x((x - location) / scale) / scale;
}
export function logisticCdf_location(x: number, location: number, scale: number): number {
  return -sigmoid_x((x - location) / scale) / scale;
}
export function logisticCdf_scale(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  // Zero at the ends, where the product of the two is not a number.
  return Math.abs(z) > 800.0 ? 0.0 : (-z * sigmoid_x(z)) / scale;
}

/** Quantile, location + scale · log(p / (1 − p)). @kernel */
export function logisticQuantile(p: number, location: number, scale: number): number {
  return location + scale * logOdds(p);
}
export function logisticQuantile_p(p: number, _location: number, scale: number): number {
  return scale / (p * (1.0 - p));
}
export function logisticQuantile_location(_p: number, _location: number, _scale: number): number {
  return 1.0;
}
export function logisticQuantile_scale(p: number, _location: number, _scale: number): number {
  return logOdds(p);
}

/** Survival function, 1 / (1 + exp(z)). @kernel located probability */
export function logisticSurvival(z: number): number {
  return sigmoid(-z);
}
export function logisticSurvival_z(z: number): number {
  return -sigmoid_x(z);
}

/** Log distribution function, −log(1 + exp(−z)). @kernel located probability */
export function logisticLogCdf(z: number): number {
  return logSigmoid(z);
}
export function logisticLogCdf_z(z: number): number {
  return sigmoid(-z);
}

/** Log survival function, −log(1 + exp(z)). @kernel located probability */
export function logisticLogSurvival(z: number): number {
  return logSigmoid(-z);
}
export function logisticLogSurvival_z(z: number): number {
  return -sigmoid(z);
}

/** Upper quantile, log((1 − p) / p). @kernel located point */
export function logisticUpperQuantile(p: number): number {
  return -logOdds(p);
}
export function logisticUpperQuantile_p(p: number): number {
  return -1.0 / (p * (1.0 - p));
}
