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

// The regularized incomplete beta function I_x(a, b), the distribution function of a beta variable, and its
// complement. Shapes a, b > 0, 0 ≤ x ≤ 1. DLMF 8.17.2. The algorithms stand in incompleteBetaCore.ts.

function evaluate(a: number, b: number, x: number): void {
  incompleteBeta(a, b, x, 1.0 - x, Math.log(x), Math.log1p(-x));
}

/**
 * I_x(a, b) = ∫₀ˣ t^{a−1} (1−t)^{b−1} dt / B(a, b). @kernel
 * @example
 * ```ts
 * import { betaI } from 'leadline/numeric';
 * console.log(betaI(2, 3, 0.1).toPrecision(6));
 * // 0.0523000
 * ```
 */
export function betaI(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? x : NaN;
  evaluate(a, b, x);
  return betaSide === 0.0 ? Math.exp(betaLogShare) : -Math.expm1(betaLogShare);
}
/**
 * The partial derivative of `betaI` in `a`.
 * @example
 * ```ts
 * import { betaI_a } from 'leadline/numeric';
 * console.log(betaI_a(2, 3, 0.1).toPrecision(6));
 * // -0.0911752
 * ```
 */
export function betaI_a(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return Math.exp(betaLogScale) * betaSlopeA;
}
/**
 * The partial derivative of `betaI` in `b`.
 * @example
 * ```ts
 * import { betaI_b } from 'leadline/numeric';
 * console.log(betaI_b(2, 3, 0.1).toPrecision(6));
 * // 0.0269502
 * ```
 */
export function betaI_b(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return Math.exp(betaLogScale) * betaSlopeB;
}
/**
 * The partial derivative of `betaI` in `x`.
 * @example
 * ```ts
 * import { betaI_x } from 'leadline/numeric';
 * console.log(betaI_x(2, 3, 0.1).toPrecision(6));
 * // 0.972000
 * ```
 */
export function betaI_x(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? edgeDensity(a, b) : x === 1.0 ? edgeDensity(b, a) : NaN;
  evaluate(a, b, x);
  return Math.exp(betaLogScale - Math.log(x) - Math.log1p(-x));
}

/** The density at x = 0. */
function edgeDensity(a: number, b: number): number {
  return a < 1.0 ? Infinity : a === 1.0 ? b : 0.0;
}

/**
 * 1 − I_x(a, b). @kernel
 * @example
 * ```ts
 * import { betaIComplement } from 'leadline/numeric';
 * console.log(betaIComplement(2, 30, 0.9).toPrecision(6));
 * // 2.80000e-29
 * ```
 */
export function betaIComplement(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? 1.0 - x : NaN;
  evaluate(a, b, x);
  return betaSide === 1.0 ? Math.exp(betaLogShare) : -Math.expm1(betaLogShare);
}
/**
 * The partial derivative of `betaIComplement` in `a`.
 * @example
 * ```ts
 * import { betaIComplement_a } from 'leadline/numeric';
 * console.log(betaIComplement_a(2, 30, 0.9).toPrecision(6));
 * // 8.19131e-29
 * ```
 */
export function betaIComplement_a(a: number, b: number, x: number): number {
  return -betaI_a(a, b, x);
}
/**
 * The partial derivative of `betaIComplement` in `b`.
 * @example
 * ```ts
 * import { betaIComplement_b } from 'leadline/numeric';
 * console.log(betaIComplement_b(2, 30, 0.9).toPrecision(6));
 * // -6.35724e-29
 * ```
 */
export function betaIComplement_b(a: number, b: number, x: number): number {
  return -betaI_b(a, b, x);
}
/**
 * The partial derivative of `betaIComplement` in `x`.
 * @example
 * ```ts
 * import { betaIComplement_x } from 'leadline/numeric';
 * console.log(betaIComplement_x(2, 30, 0.9).toPrecision(6));
 * // -8.37000e-27
 * ```
 */
export function betaIComplement_x(a: number, b: number, x: number): number {
  return -betaI_x(a, b, x);
}

