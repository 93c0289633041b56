import * as tf from '@tensorflow/tfjs';
import { ray } from '../support/support.js';
import { choose, composedExp, composedLog1p, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import { kernel } from '../tensor/formula.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { locationScaleRoute } from './routes.js';
import { type ScaleAndShapeOptions, scaleForms, shapeForms } from './scaleAndShape.js';

/** Parameters of {@link pareto}. */
export type ParetoOptions = ScaleAndShapeOptions;

/** An array of Pareto distributions. */
export interface Pareto extends Distribution<'pareto', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'scale' | 'shape'): tf.Tensor;
}

/** f(log z) from the end of the support on, `outside` before it. */
function inside(z: tf.Tensor, f: (l: tf.Tensor) => tf.Tensor, outside: number): tf.Tensor {
  const within = tf.greaterEqual(z, 1);
  return choose(within, f(tf.log(when(within, z, tf.onesLike(z)))), outside);
}

/** A moment that is infinite up to a shape. */
function beyondShape(least: number, k: tf.Tensor, f: (k: tf.Tensor) => tf.Tensor): tf.Tensor {
  const finite = tf.greater(k, least);
  return choose(finite, f(when(finite, k, tf.fill(k.shape, least + 1))), Number.POSITIVE_INFINITY);
}

const make = locationScaleRoute({
  family: 'pareto',
  support: ray,
  parameters: { scale: scaleForms, shape: shapeForms },
  logDensity: (z, k) =>
    inside(z!, (l) => tf.sub(tf.log(k!), tf.mul(tf.add(k!, 1), l)), Number.NEGATIVE_INFINITY),
  draw: { noise: 'exponential', composed: (e, k) => composedExp(tf.div(e!, k!)) },
  forms: {
    mean: (k) => beyondShape(1, k!, (v) => tf.div(v, tf.sub(v, 1))),
    mode: { ...kernel('identity', (v) => v.clone()), parameters: ['scale'] },
    variance: (k) => beyondShape(2, k!, (v) => tf.div(v, tf.mul(tf.square(tf.sub(v, 1)), tf.sub(v, 2)))),
    entropy: (k) => tf.sub(tf.add(1, tf.div(1, k!)), tf.log(k!)),
    cdf: (z, k) => inside(z!, (l) => tf.neg(composedExpm1(tf.neg(tf.mul(k!, l)))), 0),
    survival: (z, k) => inside(z!, (l) => composedExp(tf.neg(tf.mul(k!, l))), 1),
    logCdf: (z, k) => {
      const within = tf.greater(z!, 1);
      const t = tf.mul(k!, tf.log(when(within, z!, tf.fill(z!.shape, 2))));
      return choose(within, composedLog1mexp(tf.neg(t)), Number.NEGATIVE_INFINITY);
    },
    logSurvival: (z, k) => inside(z!, (l) => tf.neg(tf.mul(k!, l)), 0),
    quantile: (p, k) => composedExp(tf.div(tf.neg(composedLog1p(tf.neg(p!))), k!)),
    upperQuantile: (p, k) => composedExp(tf.div(tf.neg(tf.log(p!)), k!)),
  },
});

/**
 * The Pareto distribution: sizes above a minimum whose tail falls as a power, such as incomes and file lengths.
 *
 * Log density: log shape + shape log scale − (shape + 1) log x for x ≥ scale, −∞ below, in nats; `scale` is the minimum.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars. The mean is infinite up to
 * shape 1 and the variance up to shape 2; their gradients are zero there.
 * Gradient route: pathwise, draw = scale · exp(noise / shape) with exponential noise.
 *
 * @param options - one of `scale`, `logScale`, and one of `shape`, `logShape`
 * @throws ParameterError when a parameter is missing, given twice, not positive and finite, or a logarithm lies beyond
 *   ±700. The formulas keep their accuracy for shapes from 1e-6 to 1e6.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { pareto } from 'leadline';
 * const d = pareto({ scale: 2, shape: 1.5 });
 * console.log(d.survival(tf.tensor1d([1, 4, 200])).arraySync());
 * // [ 1, 0.3535533845424652, 0.0010000000474974513 ]
 * console.log(d.variance().arraySync());
 * // Infinity
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 20.
 */
export function pareto(options: ParetoOptions): Pareto {
  return make(options) as unknown as Pareto;
}
