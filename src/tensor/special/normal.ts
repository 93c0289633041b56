import * as tf from '@tensorflow/tfjs';
import type { ParameterValue } from '../checks.js';
import {
  composedErf,
  composedErfcx,
  composedLogNormalCdf,
  composedNormalCdf,
  composedNormalQuantile,
} from '../composedNormal.js';
import { broadcasting, elementwise } from './operation.js';

const erfOperation = elementwise('erf', (x) => composedErf(x!));

/**
 * The error function.
 *
 * Formula: (2 / √π) ∫₀ˣ exp(−t²) dt, in double precision, rounded once. Shapes: elementwise. Gradient route: (2 / √π) exp(−x²), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { erf } from 'leadline';
 * console.log(erf(tf.scalar(0.5)).dataSync()[0]!.toPrecision(6));
 * // 0.520500
 * ```
 * Source: DLMF section 7.2.
 */
export function erf(x: tf.Tensor): tf.Tensor {
  return erfOperation(x);
}

const erfcOperation = elementwise('erfc', (x) => tf.mul(2, composedNormalCdf(tf.mul(x!, -Math.SQRT2))));

/**
 * The complementary error function, accurate far in the upper tail.
 *
 * Formula: 1 − erf(x), in double precision, rounded once. Shapes: elementwise. Gradient route: −(2 / √π) exp(−x²), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { erfc } from 'leadline';
 * console.log(erfc(tf.scalar(2)).dataSync()[0]!.toPrecision(6));
 * // 0.00467773
 * ```
 * Source: DLMF section 7.2.
 */
export function erfc(x: tf.Tensor): tf.Tensor {
  return erfcOperation(x);
}

const erfcxOperation = elementwise('erfcx', (x) => composedErfcx(x!));

/**
 * The scaled complementary error function, which does not underflow.
 *
 * Formula: exp(x²) erfc(x), in double precision, rounded once. Shapes: elementwise. Gradient route: 2 x erfcx(x) − 2 / √π, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { erfcx } from 'leadline';
 * console.log(erfcx(tf.scalar(10)).dataSync()[0]!.toPrecision(6));
 * // 0.0561410
 * ```
 * Source: Cody, Math. Comp. 23 (1969) 631–637.
 */
export function erfcx(x: tf.Tensor): tf.Tensor {
  return erfcxOperation(x);
}

const normalCdfOperation = elementwise('normalCdf', (x) => composedNormalCdf(x!));

/**
 * The standard normal distribution function.
 *
 * Formula: Φ(x), in double precision, rounded once. Shapes: elementwise. Gradient route: the standard normal density, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { normalCdf } from 'leadline';
 * console.log(normalCdf(tf.scalar(1)).dataSync()[0]!.toPrecision(6));
 * // 0.841345
 * ```
 * Source: DLMF section 7.1, Φ(x) = erfc(−x / √2) / 2.
 */
export function normalCdf(x: tf.Tensor): tf.Tensor {
  return normalCdfOperation(x);
}

const logNormalCdfOperation = elementwise('logNormalCdf', (x) => composedLogNormalCdf(x!));

/**
 * The logarithm of the standard normal distribution function, accurate far in the lower tail.
 *
 * Formula: log Φ(x), in double precision, rounded once. Shapes: elementwise. Gradient route: φ(x) / Φ(x), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logNormalCdf } from 'leadline';
 * console.log(logNormalCdf(tf.scalar(-10)).dataSync()[0]!.toPrecision(6));
 * // -53.2313
 * ```
 * Source: Cody, Math. Comp. 23 (1969) 631–637.
 */
export function logNormalCdf(x: tf.Tensor): tf.Tensor {
  return logNormalCdfOperation(x);
}

const logNormalCdfDerivativeOperation = elementwise('logNormalCdfDerivative');

/**
 * The standard normal density over its distribution function, without the underflow of either.
 *
 * Formula: φ(x) / Φ(x), in double precision, rounded once. Shapes: elementwise. Gradient route: −h(x) (x + h(x)), h the value, once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logNormalCdfDerivative } from 'leadline';
 * console.log(logNormalCdfDerivative(tf.scalar(-100)).dataSync()[0]!.toPrecision(6));
 * // 100.010
 * ```
 * Source: DLMF 7.8.2.
 */
export function logNormalCdfDerivative(x: tf.Tensor): tf.Tensor {
  return logNormalCdfDerivativeOperation(x);
}

const normalQuantileOperation = elementwise('normalQuantile', (x) => composedNormalQuantile(x!));

/**
 * The standard normal quantile function.
 *
 * Formula: Φ⁻¹(x) for x in (0, 1), in double precision, rounded once. Shapes: elementwise. Gradient route: 1 / φ(Φ⁻¹(x)), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { normalQuantile } from 'leadline';
 * console.log(normalQuantile(tf.scalar(0.975)).dataSync()[0]!.toPrecision(6));
 * // 1.95996
 * ```
 * Source: Wichura, Applied Statistics 37 (1988) 477–484, algorithm AS 241.
 */
export function normalQuantile(x: tf.Tensor): tf.Tensor {
  return normalQuantileOperation(x);
}

const normalQuantileFromLogOperation = elementwise('normalQuantileFromLog');

/**
 * The standard normal quantile of a probability known by its logarithm, for tails that underflow.
 *
 * Formula: Φ⁻¹(exp(x)) for x < 0, in double precision, rounded once. Shapes: elementwise. Gradient route: exp(x) / φ(Φ⁻¹(exp(x))), once.
 *
 * @param x - any shape
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { normalQuantileFromLog } from 'leadline';
 * console.log(normalQuantileFromLog(tf.scalar(-1000)).dataSync()[0]!.toPrecision(6));
 * // -44.6157
 * ```
 * Source: Wichura, Applied Statistics 37 (1988) 477–484, with an asymptotic start beyond its range.
 */
export function normalQuantileFromLog(x: tf.Tensor): tf.Tensor {
  return normalQuantileFromLogOperation(x);
}

const owenTOperation = broadcasting('owenT');

/**
 * Owen's function, the share of a normal pair in a wedge; the distribution function of the skew normal law.
 *
 * Formula: (1 / 2π) ∫₀^a exp(−h² (1 + t²) / 2) / (1 + t²) dt, in double precision, rounded once.
 * Shapes: the arguments broadcast from the right. Gradient route: the partial derivative in each argument, once.
 *
 * @param h - any number
 * @param a - any number
 * @throws ParameterError when an argument is neither a tensor nor numbers.
 * @throws ShapeError when the shapes do not broadcast.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { owenT } from 'leadline';
 * console.log(owenT(tf.scalar(1), 2).dataSync()[0]!.toPrecision(6));
 * // 0.0784682
 * ```
 * Source: Owen, Annals of Mathematical Statistics 27 (1956) 1075–1090.
 */
export function owenT(h: ParameterValue, a: ParameterValue): tf.Tensor {
  return owenTOperation(h, a);
}
