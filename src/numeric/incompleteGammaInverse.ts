import { LN2 } from './constants.js';
import { digamma } from './digamma.js';
import {
  gammaLogScale,
  gammaLogShare,
  gammaSide,
  gammaSlope,
  gammaTail,
  incompleteGamma,
  incompleteGammaNear,
} from './incompleteGammaCore.js';
import { log1mexp } from './log1mexp.js';
import { logGamma1p } from './logGamma.js';
import { normalQuantileFromLog } from './normalQuantile.js';

// The inverses of the incomplete gamma functions in x: the quantiles of a gamma variable with rate 1.

/** From this shape on the unknown is log(x / a) instead of log x: the law may be narrower than the spacing of x. */
const LARGE: number = 60.0;

/** The core at the unknown w. */
function evaluateAt(a: number, w: number, withSlope: boolean): void {
  const mu = Math.expm1(w);
  if (a >= LARGE && Math.abs(mu) <= 0.3) incompleteGammaNear(a, mu);
  else incompleteGamma(a, pointAt(a, w), withSlope);
}

/** x at the unknown w. */
function pointAt(a: number, w: number): number {
  const x = Math.exp(w);
  return a < LARGE ? x : a * x;
}

/**
 * The w (log x, or log(x / a) for large a) with P(a, x) = e^logP and Q(a, x) = e^logQ; both logarithms are given,
 * so that each tail is known in full.
 *
 * Newton's method in w on the logarithm of one of the two shares. Both are concave in w (the density of log x is
 * log-concave), so that from one side of the root it converges monotonically, and from the other it crosses
 * once. The lower share is used below the median, and wherever x is so small that P ≈ x^a / Γ(a + 1) decides;
 * this power law is also the start there, a bound from the left. Else the start is Wilson and Hilferty's cube of
 * a normal variable for a ≥ 1, and the bound Q ≤ e^−x / Γ(a) from the right for a < 1.
 */
function quantile(a: number, logP: number, logQ: number): number {
  if (!(a > 0.0 && a < Infinity)) return NaN;
  const base = a < LARGE ? 0.0 : Math.log(a);
  const left = (logP + logGamma1p(a)) / a - base;
  // Below this P = x^a / Γ(a + 1) to double precision, and x may lie beyond the doubles.
  if (left < -40.0 - base) return left;
  const lower = logP < -LN2 || (a < 1.0 && left < -1.6);
  let w = left;
  if (a >= 1.0) {
    const z = lower ? normalQuantileFromLog(logP) : -normalQuantileFromLog(logQ);
    const cube = 1.0 - 1.0 / (9.0 * a) + z / (3.0 * Math.sqrt(a));
    if (cube > 0.0) w = Math.max(w, 3.0 * Math.log(cube) + Math.log(a) - base);
  } else if (!lower) {
    w = Math.max(w, Math.log(Math.max(1.0, Math.log(a) - logGamma1p(a) - logQ)));
  }
  const width = Math.sqrt(Math.max(a, 1.0));
  for (let i = 0; i < 100; i++) {
    evaluateAt(a, w, false);
    // d(log share)/dw = ± x p(x) / share with x p(x) = a D.
    let share = gammaLogShare;
    let rate = a / gammaTail;
    if (lower !== (gammaSide === 0.0)) {
      share = log1mexp(share);
      rate = a * Math.exp(gammaLogScale - share);
    }
    const step = lower ? (logP - share) / rate : (share - logQ) / rate;
    // A start on the crossing side may point far away: the left bound holds on the lower side, 3 anywhere.
    w = Math.max(w + Math.min(Math.max(step, -3.0), 3.0), left);
    if (Math.abs(step) * width < 1e-7) break;
  }
  return w;
}

/** 1 / p(x) at the unknown w. */
function inverseDensity(a: number, w: number): number {
  const x = pointAt(a, w);
  if (x === 0.0) return 0.0;
  evaluateAt(a, w, false);
  return (x / a) * Math.exp(-gammaLogScale);
}

/** dx/da at a fixed share, as for a draw. */
function shapeDerivative(a: number, w: number): number {
  const x = pointAt(a, w);
  if (x === 0.0) return 0.0;
  evaluateAt(a, w, true);
  return (-x / a) * gammaSlope;
}

/**
 * The x with P(a, x) = p. @kernel
 * @example
 * ```ts
 * import { gammaPInverse } from 'leadline/numeric';
 * console.log(gammaPInverse(2.5, 0.1).toPrecision(6));
 * // 0.805154
 * ```
 */
export function gammaPInverse(a: number, p: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? 0.0 : p === 1.0 ? Infinity : NaN;
  return pointAt(a, quantile(a, Math.log(p), Math.log1p(-p)));
}
/**
 * The partial derivative of `gammaPInverse` in `p`.
 * @example
 * ```ts
 * import { gammaPInverse_p } from 'leadline/numeric';
 * console.log(gammaPInverse_p(2.5, 0.1).toPrecision(6));
 * // 4.11615
 * ```
 */
