import { SQRT_2_OVER_PI, SQRT_2PI, SQRT_HALF } from './constants.js';
import { erf, erfc, erfcx } from './errorFunction.js';

/** φ(x) = e^{−x²/2} / √(2π), the standard normal density. */
export function normalDensity(x: number): number {
  return Math.exp(-0.5 * x * x) / SQRT_2PI;
}

/** x φ(x); zero at the ends, where the product of the two is not a number. */
export function scaledNormalDensity(x: number): number {
  return Math.abs(x) > 40.0 ? 0.0 : x * normalDensity(x);
}

/** Φ(x) = ½ erfc(−x/√2), the standard normal distribution function. @kernel */
export function normalCdf(x: number): number {
  // The exponent is x² /2 itself: halving the square of −x/√2 would round it once more.
  if (x < -0.7) return 0.5 * erfcx(-x * SQRT_HALF) * Math.exp(-0.5 * x * x);
  if (x > 1.4) return 1.0 - 0.5 * erfcx(x * SQRT_HALF) * Math.exp(-0.5 * x * x);
  return 0.5 + 0.5 * erf(x * SQRT_HALF);
}
export function normalCdf_x(x: number): number {
  return normalDensity(x);
}

/**
 * log Φ(x), which neither underflows at the left nor loses its small value at the right.
 *
 * Left of −1 the Gaussian factor leaves as −x²/2 and the rest is a scaled error function; right of it
 * log1p of minus the upper tail. Source: DLMF 7.2.2 and the definition of Φ. @kernel
 */
export function logNormalCdf(x: number): number {
  if (x < -1.0) return Math.log(0.5 * erfcx(-x * SQRT_HALF)) - 0.5 * x * x;
  if (x < 5.0) return Math.log1p(-0.5 * erfc(x * SQRT_HALF));
  return Math.log1p(-0.5 * erfcx(x * SQRT_HALF) * Math.exp(-0.5 * x * x));
}
export function logNormalCdf_x(x: number): number {
  return logNormalCdfDerivative(x);
}

/**
 * φ(x) / Φ(x), the derivative of log Φ: √(2/π) / erfcx(−x/√2), which stays finite in the left tail (it grows
 * like −x), where both parts underflow.
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
