import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import {
  composedCauchyCdf,
  composedCauchyLogCdf,
  composedLogSquare,
  composedTangent,
} from '../tensor/composedCauchy.js';
import { when } from '../tensor/composedMath.js';
import type { Distribution, HasEntropy, HasMode, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationItself, locationScaleParameters } from './locationScale.js';
import { locationScaleRoute } from './routes.js';

/** Parameters of {@link cauchy}. */
export type CauchyOptions = LocationScaleOptions;

/** An array of Cauchy distributions. They have neither mean nor variance. */
export interface Cauchy
  extends Distribution<'cauchy', 'pathwise'>,
    HasMode,
    HasEntropy,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

/** tan(π (p − 1/2)), from the nearer end. */
function quantile(p: tf.Tensor): tf.Tensor {
  const portion = tf.sub(p, 0.5);
  const low = tf.less(p, 0.25);
  return composedTangent(portion, when(low, tf.neg(p), tf.sub(1, p)));
}

const make = locationScaleRoute({
  family: 'cauchy',
  support: real,
  parameters: locationScaleParameters,
  logDensity: (z) => tf.sub(-Math.log(Math.PI), composedLogSquare(z!)),
  draw: { noise: 'cauchy' },
  forms: {
    mode: locationItself,
    entropy: () => Math.log(4 * Math.PI),
    cdf: (z) => composedCauchyCdf(z!),
    survival: (z) => composedCauchyCdf(tf.neg(z!)),
    logCdf: (z) => composedCauchyLogCdf(z!),
    logSurvival: (z) => composedCauchyLogCdf(tf.neg(z!)),
    quantile: (p) => quantile(p!),
    upperQuantile: (p) => tf.neg(quantile(p!)),
  },
});

/**
 * The Cauchy distribution: tails so heavy that it has neither mean nor variance; a prior that forgives outliers.
 *
 * Log density: −log π − log scale − log(1 + z²) with z = (x − location) / scale, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = location + scale · noise.
 *
 * @param options - `location`, and one of `scale`, `logScale`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { cauchy } from 'leadline';
 * const d = cauchy({ location: 0, scale: 1 });
 * console.log(d.cdf(tf.tensor1d([-1e10, 0, 1])).arraySync());
 * // [ 3.183098923331684e-11, 0.5, 0.75 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 16.
 */
export function cauchy(options: CauchyOptions): Cauchy {
  return make(options) as unknown as Cauchy;
}
