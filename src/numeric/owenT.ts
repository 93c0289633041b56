import { PI, SQRT_HALF } from './constants.js';
import { erf, erfc } from './errorFunction.js';
import { NODES, WEIGHTS } from './gaussLegendre.js';
import { normalDensity } from './normalCdf.js';
import { skewNormalCdfStandard } from './skewNormal.js';

/**
 * Owen's function T(h, a) = (1/2π) ∫₀^a e^{−h²(1 + x²)/2} / (1 + x²) dx: the probability that a standard normal
 * pair (X, Y) has X > h and 0 < Y < a X. Even in h, odd in a.
 *
 * For |a| ≤ 1 the integral itself, up to where the exponent has fallen by 50; beyond it half the difference
 * between the normal tail and the thin tail of the skew normal law, which is at most half the former.
 * Source: Owen (1956), "Tables for computing bivariate normal probabilities", equation 2.1. @kernel
 * @example
 * ```ts
 * import { owenT } from 'leadline/numeric';
 * console.log(owenT(1, 2).toPrecision(6));
 * // 0.0784682
 * ```
 */
export function owenT(h: number, a: number): number {
  const s = Math.abs(h);
  const b = Math.abs(a);
  if (!(b <= 1.0)) {
    const upper = 0.5 * erfc(s * SQRT_HALF);
    const value = 0.5 * (b < Infinity ? upper - skewNormalCdfStandard(-s, b) : upper);
    return isNaN(b) ? NaN : a < 0.0 ? -value : value;
  }
  const half = 0.5 * Math.min(b, 10.0 / s);
  let sum = 0.0;
  for (let i = 0; i < 24; i++) {
    const k = i < 12 ? i : i - 12;
    const x = half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    const t = s * x;
    sum += (WEIGHTS[k]! * Math.exp(-0.5 * t * t)) / (1.0 + x * x);
  }
  const value = (Math.exp(-0.5 * s * s) * half * sum) / (2.0 * PI);
  return a < 0.0 ? -value : value;
}
/**
 * −½ φ(h) erf(a h/√2).
 * @example
 * ```ts
 * import { owenT_h } from 'leadline/numeric';
 * console.log(owenT_h(1, 2).toPrecision(6));
 * // -0.115480
 * ```
 */
export function owenT_h(h: number, a: number): number {
  return -0.5 * normalDensity(h) * erf(a * h * SQRT_HALF);
}
/**
 * The partial derivative of `owenT` in `a`.
 * @example
 * ```ts
 * import { owenT_a } from 'leadline/numeric';
 * console.log(owenT_a(1, 2).toPrecision(6));
 * // 0.00261285
 * ```
 */
export function owenT_a(h: number, a: number): number {
  const c = 1.0 + a * a;
  return Math.exp(-0.5 * c * h * h) / (2.0 * PI * c);
}
