import { HALF_LOG_2PI, LOG_PI, PI } from './constants.js';
import { digamma } from './digamma.js';
import { stirlingSeries } from './stirlingSeries.js';

/**
 * What log Γ(2 + t) leaves after its linear term (1 − γ) t, for |t| ≤ ½: relative accuracy is kept at t = 0.
 * Source: DLMF 5.7.3; coefficients by mpmath at 50 digits.
 */
export function logGammaNear2Tail(t: number): number {
  return t * t * near2(t);
}

// Σ_{k≥2} (−1)^k (ζ(k) − 1) t^{k−2} / k.
function near2(t: number): number {
  let p = -1.1921401405860912e-9;
  p = 2.4836745438024785e-9 + t * p;
  p = -5.183475041970047e-9 + t * p;
  p = 1.0838659214896955e-8 + t * p;
  p = -2.2711094608943164e-8 + t * p;
  p = 4.7698101693639804e-8 + t * p;
  p = -1.0043224823968099e-7 + t * p;
  p = 2.1207184805554665e-7 + t * p;
  p = -4.492469198764566e-7 + t * p;
  p = 9.55141213040742e-7 + t * p;
  p = -2.039215753801366e-6 + t * p;
  p = 4.374866789907488e-6 + t * p;
  p = -9.439488275268397e-6 + t * p;
  p = 2.050721277567069e-5 + t * p;
  p = -4.492623673813314e-5 + t * p;
  p = 9.945751278180853e-5 + t * p;
  p = -0.00022315475845357939 + t * p;
  p = 0.0005096695247430425 + t * p;
  p = -0.001192753911703261 + t * p;
  p = 0.0028905103307415234 + t * p;
  p = -0.007385551028673986 + t * p;
  p = 0.020580808427784546 + t * p;
  p = -0.0673523010531981 + t * p;
  p = 0.3224670334241132 + t * p;
  return p;
}

/**
 * log Γ(2 + t) for |t| ≤ ½, by t (1 − γ + Σ_{k≥2} (−1)^k (ζ(k) − 1) t^{k−1} / k): relative accuracy is kept at
 * the zero t = 0. Source: DLMF 5.7.3; coefficients by mpmath at 50 digits.
 */
export function logGammaNear2(t: number): number {
  return t * (0.42278433509846713 + t * near2(t));
}

/**
 * log Γ(1 + x), which keeps the relative accuracy of a small x; x > −1. @kernel
 * @example
 * ```ts
 * import { logGamma1p } from 'leadline/numeric';
 * console.log(logGamma1p(1e-6).toPrecision(6));
 * // -5.77215e-7
 * ```
 */
export function logGamma1p(x: number): number {
  // log Γ(1 + x) = log Γ(2 + x) − log(1 + x).
  if (Math.abs(x) <= 0.5) return logGammaNear2(x) - Math.log1p(x);
  return logGamma(1.0 + x);
}
/**
 * The partial derivative of `logGamma1p` in `x`.
 * @example
 * ```ts
 * import { logGamma1p_x } from 'leadline/numeric';
 * console.log(logGamma1p_x(1e-6).toPrecision(6));
 * // -0.577214
 * ```
 */
export function logGamma1p_x(x: number): number {
  return digamma(1.0 + x);
}

/**
 * log |Γ(x)|, the logarithm of the gamma function; +Infinity at 0, −1, −2, …
 *
 * On [1.5, 2.5) the series about 2; below, its recurrence Γ(x) = Γ(x + 1)/x once or twice, written so that the
 * zero at 1 keeps its relative accuracy; up to 10 the recurrence downward (one logarithm of a product of
 * factors above 1, nothing cancels); above, Stirling's formula, whose terms no longer cancel there. For x < 0
 * the reflection log(π / |sin πx|) − log Γ(1 − x). Source: DLMF 5.5.1, 5.5.3, 5.7.3, 5.11.1. @kernel
 * @example
 * ```ts
 * import { logGamma } from 'leadline/numeric';
 * console.log(logGamma(2.5).toPrecision(6));
 * // 0.284683
 * ```
 */
export function logGamma(x: number): number {
  if (x >= 10.0) {
    if (x === Infinity) return Infinity;
    return (x - 0.5) * Math.log(x) - x + HALF_LOG_2PI + stirlingSeries(x);
  }
  if (x >= 2.5) {
    let product = 1.0;
    let y = x;
    while (y >= 2.5) {
      y -= 1.0;
      product *= y;
    }
    return logGammaNear2(y - 2.0) + Math.log(product);
  }
  if (x >= 1.5) return logGammaNear2(x - 2.0);
  if (x >= 0.5) return logGammaNear2(x - 1.0) - Math.log1p(x - 1.0);
  if (x >= 0.0) return logGammaNear2(x) - Math.log1p(x) - Math.log(x);
  if (!(x < 0.0)) return NaN;
  const away = Math.abs(x - Math.floor(x + 0.5));
  if (away === 0.0) return Infinity;
  return LOG_PI - Math.log(Math.sin(PI * away)) - logGamma(1.0 - x);
}
/**
 * The partial derivative of `logGamma` in `x`.
 * @example
 * ```ts
 * import { logGamma_x } from 'leadline/numeric';
 * console.log(logGamma_x(2.5).toPrecision(6));
 * // 0.703157
 * ```
 */
export function logGamma_x(x: number): number {
  return digamma(x);
}
