import {
  gammaLogScale,
  gammaLogShare,
  gammaSide,
  gammaSlope,
  gammaTail,
  incompleteGamma,
  logGammaScale,
} from './incompleteGammaCore.js';
import { log1mexp } from './log1mexp.js';

// The regularized incomplete gamma functions P(a, x) and Q(a, x) = 1 − P(a, x), shape a > 0, x ≥ 0: the
// distribution function of a gamma variable with rate 1 and its complement. DLMF 8.2.4. The algorithms stand in
// incompleteGammaCore.ts.

/**
 * P(a, x) = ∫₀ˣ t^{a−1} e^{−t} dt / Γ(a). @kernel
 * @example
 * ```ts
 * import { gammaP } from 'leadline/numeric';
 * console.log(gammaP(2.5, 2).toPrecision(6));
 * // 0.450584
 * ```
 */
export function gammaP(a: number, x: number): number {
  if (!(x > 0.0)) return x < 0.0 ? NaN : x;
  if (x === Infinity) return 1.0;
  incompleteGamma(a, x, false);
  return gammaSide === 0.0 ? Math.exp(gammaLogShare) : -Math.expm1(gammaLogShare);
}
/**
 * The partial derivative of `gammaP` in `a`.
 * @example
 * ```ts
 * import { gammaP_a } from 'leadline/numeric';
 * console.log(gammaP_a(2.5, 2).toPrecision(6));
 * // -0.274551
 * ```
 */
export function gammaP_a(a: number, x: number): number {
  if (!(x > 0.0) || x === Infinity) return x >= 0.0 ? 0.0 : NaN;
  incompleteGamma(a, x, true);
  return Math.exp(gammaLogScale) * gammaSlope;
}
/**
 * The partial derivative of `gammaP` in `x`.
 * @example
 * ```ts
 * import { gammaP_x } from 'leadline/numeric';
 * console.log(gammaP_x(2.5, 2).toPrecision(6));
 * // 0.287952
 * ```
 */
export function gammaP_x(a: number, x: number): number {
  if (x === 0.0) return a < 1.0 ? Infinity : a === 1.0 ? 1.0 : 0.0;
  if (x === Infinity) return 0.0;
  return Math.exp(logGammaScale(a, x) - Math.log(x)) * a;
}

/**
 * Q(a, x) = ∫ₓ^∞ t^{a−1} e^{−t} dt / Γ(a). @kernel
 * @example
 * ```ts
 * import { gammaQ } from 'leadline/numeric';
 * console.log(gammaQ(2.5, 20).toPrecision(6));
 * // 1.49337e-7
 * ```
 */
export function gammaQ(a: number, x: number): number {
  if (!(x > 0.0)) return x < 0.0 ? NaN : 1.0 - x;
  if (x === Infinity) return 0.0;
  incompleteGamma(a, x, false);
  return gammaSide === 1.0 ? Math.exp(gammaLogShare) : -Math.expm1(gammaLogShare);
}
/**
 * The partial derivative of `gammaQ` in `a`.
 * @example
 * ```ts
 * import { gammaQ_a } from 'leadline/numeric';
 * console.log(gammaQ_a(2.5, 20).toPrecision(6));
 * // 3.49989e-7
 * ```
 */
export function gammaQ_a(a: number, x: number): number {
  return -gammaP_a(a, x);
}
/**
 * The partial derivative of `gammaQ` in `x`.
 * @example
 * ```ts
 * import { gammaQ_x } from 'leadline/numeric';
 * console.log(gammaQ_x(2.5, 20).toPrecision(6));
 * // -1.38682e-7
 * ```
 */
export function gammaQ_x(a: number, x: number): number {
  return -gammaP_x(a, x);
}

/**
 * log P(a, x), beyond the underflow of P and without the rounding of P near 1. @kernel
 * @example
 * ```ts
 * import { logGammaP } from 'leadline/numeric';
 * console.log(logGammaP(500, 1).toPrecision(6));
 * // -2612.33
 * ```
 */
export function logGammaP(a: number, x: number): number {
  if (!(x > 0.0)) return x === 0.0 ? -Infinity : NaN;
  if (x === Infinity) return 0.0;
  incompleteGamma(a, x, false);
  return gammaSide === 0.0 ? gammaLogShare : log1mexp(gammaLogShare);
}
/**
 * The partial derivative of `logGammaP` in `a`.
 * @example
 * ```ts
 * import { logGammaP_a } from 'leadline/numeric';
 * console.log(logGammaP_a(500, 1).toPrecision(6));
 * // -6.21561
 * ```
 */
export function logGammaP_a(a: number, x: number): number {
  if (!(x > 0.0)) return x === 0.0 ? -Infinity : NaN;
  if (x === Infinity) return 0.0;
  incompleteGamma(a, x, true);
  return gammaSlope / lowerTail();
}
/**
 * The partial derivative of `logGammaP` in `x`.
 * @example
 * ```ts
 * import { logGammaP_x } from 'leadline/numeric';
 * console.log(logGammaP_x(500, 1).toPrecision(6));
 * // 499.002
 * ```
 */
export function logGammaP_x(a: number, x: number): number {
  if (!(x > 0.0)) return x === 0.0 ? Infinity : NaN;
  if (x === Infinity) return 0.0;
  incompleteGamma(a, x, false);
  return a / x / lowerTail();
}

/**
 * log Q(a, x), beyond the underflow of Q and without the rounding of Q near 1. @kernel
 * @example
 * ```ts
 * import { logGammaQ } from 'leadline/numeric';
 * console.log(logGammaQ(2.5, 1000).toPrecision(6));
 * // -989.922
 * ```
 */
export function logGammaQ(a: number, x: number): number {
  if (!(x > 0.0)) return x === 0.0 ? 0.0 : NaN;
  if (x === Infinity) return -Infinity;
  incompleteGamma(a, x, false);
  return gammaSide === 1.0 ? gammaLogShare : log1mexp(gammaLogShare);
}
/**
 * The partial derivative of `logGammaQ` in `a`.
 * @example
 * ```ts
 * import { logGammaQ_a } from 'leadline/numeric';
 * console.log(logGammaQ_a(2.5, 1000).toPrecision(6));
 * // 6.20560
 * ```
 */
export function logGammaQ_a(a: number, x: number): number {
  if (!(x > 0.0)) return x === 0.0 ? 0.0 : NaN;
  if (x === Infinity) return Infinity;
  incompleteGamma(a, x, true);
  return -gammaSlope / upperTail();
}
/**
 * The partial derivative of `logGammaQ` in `x`.
 * @example
 * ```ts
 * import { logGammaQ_x } from 'leadline/numeric';
 * console.log(logGammaQ_x(2.5, 1000).toPrecision(6));
 * // -0.998501
 * ```
 */
export function logGammaQ_x(a: number, x: number): number {
  if (!(x > 0.0)) return x === 0.0 ? -gammaP_x(a, x) : NaN;
  if (x === Infinity) return -1.0;
  incompleteGamma(a, x, false);
  return -a / x / upperTail();
}

/** P / D after a call of incompleteGamma. */
function lowerTail(): number {
  return gammaSide === 0.0 ? gammaTail : Math.exp(log1mexp(gammaLogShare) - gammaLogScale);
}

/** Q / D after a call of incompleteGamma. */
function upperTail(): number {
  return gammaSide === 1.0 ? gammaTail : Math.exp(log1mexp(gammaLogShare) - gammaLogScale);
}
