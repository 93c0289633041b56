import * as tf from '@tensorflow/tfjs';
import { applyFormula } from './apply.js';
import { requireTensor } from './checks.js';
import { composedLogGamma, composedSigmoid, composedSoftplus } from './composedMath.js';
import {
  composedErf,
  composedErfcx,
  composedLogNormalCdf,
  composedNormalCdf,
  composedNormalQuantile,
} from './composedNormal.js';
import { type KernelName, kernel } from './formula.js';
import { noComposedForm } from './noComposedForm.js';

/** A one-argument kernel as an operation on tensors. */
function elementwise(
  name: KernelName,
  composed: (...x: tf.Tensor[]) => tf.Tensor,
): (x: tf.Tensor) => tf.Tensor {
  const formula = kernel(name, composed);
  return (x) => {
    requireTensor(name, 'x', x);
    return applyFormula(name, formula, [
      { shape: x.shape, source: x, transform: undefined, constant: false },
    ]);
  };
}

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

const digammaOperation = elementwise('digamma', noComposedForm('digamma'));

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

const normalQuantileFromLogOperation = elementwise(
  'normalQuantileFromLog',
  noComposedForm('normalQuantileFromLog'),
);

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
