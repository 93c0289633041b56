import * as tf from '@tensorflow/tfjs';
import type { ParameterValue } from '../checks.js';
import { composedSigmoid, composedSoftplus, when } from '../composedMath.js';
import { composedExpm1, composedLog1pmx } from '../composedRemainders.js';
import { broadcasting, elementwise } from './operation.js';

const softplusOperation = elementwise('softplus', (x) => composedSoftplus(x!));

/**
 * log(1 + exp(x)), the smooth ramp that keeps scales positive.
 *
 * Formula: log(1 + exp(x)), in double precision, rounded once. Shapes: elementwise. Gradient route: sigmoid(x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { softplus } from 'leadline';
 * console.log(softplus(tf.scalar(0)).dataSync()[0]!.toPrecision(6));
 * // 0.693147
 * ```
 * Source: Nwankpa et al., arXiv 1811.03378 (2018), section 2.5.
 */
export function softplus(x: tf.Tensor): tf.Tensor {
  return softplusOperation(x);
}

const softplusInverseOperation = elementwise('softplusInverse', (x) =>
  tf.add(x!, tf.log(tf.neg(tf.expm1(tf.neg(x!))))),
);

/**
 * The number whose softplus is x, for starting a positive parameter at a chosen value.
 *
 * Formula: log(exp(x) − 1) for x > 0; NaN below, in double precision, rounded once. Shapes: elementwise. Gradient route: 1 / (1 − exp(−x)), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { softplusInverse } from 'leadline';
 * console.log(softplusInverse(tf.scalar(1)).dataSync()[0]!.toPrecision(6));
 * // 0.541325
 * ```
 * Source: the inverse of softplus.
 */
export function softplusInverse(x: tf.Tensor): tf.Tensor {
  return softplusInverseOperation(x);
}

const sigmoidOperation = elementwise('sigmoid', (x) => composedSigmoid(x!));

/**
 * The logistic function, from log odds to a probability.
 *
 * Formula: 1 / (1 + exp(−x)), in double precision, rounded once. Shapes: elementwise. Gradient route: sigmoid(x) sigmoid(−x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { sigmoid } from 'leadline';
 * console.log(sigmoid(tf.scalar(0)).dataSync()[0]!.toPrecision(6));
 * // 0.500000
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 23.
 */
export function sigmoid(x: tf.Tensor): tf.Tensor {
  return sigmoidOperation(x);
}

const logSigmoidOperation = elementwise('logSigmoid', (x) => tf.neg(composedSoftplus(tf.neg(x!))));

/**
 * The logarithm of a probability given by its log odds, accurate where the probability underflows.
 *
 * Formula: −softplus(−x), in double precision, rounded once. Shapes: elementwise. Gradient route: sigmoid(−x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logSigmoid } from 'leadline';
 * console.log(logSigmoid(tf.scalar(-200)).dataSync()[0]!.toPrecision(6));
 * // -200.000
 * ```
 * Source: by symmetry of softplus.
 */
export function logSigmoid(x: tf.Tensor): tf.Tensor {
  return logSigmoidOperation(x);
}

const log1mexpOperation = elementwise('log1mexp', (x) => tf.log(tf.neg(tf.expm1(x!))));

/**
 * The logarithm of one minus a probability that is known by its logarithm.
 *
 * Formula: log(1 − exp(x)) for x < 0, in double precision, rounded once. Shapes: elementwise. Gradient route: −1 / (exp(−x) − 1), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { log1mexp } from 'leadline';
 * console.log(log1mexp(tf.scalar(-1)).dataSync()[0]!.toPrecision(6));
 * // -0.458675
 * ```
 * Source: Mächler, Accurately computing log(1 − exp(−|a|)) (2012).
 */
export function log1mexp(x: tf.Tensor): tf.Tensor {
  return log1mexpOperation(x);
}

const log1pmxOperation = elementwise('log1pmx', (x) => composedLog1pmx(x!));

/**
 * The logarithm of 1 + x without its linear term, what a series in x starts from at second order.
 *
 * Formula: log(1 + x) − x for x > −1, in double precision, rounded once. Shapes: elementwise. Gradient route: −x / (1 + x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { log1pmx } from 'leadline';
 * console.log(log1pmx(tf.scalar(0.001)).dataSync()[0]!.toPrecision(6));
 * // -4.99667e-7
 * ```
 * Source: DLMF 4.6.4.
 */
export function log1pmx(x: tf.Tensor): tf.Tensor {
  return log1pmxOperation(x);
}

const logAddExpOperation = broadcasting('logAddExp', (a, b) =>
  when(
    tf.greater(a!, b!),
    tf.add(a!, composedSoftplus(tf.sub(b!, a!))),
    tf.add(b!, composedSoftplus(tf.sub(a!, b!))),
  ),
);

/**
 * Adds two numbers that are known by their logarithms.
 *
 * Formula: log(exp(a) + exp(b)), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - a logarithm
 * @param b - another
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logAddExp } from 'leadline';
 * console.log(logAddExp(tf.scalar(-1000), -1001).dataSync()[0]!.toPrecision(6));
 * // -999.687
 * ```
 * Source: Blanchard, Higham and Higham, IMA J. Numer. Anal. 41 (2021) 2311–2330.
 */
export function logAddExp(a: ParameterValue, b: ParameterValue): tf.Tensor {
  return logAddExpOperation(a, b);
}

const logSubExpOperation = broadcasting('logSubExp', (a, b) =>
  tf.add(a!, tf.log(tf.neg(composedExpm1(tf.sub(b!, a!))))),
);

/**
 * Subtracts two numbers that are known by their logarithms.
 *
 * Formula: log(exp(a) − exp(b)) for a > b; NaN below, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - the logarithm to subtract from
 * @param b - a smaller one
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logSubExp } from 'leadline';
 * console.log(logSubExp(tf.scalar(-1000), -1001).dataSync()[0]!.toPrecision(6));
 * // -1000.46
 * ```
 * Source: Mächler, Accurately computing log(1 − exp(−|a|)) (2012).
 */
export function logSubExp(a: ParameterValue, b: ParameterValue): tf.Tensor {
  return logSubExpOperation(a, b);
}
