import type * as tf from '@tensorflow/tfjs';
import type { ParameterValue } from '../checks.js';
import { composedLogGamma } from '../composedMath.js';
import { broadcasting, elementwise } from './operation.js';

const logGammaOperation = elementwise('logGamma', (x) => composedLogGamma(x!));

/**
 * The logarithm of the absolute value of the gamma function.
 *
 * Formula: log |Γ(x)|, in double precision, rounded once. Shapes: elementwise. Gradient route: digamma(x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logGamma } from 'leadline';
 * console.log(logGamma(tf.scalar(5)).dataSync()[0]!.toPrecision(6));
 * // 3.17805
 * ```
 * Source: DLMF section 5.2.
 */
export function logGamma(x: tf.Tensor): tf.Tensor {
  return logGammaOperation(x);
}

const logGamma1pOperation = elementwise('logGamma1p');

/**
 * The logarithm of the gamma function next to its zero at 1, accurate for small x.
 *
 * Formula: log Γ(1 + x) for x > −1, in double precision, rounded once. Shapes: elementwise. Gradient route: digamma(1 + x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logGamma1p } from 'leadline';
 * console.log(logGamma1p(tf.scalar(1e-6)).dataSync()[0]!.toPrecision(6));
 * // -5.77215e-7
 * ```
 * Source: DLMF 5.7.3.
 */
export function logGamma1p(x: tf.Tensor): tf.Tensor {
  return logGamma1pOperation(x);
}

const digammaOperation = elementwise('digamma');

/**
 * The logarithmic derivative of the gamma function.
 *
 * Formula: Γ′(x) / Γ(x), in double precision, rounded once. Shapes: elementwise. Gradient route: the trigamma function, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { digamma } from 'leadline';
 * console.log(digamma(tf.scalar(1)).dataSync()[0]!.toPrecision(6));
 * // -0.577216
 * ```
 * Source: DLMF section 5.2.
 */
export function digamma(x: tf.Tensor): tf.Tensor {
  return digammaOperation(x);
}

const trigammaOperation = elementwise('trigamma');

/**
 * The derivative of the digamma function.
 *
 * Formula: d² log Γ(x) / dx², in double precision, rounded once. Shapes: elementwise. Gradient route: the tetragamma function, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { trigamma } from 'leadline';
 * console.log(trigamma(tf.scalar(1)).dataSync()[0]!.toPrecision(6));
 * // 1.64493
 * ```
 * Source: DLMF section 5.15.
 */
export function trigamma(x: tf.Tensor): tf.Tensor {
  return trigammaOperation(x);
}

const digammaDifferenceOperation = broadcasting('digammaDifference');

/**
 * A difference of two digamma functions, accurate also for a small step, where the two would cancel.
 *
 * Formula: ψ(a + b) − ψ(a), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - where the step starts, above 0
 * @param b - its length, at least 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { digammaDifference } from 'leadline';
 * console.log(digammaDifference(tf.scalar(3), 1e-8).dataSync()[0]!.toPrecision(6));
 * // 3.94934e-9
 * ```
 * Source: DLMF 5.5.2 and 5.11.2.
 */
export function digammaDifference(a: ParameterValue, b: ParameterValue): tf.Tensor {
  return digammaDifferenceOperation(a, b);
}

const stirlingErrorOperation = elementwise('stirlingError');

/**
 * What Stirling's approximation of the factorial leaves: the part of a log density that is small.
 *
 * Formula: log Γ(x + 1) − (x + ½) log x + x − ½ log 2π for x > 0, in double precision, rounded once. Shapes: elementwise. Gradient route: ψ(x) + 1 / (2x) − log x, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { stirlingError } from 'leadline';
 * console.log(stirlingError(tf.scalar(10)).dataSync()[0]!.toPrecision(6));
 * // 0.00833056
 * ```
 * Source: Loader, Fast and accurate computation of binomial probabilities (2000), section 3.
 */
export function stirlingError(x: tf.Tensor): tf.Tensor {
  return stirlingErrorOperation(x);
}

const devianceOperation = broadcasting('deviance');

/**
 * Half the deviance of a Poisson observation: how far x lies from m, accurate where they are close.
 *
 * Formula: x log(x / m) + m − x, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param x - an observed rate, at least 0
 * @param m - an expected one, at least 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { deviance } from 'leadline';
 * console.log(deviance(tf.scalar(5), 5.001).dataSync()[0]!.toPrecision(6));
 * // 9.99722e-8
 * ```
 * Source: Loader, Fast and accurate computation of binomial probabilities (2000), section 2.
 */
export function deviance(x: ParameterValue, m: ParameterValue): tf.Tensor {
  return devianceOperation(x, m);
}
