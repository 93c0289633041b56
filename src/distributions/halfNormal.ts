import * as tf from '@tensorflow/tfjs';
import { centralQuantile } from '../numeric/normalQuantile.js';
import { positive } from '../support/support.js';
import { chebyshevPolynomial, polynomial } from '../tensor/chebyshev.js';
import { composedAbs, composedLog1p, when, withSlope } from '../tensor/composedMath.js';
import {
  composedErf,
  composedLogNormalCdf,
  composedNormalCdf,
  composedNormalDensity,
  composedNormalQuantile,
} from '../tensor/composedNormal.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { atMost, fromZeroOn, onPositive } from './positivePoint.js';
import { locationScaleRoute } from './routes.js';
import { type ScaleOptions, scaleForms } from './scaleAndShape.js';

/** Parameters of {@link halfNormal}. */
export type HalfNormalOptions = ScaleOptions;

/** An array of half-normal distributions. */
export interface HalfNormal
  extends Distribution<'halfNormal', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'scale'): tf.Tensor;
}

const central = (z: tf.Tensor): tf.Tensor => composedErf(tf.mul(z, Math.SQRT1_2));
const upper = (z: tf.Tensor): tf.Tensor => tf.mul(2, composedNormalCdf(tf.neg(z)));

let inverse: readonly number[] | undefined;

/** √2 erf⁻¹(p) for p ≤ 1/2, with relative accuracy near zero. */
function centralInverse(p: tf.Tensor): tf.Tensor {
  inverse ??= chebyshevPolynomial((t) => {
    const y = Math.sqrt((1 + t) / 8);
    return centralQuantile(y) / y;
  }, 12);
  const coefficients = inverse;
  return withSlope(
    p,
    (v) => tf.mul(v, polynomial(coefficients, tf.sub(tf.mul(8, tf.square(v)), 1))),
    (v) => tf.div(0.5, composedNormalDensity(centralInverse(v))),
  );
}

/** The quantile from p where that is at most 1/2, else from the upper tail q = 1 − p. */
function quantileOf(p: tf.Tensor, q: tf.Tensor): tf.Tensor {
  const near = tf.lessEqual(p, 0.5);
  const half = tf.fill(p.shape, 0.5);
  return when(
    near,
    centralInverse(when(near, p, half)),
    tf.neg(composedNormalQuantile(tf.mul(0.5, when(near, half, q)))),
  );
}

const make = locationScaleRoute({
  family: 'halfNormal',
  support: positive,
  parameters: { scale: scaleForms },
  logDensity: (z) =>
    fromZeroOn(
      z!,
      (v) => tf.sub(Math.log(2 / Math.PI) / 2, tf.mul(0.5, tf.square(v))),
      Number.NEGATIVE_INFINITY,
    ),
  draw: { noise: 'normal', composed: (e) => composedAbs(e!) },
  forms: {
    mean: () => Math.sqrt(2 / Math.PI),
    mode: () => 0,
    variance: () => 1 - 2 / Math.PI,
    entropy: () => (Math.log(Math.PI / 2) + 1) / 2,
    cdf: (z) => fromZeroOn(z!, central, 0),
    survival: (z) => fromZeroOn(z!, upper, 1),
    logCdf: (z) =>
      onPositive(
        z!,
        (v) => {
          const near = tf.less(v, 0.7);
          const one = tf.onesLike(v);
          return when(
            near,
            tf.log(central(when(near, v, one))),
            composedLog1p(tf.neg(upper(when(near, one, atMost(v, 15))))),
          );
        },
        Number.NEGATIVE_INFINITY,
      ),
    logSurvival: (z) =>
      fromZeroOn(
        z!,
        (v) => {
          const near = tf.less(v, 0.7);
          const low = when(near, v, tf.zerosLike(v));
          return when(
            near,
            composedLog1p(tf.neg(central(low))),
            tf.add(Math.LN2, composedLogNormalCdf(tf.neg(v))),
          );
        },
        0,
      ),
    quantile: (p) => quantileOf(p!, tf.sub(1, p!)),
    upperQuantile: (p) => quantileOf(tf.sub(1, p!), p!),
  },
});

/**
 * The half-normal distribution: the size of a normal number with mean 0 and sd `scale`; a prior for scales.
 *
 * Log density: log(2 / π) / 2 − log scale − (x / scale)² / 2 for x ≥ 0, −∞ below, in nats.
 * Shapes: the parameter's shape is `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = scale · |noise| with normal noise.
 *
 * @param options - one of `scale`, `logScale`
 * @throws ParameterError when no parameter or more than one is given, or it is not positive and finite (logScale:
 *   within ±700).
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { halfNormal } from 'leadline';
 * const d = halfNormal({ scale: 2 });
 * console.log(d.cdf(tf.tensor1d([1, 2, 4])).arraySync());
 * // [ 0.3829249143600464, 0.6826894879341125, 0.9544997215270996 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 13, section 10.
 */
export function halfNormal(options: HalfNormalOptions): HalfNormal {
  return make(options) as unknown as HalfNormal;
}
