import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import { composedLogOdds, composedSigmoid, composedSoftplus } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationItself, locationScaleParameters } from './locationScale.js';
import { locationScaleRoute } from './routes.js';

/** Parameters of {@link logistic}. */
export type LogisticOptions = LocationScaleOptions;

/** An array of logistic distributions. */
export interface Logistic extends Distribution<'logistic', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

const make = locationScaleRoute({
  family: 'logistic',
  support: real,
  parameters: locationScaleParameters,
  logDensity: (z) => tf.neg(tf.add(composedSoftplus(z!), composedSoftplus(tf.neg(z!)))),
  draw: { noise: 'logistic' },
  forms: {
    mean: locationItself,
    mode: locationItself,
    variance: kernel('logisticVariance', (s) => tf.mul(Math.PI ** 2 / 3, tf.square(s!))),
    entropy: kernel('logisticEntropy', (s) => tf.add(tf.log(s!), 2)),
    cdf: (z) => composedSigmoid(z!),
    survival: (z) => composedSigmoid(tf.neg(z!)),
    logCdf: (z) => tf.neg(composedSoftplus(tf.neg(z!))),
    logSurvival: (z) => tf.neg(composedSoftplus(z!)),
    quantile: (p) => composedLogOdds(p!),
    upperQuantile: (p) => tf.neg(composedLogOdds(p!)),
  },
});

/**
 * The logistic distribution: close to a normal with heavier tails, with a distribution function, quantile
 * and density that are all elementary.
 *
 * Log density: −z − 2 log(1 + exp(−z)) − log scale with z = (x − location) / scale, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = location + scale · noise. Two logistic distributions have no closed
 * divergence; use `sampledKl`.
 *
 * @param options - `location`, and one of `scale`, `logScale`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logistic } from 'leadline';
 * const d = logistic({ location: 0, scale: 1 });
 * console.log(d.logDensity(tf.scalar(0)).arraySync());
 * // -1.3862943649291992
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 23.
 */
export function logistic(options: LogisticOptions): Logistic {
  return make(options) as unknown as Logistic;
}
