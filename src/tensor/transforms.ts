import * as tf from '@tensorflow/tfjs';
import * as numeric from '../numeric/transforms.js';
import { composedExp, composedLogOdds } from './composedMath.js';
import { type KernelName, kernel, type Transform } from './formula.js';

function transform(
  name: KernelName,
  value: (v: number) => number,
  derivative: (v: number) => number,
  composed: (v: tf.Tensor) => tf.Tensor,
): Transform {
  const { index, partials } = kernel(name, composed).compiled!;
  return { name, compiled: { index, derivative: partials[0]! }, value, derivative, composed };
}

/** A log variance to a standard deviation, exp(v / 2). */
export const expHalf = transform('expHalf', numeric.expHalf, numeric.expHalf_v, (v) =>
  composedExp(tf.mul(v, 0.5)),
);

/** A logarithm to what it is the logarithm of, exp(v). */
export const exponentiated = transform('exponential', numeric.exponential, numeric.exponential_v, (v) =>
  composedExp(v),
);

/** A variance to a standard deviation, √v. */
export const squareRoot = transform('squareRoot', numeric.squareRoot, numeric.squareRoot_v, (v) =>
  tf.sqrt(v),
);

/** A precision to a standard deviation, 1 / √v. */
export const inverseSquareRoot = transform(
  'inverseSquareRoot',
  numeric.inverseSquareRoot,
  numeric.inverseSquareRoot_v,
  (v) => tf.div(1, tf.sqrt(v)),
);

/** A scale to a rate or a rate to a scale, 1 / v. */
export const reciprocal = transform('reciprocal', numeric.reciprocal, numeric.reciprocal_v, (v) =>
  tf.div(1, v),
);

/** A log rate to a scale, exp(−v). */
export const exponentialReciprocal = transform(
  'exponentialReciprocal',
  numeric.exponentialReciprocal,
  numeric.exponentialReciprocal_v,
  (v) => composedExp(tf.neg(v)),
);

/** Degrees of freedom to a gamma's shape, v / 2. */
export const half = transform('half', numeric.half, numeric.half_v, (v) => tf.mul(v, 0.5));

/** A probability to its log odds, log(v / (1 − v)). */
export const logOdds = transform('logOdds', numeric.logOdds, numeric.logOdds_v, (v) => composedLogOdds(v));

/** A probability to its logarithm. */
export const logarithm = transform('logarithm', numeric.logarithm, numeric.logarithm_v, (v) => tf.log(v));
