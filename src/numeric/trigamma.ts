import { PI } from './constants.js';

/**
 * ψ′(x), the trigamma function; +Infinity at 0 and the negative integers.
 *
 * Up to 8 the recurrence ψ′(x) = 1/x² + ψ′(x + 1), a sum of positive terms; above, the asymptotic series. For
 * x < 0 the reflection (π / sin πx)² − ψ′(1 − x). Source: DLMF 5.15.5, 5.15.6, 5.15.8. @kernel
 * @example
 * ```ts
 * import { trigamma } from 'leadline/numeric';
 * console.log(trigamma(2.5).toPrecision(6));
 * // 0.490358
 * ```
 */
export function trigamma(x: number): number {
  if (x < 0.0) {
    const away = x - Math.floor(x + 0.5);
    const s = PI / Math.sin(PI * away);
    return s * s - trigamma(1.0 - x);
  }
  let sum = 0.0;
  let y = x;
  while (y < 8.0) {
    sum += 1.0 / (y * y);
    y += 1.0;
  }
  const r = 1.0 / y;
  return sum + r + 0.5 * r * r + trigammaSeries(y);
}
/**
 * The partial derivative of `trigamma` in `x`.
 * @example
 * ```ts
 * import { trigamma_x } from 'leadline/numeric';
 * console.log(trigamma_x(2.5).toPrecision(6));
 * // -0.236204
 * ```
 */
export function trigamma_x(x: number): number {
  return tetragamma(x);
}

/** ψ′(x) − 1/x − 1/(2x²) = 1/(6x³) − 1/(30x⁵) + …, for x ≥ 8. DLMF 5.15.8. */
export function trigammaSeries(x: number): number {
  const r = 1.0 / x;
  const s = r * r;
  let p = -3617.0 / 510.0;
  p = 7.0 / 6.0 + s * p;
  p = -691.0 / 2730.0 + s * p;
  p = 5.0 / 66.0 + s * p;
  p = -1.0 / 30.0 + s * p;
  p = 1.0 / 42.0 + s * p;
  p = -1.0 / 30.0 + s * p;
  p = 1.0 / 6.0 + s * p;
  return s * r * p;
}

/**
 * ψ″(x) for x > 0, the tetragamma function (negative); by the recurrence ψ″(x) = −2/x³ + ψ″(x + 1) up to 10 and
 * the derivative of the trigamma function's asymptotic series above. For x < 0 the reflection
 * ψ″(1 − x) − 2π³ cos(πx) / sin³(πx). Source: DLMF 5.15.5, 5.15.6, 5.15.9.
 * @example
 * ```ts
 * import { tetragamma } from 'leadline/numeric';
 * console.log(tetragamma(2.5).toPrecision(6));
 * // -0.236204
 * ```
 */
export function tetragamma(x: number): number {
  if (x < 0.0) {
    const away = x - Math.floor(x + 0.5);
    const s = PI / Math.sin(PI * away);
    return tetragamma(1.0 - x) - 2.0 * Math.cos(PI * away) * s * s * s;
  }
  let sum = 0.0;
  let y = x;
  while (y < 10.0) {
    sum += 2.0 / (y * y * y);
    y += 1.0;
  }
  const r = 1.0 / y;
  const s = r * r;
  let p = (3617.0 * 17.0) / 510.0;
  p = (-7.0 * 15.0) / 6.0 + s * p;
  p = (691.0 * 13.0) / 2730.0 + s * p;
  p = (-5.0 * 11.0) / 66.0 + s * p;
  p = 9.0 / 30.0 + s * p;
  p = -7.0 / 42.0 + s * p;
  p = 5.0 / 30.0 + s * p;
  p = -3.0 / 6.0 + s * p;
  return s * (s * p - r - 1.0) - sum;
}
