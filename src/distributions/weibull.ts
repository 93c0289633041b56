import * as tf from '@tensorflow/tfjs';
import { EULER } from '../numeric/constants.js';
import { logMomentRatio } from '../numeric/families/weibull.js';
import { positive } from '../support/support.js';
import { chebyshevPolynomial, polynomial } from '../tensor/chebyshev.js';
import { composedLogGamma1p } from '../tensor/composedLogGammaNear.js';
import { choose, composedExp, composedLog1p, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { atMost, onPositive, withLimitAtZero } from './positivePoint.js';
import { locationScaleRoute } from './routes.js';
import { type ScaleAndShapeOptions, scaleForms, shapeForms } from './scaleAndShape.js';

/** Parameters of {@link weibull}. */
export type WeibullOptions = ScaleAndShapeOptions;

/** An array of Weibull distributions. */
export interface Weibull extends Distribution<'weibull', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'scale' | 'shape'): tf.Tensor;
}

/** z^shape, held where no probability is left. */
function power(z: tf.Tensor, k: tf.Tensor): tf.Tensor {
  return composedExp(atMost(tf.mul(k, tf.log(z)), 5));
}

let nearZero: readonly number[] | undefined;

/** log(Γ(1 + 2u) / Γ(1 + u)²), by a polynomial where the logarithms cancel. */
function composedMomentRatio(u: tf.Tensor): tf.Tensor {
  nearZero ??= chebyshevPolynomial((t) => logMomentRatio((1 + t) / 4) / ((1 + t) / 4) ** 2, 14);
  const near = tf.lessEqual(u, 0.5);
  const low = when(near, u, tf.fill(u.shape, 0.5));
  const high = when(near, tf.fill(u.shape, 0.5), u);
  return when(
    near,
    tf.mul(tf.square(low), polynomial(nearZero, tf.sub(tf.mul(4, low), 1))),
    tf.sub(composedLogGamma1p(tf.mul(2, high)), tf.mul(2, composedLogGamma1p(high))),
  );
}

const make = locationScaleRoute({
  family: 'weibull',
  support: positive,
  parameters: { scale: scaleForms, shape: shapeForms },
  logDensity: (z, k) => {
    const inside = onPositive(
      z!,
      (v) => tf.sub(tf.add(tf.log(k!), tf.mul(tf.sub(k!, 1), tf.log(v))), composedExp(tf.mul(k!, tf.log(v)))),
      Number.NEGATIVE_INFINITY,
    );
    return withLimitAtZero(z!, k!, inside, 0);
  },
  draw: { noise: 'exponential', composed: (e, k) => composedExp(tf.div(tf.log(e!), k!)) },
  forms: {
    mean: (k) => composedExp(composedLogGamma1p(tf.div(1, k!))),
    mode: (k) => {
      const above = tf.greater(k!, 1);
      const held = when(above, k!, tf.fill(k!.shape, 2));
      return choose(above, composedExp(tf.div(composedLog1p(tf.div(-1, held)), held)), 0);
    },
    variance: (k) => {
      const u = tf.div(1, k!);
      return tf.mul(
        composedExp(composedLogGamma1p(tf.mul(2, u))),
        tf.neg(composedExpm1(tf.neg(composedMomentRatio(u)))),
      );
    },
    entropy: (k) => tf.add(tf.sub(tf.mul(EULER, tf.sub(1, tf.div(1, k!))), tf.log(k!)), 1),
    cdf: (z, k) => onPositive(z!, (v) => tf.neg(composedExpm1(tf.neg(power(v, k!)))), 0),
    survival: (z, k) => onPositive(z!, (v) => composedExp(tf.neg(power(v, k!))), 1),
    logCdf: (z, k) =>
      onPositive(
        z!,
        (v) => {
          const t = tf.mul(k!, tf.log(v));
          const low = tf.less(t, -18);
          const held = when(low, tf.zerosLike(t), atMost(t, 4.65));
          return when(low, t, composedLog1mexp(tf.neg(composedExp(held))));
        },
        Number.NEGATIVE_INFINITY,
      ),
    logSurvival: (z, k) => onPositive(z!, (v) => tf.neg(composedExp(tf.mul(k!, tf.log(v)))), 0),
    quantile: (p, k) => composedExp(tf.div(tf.log(tf.neg(composedLog1p(tf.neg(p!)))), k!)),
    upperQuantile: (p, k) => composedExp(tf.div(tf.log(tf.neg(tf.log(p!))), k!)),
  },
});

/**
 * The Weibull distribution: lifetimes whose hazard rises or falls as a power of age, and the smallest of many numbers.
 *
 * Log density: log shape − log scale + (shape − 1) log(x / scale) − (x / scale)^shape for x > 0, −∞ below, in nats. At 0
 * it is its limit: +∞ below shape 1, −∞ above.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = scale · noise^(1 / shape) with exponential noise.
 *
 * @param options - one of `scale`, `logScale`, and one of `shape`, `logShape`
 * @throws ParameterError when a parameter is missing, given twice, not positive and finite, or a logarithm lies beyond
 *   ±700. The formulas keep their accuracy for shapes from 1e-6 to 1e6.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { weibull } from 'leadline';
 * const d = weibull({ scale: 2, shape: 1.5 });
 * console.log(d.survival(tf.tensor1d([1, 2, 4])).arraySync());
 * // [ 0.7021884918212891, 0.3678794503211975, 0.05910574644804001 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 21.
 */
export function weibull(options: WeibullOptions): Weibull {
  return make(options) as unknown as Weibull;
}
