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

/** I_x(a, b) = ∫₀ˣ t^{a−1} (1−t)^{b−1} dt / B(a, b). */
export function betaI(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? x : NaN;
  evaluate(a, b, x);
  return betaSide === 0.0 ? Math.exp(betaLogShare) : -Math.expm1(betaLogShare);
}
export function betaI_a(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return Math.exp(betaLogScale) * betaSlopeA;
}
export function betaI_b(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return Math.exp(betaLogScale) * betaSlopeB;
}
export function betaI_x(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? edgeDensity(a, b) : x === 1.0 ? edgeDensity(b, a) : NaN;
  evaluate(a, b, x);
  return Math.exp(betaLogScale - Math.log(x) - Math.log1p(-x));
}

/** The density at x = 0. */
function edgeDensity(a: number, b: number): number {
  return a < 1.0 ? Infinity : a === 1.0 ? b : 0.0;
}

/** 1 − I_x(a, b). */
export function betaIComplement(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 || x === 1.0 ? 1.0 - x : NaN;
  evaluate(a, b, x);
  return betaSide === 1.0 ? Math.exp(betaLogShare) : -Math.expm1(betaLogShare);
}
export function betaIComplement_a(a: number, b: number, x: number): number {
  return -betaI_a(a, b, x);
}
export function betaIComplement_b(a: number, b: number, x: number): number {
  return -betaI_b(a, b, x);
}
export function betaIComplement_x(a: number, b: number, x: number): number {
  return -betaI_x(a, b, x);
}

/** log I_x(a, b), beyond its underflow and without its rounding near 1. */
export function logBetaI(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? -Infinity : x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return betaSide === 0.0 ? betaLogShare : log1mexp(betaLogShare);
}
export function logBetaI_a(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? -Infinity : x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return betaSlopeA / lowerTail();
}
export function logBetaI_b(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 1.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return betaSlopeB / lowerTail();
}
export function logBetaI_x(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? Infinity : x === 1.0 ? edgeDensity(b, a) : NaN;
  evaluate(a, b, x);
  return 1.0 / (x * (1.0 - x) * lowerTail());
}

/** I / D after a call of `evaluate`. */
function lowerTail(): number {
  return betaSide === 0.0 ? betaTail : Math.exp(log1mexp(betaLogShare) - betaLogScale);
}

/** log(1 − I_x(a, b)), likewise. */
export function logBetaIComplement(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? 0.0 : x === 1.0 ? -Infinity : NaN;
  evaluate(a, b, x);
  return betaSide === 1.0 ? betaLogShare : log1mexp(betaLogShare);
}
export function logBetaIComplement_a(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? 0.0 : NaN;
  evaluate(a, b, x);
  return -betaSlopeA / upperTail();
}
export function logBetaIComplement_b(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? 0.0 : x === 1.0 ? -Infinity : NaN;
  evaluate(a, b, x);
  return -betaSlopeB / upperTail();
}
export function logBetaIComplement_x(a: number, b: number, x: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? -edgeDensity(a, b) : x === 1.0 ? -Infinity : NaN;
  evaluate(a, b, x);
  return -1.0 / (x * (1.0 - x) * upperTail());
}

/** (1 − I) / D after a call of `evaluate`. */
function upperTail(): number {
  return betaSide === 1.0 ? betaTail : Math.exp(log1mexp(betaLogShare) - betaLogScale);
}
