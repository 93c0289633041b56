import type * as tf from '@tensorflow/tfjs';
import { logScaledGammaDraws, scaledGammaDraws } from '../random/noise.js';
import { positive } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { half } from '../tensor/transforms.js';
import type { Distribution, HasLogDraw, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { gammaForms } from './gammaForms.js';
import { aboveZero } from './parameters.js';
import { implicitRoute } from './routes.js';

/** Parameters of {@link chiSquared}. */
export interface ChiSquaredOptions {
  readonly degreesOfFreedom: ParameterValue;
}

/** An array of chi-squared distributions. */
export interface ChiSquared
  extends Distribution<'chiSquared', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles,
    HasLogDraw {
  /** Half the degrees of freedom, as the formulas read them, differentiable. */
  parameter(name: 'shape'): tf.Tensor;
}

const make = implicitRoute({
  family: 'chiSquared',
  kernels: 'gamma',
  support: positive,
  parameters: { shape: { degreesOfFreedom: { domain: aboveZero, transform: half } } },
  fixed: { scale: 2 },
  ...gammaForms,
  sampler: (stream, { shape, scale }) => scaledGammaDraws(stream, shape!, scale!),
  logSampler: (stream, { shape, scale }) => logScaledGammaDraws(stream, shape!, scale!),
});

/**
 * The chi-squared distribution: the sum of squares of standard normals, in any real number of degrees of freedom.
 *
 * Log density: that of a gamma distribution of shape degreesOfFreedom / 2 and scale 2, in nats; −∞ below 0.
 * Shapes: the parameter's shape is `arrayShape`; points are scalars.
 * Gradient route: pathwise, an exact sampler with implicit derivatives; `drawLog` draws the logarithm.
 *
 * @param options - `degreesOfFreedom`
 * @throws ParameterError when it is missing, or not positive and finite.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { chiSquared } from 'leadline';
 * const d = chiSquared({ degreesOfFreedom: 3 });
 * console.log(d.upperQuantile(tf.tensor1d([0.05, 0.01])).arraySync());
 * // [ 7.814727783203125, 11.344866752624512 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 18; gradient:
 * Figurnov, Mohamed and Mnih, arXiv 1805.08498 (2018).
 */
export function chiSquared(options: ChiSquaredOptions): ChiSquared {
  return make(options) as unknown as ChiSquared;
}
