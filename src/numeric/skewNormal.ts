import { HALF_LOG_2PI, PI, SQRT_2_OVER_PI, SQRT_2PI, SQRT_HALF } from './constants.js';
import { erf, erfc, erfcx } from './errorFunction.js';
import { thinTail } from './skewNormalCore.js';

// The distribution function of the skew normal law with density 2 φ(z) Φ(a z), a of either sign. Everything comes
// from its thin tail G(z, a) = F(−z; a) for z, a ≥ 0, by F(z; a) − F(−z; a) = erf(z/√2) and F(z; −a) = 1 − F(−z; a).
// Source: Azzalini (1985), "A class of distributions which includes the normal ones", section 2.

/** e^{−(1 + a²) z² / 2}. */
function bell(z: number, shape: number): number {
  return Math.exp(-0.5 * (1.0 + shape * shape) * z * z);
}

/** G(z, a). */
function thin(z: number, a: number): number {
  return (bell(z, a) * thinTail(z, a)) / (SQRT_2PI * Math.sqrt(1.0 + a * a));
}

/** G(z, a) / (2 Φ(−z)), at most ½. */
function thinShare(z: number, a: number): number {
  const scaled = thinTail(z, a) / (SQRT_2PI * Math.sqrt(1.0 + a * a));
  return (Math.exp(-0.5 * a * a * z * z) * scaled) / erfcx(z * SQRT_HALF);
}

/**
 * F(z; a) = Φ(z) − 2 T(z, a), with relative accuracy in the lower tail, T being Owen's function.
 * @example
 * ```ts
 * import { skewNormalCdfStandard } from 'leadline/numeric';
 * console.log(skewNormalCdfStandard(-1, 2).toPrecision(6));
 * // 0.00171888
 * ```
 */
export function skewNormalCdfStandard(z: number, shape: number): number {
  if (!(Math.abs(z) < Infinity)) return z > 0.0 ? 1.0 : z < 0.0 ? 0.0 : NaN;
  if (shape >= 0.0) return z < 0.0 ? thin(-z, shape) : erf(z * SQRT_HALF) + thin(z, shape);
  return z < 0.0 ? erfc(-z * SQRT_HALF) * (1.0 - thinShare(-z, -shape)) : 1.0 - thin(z, -shape);
}
/**
 * 2 φ(z) Φ(a z).
 * @example
 * ```ts
 * import { skewNormalCdfStandard_z } from 'leadline/numeric';
 * console.log(skewNormalCdfStandard_z(-1, 2).toPrecision(6));
 * // 0.0110097
 * ```
 */
export function skewNormalCdfStandard_z(z: number, shape: number): number {
  if (!(Math.abs(z) < Infinity)) return isNaN(z) ? NaN : 0.0;
  const t = shape * z * SQRT_HALF;
  if (t < 0.0) return (bell(z, shape) * erfcx(-t)) / SQRT_2PI;
  return (Math.exp(-0.5 * z * z) * (1.0 + erf(t))) / SQRT_2PI;
}
/**
 * The partial derivative of `skewNormalCdfStandard` in `shape`.
 * @example
 * ```ts
 * import { skewNormalCdfStandard_shape } from 'leadline/numeric';
 * console.log(skewNormalCdfStandard_shape(-1, 2).toPrecision(6));
 * // -0.00522569
 * ```
 */
export function skewNormalCdfStandard_shape(z: number, shape: number): number {
  return -bell(z, shape) / (PI * (1.0 + shape * shape));
}

/**
 * 1 − F(z; a) = F(−z; −a).
 * @example
 * ```ts
 * import { skewNormalSurvivalStandard } from 'leadline/numeric';
 * console.log(skewNormalSurvivalStandard(2, 3).toPrecision(6));
 * // 0.0455003
 * ```
 */
export function skewNormalSurvivalStandard(z: number, shape: number): number {
  return skewNormalCdfStandard(-z, -shape);
}
/**
 * The partial derivative of `skewNormalSurvivalStandard` in `z`.
 * @example
 * ```ts
 * import { skewNormalSurvivalStandard_z } from 'leadline/numeric';
 * console.log(skewNormalSurvivalStandard_z(2, 3).toPrecision(6));
 * // -0.107982
 * ```
 */
export function skewNormalSurvivalStandard_z(z: number, shape: number): number {
  return -skewNormalCdfStandard_z(z, shape);
}
/**
 * The partial derivative of `skewNormalSurvivalStandard` in `shape`.
 * @example
 * ```ts
 * import { skewNormalSurvivalStandard_shape } from 'leadline/numeric';
 * console.log(skewNormalSurvivalStandard_shape(2, 3).toPrecision(6));
 * // 6.56086e-11
 * ```
 */
