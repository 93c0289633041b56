import { PI } from './constants.js';
import { digammaSeries } from './stirlingSeries.js';
import { trigamma, trigammaSeries } from './trigamma.js';

/** The positive zero of ψ, in two parts. */
const ROOT: number = 1.4616321449683622;
const ROOT_LOW: number = 9.549995429965697e-17;

/** ψ(2 + t) for |t| ≤ ½: 1 − γ + Σ_{k≥2} (−1)^k (ζ(k) − 1) t^{k−1}. DLMF 5.7.4; coefficients by mpmath at 50 digits. */
function digammaNear2(t: number): number {
  let p = -7.45071178983543e-9;
  p = 1.4901554828365043e-8 + t * p;
  p = -2.980350351465228e-8 + t * p;
  p = 5.960818905125948e-8 + t * p;
  p = -1.1921992596531106e-7 + t * p;
  p = 2.38450502727733e-7 + t * p;
  p = -4.769329867878064e-7 + t * p;
  p = 9.539620338727962e-7 + t * p;
  p = -1.908212716553939e-6 + t * p;
  p = 3.81729326499984e-6 + t * p;
  p = -7.637197637899763e-6 + t * p;
  p = 1.528225940865187e-5 + t * p;
  p = -3.058823630702049e-5 + t * p;
  p = 6.124813505870483e-5 + t * p;
  p = -0.00012271334757848915 + t * p;
  p = 0.0002460865533080483 + t * p;
  p = -0.0004941886041194645 + t * p;
  p = 0.0009945751278180853 + t * p;
  p = -0.0020083928260822143 + t * p;
  p = 0.00407735619794434 + t * p;
  p = -0.008349277381922827 + t * p;
  p = 0.01734306198444914 + t * p;
  p = -0.03692775514336993 + t * p;
  p = 0.08232323371113819 + t * p;
  p = -0.2020569031595943 + t * p;
  p = 0.6449340668482264 + t * p;
  p = 0.42278433509846713 + t * p;
  return p;
}

/** Taylor series at the positive zero, whose first factor carries the relative accuracy; |x − zero| ≤ 0.02. */
function digammaNearRoot(x: number): number {
  const d = x - ROOT - ROOT_LOW;
  let p = 0.022597648232218104;
  p = -0.03316112647484736 + d * p;
  p = 0.04880428816414311 + d * p;
  p = -0.07219956125645471 + d * p;
  p = 0.10782405069126237 + d * p;
  p = -0.16394270544240652 + d * p;
  p = 0.258499760955651 + d * p;
  p = -0.4427631689835921 + d * p;
  p = 0.9676722454476212 + d * p;
  return d * p;
}

/**
 * ψ(x) = d log Γ(x) / dx, the digamma function; NaN at the poles −1, −2, … and −Infinity at 0.
 *
 * Near its positive zero a Taylor series about it; on [1.5, 2.5) a series about 2; below 6 the recurrence
 * ψ(x + 1) = ψ(x) + 1/x leads there; above, the asymptotic series. For x < 0 the reflection
 * ψ(1 − x) − π / tan(πx), which is accurate to double precision in absolute terms: near one of the negative
 * zeros only the absolute error stays small. Source: DLMF 5.5.2, 5.5.4, 5.7.4, 5.11.2. @kernel
 * @example
 * ```ts
 * import { digamma } from 'leadline/numeric';
 * console.log(digamma(2.5).toPrecision(6));
 * // 0.703157
 * ```
 */
export function digamma(x: number): number {
  if (x >= 6.0) return Math.log(x) - 0.5 / x - digammaSeries(x);
  if (x >= 2.5) {
    let sum = 0.0;
    let y = x;
    while (y >= 2.5) {
      y -= 1.0;
      sum += 1.0 / y;
    }
    return digammaNear2(y - 2.0) + sum;
  }
  if (x >= 1.44 && x <= 1.48) return digammaNearRoot(x);
  if (x >= 1.5) return digammaNear2(x - 2.0);
  if (x >= 0.5) return digammaNear2(x - 1.0) - 1.0 / x;
  if (x >= 0.0) return digammaNear2(x) - 1.0 / (1.0 + x) - 1.0 / x;
  if (!(x < 0.0)) return NaN;
  const away = x - Math.floor(x + 0.5);
  if (away === 0.0) return NaN;
  return digamma(1.0 - x) - (PI * Math.cos(PI * away)) / Math.sin(PI * away);
}
/**
 * The partial derivative of `digamma` in `x`.
 * @example
 * ```ts
 * import { digamma_x } from 'leadline/numeric';
 * console.log(digamma_x(2.5).toPrecision(6));
 * // 0.490358
 * ```
 */
export function digamma_x(x: number): number {
  return trigamma(x);
}

/**
 * ψ(x) − log x for x > 0, without the cancellation at large x: −1/(2x) − 1/(12x²) + …; DLMF 5.11.2. @kernel
 * @example
 * ```ts
 * import { digammaMinusLog } from 'leadline/numeric';
 * console.log(digammaMinusLog(2.5).toPrecision(6));
 * // -0.213134
 * ```
 */
export function digammaMinusLog(x: number): number {
  if (x >= 6.0) return -0.5 / x - digammaSeries(x);
  return digamma(x) - Math.log(x);
}
/**
 * The partial derivative of `digammaMinusLog` in `x`.
 * @example
 * ```ts
 * import { digammaMinusLog_x } from 'leadline/numeric';
 * console.log(digammaMinusLog_x(2.5).toPrecision(6));
 * // 0.0903578
 * ```
 */
export function digammaMinusLog_x(x: number): number {
  if (x >= 8.0) return 0.5 / (x * x) + trigammaSeries(x);
  return trigamma(x) - 1.0 / x;
}
