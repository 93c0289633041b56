import * as tf from '@tensorflow/tfjs';
import { positive } from '../support/support.js';
import { composedScaledExponentialIntegral } from '../tensor/composedExponentialIntegral.js';
import { choose, composedExp, composedLog1p, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import type { Distribution, HasEntropy, HasMean, HasMode, HasQuantiles, HasTails } from './distribution.js';
import type { OneOf } from './oneOf.js';
import { atMost, fromZeroOn, onPositive } from './positivePoint.js';
import { quantileRoute } from './routes.js';
import { rateForms, shapeForms } from './scaleAndShape.js';

/** Parameters of {@link gompertz}. */
export type GompertzOptions = OneOf<'shape' | 'logShape'> & OneOf<'rate' | 'logRate'>;

/** An array of Gompertz distributions. */
export interface Gompertz
  extends Distribution<'gompertz', 'pathwise'>,
    HasMean,
    HasMode,
    HasEntropy,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'shape' | 'rate'): tf.Tensor;
}

/** shape (exp(z) − 1), held at 150 or more where no probability is left. */
function hazard(x: tf.Tensor, k: tf.Tensor, r: tf.Tensor): tf.Tensor {
  const z = tf.mul(r, x);
  const near = tf.less(z, 1);
  const small = when(near, z, tf.zerosLike(z));
  const large = when(near, tf.onesLike(z), z);
  const growth = composedExp(atMost(tf.add(large, tf.log(k)), 5.5));
  return when(near, tf.mul(k, composedExpm1(small)), tf.mul(growth, tf.neg(composedExpm1(tf.neg(large)))));
}

function atHazard(h: tf.Tensor, k: tf.Tensor, r: tf.Tensor): tf.Tensor {
  return tf.div(composedLog1p(tf.div(h, k)), r);
}

const make = quantileRoute({
  family: 'gompertz',
  support: positive,
  parameters: { shape: shapeForms, rate: rateForms },
  logDensity: (x, k, r) =>
    fromZeroOn(
      x!,
      (v) => {
        const z = tf.mul(r!, v);
        const steady = tf.add(tf.log(k!), tf.log(r!));
        return tf.add(steady, tf.sub(z, tf.mul(k!, composedExpm1(z))));
      },
      Number.NEGATIVE_INFINITY,
    ),
  draw: { noise: 'exponential', composed: (e, k, r) => atHazard(e!, k!, r!) },
  forms: {
    mean: (k, r) => tf.div(composedScaledExponentialIntegral(k!), r!),
    mode: (k, r) => {
      const below = tf.less(k!, 1);
      const held = when(below, k!, tf.onesLike(k!));
      return tf.div(choose(below, tf.neg(tf.log(held)), 0), r!);
    },
    entropy: (k, r) =>
      tf.sub(tf.sub(1, composedScaledExponentialIntegral(k!)), tf.add(tf.log(k!), tf.log(r!))),
    cdf: (x, k, r) => fromZeroOn(x!, (v) => tf.neg(composedExpm1(tf.neg(hazard(v, k!, r!)))), 0),
    survival: (x, k, r) => fromZeroOn(x!, (v) => composedExp(tf.neg(hazard(v, k!, r!))), 1),
    logCdf: (x, k, r) =>
      onPositive(
        x!,
        (v) => composedLog1mexp(tf.neg(atMost(hazard(v, k!, r!), 110))),
        Number.NEGATIVE_INFINITY,
      ),
    logSurvival: (x, k, r) => fromZeroOn(x!, (v) => tf.neg(tf.mul(k!, composedExpm1(tf.mul(r!, v)))), 0),
    quantile: (p, k, r) => atHazard(tf.neg(composedLog1p(tf.neg(p!))), k!, r!),
    upperQuantile: (p, k, r) => atHazard(tf.neg(tf.log(p!)), k!, r!),
  },
});

/**
 * The Gompertz distribution: lifetimes whose hazard grows exponentially with age, shape · rate · exp(rate · x).
 *
 * Log density: log shape + log rate + rate · x − shape (exp(rate · x) − 1) for x ≥ 0, −∞ below, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars. The variance has no
 * elementary form and is left out.
 * Gradient route: pathwise, draw = log(1 + noise / shape) / rate with exponential noise.
 *
 * @param options - one of `shape`, `logShape`, and one of `rate`, `logRate`
 * @throws ParameterError when a parameter is missing, given twice, not positive and finite, or a logarithm lies beyond
 *   ±700. The formulas keep their accuracy for shapes from 1e-6 to 1e6.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { gompertz } from 'leadline';
 * const d = gompertz({ shape: 0.01, rate: 0.5 });
 * console.log(d.survival(tf.tensor1d([1, 5, 10])).arraySync());
 * // [ 0.9935337901115417, 0.8942008018493652, 0.2289775013923645 ]
 * console.log(d.mean().arraySync());
 * // 8.157022476196289
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 22, section 8.
 */
export function gompertz(options: GompertzOptions): Gompertz {
  return make(options) as unknown as Gompertz;
}
