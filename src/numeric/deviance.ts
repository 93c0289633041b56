import { log1pmx } from './log1pmx.js';

/**
 * x log(x / m) + m − x for x ≥ 0, m ≥ 0: half a Poisson deviance, and m for x = 0. Zero, with a double zero, at
 * x = m: within a factor of two it is −x (log(1 + u) − u) with u = (m − x) / x, which keeps the relative
 * accuracy there. Source: Loader (2000), "Fast and accurate computation of binomial probabilities", section 2. @kernel
 * @example
 * ```ts
 * import { deviance } from 'leadline/numeric';
 * console.log(deviance(5, 5.001).toPrecision(6));
 * // 9.99867e-8
 * ```
 */
export function deviance(x: number, m: number): number {
  if (x === 0.0) return m;
  const d = m - x;
  if (Math.abs(d) <= 0.5 * x) return x * (0.0 - log1pmx(d / x));
  if (x === Infinity || m === Infinity) return Infinity;
  return x * logRatio(x, m) + d;
}

/**
 * log(x / m).
 * @example
 * ```ts
 * import { deviance_x } from 'leadline/numeric';
 * console.log(deviance_x(5, 5.001).toPrecision(6));
 * // -0.000199980
 * ```
 */
export function deviance_x(x: number, m: number): number {
  return logRatio(x, m);
}

/**
 * 1 − x / m.
 * @example
 * ```ts
 * import { deviance_m } from 'leadline/numeric';
 * console.log(deviance_m(5, 5.001).toPrecision(6));
 * // 0.000199960
 * ```
 */
export function deviance_m(x: number, m: number): number {
  return (m - x) / m;
}

/**
 * log(x / m) for positive x and m, with relative accuracy where they are close and no overflow of the ratio. @kernel
 * @example
 * ```ts
 * import { logRatio } from 'leadline/numeric';
 * console.log(logRatio(5, 5.001).toPrecision(6));
 * // -0.000199980
 * ```
 */
export function logRatio(x: number, m: number): number {
  const d = x - m;
  if (Math.abs(d) <= 0.5 * m) return Math.log1p(d / m);
  const r = x / m;
  return r > 1.0e-300 && r < 1.0e300 ? Math.log(r) : Math.log(x) - Math.log(m);
}
/**
 * The partial derivative of `logRatio` in `x`.
 * @example
 * ```ts
 * import { logRatio_x } from 'leadline/numeric';
 * console.log(logRatio_x(5, 5.001).toPrecision(6));
 * // 0.200000
 * ```
 */
export function logRatio_x(x: number, _m: number): number {
  return 1.0 / x;
}
/**
 * The partial derivative of `logRatio` in `m`.
 * @example
 * ```ts
 * import { logRatio_m } from 'leadline/numeric';
 * console.log(logRatio_m(5, 5.001).toPrecision(6));
 * // -0.199960
 * ```
 */
export function logRatio_m(_x: number, m: number): number {
  return -1.0 / m;
}