/**
 * log I_x(a, b), beyond its underflow and without its rounding near 1. @kernel
 * @example
 * ```ts
 * import { logBetaI } from 'leadline/numeric';
 * console.log(logBetaI(200, 3, 0.001).toPrecision(6));
 * // -1371.63
 * ```
 */
export function logBetaI(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? -Infinity : x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return betaSide === 0.0 ? betaLogShare : log1mexp(betaLogShare);
}
/**
 * The partial derivative of `logBetaI` in `a`.
 * @example
 * ```ts
 * import { logBetaI_a } from 'leadline/numeric';
 * console.log(logBetaI_a(200, 3, 0.001).toPrecision(6));
 * // -6.89783
 * ```
 */
export function logBetaI_a(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? -Infinity : x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return betaSlopeA / lowerTail();
}
/**
 * The partial derivative of `logBetaI` in `b`.
 * @example
 * ```ts
 * import { logBetaI_b } from 'leadline/numeric';
 * console.log(logBetaI_b(200, 3, 0.001).toPrecision(6));
 * // 4.38696
 * ```
 */
export function logBetaI_b(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return betaSlopeB / lowerTail();
}
/**
 * The partial derivative of `logBetaI` in `x`.
 * @example
 * ```ts
 * import { logBetaI_x } from 'leadline/numeric';
 * console.log(logBetaI_x(200, 3, 0.001).toPrecision(6));
 * // 199998
 * ```
 */
export function logBetaI_x(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? Infinity : x === 1.0 ? edgeDensity(b, a) : NaN;
  evaluate(a, b, x);
  return 1.0 / (x * (1.0 - x) * lowerTail());
}

/**
 * log(1 − I_x(a, b)), beyond the underflow of the complement and without its rounding near 1. @kernel
 * @example
 * ```ts
 * import { logBetaIComplement } from 'leadline/numeric';
 * console.log(logBetaIComplement(2, 300, 0.9).toPrecision(6));
 * // -685.173
 * ```
 */
export function logBetaIComplement(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? 0.0 : x === 1.0 ? -Infinity : NaN;
  evaluate(a, b, x);
  return betaSide === 1.0 ? betaLogShare : log1mexp(betaLogShare);
}
/**
 * The partial derivative of `logBetaIComplement` in `a`.
 * @example
 * ```ts
 * import { logBetaIComplement_a } from 'leadline/numeric';
 * console.log(logBetaIComplement_a(2, 300, 0.9).toPrecision(6));
 * // 5.18099
 * ```
 */
export function logBetaIComplement_a(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return -betaSlopeA / upperTail();
}
/**
 * The partial derivative of `logBetaIComplement` in `b`.
 * @example
 * ```ts
 * import { logBetaIComplement_b } from 'leadline/numeric';
 * console.log(logBetaIComplement_b(2, 300, 0.9).toPrecision(6));
 * // -2.29926
 * ```
 */
export function logBetaIComplement_b(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? 0.0 : x === 1.0 ? -Infinity : NaN;
  evaluate(a, b, x);
  return -betaSlopeB / upperTail();
}
/**
 * The partial derivative of `logBetaIComplement` in `x`.
 * @example
 * ```ts
 * import { logBetaIComplement_x } from 'leadline/numeric';
 * console.log(logBetaIComplement_x(2, 300, 0.9).toPrecision(6));
 * // -2998.89
 * ```
 */
export function logBetaIComplement_x(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 1.0 ? -Infinity : x === 0.0 ? -edgeDensity(a, b) : NaN;
  evaluate(a, b, x);
  return -1.0 / (x * (1.0 - x) * upperTail());
}

/** I / D after a call of `evaluate`. */
function lowerTail(): number {
  return betaSide === 0.0 ? betaTail : Math.exp(log1mexp(betaLogShare) - betaLogScale);
}

/** (1 − I) / D after a call of `evaluate`. */
function upperTail(): number {
  return betaSide === 1.0 ? betaTail : Math.exp(log1mexp(betaLogShare) - betaLogScale);
}
