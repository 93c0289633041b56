import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import { composedAbs, composedExp, composedLog1p, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationItself, locationScaleParameters } from './locationScale.js';
import { locationScaleRoute } from './routes.js';

/** Parameters of {@link laplace}. */
export type LaplaceOptions = LocationScaleOptions;

/** An array of Laplace distributions. */
export interface Laplace extends Distribution<'laplace', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

const standardCdf = (z: tf.Tensor): tf.Tensor => {
  const below = tf.less(z, 0);
  const tail = tf.mul(0.5, composedExp(when(below, z, tf.neg(z))));
  return when(below, tail, tf.sub(1, tail));
};

const standardLogCdf = (z: tf.Tensor): tf.Tensor => {
  const below = tf.less(z, 0);
  const tail = composedExp(when(below, tf.zerosLike(z), tf.neg(z)));
  return when(below, tf.sub(z, Math.LN2), composedLog1p(tf.mul(-0.5, tail)));
};

const standardQuantile = (p: tf.Tensor): tf.Tensor => {
  const below = tf.less(p, 0.5);
  const log = tf.log(tf.mul(2, when(below, p, tf.sub(1, p))));
  return when(below, log, tf.neg(log));
};

const make = locationScaleRoute({
  family: 'laplace',
  support: real,
  parameters: locationScaleParameters,
  logDensity: (z) => tf.sub(tf.neg(composedAbs(z!)), Math.LN2),
  draw: { noise: 'laplace' },
  forms: {
    mean: locationItself,
    mode: locationItself,
    variance: kernel('laplaceVariance', (s) => tf.mul(2, tf.square(s!))),
    entropy: kernel('laplaceEntropy', (s) => tf.add(1, tf.log(tf.mul(2, s!)))),
    cdf: (z) => standardCdf(z!),
    survival: (z) => standardCdf(tf.neg(z!)),
    logCdf: (z) => standardLogCdf(z!),
    logSurvival: (z) => standardLogCdf(tf.neg(z!)),
    quantile: (p) => standardQuantile(p!),
    upperQuantile: (p) => tf.neg(standardQuantile(p!)),
  },
});

/**
 * The Laplace distribution: noise with heavier tails than the normal, and a prior that favors values near
 * its location.
 *
 * Log density: −|x − location| / scale − log(2 scale), in nats. Its derivative in x at the location is
 * taken as zero. Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = location + scale · noise.
 *
 * @param options - `location`, and one of `scale`, `logScale`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { laplace } from 'leadline';
 * const d = laplace({ location: 0, scale: 1 });
 * console.log(d.cdf(tf.tensor1d([-1, 0])).arraySync());
 * // [ 0.18393972516059875, 0.5 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 24.
 */
export function laplace(options: LaplaceOptions): Laplace {
  return make(options) as unknown as Laplace;
}
