// The Kumaraswamy distribution on (0, 1) in double precision: distribution function 1 − (1 − x^alpha)^beta.
// Sources: Kumaraswamy (1980), "A generalized probability density function for double-bounded random processes",
// Journal of Hydrology 46; Jones (2009), "Kumaraswamy's distribution", Statistical Methodology 6, sections 2 and 3.
import { digammaDifference } from '../digammaDifference.js';
import { bendB, bendS, gammaBend } from '../gammaBend.js';
import { log1mexp } from '../log1mexp.js';
import { logBeta } from '../logBeta.js';
import { outside } from '../outside.js';
import { trigamma } from '../trigamma.js';

function isInside(x: number): boolean {
  return x > 0.0 && x < 1.0;
}

// log(1 − x^alpha), and x^alpha / (1 − x^alpha).
function logRest(x: number, alpha: number): number {
  return log1mexp(alpha * Math.log(x));
}
function odds(x: number, alpha: number): number {
  return 1.0 / Math.expm1(-alpha * Math.log(x));
}

/** Log density, log alpha + log beta + (alpha − 1) log x + (beta − 1) log(1 − x^alpha); its limits at 0 and 1. @kernel */
export function kumaraswamyLogDensity(x: number, alpha: number, beta: number): number {
  if (x === 0.0) return alpha === 1.0 ? Math.log(beta) : alpha < 1.0 ? Infinity : -Infinity;
  if (x === 1.0) return beta === 1.0 ? Math.log(alpha) : beta < 1.0 ? Infinity : -Infinity;
  if (!isInside(x)) return outside(x);
  return Math.log(alpha) + Math.log(beta) + (alpha - 1.0) * Math.log(x) + (beta - 1.0) * logRest(x, alpha);
}
export function kumaraswamyLogDensity_x(x: number, alpha: number, beta: number): number {
  return isInside(x) ? (alpha - 1.0 - (beta - 1.0) * alpha * odds(x, alpha)) / x : 0.0;
}
export function kumaraswamyLogDensity_alpha(x: number, alpha: number, beta: number): number {
  if (!isInside(x)) return 0.0;
  if (!(alpha > 0.0)) return NaN;
  return 1.0 / alpha + Math.log(x) - (beta - 1.0) * odds(x, alpha) * Math.log(x);
}
export function kumaraswamyLogDensity_beta(x: number, alpha: number, beta: number): number {
  return isInside(x) ? 1.0 / beta + logRest(x, alpha) : 0.0;
}

/** Log survival function, beta log(1 − x^alpha). @kernel */
export function kumaraswamyLogSurvival(x: number, alpha: number, beta: number): number {
  if (x <= 0.0) return 0.0;
  return x >= 1.0 ? -Infinity : beta * logRest(x, alpha);
}
export function kumaraswamyLogSurvival_x(x: number, alpha: number, beta: number): number {
  return isInside(x) ? (-beta * odds(x, alpha) * alpha) / x : 0.0;
}
export function kumaraswamyLogSurvival_alpha(x: number, alpha: number, beta: number): number {
  return isInside(x) ? -beta * odds(x, alpha) * Math.log(x) : 0.0;
}
export function kumaraswamyLogSurvival_beta(x: number, alpha: number, _beta: number): number {
  return isInside(x) ? logRest(x, alpha) : 0.0;
}

/** Survival function, (1 − x^alpha)^beta. @kernel */
export function kumaraswamySurvival(x: number, alpha: number, beta: number): number {
  return Math.exp(kumaraswamyLogSurvival(x, alpha, beta));
}
export function kumaraswamySurvival_x(x: number, alpha: number, beta: number): number {
  return kumaraswamySurvival(x, alpha, beta) * kumaraswamyLogSurvival_x(x, alpha, beta);
}
export function kumaraswamySurvival_alpha(x: number, alpha: number, beta: number): number {
  return kumaraswamySurvival(x, alpha, beta) * kumaraswamyLogSurvival_alpha(x, alpha, beta);
}
export function kumaraswamySurvival_beta(x: number, alpha: number, beta: number): number {
  return kumaraswamySurvival(x, alpha, beta) * kumaraswamyLogSurvival_beta(x, alpha, beta);
}

/** Distribution function, 1 − (1 − x^alpha)^beta. @kernel */
export function kumaraswamyCdf(x: number, alpha: number, beta: number): number {
  return 0.0 - Math.expm1(kumaraswamyLogSurvival(x, alpha, beta));
}
export function kumaraswamyCdf_x(x: number, alpha: number, beta: number): number {
  return -kumaraswamySurvival_x(x, alpha, beta);
}
export function kumaraswamyCdf_alpha(x: number, alpha: number, beta: number): number {
  return -kumaraswamySurvival_alpha(x, alpha, beta);
}
export function kumaraswamyCdf_beta(x: number, alpha: number, beta: number): number {
  return -kumaraswamySurvival_beta(x, alpha, beta);
}

