import * as tf from '@tensorflow/tfjs';
import { studentTDraws } from '../random/noise.js';
import { real } from '../support/support.js';
import { when } from '../tensor/composedMath.js';
import { composedStudentTEntropy, composedStudentTLogDensity } from '../tensor/composedStudentT.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import { exponentiated } from '../tensor/transforms.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationItself, locationScaleParameters } from './locationScale.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, type Domain, runaway } from './parameters.js';
import { implicitRoute } from './routes.js';

/** Parameters of {@link studentT}. */
export type StudentTOptions = LocationScaleOptions & OneOf<'degreesOfFreedom' | 'logDegreesOfFreedom'>;

/** An array of Student's t distributions. */
export interface StudentT extends Distribution<'studentT', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale' | 'degreesOfFreedom'): tf.Tensor;
}

/** Draws beyond float32 are stored as the largest number. */
const largest = 2 ** 128 - 2 ** 104;

/** What is a normal law or has no numbers left beyond either end. */
const ofFreedom: Domain = { words: 'between -30 and 80', above: -30, below: 80 };

const make = implicitRoute({
  family: 'studentT',
  support: real,
  parameters: {
    ...locationScaleParameters,
    degreesOfFreedom: {
      degreesOfFreedom: {
        domain: aboveZero,
        fix: 'pass logDegreesOfFreedom if your network can produce negative values',
      },
      logDegreesOfFreedom: { domain: ofFreedom, fix: runaway, transform: exponentiated },
    },
  },
  placed: true,
  sampler: (stream, { location, scale, degreesOfFreedom }) =>
    studentTDraws(stream, degreesOfFreedom!).map((z, i) => {
      const x = location![i]! + scale![i]! * z;
      return Math.max(-largest, Math.min(largest, x));
    }),
  logDensity: (z, nu) => composedStudentTLogDensity(z!, nu!),
  forms: {
    mean: (nu) => when(tf.greater(nu!, 1), tf.zerosLike(nu!), tf.fill(nu!.shape, Number.NaN)),
    mode: locationItself,
    variance: (nu) => {
      const finite = tf.greater(nu!, 2);
      const held = when(finite, nu!, tf.fill(nu!.shape, 3));
      const none = tf.fill(nu!.shape, Number.NaN);
      const infinite = tf.fill(nu!.shape, Number.POSITIVE_INFINITY);
      return when(finite, tf.div(held, tf.sub(held, 2)), when(tf.greater(nu!, 1), infinite, none));
    },
    entropy: (nu) => composedStudentTEntropy(nu!),
    cdf: noComposedForm('studentT.cdf'),
    survival: noComposedForm('studentT.survival'),
    logCdf: noComposedForm('studentT.logCdf'),
    logSurvival: noComposedForm('studentT.logSurvival'),
    quantile: noComposedForm('studentT.quantile'),
    upperQuantile: noComposedForm('studentT.upperQuantile'),
  },
});

/**
 * Student's t distribution: a bell with heavy tails, for errors that are sometimes large; its degrees of freedom
 * can be learned.
 *
 * Log density: log Γ((ν + 1)/2) − log Γ(ν/2) − ½ log(πν) − ½ (ν + 1) log(1 + z²/ν) − log scale with
 * z = (x − location) / scale and ν degrees of freedom, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, by implicit differentiation of an exact sampler. The mean is NaN for ν ≤ 1, the variance
 * NaN for ν ≤ 1 and infinite for 1 < ν ≤ 2. Cdf, survival function, their logarithms and quantiles are evaluated by
 * kernels and differentiable once.
 *
 * @param options - `location`, one of `scale`, `logScale`, and one of `degreesOfFreedom`, `logDegreesOfFreedom`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale or the degrees of freedom
 *   are not positive, logScale lies beyond ±700, or logDegreesOfFreedom lies outside (−30, 80).
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { studentT } from 'leadline';
 * const d = studentT({ location: 0, scale: 1, degreesOfFreedom: 4 });
 * console.log(d.cdf(tf.tensor1d([0, 2])).arraySync());
 * // [ 0.5, 0.9419417381286621 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 28; the gradient of
 * a draw from Figurnov, Mohamed and Mnih (2018), "Implicit reparameterization gradients".
 */
export function studentT(options: StudentTOptions): StudentT {
  return make(options) as unknown as StudentT;
}