export function skewNormalSurvivalStandard_shape(z: number, shape: number): number {
  return -skewNormalCdfStandard_shape(z, shape);
}

/**
 * log F(z; a), right where F underflows and where it is near 1.
 * @example
 * ```ts
 * import { skewNormalLogCdfStandard } from 'leadline/numeric';
 * console.log(skewNormalLogCdfStandard(-20, 2).toPrecision(6));
 * // -1009.44
 * ```
 */
export function skewNormalLogCdfStandard(z: number, shape: number): number {
  if (!(Math.abs(z) < Infinity)) return z > 0.0 ? 0.0 : z < 0.0 ? -Infinity : NaN;
  if (shape >= 0.0 && z < 0.0) {
    const c = 1.0 + shape * shape;
    return Math.log(thinTail(-z, shape)) - 0.5 * c * z * z - HALF_LOG_2PI - 0.5 * Math.log(c);
  }
  const above = skewNormalCdfStandard(-z, -shape);
  if (above < 0.5) return Math.log1p(-above);
  if (z >= 0.0) return Math.log(skewNormalCdfStandard(z, shape));
  return Math.log(erfcx(-z * SQRT_HALF)) - 0.5 * z * z + Math.log1p(-thinShare(-z, -shape));
}
/**
 * The partial derivative of `skewNormalLogCdfStandard` in `z`.
 * @example
 * ```ts
 * import { skewNormalLogCdfStandard_z } from 'leadline/numeric';
 * console.log(skewNormalLogCdfStandard_z(-20, 2).toPrecision(6));
 * // 100.100
 * ```
 */
export function skewNormalLogCdfStandard_z(z: number, shape: number): number {
  if (!(Math.abs(z) < Infinity)) return z > 0.0 ? 0.0 : z < 0.0 ? Infinity : NaN;
  if (z >= 0.0) return skewNormalCdfStandard_z(z, shape) / skewNormalCdfStandard(z, shape);
  if (shape >= 0.0) {
    return (Math.sqrt(1.0 + shape * shape) * erfcx(-shape * z * SQRT_HALF)) / thinTail(-z, shape);
  }
  const share = 1.0 - thinShare(-z, -shape);
  return (1.0 + erf(shape * z * SQRT_HALF)) / (SQRT_2PI * erfcx(-z * SQRT_HALF) * share);
}
/**
 * The partial derivative of `skewNormalLogCdfStandard` in `shape`.
 * @example
 * ```ts
 * import { skewNormalLogCdfStandard_shape } from 'leadline/numeric';
 * console.log(skewNormalLogCdfStandard_shape(-20, 2).toPrecision(6));
 * // -801.299
 * ```
 */
export function skewNormalLogCdfStandard_shape(z: number, shape: number): number {
  if (!(Math.abs(z) < Infinity)) return z === -Infinity && shape >= 0.0 ? -Infinity : 0.0;
  if (z >= 0.0) return skewNormalCdfStandard_shape(z, shape) / skewNormalCdfStandard(z, shape);
  const c = 1.0 + shape * shape;
  if (shape >= 0.0) return -SQRT_2_OVER_PI / (Math.sqrt(c) * thinTail(-z, shape));
  const share = 1.0 - thinShare(-z, -shape);
  return -Math.exp(-0.5 * shape * shape * z * z) / (PI * c * erfcx(-z * SQRT_HALF) * share);
}

/**
 * log(1 − F(z; a)) = log F(−z; −a).
 * @example
 * ```ts
 * import { skewNormalLogSurvivalStandard } from 'leadline/numeric';
 * console.log(skewNormalLogSurvivalStandard(20, -2).toPrecision(6));
 * // -1009.44
 * ```
 */
export function skewNormalLogSurvivalStandard(z: number, shape: number): number {
  return skewNormalLogCdfStandard(-z, -shape);
}
/**
 * The partial derivative of `skewNormalLogSurvivalStandard` in `z`.
 * @example
 * ```ts
 * import { skewNormalLogSurvivalStandard_z } from 'leadline/numeric';
 * console.log(skewNormalLogSurvivalStandard_z(20, -2).toPrecision(6));
 * // -100.100
 * ```
 */
export function skewNormalLogSurvivalStandard_z(z: number, shape: number): number {
  return -skewNormalLogCdfStandard_z(-z, -shape);
}
/**
 * The partial derivative of `skewNormalLogSurvivalStandard` in `shape`.
 * @example
 * ```ts
 * import { skewNormalLogSurvivalStandard_shape } from 'leadline/numeric';
 * console.log(skewNormalLogSurvivalStandard_shape(20, -2).toPrecision(6));
 * // 801.299
 * ```
 */
export function skewNormalLogSurvivalStandard_shape(z: number, shape: number): number {
  return -skewNormalLogCdfStandard_shape(-z, -shape);
}
