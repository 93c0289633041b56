import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { kernel } from '../tensor/formula.js';
import { expHalf, exponentiated, inverseSquareRoot, squareRoot } from '../tensor/transforms.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { halfLogTwoPi, normalForms } from './normalForms.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, finite, logarithmic, logarithmicSquare, runaway } from './parameters.js';
import { locationScaleRoute } from './routes.js';

/** Parameters of {@link normal}: a mean and exactly one measure of spread. */
export type NormalOptions = { readonly mean: ParameterValue } & OneOf<
  'sd' | 'logSd' | 'variance' | 'logVariance' | 'precision'
>;

/** An array of normal distributions. */
export interface Normal extends Distribution<'normal', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'mean' | 'sd'): tf.Tensor;
}

const fix = 'pass logVariance if your network can produce negative values';
const mean = kernel('identity', (v) => v.clone());

const make = locationScaleRoute({
  family: 'normal',
  support: real,
  parameters: {
    mean: { mean: { domain: finite } },
    sd: {
      sd: { domain: aboveZero, fix },
      logSd: { domain: logarithmic, fix: runaway, transform: exponentiated },
      variance: { domain: aboveZero, transform: squareRoot, fix },
      logVariance: { domain: logarithmicSquare, fix: runaway, transform: expHalf },
      precision: { domain: aboveZero, transform: inverseSquareRoot, fix },
    },
  },
  logDensity: kernel('normalLogDensity', normalForms.logDensity),
  draw: { noise: 'normal', composed: kernel('normalDraw', normalForms.draw) },
  forms: {
    mean: { ...mean, parameters: ['mean'] },
    mode: { ...mean, parameters: ['mean'] },
    variance: kernel('normalVariance', (s) => tf.square(s!)),
    entropy: kernel('normalEntropy', (s) => tf.add(tf.log(s!), halfLogTwoPi + 0.5)),
    cdf: kernel('normalCdfOf', normalForms.cdf),
    survival: kernel('normalSurvivalOf', normalForms.survival),
    logCdf: kernel('normalLogCdfOf', normalForms.logCdf),
    logSurvival: kernel('normalLogSurvivalOf', normalForms.logSurvival),
    quantile: kernel('normalQuantileOf', normalForms.quantile),
    upperQuantile: kernel('normalUpperQuantileOf', normalForms.upperQuantile),
  },
});

/**
 * The normal distribution: the usual choice for real-valued latents and for noise with many small causes.
 *
 * Log density: −½ ((x − mean) / sd)² − log sd − ½ log 2π, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = mean + sd · noise.
 *
 * @param options - `mean`, and one of `sd`, `logSd`, `variance`, `logVariance`, `precision`
 * @throws ParameterError when a parameter is missing, given twice, not finite, a spread is not positive, or its
 *   logarithm lies beyond ±700 (±1400 for logVariance).
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { normal } from 'leadline';
 * const d = normal({ mean: [0, 1], sd: 2 });
 * console.log(d.arrayShape, d.route);
 * // [ 2 ] pathwise
 * console.log(d.logDensity(tf.scalar(1)).arraySync());
 * // [ -1.7370857000350952, -1.6120857000350952 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 13.
 */
export function normal(options: NormalOptions): Normal {
  return make(options) as unknown as Normal;
}
