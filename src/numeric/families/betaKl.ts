// Divergences of beta distributions in double precision.
import { deviance, logRatio } from '../deviance.js';
import { digammaDifference, digammaMinusLogDifference } from '../digammaDifference.js';
import { gammaRemainder, gammaRemainderOf } from '../gammaRemainder.js';
import { log1pmx } from '../log1pmx.js';
import { logBeta } from '../logBeta.js';
import { trigamma, trigammaSeries } from '../trigamma.js';

/**
 * Divergence between beta distributions of shapes a, b and c, d. With R the remainder of log Γ (gammaRemainder.ts)
 * and n = a + b, m = c + d: R(a, c) + R(b, d) − R(n, m) + c log(c n / (a m)) + d log(d n / (b m)). The last two are m
 * times the divergence of the means as probabilities, a sum of two deviances whose differences are ∓(a d − b c) / n:
 * one rounding for float32 numbers, so that the divergence of nearly equal distributions keeps its digits.
 * Source: by E log x = ψ(a) − ψ(n); Johnson, Kotz and Balakrishnan 2, section 25.2 has the moments. @kernel
 */
export function betaKl(alpha: number, beta: number, otherAlpha: number, otherBeta: number): number {
  const n = alpha + beta;
  const m = otherAlpha + otherBeta;
  const gap = (otherAlpha * beta - alpha * otherBeta) / n;
  const whole = gammaRemainderOf(n, m, otherAlpha - alpha + (otherBeta - beta));
  const shapes = gammaRemainder(alpha, otherAlpha) + gammaRemainder(beta, otherBeta) - whole;
  return shapes + (excess(otherAlpha, -gap, m * (alpha / n)) + excess(otherBeta, gap, m * (beta / n)));
}

// c log(c / p) + p − c with p − c given.
function excess(c: number, difference: number, p: number): number {
  if (Math.abs(difference) <= 0.5 * c) return c * (0.0 - log1pmx(difference / c));
  return deviance(c, p);
}

export function betaKl_alpha(alpha: number, beta: number, otherAlpha: number, otherBeta: number): number {
  const n = alpha + beta;
  const d = otherAlpha - alpha;
  const whole = d + (otherBeta - beta);
  const means = (otherAlpha * beta - alpha * otherBeta) / alpha / n;
  return whole * trigammaRest(n) - d * trigammaRest(alpha) - means;
}
export function betaKl_beta(alpha: number, beta: number, otherAlpha: number, otherBeta: number): number {
  return betaKl_alpha(beta, alpha, otherBeta, otherAlpha);
}
export function betaKl_otherAlpha(
  alpha: number,
  beta: number,
  otherAlpha: number,
  otherBeta: number,
): number {
  const n = alpha + beta;
  const m = otherAlpha + otherBeta;
  const ratio = (otherAlpha * beta - alpha * otherBeta) / alpha / m;
  const means = Math.abs(ratio) <= 0.5 ? Math.log1p(ratio) : logRatio(otherAlpha, alpha) - logRatio(m, n);
  const d = otherAlpha - alpha;
  return means + digammaRest(alpha, otherAlpha, d) - digammaRest(n, m, d + (otherBeta - beta));
}
export function betaKl_otherBeta(alpha: number, beta: number, otherAlpha: number, otherBeta: number): number {
  return betaKl_otherAlpha(beta, alpha, otherBeta, otherAlpha);
}

// ψ′(x) − 1/x.
function trigammaRest(x: number): number {
  return x < 8.0 ? trigamma(x) - 1.0 / x : 0.5 / x / x + trigammaSeries(x);
}

// (ψ(y) − log y) − (ψ(x) − log x), with d = y − x.
function digammaRest(x: number, y: number, d: number): number {
  if (Math.min(x, y) >= 8.0) return digammaMinusLogDifference(x, d);
  return (d < 0.0 ? -digammaDifference(y, -d) : digammaDifference(x, d)) - logGrowth(x, y, d);
}

// log(y / x), with d = y − x.
function logGrowth(x: number, y: number, d: number): number {
  return Math.abs(d) <= 0.5 * x ? Math.log1p(d / x) : logRatio(y, x);
}

// x log x − x, zero at 0.
function entropic(x: number): number {
  return x === 0.0 ? 0.0 : x * Math.log(x) - x;
}

/**
 * Divergence of a uniform distribution on [l, u] inside [0, 1] from a beta one: −log(u − l) + log B(a, b) −
 * (a − 1) E log x − (b − 1) E log(1 − x), E log x = (u log u − l log l) / (u − l) − 1; infinite where the interval
 * leaves [0, 1]. Source: by direct integration. @kernel
 */
export function uniformBetaKl(lower: number, upper: number, otherAlpha: number, otherBeta: number): number {
  if (!(lower >= 0.0 && upper <= 1.0)) return Infinity;
  const inside =
    (otherAlpha - 1.0) * meanLog(lower, upper) + (otherBeta - 1.0) * meanLog(1.0 - upper, 1.0 - lower);
  return logBeta(otherAlpha, otherBeta) - Math.log(upper - lower) - inside;
}
export function uniformBetaKl_lower(
  lower: number,
  upper: number,
  otherAlpha: number,
  otherBeta: number,
): number {
  if (!(lower >= 0.0 && upper <= 1.0)) return 0.0;
  const w = upper - lower;
  const x = ((otherAlpha - 1.0) * (meanLog(lower, upper) - Math.log(lower))) / w;
  const y = ((otherBeta - 1.0) * (meanLog(1.0 - upper, 1.0 - lower) - Math.log1p(-lower))) / w;
  return 1.0 / w - (otherAlpha === 1.0 ? 0.0 : x) - y;
}
export function uniformBetaKl_upper(
  lower: number,
  upper: number,
  otherAlpha: number,
  otherBeta: number,
): number {
  return -uniformBetaKl_lower(1.0 - upper, 1.0 - lower, otherBeta, otherAlpha);
}
export function uniformBetaKl_otherAlpha(
  lower: number,
  upper: number,
  otherAlpha: number,
  otherBeta: number,
): number {
  if (!(lower >= 0.0 && upper <= 1.0)) return 0.0;
  return -digammaDifference(otherAlpha, otherBeta) - meanLog(lower, upper);
}
export function uniformBetaKl_otherBeta(
  lower: number,
  upper: number,
  otherAlpha: number,
  otherBeta: number,
): number {
  return uniformBetaKl_otherAlpha(1.0 - upper, 1.0 - lower, otherBeta, otherAlpha);
}

/** The mean of log x over [l, u]; for a narrow interval from its middle m, by the series in (w / 2m)². */
function meanLog(lower: number, upper: number): number {
  const w = upper - lower;
  const m = 0.5 * (lower + upper);
  const t = (0.5 * w) / m;
  if (t > 0.05) return (entropic(upper) - entropic(lower)) / w;
  const s = t * t;
  return Math.log(m) - s * (1.0 / 6.0 + s * (1.0 / 20.0 + s * (1.0 / 42.0 + s * (1.0 / 72.0 + s / 110.0))));
}
