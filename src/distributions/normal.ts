import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { composedNormalCdf, composedNormalQuantile } from '../tensor/composedNormal.js';
import { kernel } from '../tensor/formula.js';
import { expHalf, exponentiated, inverseSquareRoot, squareRoot } from '../tensor/transforms.js';
import type { Distribution, HasContinuousForms } from './distribution.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, finite, logarithmic, logarithmicSquare, runaway } from './parameters.js';
import { scalarFamily } from './scalarFamily.js';

/** Parameters of {@link normal}: a mean and exactly one measure of spread. */
export type NormalOptions = { readonly mean: ParameterValue } & OneOf<
  'sd' | 'logSd' | 'variance' | 'logVariance' | 'precision'
>;

/** An array of normal distributions. */
export interface Normal extends Distribution<'normal', 'pathwise'>, HasContinuousForms {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'mean' | 'sd'): tf.Tensor;
}

const halfLogTwoPi = 0.5 * Math.log(2 * Math.PI);
const fix = 'pass logVariance if your network can produce negative values';
const mean = kernel('identity', (v) => v.clone());

const make = scalarFamily({
  family: 'normal',
  route: 'pathwise',
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
  logDensity: kernel('normalLogDensity', (x, m, s) => {
    const z = tf.div(tf.sub(x!, m!), s!);
    return tf.sub(tf.mul(-0.5, tf.square(z)), tf.add(tf.log(s!), halfLogTwoPi));
  }),
  draw: { noise: 'normal', formula: kernel('normalDraw', (e, m, s) => tf.add(m!, tf.mul(s!, e!))) },
  summaries: {
    mean: { ...mean, parameters: ['mean'] },
    mode: { ...mean, parameters: ['mean'] },
    variance: kernel('normalVariance', (s) => tf.square(s!)),
    entropy: kernel('normalEntropy', (s) => tf.add(tf.log(s!), halfLogTwoPi + 0.5)),
  },
  functions: {
    cdf: kernel('normalCdfOf', (x, m, s) => composedNormalCdf(tf.div(tf.sub(x!, m!), s!))),
    quantile: kernel('normalQuantileOf', (p, m, s) => tf.add(m!, tf.mul(s!, composedNormalQuantile(p!)))),
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
