// The Bernoulli distribution in double precision, by its log odds.
// Source: Johnson, Kemp and Kotz, Univariate Discrete Distributions, 3rd edition (2005), section 3.2.
import { exponentialRemainder } from '../exponentialRemainder.js';
import { log1pmx } from '../log1pmx.js';
import { outside } from '../outside.js';
import { sigmoid } from '../sigmoid.js';
import { softplus } from '../softplus.js';

/** Log mass, −softplus(−logit) at one and −softplus(logit) at zero, −∞ elsewhere. @kernel */
export function bernoulliLogDensity(x: number, logit: number): number {
  if (x === 1.0) return -softplus(-logit);
  if (x === 0.0) return -softplus(logit);
  return outside(x);
}
export function bernoulliLogDensity_logit(x: number, logit: number): number {
  if (x === 1.0) return sigmoid(-logit);
  if (x === 0.0) return -sigmoid(logit);
  return 0.0;
}

/** Draw: one where standard logistic noise exceeds −logit. @kernel */
export function bernoulliDraw(noise: number, logit: number): number {
  return noise + logit > 0.0 ? 1.0 : 0.0;
}

/** Mean, the probability of one. @kernel */
export function bernoulliMean(logit: number): number {
  return sigmoid(logit);
}
export function bernoulliMean_logit(logit: number): number {
  return sigmoid(logit) * sigmoid(-logit);
}

/** Variance, p (1 − p). @kernel */
export function bernoulliVariance(logit: number): number {
  return sigmoid(logit) * sigmoid(-logit);
}
export function bernoulliVariance_logit(logit: number): number {
  return -sigmoid(logit) * sigmoid(-logit) * Math.tanh(0.5 * logit);
}

/** Mode: one where the log odds are positive. @kernel */
export function bernoulliMode(logit: number): number {
  return logit > 0.0 ? 1.0 : 0.0;
}
export function bernoulliMode_logit(_logit: number): number {
  return 0.0;
}

/** Entropy, softplus(−|l|) + |l| p(−|l|) for log odds l; even in l. @kernel */
export function bernoulliEntropy(logit: number): number {
  const l = Math.abs(logit);
  return l === Infinity ? 0.0 : softplus(-l) + l * sigmoid(-l);
}
export function bernoulliEntropy_logit(logit: number): number {
  const l = Math.abs(logit);
  return l === Infinity ? 0.0 : -logit * sigmoid(l) * sigmoid(-l);
}

/** Distribution function: 0 below zero, 1 − p from zero, 1 from one. @kernel */
export function bernoulliCdf(x: number, logit: number): number {
  if (x < 0.0) return 0.0;
  if (x < 1.0) return sigmoid(-logit);
  return x >= 1.0 ? 1.0 : NaN;
}
export function bernoulliCdf_logit(x: number, logit: number): number {
  return x >= 0.0 && x < 1.0 ? -sigmoid(logit) * sigmoid(-logit) : 0.0;
}

// The smaller of the two probabilities is worked with, so that 1 − p never cancels.
/**
 * Divergence, p (logit − otherLogit) + softplus(otherLogit) − softplus(logit). Where the two are close it is
 * the remainder of a first-order expansion: with δ their difference and u = p (exp(δ) − 1), it equals
 * (log(1 + u) − u) + p (exp(δ) − 1 − δ).
 * @kernel
 */
export function bernoulliKl(logit: number, otherLogit: number): number {
  const flip = logit > 0.0;
  const a = flip ? -logit : logit;
  const b = flip ? -otherLogit : otherLogit;
  const p = sigmoid(a);
  const delta = b - a;
  if (Math.abs(delta) < 1.0) {
    return log1pmx(p * Math.expm1(delta)) + p * exponentialRemainder(delta);
  }
  return softplus(b) - softplus(a) - p * delta;
}
export function bernoulliKl_logit(logit: number, otherLogit: number): number {
  return sigmoid(logit) * sigmoid(-logit) * (logit - otherLogit);
}
export function bernoulliKl_otherLogit(logit: number, otherLogit: number): number {
  const flip = logit > 0.0;
  const a = flip ? -logit : logit;
  const b = flip ? -otherLogit : otherLogit;
  const p = sigmoid(a);
  const delta = b - a;
  const e = Math.expm1(delta);
  const difference = Math.abs(delta) < 1.0 ? (p * sigmoid(-a) * e) / (1.0 + p * e) : sigmoid(b) - p;
  return flip ? -difference : difference;
}
