import type * as tf from '@tensorflow/tfjs';
import { elementwise } from './operation.js';

const besselI0eOperation = elementwise('besselI0e');

/**
 * The scaled modified Bessel function of order 0, which normalizes the von Mises law.
 *
 * Formula: exp(−|x|) I₀(x), in double precision, rounded once. Shapes: elementwise. Gradient route: exp(−|x|) I₁(x) less the sign of x times the value, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { besselI0e } from 'leadline';
 * console.log(besselI0e(tf.scalar(2)).dataSync()[0]!.toPrecision(6));
 * // 0.308508
 * ```
 * Source: DLMF sections 10.25 and 10.40.
 */
export function besselI0e(x: tf.Tensor): tf.Tensor {
  return besselI0eOperation(x);
}

const logBesselI0eOperation = elementwise('logBesselI0e');

/**
 * The logarithm of the scaled modified Bessel function of order 0, accurate at its zero.
 *
 * Formula: log(exp(−|x|) I₀(x)), in double precision, rounded once. Shapes: elementwise. Gradient route: I₁(x) / I₀(x) less the sign of x, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logBesselI0e } from 'leadline';
 * console.log(logBesselI0e(tf.scalar(2)).dataSync()[0]!.toPrecision(6));
 * // -1.17601
 * ```
 * Source: DLMF sections 10.25 and 10.40.
 */
export function logBesselI0e(x: tf.Tensor): tf.Tensor {
  return logBesselI0eOperation(x);
}

const besselI1eOperation = elementwise('besselI1e');

/**
 * The scaled modified Bessel function of order 1.
 *
 * Formula: exp(−|x|) I₁(x), in double precision, rounded once. Shapes: elementwise. Gradient route: exp(−|x|) (I₀(x) − I₁(x) / x) less the sign of x times the value, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { besselI1e } from 'leadline';
 * console.log(besselI1e(tf.scalar(2)).dataSync()[0]!.toPrecision(6));
 * // 0.215269
 * ```
 * Source: DLMF sections 10.25 and 10.40.
 */
export function besselI1e(x: tf.Tensor): tf.Tensor {
  return besselI1eOperation(x);
}

const besselRatioOperation = elementwise('besselRatio');

/**
 * The mean resultant length of a von Mises law with concentration x.
 *
 * Formula: A(x) = I₁(x) / I₀(x) for x ≥ 0, in double precision, rounded once. Shapes: elementwise. Gradient route: 1 − A(x) / x − A(x)², once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { besselRatio } from 'leadline';
 * console.log(besselRatio(tf.scalar(2)).dataSync()[0]!.toPrecision(6));
 * // 0.697775
 * ```
 * Source: DLMF 10.29.2; Mardia and Jupp, Directional Statistics (2000), section 3.5.
 */
export function besselRatio(x: tf.Tensor): tf.Tensor {
  return besselRatioOperation(x);
}

const besselRatioComplementOperation = elementwise('besselRatioComplement');

/**
 * The circular variance of a von Mises law with concentration x, accurate for a large one.
 *
 * Formula: 1 − I₁(x) / I₀(x) for x ≥ 0, in double precision, rounded once. Shapes: elementwise. Gradient route: minus the derivative of the ratio, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { besselRatioComplement } from 'leadline';
 * console.log(besselRatioComplement(tf.scalar(1e6)).dataSync()[0]!.toPrecision(6));
 * // 5.00000e-7
 * ```
 * Source: DLMF 10.29.2; Mardia and Jupp, Directional Statistics (2000), section 3.5.
 */
export function besselRatioComplement(x: tf.Tensor): tf.Tensor {
  return besselRatioComplementOperation(x);
}
