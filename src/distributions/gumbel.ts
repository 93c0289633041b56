import * as tf from '@tensorflow/tfjs';
import { EULER } from '../numeric/constants.js';
import { real } from '../support/support.js';
import { composedExp, composedLog1p } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationItself, locationScaleParameters } from './locationScale.js';
import { locationScaleRoute } from './routes.js';

/** Parameters of {@link gumbel}. */
export type GumbelOptions = LocationScaleOptions;

/** An array of Gumbel distributions. */
export interface Gumbel extends Distribution<'gumbel', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

const rarity = (z: tf.Tensor): tf.Tensor => composedExp(tf.neg(z));
// Below z = −40 nothing is left of a probability; its derivative must not be zero times infinity.
const held = (z: tf.Tensor): tf.Tensor => rarity(tf.maximum(z, -40));

const make = locationScaleRoute({
  family: 'gumbel',
  support: real,
  parameters: locationScaleParameters,
  logDensity: (z) => tf.neg(tf.add(z!, rarity(z!))),
  draw: { noise: 'gumbel' },
  forms: {
    mean: () => EULER,
    mode: locationItself,
    variance: () => Math.PI ** 2 / 6,
    entropy: () => 1 + EULER,
    cdf: (z) => composedExp(tf.neg(held(z!))),
    survival: (z) => tf.neg(composedExpm1(tf.neg(held(z!)))),
    logCdf: (z) => tf.neg(rarity(z!)),
    logSurvival: (z) => composedLog1mexp(tf.neg(held(z!))),
    quantile: (p) => tf.neg(tf.log(tf.neg(tf.log(p!)))),
    upperQuantile: (p) => tf.neg(tf.log(tf.neg(composedLog1p(tf.neg(p!))))),
  },
});

/**
 * The Gumbel distribution: the largest of many numbers, and the noise whose argmax draws a category.
 *
 * Log density: −z − exp(−z) − log scale with z = (x − location) / scale, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = location + scale · noise.
 *
 * @param options - `location`, and one of `scale`, `logScale`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { gumbel } from 'leadline';
 * const d = gumbel({ location: 0, scale: 1 });
 * console.log(d.cdf(tf.tensor1d([0, 2])).arraySync());
 * // [ 0.3678794503211975, 0.8734230399131775 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 22.
 */
export function gumbel(options: GumbelOptions): Gumbel {
  return make(options) as unknown as Gumbel;
}