export function gammaPInverse_p(a: number, p: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? zeroSlope(a) : p === 1.0 ? Infinity : NaN;
  return inverseDensity(a, quantile(a, Math.log(p), Math.log1p(-p)));
}
/**
 * The partial derivative of `gammaPInverse` in `a`.
 * @example
 * ```ts
 * import { gammaPInverse_a } from 'leadline/numeric';
 * console.log(gammaPInverse_a(2.5, 0.1).toPrecision(6));
 * // 0.572753
 * ```
 */
export function gammaPInverse_a(a: number, p: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? 0.0 : p === 1.0 ? Infinity : NaN;
  return shapeDerivative(a, quantile(a, Math.log(p), Math.log1p(-p)));
}

/**
 * The x with Q(a, x) = q. @kernel
 * @example
 * ```ts
 * import { gammaQInverse } from 'leadline/numeric';
 * console.log(gammaQInverse(2.5, 1e-20).toPrecision(6));
 * // 51.7145
 * ```
 */
export function gammaQInverse(a: number, q: number): number {
  if (!(q > 0.0 && q < 1.0)) return q === 0.0 ? Infinity : q === 1.0 ? 0.0 : NaN;
  return pointAt(a, quantile(a, Math.log1p(-q), Math.log(q)));
}
/**
 * The partial derivative of `gammaQInverse` in `q`.
 * @example
 * ```ts
 * import { gammaQInverse_q } from 'leadline/numeric';
 * console.log(gammaQInverse_q(2.5, 1e-20).toPrecision(6));
 * // -1.02928e+20
 * ```
 */
export function gammaQInverse_q(a: number, q: number): number {
  if (!(q > 0.0 && q < 1.0)) return q === 0.0 ? -Infinity : q === 1.0 ? -zeroSlope(a) : NaN;
  return -inverseDensity(a, quantile(a, Math.log1p(-q), Math.log(q)));
}
/**
 * The partial derivative of `gammaQInverse` in `a`.
 * @example
 * ```ts
 * import { gammaQInverse_a } from 'leadline/numeric';
 * console.log(gammaQInverse_a(2.5, 1e-20).toPrecision(6));
 * // 3.35762
 * ```
 */
export function gammaQInverse_a(a: number, q: number): number {
  if (!(q > 0.0 && q < 1.0)) return q === 0.0 ? Infinity : q === 1.0 ? 0.0 : NaN;
  return shapeDerivative(a, quantile(a, Math.log1p(-q), Math.log(q)));
}

/** 1 / p(0). */
function zeroSlope(a: number): number {
  return a < 1.0 ? 0.0 : a === 1.0 ? 1.0 : Infinity;
}

/**
 * log x with log P(a, x) = logP: right also where x or P underflows. @kernel
 * @example
 * ```ts
 * import { logGammaPInverse } from 'leadline/numeric';
 * console.log(logGammaPInverse(0.001, -5).toPrecision(6));
 * // -5000.58
 * ```
 */
export function logGammaPInverse(a: number, logP: number): number {
  if (!(logP < 0.0)) return logP === 0.0 ? Infinity : NaN;
  if (logP === -Infinity) return -Infinity;
  const w = quantile(a, logP, log1mexp(logP));
  return a < LARGE ? w : w + Math.log(a);
}
/**
 * The partial derivative of `logGammaPInverse` in `a`.
 * @example
 * ```ts
 * import { logGammaPInverse_a } from 'leadline/numeric';
 * console.log(logGammaPInverse_a(0.001, -5).toPrecision(6));
 * // 5.00000e+6
 * ```
 */
export function logGammaPInverse_a(a: number, logP: number): number {
  if (!(logP < 0.0)) return logP === 0.0 ? 0.0 : NaN;
  if (logP === -Infinity) return Infinity;
  const w = quantile(a, logP, log1mexp(logP));
  if (a < LARGE && w < -40.0) return (digamma(a + 1.0) - w) / a;
  evaluateAt(a, w, true);
  return -gammaSlope / a;
}
/**
 * P / (x p(x)).
 * @example
 * ```ts
 * import { logGammaPInverse_logP } from 'leadline/numeric';
 * console.log(logGammaPInverse_logP(0.001, -5).toPrecision(6));
 * // 1000.00
 * ```
 */
export function logGammaPInverse_logP(a: number, logP: number): number {
  if (!(logP < 0.0)) return logP === 0.0 ? Infinity : NaN;
  const w = logP === -Infinity ? logP : quantile(a, logP, log1mexp(logP));
  if (a < LARGE && w < -40.0) return 1.0 / a;
  evaluateAt(a, w, false);
  return (gammaSide === 0.0 ? gammaTail : Math.exp(logP - gammaLogScale)) / a;
}