// log(beta x^alpha), which is the log distribution function where it is far below zero.
function logTail(x: number, alpha: number, beta: number): number {
  return alpha * Math.log(x) + Math.log(beta);
}
function isTail(x: number, alpha: number, beta: number): boolean {
  return alpha * Math.log(x) < -40.0 && logTail(x, alpha, beta) < -40.0;
}

/** Log distribution function. @kernel */
export function kumaraswamyLogCdf(x: number, alpha: number, beta: number): number {
  if (isInside(x) && isTail(x, alpha, beta)) return logTail(x, alpha, beta);
  return log1mexp(kumaraswamyLogSurvival(x, alpha, beta));
}
// Minus the odds of survival, times a slope of its logarithm.
function survivalOdds(x: number, alpha: number, beta: number): number {
  return -1.0 / Math.expm1(-kumaraswamyLogSurvival(x, alpha, beta));
}
export function kumaraswamyLogCdf_x(x: number, alpha: number, beta: number): number {
  if (isInside(x) && isTail(x, alpha, beta)) return alpha / x;
  return isInside(x) ? survivalOdds(x, alpha, beta) * kumaraswamyLogSurvival_x(x, alpha, beta) : 0.0;
}
export function kumaraswamyLogCdf_alpha(x: number, alpha: number, beta: number): number {
  if (isInside(x) && isTail(x, alpha, beta)) return Math.log(x);
  return isInside(x) ? survivalOdds(x, alpha, beta) * kumaraswamyLogSurvival_alpha(x, alpha, beta) : 0.0;
}
export function kumaraswamyLogCdf_beta(x: number, alpha: number, beta: number): number {
  if (isInside(x) && isTail(x, alpha, beta)) return 1.0 / beta;
  return isInside(x) ? survivalOdds(x, alpha, beta) * kumaraswamyLogSurvival_beta(x, alpha, beta) : 0.0;
}

// The point above which lies a share whose logarithm is −e: (1 − exp(−e / beta))^(1 / alpha).
function pointAt(e: number, alpha: number, beta: number): number {
  return Math.exp(log1mexp(-e / beta) / alpha);
}
function slopeInAlpha(e: number, alpha: number, beta: number): number {
  const l = log1mexp(-e / beta) / alpha;
  // Far below what a double holds the point is zero, and so is its slope.
  return l < -1000.0 ? 0.0 : (-Math.exp(l) * l) / alpha;
}
function slopeInBeta(e: number, alpha: number, beta: number): number {
  const t = e / beta;
  return t > 1000.0 ? 0.0 : (-pointAt(e, alpha, beta) * (t / Math.expm1(t))) / alpha / beta;
}
// de by d(share) is one over the share above.
function slopeInShare(e: number, alpha: number, beta: number, above: number): number {
  return pointAt(e, alpha, beta) / Math.expm1(e / beta) / alpha / beta / above;
}

/** Quantile, (1 − (1 − p)^(1 / beta))^(1 / alpha). @kernel */
export function kumaraswamyQuantile(p: number, alpha: number, beta: number): number {
  return pointAt(-Math.log1p(-p), alpha, beta);
}
export function kumaraswamyQuantile_p(p: number, alpha: number, beta: number): number {
  return slopeInShare(-Math.log1p(-p), alpha, beta, 1.0 - p);
}
export function kumaraswamyQuantile_alpha(p: number, alpha: number, beta: number): number {
  return slopeInAlpha(-Math.log1p(-p), alpha, beta);
}
export function kumaraswamyQuantile_beta(p: number, alpha: number, beta: number): number {
  return slopeInBeta(-Math.log1p(-p), alpha, beta);
}

/** Upper quantile, (1 − p^(1 / beta))^(1 / alpha). @kernel */
export function kumaraswamyUpperQuantile(p: number, alpha: number, beta: number): number {
  return pointAt(-Math.log(p), alpha, beta);
}
export function kumaraswamyUpperQuantile_p(p: number, alpha: number, beta: number): number {
  return -slopeInShare(-Math.log(p), alpha, beta, p);
}
export function kumaraswamyUpperQuantile_alpha(p: number, alpha: number, beta: number): number {
  return slopeInAlpha(-Math.log(p), alpha, beta);
}
export function kumaraswamyUpperQuantile_beta(p: number, alpha: number, beta: number): number {
  return slopeInBeta(-Math.log(p), alpha, beta);
}

