import { SQRT_2_OVER_PI, SQRT_2PI, SQRT_HALF } from './constants.js';
import { erf, erfc, erfcx } from './errorFunction.js';

/**
 * φ(x) = e^{−x²/2} / √(2π), the standard normal density.
 * @example
 * ```ts
 * import { normalDensity } from 'leadline/numeric';
 * console.log(normalDensity(1).toPrecision(6));
 * // 0.241971
 * ```
 */
export function normalDensity(x: number): number {
  return Math.exp(-0.5 * x * x) / SQRT_2PI;
}

/** x φ(x); zero at the ends, where the product of the two is not a number. */
export function scaledNormalDensity(x: number): number {
  return Math.abs(x) > 40.0 ? 0.0 : x * normalDensity(x);
}

/**
 * Φ(x) = ½ erfc(−x/√2), the standard normal distribution function. @kernel
 * @example
 * ```ts
 * import { normalCdf } from 'leadline/numeric';
 * console.log(normalCdf(-2).toPrecision(6));
 * // 0.0227501
 * ```
 */
export function normalCdf(x: number): number {
  // The exponent is x² /2 itself: halving the square of −x/√2 would round it once more.
  if (x < -0.7) return 0.5 * erfcx(-x * SQRT_HALF) * Math.exp(-0.5 * x * x);
  if (x > 1.4) return 1.0 - 0.5 * erfcx(x * SQRT_HALF) * Math.exp(-0.5 * x * x);
  return 0.5 + 0.5 * erf(x * SQRT_HALF);
}
/**
 * The partial derivative of `normalCdf` in `x`.
 * @example
 * ```ts
 * import { normalCdf_x } from 'leadline/numeric';
 * console.log(normalCdf_x(-2).toPrecision(6));
 * // 0.0539910
 * ```
 */
export function normalCdf_x(x: number): number {
  return normalDensity(x);
}

/**
 * log Φ(x), which neither underflows at the left nor loses its small value at the right.
 *
 * Left of −1 the Gaussian factor leaves as −x²/2 and the rest is a scaled error function; right of it
 * log1p of minus the upper tail. Source: DLMF 7.2.2 and the definition of Φ. @kernel
 * @example
 * ```ts
 * import { logNormalCdf } from 'leadline/numeric';
 * console.log(logNormalCdf(-10).toPrecision(6));
 * // -53.2313
 * ```
 */
export function logNormalCdf(x: number): number {
  if (x < -1.0) return Math.log(0.5 * erfcx(-x * SQRT_HALF)) - 0.5 * x * x;
  if (x < 5.0) return Math.log1p(-0.5 * erfc(x * SQRT_HALF));
  return Math.log1p(-0.5 * erfcx(x * SQRT_HALF) * Math.exp(-0.5 * x * x));
}
/**
 * The partial derivative of `logNormalCdf` in `x`.
 * @example
 * ```ts
 * import { logNormalCdf_x } from 'leadline/numeric';
 * console.log(logNormalCdf_x(-10).toPrecision(6));
 * // 10.0981
 * ```
 */
export function logNormalCdf_x(x: number): number {
  return logNormalCdfDerivative(x);
}

/**
 * φ(x) / Φ(x), the derivative of log Φ: √(2/π) / erfcx(−x/√2), which stays finite in the left tail (it grows
 * like −x), where both parts underflow. @kernel
 * @example
 * ```ts
 * import { logNormalCdfDerivative } from 'leadline/numeric';
 * console.log(logNormalCdfDerivative(-10).toPrecision(6));
 * // 10.0981
 * ```
 */
export function logNormalCdfDerivative(x: number): number {
  if (x > 5.0) {
    const e = Math.exp(-0.5 * x * x);
    return e / (SQRT_2PI * (1.0 - 0.5 * erfcx(x * SQRT_HALF) * e));
  }
  return SQRT_2_OVER_PI / erfcx(-x * SQRT_HALF);
}

/** x times that; zero at the upper end, where the product of the two is not a number. */
export function scaledLogNormalCdfDerivative(x: number): number {
  return x > 40.0 ? 0.0 : x * logNormalCdfDerivative(x);
}

/**
 * h′ = −h (x + h) for h = φ/Φ. Left of −4 the sum cancels to 1/(t + 2/(t + 3/(t + …))) with t = −x, the rest of
 * Laplace's continued fraction for 1/h after its first step, DLMF 7.9.1.
 * @example
 * ```ts
 * import { logNormalCdfDerivative_x } from 'leadline/numeric';
 * console.log(logNormalCdfDerivative_x(-10).toPrecision(6));
 * // -0.990555
 * ```
 */
export function logNormalCdfDerivative_x(x: number): number {
  const h = logNormalCdfDerivative(x);
  if (x > -4.0) return -h * (x + h);
  let f = 0.0;
  for (let k = 60.0; k > 0.5; k -= 1.0) f = k / (f - x);
  return -h * f;
}
