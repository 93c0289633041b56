import * as tf from '@tensorflow/tfjs';
import { positive } from '../support/support.js';
import { composedCauchyCdf, composedLogSquare, composedTangent } from '../tensor/composedCauchy.js';
import { composedAbs, composedLog1p, when } from '../tensor/composedMath.js';
import type { Distribution, HasEntropy, HasMode, HasQuantiles, HasTails } from './distribution.js';
import { fromZeroOn, onPositive } from './positivePoint.js';
import { locationScaleRoute } from './routes.js';
import { type ScaleOptions, scaleForms } from './scaleAndShape.js';

/** Parameters of {@link halfCauchy}. */
export type HalfCauchyOptions = ScaleOptions;

/** An array of half-Cauchy distributions. Their mean is infinite. */
export interface HalfCauchy
  extends Distribution<'halfCauchy', 'pathwise'>,
    HasMode,
    HasEntropy,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'scale'): tf.Tensor;
}

const below = (z: tf.Tensor): tf.Tensor => tf.mul(2 / Math.PI, tf.atan(z));
const above = (z: tf.Tensor): tf.Tensor => tf.mul(2, composedCauchyCdf(tf.neg(z)));

/** The logarithm of one of them from the other where that is smaller. */
function logarithmOf(z: tf.Tensor, itself: typeof below, other: typeof below, near: tf.Tensor): tf.Tensor {
  const one = tf.onesLike(z);
  return when(near, tf.log(itself(when(near, z, one))), composedLog1p(tf.neg(other(when(near, one, z)))));
}

const make = locationScaleRoute({
  family: 'halfCauchy',
  support: positive,
  parameters: { scale: scaleForms },
  logDensity: (z) =>
    fromZeroOn(z!, (v) => tf.sub(Math.log(2 / Math.PI), composedLogSquare(v)), Number.NEGATIVE_INFINITY),
  draw: { noise: 'cauchy', composed: (e) => composedAbs(e!) },
  forms: {
    mode: () => 0,
    entropy: () => Math.log(2 * Math.PI),
    cdf: (z) => fromZeroOn(z!, below, 0),
    survival: (z) => fromZeroOn(z!, above, 1),
    logCdf: (z) =>
      onPositive(z!, (v) => logarithmOf(v, below, above, tf.less(v, 1)), Number.NEGATIVE_INFINITY),
    logSurvival: (z) => fromZeroOn(z!, (v) => logarithmOf(v, above, below, tf.greater(v, 1)), 0),
    quantile: (p) => composedTangent(tf.mul(0.5, p!), tf.mul(0.5, tf.sub(1, p!))),
    upperQuantile: (p) => composedTangent(tf.mul(0.5, tf.sub(1, p!)), tf.mul(0.5, p!)),
  },
});

/**
 * The half-Cauchy distribution: the size of a Cauchy number about 0; a heavy-tailed prior for scales. It has no mean.
 *
 * Log density: log(2 / π) − log scale − log(1 + (x / scale)²) for x ≥ 0, −∞ below, in nats.
 * Shapes: the parameter's shape is `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = scale · |noise| with Cauchy noise.
 *
 * @param options - one of `scale`, `logScale`
 * @throws ParameterError when no parameter or more than one is given, or it is not positive and finite (logScale:
 *   within ±700).
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { halfCauchy } from 'leadline';
 * const d = halfCauchy({ scale: 2 });
 * console.log(d.survival(tf.tensor1d([1, 2, 1e10])).arraySync());
 * // [ 0.7048327922821045, 0.5, 1.2732395693326737e-10 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 16.
 */
export function halfCauchy(options: HalfCauchyOptions): HalfCauchy {
  return make(options) as unknown as HalfCauchy;
}
