import type * as tf from '@tensorflow/tfjs';
import type { ParameterValue } from '../checks.js';
import { broadcasting } from './operation.js';

const logBetaOperation = broadcasting('logBeta');

/**
 * The logarithm of the beta function, without the cancellation of its three gamma functions.
 *
 * Formula: log Γ(a) + log Γ(b) − log Γ(a + b), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logBeta } from 'leadline';
 * console.log(logBeta(tf.scalar(2), 1e8).dataSync()[0]!.toPrecision(6));
 * // -36.8414
 * ```
 * Source: DLMF 5.12.1.
 */
export function logBeta(a: ParameterValue, b: ParameterValue): tf.Tensor {
  return logBetaOperation(a, b);
}

const betaIOperation = broadcasting('betaI');

/**
 * The regularized incomplete beta function: the distribution function of a beta variable.
 *
 * Formula: I(x; a, b) = ∫₀ˣ t^(a−1) (1 − t)^(b−1) dt / B(a, b), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @param x - point, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { betaI } from 'leadline';
 * console.log(betaI(tf.scalar(2), 3, 0.1).dataSync()[0]!.toPrecision(6));
 * // 0.0523000
 * ```
 * Source: DLMF 8.17.2; Didonato and Morris, ACM Trans. Math. Softw. 18 (1992) 360–373.
 */
export function betaI(a: ParameterValue, b: ParameterValue, x: ParameterValue): tf.Tensor {
  return betaIOperation(a, b, x);
}

const betaIComplementOperation = broadcasting('betaIComplement');

/**
 * One minus the regularized incomplete beta function: the survival function of a beta variable.
 *
 * Formula: 1 − I(x; a, b), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @param x - point, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { betaIComplement } from 'leadline';
 * console.log(betaIComplement(tf.scalar(2), 30, 0.9).dataSync()[0]!.toPrecision(6));
 * // 2.80002e-29
 * ```
 * Source: DLMF 8.17.2; Didonato and Morris, ACM Trans. Math. Softw. 18 (1992) 360–373.
 */
export function betaIComplement(a: ParameterValue, b: ParameterValue, x: ParameterValue): tf.Tensor {
  return betaIComplementOperation(a, b, x);
}

const logBetaIOperation = broadcasting('logBetaI');

/**
 * The logarithm of the regularized incomplete beta function, right where that underflows.
 *
 * Formula: log I(x; a, b), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @param x - point, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logBetaI } from 'leadline';
 * console.log(logBetaI(tf.scalar(200), 3, 0.001).dataSync()[0]!.toPrecision(6));
 * // -1371.63
 * ```
 * Source: DLMF 8.17.2; Didonato and Morris, ACM Trans. Math. Softw. 18 (1992) 360–373.
 */
export function logBetaI(a: ParameterValue, b: ParameterValue, x: ParameterValue): tf.Tensor {
  return logBetaIOperation(a, b, x);
}

const logBetaIComplementOperation = broadcasting('logBetaIComplement');

/**
 * The logarithm of the survival function of a beta variable, right where that underflows.
 *
 * Formula: log(1 − I(x; a, b)), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @param x - point, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logBetaIComplement } from 'leadline';
 * console.log(logBetaIComplement(tf.scalar(2), 300, 0.9).dataSync()[0]!.toPrecision(6));
 * // -685.173
 * ```
 * Source: DLMF 8.17.2; Didonato and Morris, ACM Trans. Math. Softw. 18 (1992) 360–373.
 */
export function logBetaIComplement(a: ParameterValue, b: ParameterValue, x: ParameterValue): tf.Tensor {
  return logBetaIComplementOperation(a, b, x);
}

const betaIInverseOperation = broadcasting('betaIInverse');

/**
 * The quantile of a beta variable.
 *
 * Formula: the x with I(x; a, b) = p, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @param p - share, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { betaIInverse } from 'leadline';
 * console.log(betaIInverse(tf.scalar(2), 3, 0.1).dataSync()[0]!.toPrecision(6));
 * // 0.142559
 * ```
 * Source: DLMF 8.17.2; Didonato and Morris, ACM Trans. Math. Softw. 18 (1992) 360–373.
 */
export function betaIInverse(a: ParameterValue, b: ParameterValue, p: ParameterValue): tf.Tensor {
  return betaIInverseOperation(a, b, p);
}

const betaIInverseComplementOperation = broadcasting('betaIInverseComplement');

/**
 * One minus the quantile of a beta variable, accurate where the quantile is near 1.
 *
 * Formula: 1 − x for the x with I(x; a, b) = p, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - first shape, above 0
 * @param b - second shape, above 0
 * @param p - share, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { betaIInverseComplement } from 'leadline';
 * console.log(betaIInverseComplement(tf.scalar(30), 0.1, 0.5).dataSync()[0]!.toPrecision(6));
 * // 0.0000200798
 * ```
 * Source: DLMF 8.17.2; Didonato and Morris, ACM Trans. Math. Softw. 18 (1992) 360–373.
 */
export function betaIInverseComplement(a: ParameterValue, b: ParameterValue, p: ParameterValue): tf.Tensor {
  return betaIInverseComplementOperation(a, b, p);
}
