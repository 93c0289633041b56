import { HALF_LOG_2PI, SQRT_2PI } from './constants.js';

// The modified Bessel functions of orders 0 and 1 and their ratio, which normalize the von Mises law. Below 30
// the power series, positive terms; from 30 on expansions in 1/x, whose smallest term is below 1e-16 there.

/** Σ (x²/4)^k / (k!)² = I₀(x), left by `powerSeries`. */
let sum0: number = 0.0;
/** Σ (x²/4)^k / (k! (k + 1)!) = I₁(x) / (x/2). */
let sum1: number = 0.0;
/** I₀(x) − 1. */
let above: number = 0.0;

/** DLMF 10.25.2. */
function powerSeries(x: number): void {
  const q = 0.25 * x * x;
  let term = 1.0;
  let k = 0.0;
  above = 0.0;
  sum1 = 1.0;
  while (term > 1e-17 * sum1) {
    k += 1.0;
    term *= q / (k * k);
    above += term;
    sum1 += term / (k + 1.0);
  }
  sum0 = 1.0 + above;
}

/** √(2πx) e^−x I₀(x) in r = 1/x, DLMF 10.40.1. */
function expansion0(r: number): number {
  let p = 50069589.531988926;
  p = 6252951.493434797 + r * p;
  p = 832859.3040162893 + r * p;
  p = 118838.42625678325 + r * p;
  p = 18257.755474293175 + r * p;
  p = 3038.090510922384 + r * p;
  p = 551.3358961220206 + r * p;
  p = 110.01714026924674 + r * p;
  p = 24.380529699556064 + r * p;
  p = 6.074042001273483 + r * p;
  p = 1.7277275025844574 + r * p;
  p = 0.5725014209747314 + r * p;
  p = 0.22710800170898438 + r * p;
  p = 0.112152099609375 + r * p;
  p = 0.0732421875 + r * p;
  p = 0.0703125 + r * p;
  p = 0.125 + r * p;
  p = 1.0 + r * p;
  return p;
}

/** √(2πx) e^−x I₁(x) in r = 1/x. */
function expansion1(r: number): number {
  let p = -53104110.10968523;
  p = -6656367.718817688 + r * p;
  p = -890297.8767070678 + r * p;
  p = -127641.2726461746 + r * p;
  p = -19718.37591223663 + r * p;
  p = -3302.2722944808525 + r * p;
  p = -603.8440767050702 + r * p;
  p = -121.59789187653587 + r * p;
  p = -27.248827311268542 + r * p;
  p = -6.883914268109947 + r * p;
  p = -1.993531733751297 + r * p;
  p = -0.6765925884246826 + r * p;
  p = -0.2775764465332031 + r * p;
  p = -0.144195556640625 + r * p;
  p = -0.1025390625 + r * p;
  p = -0.1171875 + r * p;
  p = -0.375 + r * p;
  p = 1.0 + r * p;
  return p;
}

/**
 * 1 − I₁(x)/I₀(x) in r = 1/x. The coefficients follow from the ratio's equation A′ = 1 − A/x − A² (DLMF 10.29.2),
 * solved term by term, so that nothing cancels.
 */
function expansionComplement(r: number): number {
  let p = 7546911569.366995;
  p = 836956449.7799761 + r * p;
  p = 98252781.81546783 + r * p;
  p = 12251067.63286615 + r * p;
  p = 1628749.4532470703 + r * p;
  p = 231884.6359563172 + r * p;
  p = 35528.87744140625 + r * p;
  p = 5892.0457146167755 + r * p;
  p = 1064.67822265625 + r * p;
  p = 211.27614974975586 + r * p;
  p = 46.478515625 + r * p;
  p = 11.466461181640625 + r * p;
  p = 3.21875 + r * p;
  p = 1.0478515625 + r * p;
  p = 0.40625 + r * p;
  p = 0.1953125 + r * p;
  p = 0.125 + r * p;
  p = 0.125 + r * p;
  p = 0.5 + r * p;
  return r * p;
}

/** The derivative in x of the ratio, from the same coefficients. */
function expansionSlope(r: number): number {
  let p = 143391319817.9729;
  p = 15065216096.039572 + r * p;
  p = 1670297290.8629532 + r * p;
  p = 196017082.1258584 + r * p;
  p = 24431241.798706055 + r * p;
  p = 3246384.9033884406 + r * p;
  p = 461875.40673828125 + r * p;
  p = 70704.5485754013 + r * p;
  p = 11711.46044921875 + r * p;
  p = 2112.7614974975586 + r * p;
  p = 418.306640625 + r * p;
  p = 91.731689453125 + r * p;
  p = 22.53125 + r * p;
  p = 6.287109375 + r * p;
  p = 2.03125 + r * p;
  p = 0.78125 + r * p;
  p = 0.375 + r * p;
  p = 0.25 + r * p;
  p = 0.5 + r * p;
  return r * r * p;
}

/**
 * e^−|x| I₀(x). @kernel
 * @example
 * ```ts
 * import { besselI0e } from 'leadline/numeric';
 * console.log(besselI0e(2).toPrecision(6));
 * // 0.308508
 * ```
 */
