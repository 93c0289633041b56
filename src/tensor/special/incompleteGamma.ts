import type * as tf from '@tensorflow/tfjs';
import type { ParameterValue } from '../checks.js';
import { broadcasting } from './operation.js';

const gammaPOperation = broadcasting('gammaP');

/**
 * The regularized lower incomplete gamma function: the distribution function of a gamma variable.
 *
 * Formula: P(a, x) = ∫₀ˣ t^(a−1) exp(−t) dt / Γ(a), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param x - point, at least 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { gammaP } from 'leadline';
 * console.log(gammaP(tf.scalar(2.5), 2).dataSync()[0]!.toPrecision(6));
 * // 0.450584
 * ```
 * Source: DLMF 8.2.4; Temme, SIAM J. Math. Anal. 10 (1979) 757–766.
 */
export function gammaP(a: ParameterValue, x: ParameterValue): tf.Tensor {
  return gammaPOperation(a, x);
}

const gammaQOperation = broadcasting('gammaQ');

/**
 * The regularized upper incomplete gamma function: the survival function of a gamma variable.
 *
 * Formula: Q(a, x) = ∫ₓ^∞ t^(a−1) exp(−t) dt / Γ(a), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param x - point, at least 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { gammaQ } from 'leadline';
 * console.log(gammaQ(tf.scalar(2.5), 20).dataSync()[0]!.toPrecision(6));
 * // 1.49337e-7
 * ```
 * Source: DLMF 8.2.4; Temme, SIAM J. Math. Anal. 10 (1979) 757–766.
 */
export function gammaQ(a: ParameterValue, x: ParameterValue): tf.Tensor {
  return gammaQOperation(a, x);
}

const logGammaPOperation = broadcasting('logGammaP');

/**
 * The logarithm of the regularized lower incomplete gamma function, right where that underflows.
 *
 * Formula: log P(a, x), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param x - point, at least 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logGammaP } from 'leadline';
 * console.log(logGammaP(tf.scalar(500), 1).dataSync()[0]!.toPrecision(6));
 * // -2612.33
 * ```
 * Source: DLMF 8.2.4; Temme, SIAM J. Math. Anal. 10 (1979) 757–766.
 */
export function logGammaP(a: ParameterValue, x: ParameterValue): tf.Tensor {
  return logGammaPOperation(a, x);
}

const logGammaQOperation = broadcasting('logGammaQ');

/**
 * The logarithm of the regularized upper incomplete gamma function, right where that underflows.
 *
 * Formula: log Q(a, x), in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param x - point, at least 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logGammaQ } from 'leadline';
 * console.log(logGammaQ(tf.scalar(2.5), 1000).dataSync()[0]!.toPrecision(6));
 * // -989.922
 * ```
 * Source: DLMF 8.2.4; Temme, SIAM J. Math. Anal. 10 (1979) 757–766.
 */
export function logGammaQ(a: ParameterValue, x: ParameterValue): tf.Tensor {
  return logGammaQOperation(a, x);
}

const gammaPInverseOperation = broadcasting('gammaPInverse');

/**
 * The quantile of a gamma variable.
 *
 * Formula: the x with P(a, x) = p, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param p - share, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { gammaPInverse } from 'leadline';
 * console.log(gammaPInverse(tf.scalar(2.5), 0.1).dataSync()[0]!.toPrecision(6));
 * // 0.805154
 * ```
 * Source: DLMF section 8.2; the start as in Wilson and Hilferty, PNAS 17 (1931) 684–688.
 */
export function gammaPInverse(a: ParameterValue, p: ParameterValue): tf.Tensor {
  return gammaPInverseOperation(a, p);
}

const gammaQInverseOperation = broadcasting('gammaQInverse');

/**
 * The upper quantile of a gamma variable, from the share above it.
 *
 * Formula: the x with Q(a, x) = q, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param q - share above, from 0 to 1
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { gammaQInverse } from 'leadline';
 * console.log(gammaQInverse(tf.scalar(2.5), 1e-20).dataSync()[0]!.toPrecision(6));
 * // 51.7145
 * ```
 * Source: DLMF section 8.2; the start as in Wilson and Hilferty, PNAS 17 (1931) 684–688.
 */
export function gammaQInverse(a: ParameterValue, q: ParameterValue): tf.Tensor {
  return gammaQInverseOperation(a, q);
}

const logGammaPInverseOperation = broadcasting('logGammaPInverse');

/**
 * The logarithm of the quantile of a gamma variable, right where the quantile or the share underflows.
 *
 * Formula: the log x with log P(a, x) = logP, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param a - shape, above 0
 * @param logP - logarithm of a share, below 0
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logGammaPInverse } from 'leadline';
 * console.log(logGammaPInverse(tf.scalar(0.001), -5).dataSync()[0]!.toPrecision(6));
 * // -5000.58
 * ```
 * Source: DLMF section 8.2; the start as in Wilson and Hilferty, PNAS 17 (1931) 684–688.
 */
export function logGammaPInverse(a: ParameterValue, logP: ParameterValue): tf.Tensor {
  return logGammaPInverseOperation(a, logP);
}
