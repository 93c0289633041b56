import { SQRT_PI, TWO_OVER_SQRT_PI } from './constants.js';

/**
 * e^{x²} erfc(x) for x ≥ 0: the polynomial of (1 + 2x) e^{x²} erfc(x) in t = (x − 4) / (x + 4), which maps
 * [0, ∞) to [−1, 1). Degree 24, truncation below 1e-16. The idea is Shepherd and Laframboise (1981), "Chebyshev
 * approximation of (1 + 2x) exp(x²) erfc x in 0 ≤ x < ∞"; the coefficients are by mpmath at 40 digits.
 */
function scaledUpper(x: number): number {
  if (x > 1.0e8) return 1.0 / (SQRT_PI * x);
  const t = (x - 4.0) / (x + 4.0);
  let p = -2.659599690242689e-10;
  p = 9.311744978232572e-10 + t * p;
  p = 3.1695881915648173e-9 + t * p;
  p = -1.234686604382353e-8 + t * p;
  p = -2.05606492756992e-8 + t * p;
  p = 1.0633855618594884e-7 + t * p;
  p = 7.746992727017941e-8 + t * p;
  p = -8.210939042560568e-7 + t * p;
  p = 2.919733377963012e-7 + t * p;
  p = 5.706604414895734e-6 + t * p;
  p = -1.1221287012353486e-5 + t * p;
  p = -2.4397746422436416e-5 + t * p;
  p = 0.0001506214900124047 + t * p;
  p = -0.00019925714661091188 + t * p;
  p = -0.0007577732613730956 + t * p;
  p = 0.005031970067657489 + t * p;
  p = -0.016197734059799265 + t * p;
  p = 0.03716751552655567 + t * p;
  p = -0.06633036581218697 + t * p;
  p = 0.0937328349990944 + t * p;
  p = -0.10103906603630056 + t * p;
  p = 0.06809705425466908 + t * p;
  p = 0.015379652102619604 + t * p;
  p = -0.1396211168405623 + t * p;
  p = 1.2329951186255526 + t * p;
  return p / (1.0 + 2.0 * x);
}

/** The Maclaurin series of erf, DLMF 7.6.1, for |x| ≤ 1: sixteen terms leave less than 1e-15 of the value. */
function erfSeries(x: number): number {
  const s = x * x;
  let p = -9.063970842808673e-17;
  p = 1.6342614095367152e-15 + s * p;
  p = -2.7835162072109215e-14 + s * p;
  p = 4.4632242632864775e-13 + s * p;
  p = -6.7113668551641105e-12 + s * p;
  p = 9.422759064650411e-11 + s * p;
  p = -1.2290555301717928e-9 + s * p;
  p = 1.4807192815879218e-8 + s * p;
  p = -1.6365844691234924e-7 + s * p;
  p = 1.6462114365889248e-6 + s * p;
  p = -1.492565035840625e-5 + s * p;
  p = 0.00012055332981789664 + s * p;
  p = -0.0008548327023450853 + s * p;
  p = 0.005223977625442188 + s * p;
  p = -0.026866170645131252 + s * p;
  p = 0.11283791670955126 + s * p;
  p = -0.37612638903183754 + s * p;
  p = 1.1283791670955126 + s * p;
  return x * p;
}

/** e^{−x²} with the square split, so that the rounding of x² is not multiplied by its size. */
function gaussian(x: number): number {
  if (x > 28.0) return 0.0;
  const head = Math.floor(x * 16.0) * 0.0625;
  return Math.exp(-head * head) * Math.exp(-(x - head) * (x + head));
}

/**
 * erf(x) = 2/√π ∫₀ˣ e^{−t²} dt, the error function. DLMF 7.2.1. @kernel
 * @example
 * ```ts
 * import { erf } from 'leadline/numeric';
 * console.log(erf(0.5).toPrecision(6));
 * // 0.520500
 * ```
 */
export function erf(x: number): number {
  const a = Math.abs(x);
  if (a <= 1.0) return erfSeries(x);
  const upper = gaussian(a) * scaledUpper(a);
  return x > 0.0 ? 1.0 - upper : upper - 1.0;
}
/**
 * The partial derivative of `erf` in `x`.
 * @example
 * ```ts
 * import { erf_x } from 'leadline/numeric';
 * console.log(erf_x(0.5).toPrecision(6));
 * // 0.878783
 * ```
 */
export function erf_x(x: number): number {
  return TWO_OVER_SQRT_PI * gaussian(Math.abs(x));
}

/**
 * erfc(x) = 1 − erf(x), the complementary error function; the upper tail keeps its relative accuracy. @kernel
 * @example
 * ```ts
 * import { erfc } from 'leadline/numeric';
 * console.log(erfc(5).toPrecision(6));
 * // 1.53746e-12
 * ```
 */
export function erfc(x: number): number {
  if (x > 0.5) return gaussian(x) * scaledUpper(x);
  if (x < -1.0) return 2.0 - gaussian(-x) * scaledUpper(-x);
  return 1.0 - erfSeries(x);
}
/**
 * The partial derivative of `erfc` in `x`.
 * @example
 * ```ts
 * import { erfc_x } from 'leadline/numeric';
 * console.log(erfc_x(5).toPrecision(6));
 * // -1.56709e-11
 * ```
 */
export function erfc_x(x: number): number {
  return -TWO_OVER_SQRT_PI * gaussian(Math.abs(x));
}

/**
 * erfcx(x) = e^{x²} erfc(x), the scaled complementary error function: a tail without its underflow. @kernel
 * @example
 * ```ts
 * import { erfcx } from 'leadline/numeric';
 * console.log(erfcx(10).toPrecision(6));
 * // 0.0561410
 * ```
 */
export function erfcx(x: number): number {
  if (x >= 0.0) return scaledUpper(x);
  if (x < -27.0) return Infinity;
  return 2.0 / gaussian(-x) - scaledUpper(-x);
}

/**
 * d erfcx(x)/dx = 2x erfcx(x) − 2/√π, negative. From 6 on the difference cancels, and its asymptotic series
 * −2/√π Σ_{k≥1} (−1)^{k−1} (2k − 1)!! / (2x²)^k takes over (DLMF 7.12.1).
 * @example
 * ```ts
 * import { erfcx_x } from 'leadline/numeric';
 * console.log(erfcx_x(10).toPrecision(6));
 * // -0.00555931
 * ```
 */
export function erfcx_x(x: number): number {
  if (x < 6.0) return 2.0 * x * erfcx(x) - TWO_OVER_SQRT_PI;
  const s = 0.5 / (x * x);
  let p = 1.0;
  for (let k = 31.0; k > 1.0; k -= 2.0) p = 1.0 - k * s * p;
  return -TWO_OVER_SQRT_PI * s * p;
}