/** Draw from standard exponential noise, (1 − exp(−noise / beta))^(1 / alpha), held inside the open interval. @kernel */
export function kumaraswamyDraw(noise: number, alpha: number, beta: number): number {
  return Math.min(Math.max(pointAt(noise, alpha, beta), 1.401298464324817e-45), 1.0 - 5.9604644775390625e-8);
}
export function kumaraswamyDraw_alpha(noise: number, alpha: number, beta: number): number {
  return slopeInAlpha(noise, alpha, beta);
}
export function kumaraswamyDraw_beta(noise: number, alpha: number, beta: number): number {
  return slopeInBeta(noise, alpha, beta);
}

// The mean of x^n, with s = n / alpha: beta B(1 + s, beta).
function moment(s: number, beta: number): number {
  return Math.exp(Math.log(beta) + logBeta(1.0 + s, beta));
}

/** Mean, beta B(1 + 1 / alpha, beta). @kernel */
export function kumaraswamyMean(alpha: number, beta: number): number {
  return moment(1.0 / alpha, beta);
}
export function kumaraswamyMean_alpha(alpha: number, beta: number): number {
  const s = 1.0 / alpha;
  return moment(s, beta) * s * (s * digammaDifference(1.0 + s, beta));
}
export function kumaraswamyMean_beta(alpha: number, beta: number): number {
  return -moment(1.0 / alpha, beta) * digammaDifference(1.0 + beta, 1.0 / alpha);
}

/**
 * Variance, m₂ − m₁² with the moments mₙ = beta B(1 + n / alpha, beta): m₂ (1 − exp(−δ)) with δ = log(m₂ / m₁²), a
 * second difference of log gamma functions that is computed as one.
 * @kernel
 */
export function kumaraswamyVariance(alpha: number, beta: number): number {
  const s = 1.0 / alpha;
  const m = moment(2.0 * s, beta);
  return m === 0.0 ? 0.0 : -m * Math.expm1(-gammaBend(s, beta));
}
export function kumaraswamyVariance_alpha(alpha: number, beta: number): number {
  const s = 1.0 / alpha;
  const m = moment(2.0 * s, beta);
  if (m === 0.0) return 0.0;
  const bend = gammaBend(s, beta);
  const slope = bendS;
  return (
    m * s * s * (-2.0 * Math.expm1(-bend) * digammaDifference(1.0 + 2.0 * s, beta) - Math.exp(-bend) * slope)
  );
}
export function kumaraswamyVariance_beta(alpha: number, beta: number): number {
  const s = 1.0 / alpha;
  const m = moment(2.0 * s, beta);
  if (m === 0.0) return 0.0;
  const bend = gammaBend(s, beta);
  const slope = bendB;
  return m * (Math.expm1(-bend) * digammaDifference(1.0 + beta, 2.0 * s) + Math.exp(-bend) * slope);
}

/**
 * Mode: ((alpha − 1) / (alpha beta − 1))^(1 / alpha) where both shapes are above 1, an end where the density rises
 * towards it, NaN where it has two highest ends or none.
 * @kernel
 */
export function kumaraswamyMode(alpha: number, beta: number): number {
  if (alpha > 1.0 && beta > 1.0) return Math.exp(-Math.log1p((alpha * (beta - 1.0)) / (alpha - 1.0)) / alpha);
  if (alpha === beta || (alpha < 1.0 && beta < 1.0)) return NaN;
  return alpha >= 1.0 && beta <= 1.0 ? 1.0 : 0.0;
}
export function kumaraswamyMode_alpha(alpha: number, beta: number): number {
  if (!(alpha > 1.0 && beta > 1.0)) return 0.0;
  const l = Math.log1p((alpha * (beta - 1.0)) / (alpha - 1.0));
  const rest = ((beta - 1.0) / (alpha - 1.0) / (alpha * beta - 1.0)) * alpha;
  return (Math.exp(-l / alpha) * (l + rest)) / alpha / alpha;
}
export function kumaraswamyMode_beta(alpha: number, beta: number): number {
  return alpha > 1.0 && beta > 1.0 ? -kumaraswamyMode(alpha, beta) / (alpha * beta - 1.0) : 0.0;
}

// ψ(1 + b) + γ, the harmonic number.
function harmonic(b: number): number {
  return digammaDifference(1.0, b);
}

/** Entropy, 1 − 1 / beta + (1 − 1 / alpha) H − log alpha − log beta with the harmonic number H of beta. @kernel */
export function kumaraswamyEntropy(alpha: number, beta: number): number {
  return (1.0 - 1.0 / alpha) * harmonic(beta) + (beta - 1.0) / beta - Math.log(alpha) - Math.log(beta);
}
export function kumaraswamyEntropy_alpha(alpha: number, beta: number): number {
  return (harmonic(beta) / alpha - 1.0) / alpha;
}
export function kumaraswamyEntropy_beta(alpha: number, beta: number): number {
  return (1.0 - 1.0 / alpha) * trigamma(1.0 + beta) + (1.0 - beta) / beta / beta;
}
