import * as tf from '@tensorflow/tfjs';
import { tangentRest } from '../numeric/families/logLogistic.js';
import { positive } from '../support/support.js';
import { chebyshevPolynomial, polynomial } from '../tensor/chebyshev.js';
import {
  choose,
  composedExp,
  composedLog1p,
  composedLogOdds,
  composedSigmoid,
  composedSoftplus,
  when,
  withSlope,
} from '../tensor/composedMath.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { onPositive, withLimitAtZero } from './positivePoint.js';
import { locationScaleRoute } from './routes.js';
import { type ScaleAndShapeOptions, scaleForms, shapeForms } from './scaleAndShape.js';

/** Parameters of {@link logLogistic}. */
export type LogLogisticOptions = ScaleAndShapeOptions;

/** An array of log-logistic distributions. */
export interface LogLogistic
  extends Distribution<'logLogistic', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'scale' | 'shape'): tf.Tensor;
}

let restCoefficients: readonly number[] | undefined;

/** 1 − b cot b with b = π / shape: a polynomial in 1 / shape² where b is small, by the distance to π where that is. */
function composedTangentRest(k: tf.Tensor): tf.Tensor {
  restCoefficients ??= chebyshevPolynomial((t) => {
    const square = (1 + t) / 32;
    return tangentRest(1 / Math.sqrt(square)) / square;
  }, 8);
  const near = tf.greaterEqual(k, 4);
  const square = tf.square(tf.div(1, when(near, k, tf.fill(k.shape, 4))));
  const held = when(near, tf.fill(k.shape, 3), k);
  const side = when(tf.less(held, 2), tf.div(tf.sub(1, held), held), tf.div(1, held));
  const b = tf.div(Math.PI, held);
  return when(
    near,
    tf.mul(square, polynomial(restCoefficients, tf.sub(tf.mul(32, square), 1))),
    tf.sub(1, tf.div(b, tf.tan(tf.mul(Math.PI, side)))),
  );
}

/** b / sin b, whose derivative in the shape is −(b / sin b) (1 − b cot b) / shape. */
function overSine(k: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor => {
    const portion = tf.where(tf.less(v, 2), tf.div(tf.sub(v, 1), v), tf.div(1, v));
    return tf.div(Math.PI, tf.mul(v, tf.sin(tf.mul(Math.PI, portion))));
  };
  return withSlope(k, value, (v) => tf.neg(tf.div(tf.mul(overSine(v), composedTangentRest(v)), v)));
}

/** f(shape) above `least`, `otherwise` up to it. */
function above(least: number, k: tf.Tensor, f: (k: tf.Tensor) => tf.Tensor, otherwise: number): tf.Tensor {
  const found = tf.greater(k, least);
  return choose(found, f(when(found, k, tf.fill(k.shape, least + 1))), otherwise);
}

function variance(k: tf.Tensor): tf.Tensor {
  const cosine = tf.sin(tf.mul(Math.PI / 2, tf.div(tf.sub(k, 2), k)));
  return tf.div(tf.mul(overSine(k), composedTangentRest(k)), cosine);
}

const logOdds = (z: tf.Tensor, k: tf.Tensor): tf.Tensor => tf.mul(k, tf.log(z));

const make = locationScaleRoute({
  family: 'logLogistic',
  support: positive,
  parameters: { scale: scaleForms, shape: shapeForms },
  logDensity: (z, k) => {
    const inside = onPositive(
      z!,
      (v) => {
        const t = logOdds(v, k!);
        return tf.sub(
          tf.sub(tf.log(k!), tf.log(v)),
          tf.add(composedSoftplus(t), composedSoftplus(tf.neg(t))),
        );
      },
      Number.NEGATIVE_INFINITY,
    );
    return withLimitAtZero(z!, k!, inside, 0);
  },
  draw: { noise: 'logistic', composed: (e, k) => composedExp(tf.div(e!, k!)) },
  forms: {
    mean: (k) => above(1, k!, overSine, Number.POSITIVE_INFINITY),
    variance: (k) => above(2, k!, variance, Number.POSITIVE_INFINITY),
    mode: (k) => above(1, k!, (v) => composedExp(tf.div(composedLog1p(tf.div(-2, tf.add(v, 1))), v)), 0),
    entropy: (k) => tf.sub(2, tf.log(k!)),
    cdf: (z, k) => onPositive(z!, (v) => composedSigmoid(logOdds(v, k!)), 0),
    survival: (z, k) => onPositive(z!, (v) => composedSigmoid(tf.neg(logOdds(v, k!))), 1),
    logCdf: (z, k) =>
      onPositive(z!, (v) => tf.neg(composedSoftplus(tf.neg(logOdds(v, k!)))), Number.NEGATIVE_INFINITY),
    logSurvival: (z, k) => onPositive(z!, (v) => tf.neg(composedSoftplus(logOdds(v, k!))), 0),
    quantile: (p, k) => composedExp(tf.div(composedLogOdds(p!), k!)),
    upperQuantile: (p, k) => composedExp(tf.div(tf.neg(composedLogOdds(p!)), k!)),
  },
});

/**
 * The log-logistic distribution: a positive number whose logarithm is logistic; lifetimes whose hazard rises, then falls.
 *
 * Log density: log shape − log x + t − 2 log(1 + exp(t)) with t = shape log(x / scale), for x > 0, −∞ below, in nats.
 * At 0 it is its limit: +∞ below shape 1, −∞ above.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars. The mean is infinite up to
 * shape 1 and the variance up to shape 2; their gradients are zero there.
 * Gradient route: pathwise, draw = scale · exp(noise / shape) with logistic noise.
 *
 * @param options - one of `scale`, `logScale`, and one of `shape`, `logShape`
 * @throws ParameterError when a parameter is missing, given twice, not positive and finite, or a logarithm lies beyond
 *   ±700. The formulas keep their accuracy for shapes from 1e-6 to 1e6.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logLogistic } from 'leadline';
 * const d = logLogistic({ scale: 2, shape: 1.5 });
 * console.log(d.survival(tf.tensor1d([1, 2, 200])).arraySync());
 * // [ 0.7387961149215698, 0.5, 0.0009990009712055326 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 23, section 11.
 */
export function logLogistic(options: LogLogisticOptions): LogLogistic {
  return make(options) as unknown as LogLogistic;
}