export function besselI0e(x: number): number {
  const s = Math.abs(x);
  if (s < 30.0) {
    powerSeries(s);
    return Math.exp(-s) * sum0;
  }
  return expansion0(1.0 / s) / (SQRT_2PI * Math.sqrt(s));
}
/**
 * The partial derivative of `besselI0e` in `x`.
 * @example
 * ```ts
 * import { besselI0e_x } from 'leadline/numeric';
 * console.log(besselI0e_x(2).toPrecision(6));
 * // -0.0932390
 * ```
 */
export function besselI0e_x(x: number): number {
  const slope = besselI0e(x) * besselRatioComplement(Math.abs(x));
  return x < 0.0 ? slope : -slope;
}

/**
 * log(e^−|x| I₀(x)), zero at 0 and negative elsewhere. @kernel
 * @example
 * ```ts
 * import { logBesselI0e } from 'leadline/numeric';
 * console.log(logBesselI0e(2).toPrecision(6));
 * // -1.17601
 * ```
 */
export function logBesselI0e(x: number): number {
  const s = Math.abs(x);
  if (s < 30.0) {
    powerSeries(s);
    return Math.log1p(above) - s;
  }
  return Math.log(expansion0(1.0 / s)) - HALF_LOG_2PI - 0.5 * Math.log(s);
}
/**
 * The partial derivative of `logBesselI0e` in `x`.
 * @example
 * ```ts
 * import { logBesselI0e_x } from 'leadline/numeric';
 * console.log(logBesselI0e_x(2).toPrecision(6));
 * // -0.302225
 * ```
 */
export function logBesselI0e_x(x: number): number {
  const slope = besselRatioComplement(Math.abs(x));
  return x < 0.0 ? slope : -slope;
}

/**
 * e^−|x| I₁(x), an odd function. @kernel
 * @example
 * ```ts
 * import { besselI1e } from 'leadline/numeric';
 * console.log(besselI1e(2).toPrecision(6));
 * // 0.215269
 * ```
 */
export function besselI1e(x: number): number {
  const s = Math.abs(x);
  if (s < 30.0) {
    powerSeries(s);
    return 0.5 * x * Math.exp(-s) * sum1;
  }
  const value = expansion1(1.0 / s) / (SQRT_2PI * Math.sqrt(s));
  return x < 0.0 ? -value : value;
}
/**
 * e^−|x| (I₀ − I₁/x − |I₁|); it crosses zero near 1.545, where only its absolute error is small.
 * @example
 * ```ts
 * import { besselI1e_x } from 'leadline/numeric';
 * console.log(besselI1e_x(2).toPrecision(6));
 * // -0.0143956
 * ```
 */
export function besselI1e_x(x: number): number {
  const s = Math.abs(x);
  if (s < 30.0) {
    powerSeries(s);
    return Math.exp(-s) * (sum0 - 0.5 * sum1 * (1.0 + s));
  }
  return besselI0e(s) * (besselRatioComplement(s) - besselRatio(s) / s);
}

/**
 * A(x) = I₁(x) / I₀(x) for x ≥ 0, the mean resultant length of a von Mises law of concentration x. @kernel
 * @example
 * ```ts
 * import { besselRatio } from 'leadline/numeric';
 * console.log(besselRatio(2).toPrecision(6));
 * // 0.697775
 * ```
 */
export function besselRatio(x: number): number {
  if (x < 30.0) {
    powerSeries(x);
    return (0.5 * x * sum1) / sum0;
  }
  return 1.0 - expansionComplement(1.0 / x);
}
/**
 * A′(x) = 1 − A/x − A², ½ at 0 and 1/(2x²) for large x.
 * @example
 * ```ts
 * import { besselRatio_x } from 'leadline/numeric';
 * console.log(besselRatio_x(2).toPrecision(6));
 * // 0.164223
 * ```
 */
export function besselRatio_x(x: number): number {
  if (x < 30.0) {
    powerSeries(x);
    const half = (0.5 * sum1) / sum0;
    return 1.0 - half - x * x * half * half;
  }
  return expansionSlope(1.0 / x);
}

/**
 * 1 − A(x), the circular variance, which goes like 1/(2x) for large x. @kernel
 * @example
 * ```ts
 * import { besselRatioComplement } from 'leadline/numeric';
 * console.log(besselRatioComplement(1e6).toPrecision(6));
 * // 5.00000e-7
 * ```
 */
export function besselRatioComplement(x: number): number {
  if (x < 30.0) {
    powerSeries(x);
    return 1.0 - (0.5 * x * sum1) / sum0;
  }
  return expansionComplement(1.0 / x);
}
/**
 * The partial derivative of `besselRatioComplement` in `x`.
 * @example
 * ```ts
 * import { besselRatioComplement_x } from 'leadline/numeric';
 * console.log(besselRatioComplement_x(1e6).toPrecision(6));
 * // -5.00000e-13
 * ```
 */
export function besselRatioComplement_x(x: number): number {
  return -besselRatio_x(x);
}
