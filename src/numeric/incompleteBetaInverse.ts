import { LN2 } from './constants.js';
import { digamma } from './digamma.js';
import {
  betaLogScale,
  betaLogShare,
  betaSide,
  betaSlopeA,
  betaSlopeB,
  betaTail,
  incompleteBeta,
} from './incompleteBetaCore.js';
import { log1mexp } from './log1mexp.js';
import { logBeta } from './logBeta.js';
import { normalQuantileFromLog } from './normalQuantile.js';
import { sigmoid } from './sigmoid.js';
import { softplus } from './softplus.js';
import { trigamma } from './trigamma.js';

// The inverse of the incomplete beta function in x: the quantile of a beta variable.

/** The core at log odds s, where both ends of (0, 1) keep their digits. */
function evaluateAt(a: number, b: number, s: number): void {
  incompleteBeta(a, b, sigmoid(s), sigmoid(-s), -softplus(-s), -softplus(s));
}

/**
 * The log odds s of the x with I_x(a, b) = e^logP, for a lower share of at most about one half.
 *
 * Newton's method on log I, which is concave in s (the density of the log odds is log-concave): monotone from
 * the left, at most one crossing from the right. The start is a bound from the left, from
 * I ≤ x^a / (a B(a, b)) for b ≥ 1 and twice that for b < 1 and x ≤ ½; or, for a, b ≥ 1, the normal law with the
 * mean and variance of the log odds, where that lies beyond the bound.
 */
function lowerLogOdds(a: number, b: number, logP: number): number {
  if (!(Math.min(a, b) > 0.0 && Math.max(a, b) < Infinity)) return NaN;
  const logX = (logP + Math.log(a) + logBeta(a, b) - (b < 1.0 ? LN2 : 0.0)) / a;
  const limit = b < 1.0 ? -LN2 : -1e-12;
  const bound = logX < limit ? logX - Math.log(-Math.expm1(logX)) : b < 1.0 ? 0.0 : 27.0;
  let s = bound;
  if (a >= 1.0 && b >= 1.0) {
    const spread = Math.sqrt(trigamma(a) + trigamma(b));
    s = Math.max(s, digamma(a) - digamma(b) + spread * normalQuantileFromLog(logP));
  }
  const width = Math.sqrt(Math.max(Math.min(a, b), 1.0));
  for (let i = 0; i < 200; i++) {
    evaluateAt(a, b, s);
    let share = betaLogShare;
    let rate = 1.0 / betaTail;
    if (betaSide !== 0.0) {
      share = log1mexp(share);
      rate = Math.exp(betaLogScale - share);
    }
    const last = s;
    s = Math.max(s + (logP - share) / rate, bound);
    if (Math.abs(s - last) * width < 1e-7 || Math.abs(s - last) <= 1e-15 * Math.abs(s)) break;
  }
  return s;
}

/** log(x / (1 − x)) for the x with I_x(a, b) = p, in double precision at both ends. */
export function betaLogOddsQuantile(a: number, b: number, p: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? -Infinity : p === 1.0 ? Infinity : NaN;
  if (p <= 0.5) return lowerLogOdds(a, b, Math.log(p));
  return -lowerLogOdds(b, a, Math.log1p(-p));
}

/**
 * The x with I_x(a, b) = p. @kernel
 * @example
 * ```ts
 * import { betaIInverse } from 'leadline/numeric';
 * console.log(betaIInverse(2, 3, 0.1).toPrecision(6));
 * // 0.142559
 * ```
 */
export function betaIInverse(a: number, b: number, p: number): number {
  return sigmoid(betaLogOddsQuantile(a, b, p));
}
/**
 * The partial derivative of `betaIInverse` in `a`.
 * @example
 * ```ts
 * import { betaIInverse_a } from 'leadline/numeric';
 * console.log(betaIInverse_a(2, 3, 0.1).toPrecision(6));
 * // 0.111328
 * ```
 */
export function betaIInverse_a(a: number, b: number, p: number): number {
  const s = betaLogOddsQuantile(a, b, p);
  if (Math.abs(s) === Infinity) return 0.0;
  evaluateAt(a, b, s);
  return -sigmoid(s) * sigmoid(-s) * betaSlopeA;
}
/**
 * The partial derivative of `betaIInverse` in `b`.
 * @example
 * ```ts
 * import { betaIInverse_b } from 'leadline/numeric';
 * console.log(betaIInverse_b(2, 3, 0.1).toPrecision(6));
 * // -0.0386050
 * ```
 */
export function betaIInverse_b(a: number, b: number, p: number): number {
  const s = betaLogOddsQuantile(a, b, p);
  if (Math.abs(s) === Infinity) return 0.0;
  evaluateAt(a, b, s);
  return -sigmoid(s) * sigmoid(-s) * betaSlopeB;
}
/**
 * The partial derivative of `betaIInverse` in `p`.
 * @example
 * ```ts
 * import { betaIInverse_p } from 'leadline/numeric';
 * console.log(betaIInverse_p(2, 3, 0.1).toPrecision(6));
 * // 0.795088
 * ```
 */
export function betaIInverse_p(a: number, b: number, p: number): number {
  const s = betaLogOddsQuantile(a, b, p);
  if (Math.abs(s) === Infinity) return NaN;
  evaluateAt(a, b, s);
  return Math.exp(-softplus(-s) - softplus(s) - betaLogScale);
}

/**
 * 1 − x for the x with I_x(a, b) = p, to its own relative accuracy. @kernel
 * @example
 * ```ts
 * import { betaIInverseComplement } from 'leadline/numeric';
 * console.log(betaIInverseComplement(30, 0.1, 0.5).toPrecision(6));
 * // 0.0000200798
 * ```
 */
export function betaIInverseComplement(a: number, b: number, p: number): number {
  return sigmoid(-betaLogOddsQuantile(a, b, p));
}
/**
 * The partial derivative of `betaIInverseComplement` in `a`.
 * @example
 * ```ts
 * import { betaIInverseComplement_a } from 'leadline/numeric';
 * console.log(betaIInverseComplement_a(30, 0.1, 0.5).toPrecision(6));
 * // -6.79447e-7
 * ```
 */
export function betaIInverseComplement_a(a: number, b: number, p: number): number {
  return -betaIInverse_a(a, b, p);
}
/**
 * The partial derivative of `betaIInverseComplement` in `b`.
 * @example
 * ```ts
 * import { betaIInverseComplement_b } from 'leadline/numeric';
 * console.log(betaIInverseComplement_b(30, 0.1, 0.5).toPrecision(6));
 * // 0.00140727
 * ```
 */
export function betaIInverseComplement_b(a: number, b: number, p: number): number {
  return -betaIInverse_b(a, b, p);
}
/**
 * The partial derivative of `betaIInverseComplement` in `p`.
 * @example
 * ```ts
 * import { betaIInverseComplement_p } from 'leadline/numeric';
 * console.log(betaIInverseComplement_p(30, 0.1, 0.5).toPrecision(6));
 * // -0.000401808
 * ```
 */
export function betaIInverseComplement_p(a: number, b: number, p: number): number {
  return -betaIInverse_p(a, b, p);
}
