import { trigamma } from './trigamma.js';
import { trigammaDifference } from './trigammaDifference.js';

/**
 * ψ(a + b) − ψ(a) for a > 0, b ≥ 0, with relative accuracy also where b ≪ a, where the difference of the two
 * would leave nothing.
 *
 * Below a = 8 the recurrence moves both up, ψ(a + b) − ψ(a) = Σ b / ((a + j)(a + b + j)) + …, positive terms;
 * above, the asymptotic series of each subtracted term by term, which leaves a factor b in every term:
 * log(1 + b/a) + (r − s)/2 + (r² − s²) times a divided difference, r = 1/a, s = 1/(a + b). DLMF 5.5.2, 5.11.2. @kernel
 * @example
 * ```ts
 * import { digammaDifference } from 'leadline/numeric';
 * console.log(digammaDifference(3, 1e-8).toPrecision(6));
 * // 3.94934e-9
 * ```
 */
export function digammaDifference(a: number, b: number): number {
  // Outside the domain the recurrence would climb for ever.
  if (!(a >= 0.0 && b >= 0.0)) return NaN;
  let sum = 0.0;
  let x = a;
  while (x < 8.0) {
    sum += b / x / (x + b);
    x += 1.0;
  }
  return sum + Math.log1p(b / x) + digammaMinusLogDifference(x, b);
}
/**
 * The partial derivative of `digammaDifference` in `b`.
 * @example
 * ```ts
 * import { digammaDifference_b } from 'leadline/numeric';
 * console.log(digammaDifference_b(3, 1e-8).toPrecision(6));
 * // 0.394934
 * ```
 */
export function digammaDifference_b(a: number, b: number): number {
  return trigamma(a + b);
}
/**
 * ψ′(a + b) − ψ′(a), with relative accuracy for b ≪ a too.
 * @example
 * ```ts
 * import { digammaDifference_a } from 'leadline/numeric';
 * console.log(digammaDifference_a(3, 1e-8).toPrecision(6));
 * // -1.54114e-9
 * ```
 */
export function digammaDifference_a(a: number, b: number): number {
  return -trigammaDifference(a, b);
}

/**
 * (ψ(x + b) − log(x + b)) − (ψ(x) − log x) for x ≥ 8 and x + b ≥ 8, b of either sign, to its own relative accuracy.
 */
export function digammaMinusLogDifference(x: number, b: number): number {
  const r = 1.0 / x;
  const s = 1.0 / (x + b);
  // b r s and b r s (r + s) are r − s and r² − s² without their cancellation.
  const first = b * r * s;
  const u = r * r;
  const v = s * s;
  // p runs through Horner's rule at u, q through the divided difference of the same polynomial between u and v.
  let p = -3617.0 / 8160.0;
  let q = p;
  p = 1.0 / 12.0 + u * p;
  q = p + v * q;
  p = -691.0 / 32760.0 + u * p;
  q = p + v * q;
  p = 1.0 / 132.0 + u * p;
  q = p + v * q;
  p = -1.0 / 240.0 + u * p;
  q = p + v * q;
  p = 1.0 / 252.0 + u * p;
  q = p + v * q;
  p = -1.0 / 120.0 + u * p;
  q = p + v * q;
  p = 1.0 / 12.0 + u * p;
  q = p + v * q;
  return 0.5 * first + first * (r + s) * q;
}
