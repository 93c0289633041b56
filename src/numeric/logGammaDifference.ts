import { digamma } from './digamma.js';
import { digammaDifference } from './digammaDifference.js';
import { log1pmx } from './log1pmx.js';

/**
 * log Γ(b + a) − log Γ(b) for b > 0 and 0 ≤ a ≤ 1, with relative accuracy for small a, where the difference of
 * the two would leave nothing.
 *
 * Below b = 8 the recurrence moves both up at the cost of log1p(a/b) a step; above, Stirling's formulas are
 * subtracted term by term, which leaves a factor a in every term. DLMF 5.5.1, 5.11.1.
 * @example
 * ```ts
 * import { logGammaDifference } from 'leadline/numeric';
 * console.log(logGammaDifference(3, 1e-8).toPrecision(6));
 * // 9.22784e-9
 * ```
 */
export function logGammaDifference(b: number, a: number): number {
  // Outside the domain the recurrence would climb for ever.
  if (!(b >= 0.0 && a >= -b)) return NaN;
  let sum = 0.0;
  let x = b;
  while (x < 8.0) {
    sum += Math.log1p(a / x);
    x += 1.0;
  }
  const r = 1.0 / x;
  const s = 1.0 / (x + a);
  const u = r * r;
  const v = s * s;
  // p runs through Horner's rule of the series at u, q through its divided difference between u and v.
  let p = -3617.0 / 122400.0;
  let q = p;
  p = 1.0 / 156.0 + u * p;
  q = p + v * q;
  p = -691.0 / 360360.0 + u * p;
  q = p + v * q;
  p = 1.0 / 1188.0 + u * p;
  q = p + v * q;
  p = -1.0 / 1680.0 + u * p;
  q = p + v * q;
  p = 1.0 / 1260.0 + u * p;
  q = p + v * q;
  p = -1.0 / 360.0 + u * p;
  q = p + v * q;
  p = 1.0 / 12.0 + u * p;
  const h = a * r;
  return x * log1pmx(h) - 0.5 * Math.log1p(h) + a * Math.log(x + a) - h * s * (p + s * (r + s) * q) - sum;
}
/**
 * The partial derivative of `logGammaDifference` in `b`.
 * @example
 * ```ts
 * import { logGammaDifference_b } from 'leadline/numeric';
 * console.log(logGammaDifference_b(3, 1e-8).toPrecision(6));
 * // 3.94934e-9
 * ```
 */
export function logGammaDifference_b(b: number, a: number): number {
  return digammaDifference(b, a);
}
/**
 * The partial derivative of `logGammaDifference` in `a`.
 * @example
 * ```ts
 * import { logGammaDifference_a } from 'leadline/numeric';
 * console.log(logGammaDifference_a(3, 1e-8).toPrecision(6));
 * // 0.922784
 * ```
 */
export function logGammaDifference_a(b: number, a: number): number {
  return digamma(b + a);
}
