import * as tf from '@tensorflow/tfjs';
import { inverseGammaDraws, logInverseGammaDraws } from '../random/noise.js';
import { positive } from '../support/support.js';
import { composedDigammaMinusLog, composedExcess, composedStirlingError } from '../tensor/composedGamma.js';
import { choose, when } from '../tensor/composedMath.js';
import type { Distribution, HasLogDraw, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { kernelTails, scaleForms, shapeForms } from './gammaForms.js';
import type { OneOf } from './oneOf.js';
import { implicitRoute } from './routes.js';

/** Parameters of {@link inverseGamma}. */
export type InverseGammaOptions = OneOf<'shape' | 'logShape'> & OneOf<'scale' | 'logScale'>;

/** An array of inverse gamma distributions. */
export interface InverseGamma
  extends Distribution<'inverseGamma', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles,
    HasLogDraw {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'shape' | 'scale'): tf.Tensor;
}

const halfLog2Pi = 0.5 * Math.log(2 * Math.PI);

/** The log density in saddle-point form, as the double-precision formula. */
function composedLogDensity(x: tf.Tensor, shape: tf.Tensor, scale: tf.Tensor): tf.Tensor {
  const inside = tf.greater(x, 0);
  const held = when(inside, x, tf.onesLike(x));
  const product = tf.mul(shape, held);
  const full = tf.zerosLike(tf.add(product, scale));
  // shape · (u − log(1 + u)) with 1 + u = scale / (shape · x).
  const distance = tf.div(composedExcess(tf.add(scale, full), tf.add(product, full)), held);
  const front = tf.sub(tf.mul(0.5, tf.log(shape)), tf.add(halfLog2Pi, composedStirlingError(shape)));
  return choose(inside, tf.sub(front, tf.add(distance, tf.log(held))), Number.NEGATIVE_INFINITY);
}

/** `value` above a shape of `least`, infinite below it. */
function above(least: number, shape: tf.Tensor, value: (shape: tf.Tensor) => tf.Tensor): tf.Tensor {
  const fits = tf.greater(shape, least);
  return choose(fits, value(when(fits, shape, tf.fill(shape.shape, least + 1))), Number.POSITIVE_INFINITY);
}

function composedVariance(shape: tf.Tensor, scale: tf.Tensor): tf.Tensor {
  const value = above(2, shape, (a) => tf.div(tf.square(tf.div(scale, tf.sub(a, 1))), tf.sub(a, 2)));
  const exists = tf.add(tf.greater(shape, 1), tf.zerosLike(value)).toBool();
  return when(exists, value, tf.fill(value.shape, Number.NaN));
}

const make = implicitRoute({
  family: 'inverseGamma',
  support: positive,
  parameters: {
    shape: shapeForms,
    scale: { scale: scaleForms.scale, logScale: scaleForms.logScale },
  },
  logDensity: (x, shape, scale) => composedLogDensity(x!, shape!, scale!),
  sampler: (stream, { shape, scale }) => inverseGammaDraws(stream, shape!, scale!),
  logSampler: (stream, { shape, scale }) => logInverseGammaDraws(stream, shape!, scale!),
  forms: {
    mean: (shape, scale) => above(1, shape!, (a) => tf.div(scale!, tf.sub(a, 1))),
    variance: (shape, scale) => composedVariance(shape!, scale!),
    mode: (shape, scale) => tf.div(scale!, tf.add(shape!, 1)),
    entropy: (shape, scale) =>
      tf.add(
        tf.add(tf.sub(tf.log(scale!), tf.mul(1.5, tf.log(shape!))), halfLog2Pi),
        tf.sub(composedStirlingError(shape!), tf.mul(tf.add(1, shape!), composedDigammaMinusLog(shape!))),
      ),
    ...kernelTails('inverseGamma'),
  },
});

/**
 * The inverse gamma distribution: a scale over a gamma variable, the conjugate prior of a variance.
 *
 * Log density: shape · log z − z − log Γ(shape) − log x with z = scale / x for x > 0, −∞ elsewhere, in nats. The mean
 * is infinite up to shape 1; the variance is infinite up to shape 2, and does not exist (NaN) up to 1.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, an exact sampler with implicit derivatives; `drawLog` draws the logarithm, for shapes so
 * small that the draw overflows.
 *
 * @param options - one of `shape`, `logShape` and one of `scale`, `logScale`
 * @throws ParameterError when a parameter is missing, given twice, not positive and finite, or a logarithm lies
 *   beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { inverseGamma } from 'leadline';
 * const d = inverseGamma({ shape: 3, scale: 2 });
 * console.log(d.cdf(tf.tensor1d([0.5, 5])).arraySync());
 * // [ 0.23810330033302307, 0.992073655128479 ]
 * console.log(d.mean().arraySync());
 * // 1
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), section 17.2; gradient:
 * Figurnov, Mohamed and Mnih, arXiv 1805.08498 (2018).
 */
export function inverseGamma(options: InverseGammaOptions): InverseGamma {
  return make(options) as unknown as InverseGamma;
}
