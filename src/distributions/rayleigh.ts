import * as tf from '@tensorflow/tfjs';
import { EULER } from '../numeric/constants.js';
import { positive } from '../support/support.js';
import { composedExp, composedLog1p, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { atMost, onPositive } from './positivePoint.js';
import { locationScaleRoute } from './routes.js';
import { type ScaleOptions, scaleForms } from './scaleAndShape.js';

/** Parameters of {@link rayleigh}. */
export type RayleighOptions = ScaleOptions;

/** An array of Rayleigh distributions. */
export interface Rayleigh extends Distribution<'rayleigh', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'scale'): tf.Tensor;
}

const halfSquare = (z: tf.Tensor): tf.Tensor => tf.mul(0.5, tf.square(z));
// Beyond z = 15 nothing is left of a probability; its derivative must not be zero times infinity.
const held = (z: tf.Tensor): tf.Tensor => halfSquare(atMost(z, 15));

const make = locationScaleRoute({
  family: 'rayleigh',
  support: positive,
  parameters: { scale: scaleForms },
  logDensity: (z) => onPositive(z!, (v) => tf.sub(tf.log(v), halfSquare(v)), Number.NEGATIVE_INFINITY),
  draw: { noise: 'exponential', composed: (e) => tf.sqrt(tf.mul(2, e!)) },
  forms: {
    mean: () => Math.sqrt(Math.PI / 2),
    mode: () => 1,
    variance: () => 2 - Math.PI / 2,
    entropy: () => 1 + (EULER - Math.LN2) / 2,
    cdf: (z) => onPositive(z!, (v) => tf.neg(composedExpm1(tf.neg(held(v)))), 0),
    survival: (z) => onPositive(z!, (v) => composedExp(tf.neg(held(v))), 1),
    logCdf: (z) =>
      onPositive(
        z!,
        (v) => {
          const low = tf.less(v, 1e-4);
          const near = tf.sub(tf.mul(2, tf.log(v)), Math.LN2);
          return when(low, near, composedLog1mexp(tf.neg(held(when(low, tf.onesLike(v), v)))));
        },
        Number.NEGATIVE_INFINITY,
      ),
    logSurvival: (z) => onPositive(z!, (v) => tf.neg(halfSquare(v)), 0),
    quantile: (p) => tf.sqrt(tf.mul(-2, composedLog1p(tf.neg(p!)))),
    upperQuantile: (p) => tf.sqrt(tf.mul(-2, tf.log(p!))),
  },
});

/**
 * The Rayleigh distribution: the distance from the origin of a point whose two coordinates are normal, mean 0, sd `scale`.
 *
 * Log density: log x − 2 log scale − (x / scale)² / 2 for x > 0, −∞ elsewhere, in nats.
 * Shapes: the parameter's shape is `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = scale · √(2 noise) with exponential noise.
 *
 * @param options - one of `scale`, `logScale`
 * @throws ParameterError when no parameter or more than one is given, or it is not positive and finite (logScale:
 *   within ±700).
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { rayleigh } from 'leadline';
 * const d = rayleigh({ scale: 2 });
 * console.log(d.cdf(tf.tensor1d([1, 2, 4])).arraySync());
 * // [ 0.1175030991435051, 0.39346933364868164, 0.8646647334098816 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 18, section 10.
 */
export function rayleigh(options: RayleighOptions): Rayleigh {
  return make(options) as unknown as Rayleigh;
}
