import { LN2, LN2_LOW, SQRT_2PI, SQRT_HALF, SQRT_HALF_PI } from './constants.js';
import { erf, erfcx } from './errorFunction.js';
import { logNormalCdf, logNormalCdfDerivative, normalDensity } from './normalCdf.js';

/**
 * The x with erf(x/√2) = y for |y| ≤ 0.62: a polynomial good to 3e-7, then one step of Halley's method, which
 * triples the digits. Working with y = 2p − 1 keeps the relative accuracy at the zero p = ½.
 */
export function centralQuantile(y: number): number {
  const s = y * y;
  let p = 0.20811178380128645;
  p = 0.024965225998847422 + s * p;
  p = 0.13622857912640565 + s * p;
  p = 0.1791499477495139 + s * p;
  p = 0.32815685965667574 + s * p;
  p = 1.253313931067276 + s * p;
  const x = y * p;
  const step = (erf(x * SQRT_HALF) - y) / (2.0 * normalDensity(x));
  return x - step / (1.0 + 0.5 * x * step);
}

/**
 * The x with log Φ(x) = l, for l ≤ log 0.21. With r = √(−2l) the start is −r + (½ log(2πr²) + c(1/r)) / r, the
 * first terms of the asymptotic inverse with a fitted remainder (error below 3e-4 / r); one step of Halley's
 * method on log Φ, whose derivative h obeys h′ = −h (x + h), leaves less than 1e-11.
 */
function lowerTailQuantile(l: number): number {
  const r = Math.sqrt(-2.0 * l);
  const u = 1.0 / r;
  let c = 19.422824408115897;
  c = -38.39123659355804 + u * c;
  c = 30.141305414018944 + u * c;
  c = -11.994859036308998 + u * c;
  c = 2.490109152065082 + u * c;
  c = 0.14908827787176696 + u * c;
  c = -0.0004341281985434584 + u * c;
  const x = (Math.log(SQRT_2PI * r) + c) * u - r;
  const h = logNormalCdfDerivative(x);
  const step = (logNormalCdf(x) - l) / h;
  return x - step / (1.0 + 0.5 * (x + h) * step);
}

/**
 * Φ⁻¹(p), the standard normal quantile; ∓Infinity at 0 and 1, NaN outside [0, 1]. The upper tail is as good as
 * the double p allows: for a tail beyond 1 − 1e-8 give the logarithm of the complement to
 * `normalQuantileFromLog` and change the sign. @kernel
 * @example
 * ```ts
 * import { normalQuantile } from 'leadline/numeric';
 * console.log(normalQuantile(0.01).toPrecision(6));
 * // -2.32635
 * ```
 */
export function normalQuantile(x: number): number {
  if (x > 0.2 && x < 0.8) return centralQuantile(2.0 * x - 1.0);
  if (x <= 0.0) return x === 0.0 ? -Infinity : NaN;
  if (x >= 1.0) return x === 1.0 ? Infinity : NaN;
  if (x < 0.5) return lowerTailQuantile(Math.log(x));
  return -lowerTailQuantile(Math.log1p(-x));
}
/**
 * The partial derivative of `normalQuantile` in `x`.
 * @example
 * ```ts
 * import { normalQuantile_x } from 'leadline/numeric';
 * console.log(normalQuantile_x(0.01).toPrecision(6));
 * // 37.5204
 * ```
 */
export function normalQuantile_x(x: number): number {
  return 1.0 / normalDensity(normalQuantile(x));
}

/**
 * The x with log Φ(x) = l, from the logarithm of the probability (here named x as every kernel's argument):
 * both tails, l → −Infinity and l → 0, keep their relative accuracy. NaN for l > 0. @kernel
 * @example
 * ```ts
 * import { normalQuantileFromLog } from 'leadline/numeric';
 * console.log(normalQuantileFromLog(-1000).toPrecision(6));
 * // -44.6157
 * ```
 */
export function normalQuantileFromLog(x: number): number {
  if (x < -1.6) return x === -Infinity ? x : lowerTailQuantile(x);
  if (x < -0.223) return centralQuantile(centralFromLog(x));
  if (x >= 0.0) return x === 0.0 ? Infinity : NaN;
  return -lowerTailQuantile(Math.log(-Math.expm1(x)));
}

/** 2e^l − 1 near its zero l = −log 2. */
function centralFromLog(l: number): number {
  return Math.expm1(l + LN2 + LN2_LOW);
}

/**
 * Φ/φ at the quantile: √(π/2) erfcx(−x/√2).
 * @example
 * ```ts
 * import { normalQuantileFromLog_x } from 'leadline/numeric';
 * console.log(normalQuantileFromLog_x(-1000).toPrecision(6));
 * // 0.0224024
 * ```
 */
export function normalQuantileFromLog_x(x: number): number {
  return SQRT_HALF_PI * erfcx(-normalQuantileFromLog(x) * SQRT_HALF);
}
