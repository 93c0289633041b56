import * as tf from '@tensorflow/tfjs';
import { inverseGaussianDraws } from '../random/noise.js';
import { positive } from '../support/support.js';
import { choose, relativeDistance, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import { exponentiated } from '../tensor/transforms.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, logarithmic, runaway } from './parameters.js';
import { implicitRoute } from './routes.js';

/** Parameters of {@link inverseGaussian}: one of `mean`, `logMean`, and one of `shape`, `logShape`. */
export type InverseGaussianOptions = OneOf<'mean' | 'logMean'> & OneOf<'shape' | 'logShape'>;

/** An array of inverse Gaussian distributions. */
export interface InverseGaussian
  extends Distribution<'inverseGaussian', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'mean' | 'shape'): tf.Tensor;
}

const positiveForms = (name: string, log: string) => ({
  [name]: { domain: aboveZero, fix: `pass ${log} if your network can produce negative values` },
  [log]: { domain: logarithmic, fix: runaway, transform: exponentiated },
});

function logDensity(x: tf.Tensor, mean: tf.Tensor, shape: tf.Tensor): tf.Tensor {
  const inside = tf.logicalAnd(tf.greater(x, 0), tf.isFinite(x));
  const held = when(inside, x, tf.onesLike(x));
  const t = relativeDistance(held, mean);
  const root = tf.sub(tf.mul(0.5, tf.log(shape)), tf.mul(1.5, tf.log(held)));
  const square = tf.mul(tf.mul(t, shape), tf.div(t, held));
  const value = tf.sub(tf.sub(root, 0.5 * Math.log(2 * Math.PI)), tf.mul(0.5, square));
  return choose(inside, value, Number.NEGATIVE_INFINITY);
}

/** For large mean / shape written in shape / mean: the root of one plus a square then loses nothing. */
function mode(mean: tf.Tensor, shape: tf.Tensor): tf.Tensor {
  const q = tf.div(tf.mul(1.5, mean), shape);
  const low = tf.less(q, 1);
  const small = when(low, q, tf.onesLike(q));
  const large = when(low, tf.onesLike(q), tf.div(shape, tf.mul(1.5, mean)));
  const root = (v: tf.Tensor): tf.Tensor => tf.sqrt(tf.add(1, tf.square(v)));
  return when(
    low,
    tf.div(mean, tf.add(root(small), small)),
    tf.div(tf.div(shape, 1.5), tf.add(1, root(large))),
  );
}

const make = implicitRoute({
  family: 'inverseGaussian',
  support: positive,
  parameters: { mean: positiveForms('mean', 'logMean'), shape: positiveForms('shape', 'logShape') },
  sampler: (stream, { mean, shape }) => inverseGaussianDraws(stream, mean!, shape!),
  logDensity: (x, m, s) => logDensity(x!, m!, s!),
  forms: {
    mean: { ...kernel('identity', (m) => m.clone()), parameters: ['mean'] },
    variance: (m, s) => tf.mul(tf.mul(m!, tf.div(m!, s!)), m!),
    mode: (m, s) => mode(m!, s!),
    entropy: noComposedForm('inverseGaussian.entropy'),
    cdf: noComposedForm('inverseGaussian.cdf'),
    survival: noComposedForm('inverseGaussian.survival'),
    logCdf: noComposedForm('inverseGaussian.logCdf'),
    logSurvival: noComposedForm('inverseGaussian.logSurvival'),
    quantile: noComposedForm('inverseGaussian.quantile'),
    upperQuantile: noComposedForm('inverseGaussian.upperQuantile'),
  },
});

/**
 * The inverse Gaussian distribution: how long a Brownian motion with drift takes to reach a level, and a positive
 * quantity whose tail is lighter than a log-normal's.
 *
 * Log density: ½ log(shape / (2π x³)) − shape (x − mean)² / (2 mean² x) for x > 0, −∞ elsewhere, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, by implicit differentiation of an exact sampler. Cdf, survival function, their
 * logarithms, quantiles and entropy are evaluated by kernels and differentiable once.
 *
 * @param options - one of `mean`, `logMean`, and one of `shape`, `logShape`; the variance is mean³ / shape
 * @throws ParameterError when a parameter is missing, given twice, not finite or not positive, or a logarithm lies
 *   beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { inverseGaussian } from 'leadline';
 * const d = inverseGaussian({ mean: 1, shape: 2 });
 * console.log(d.cdf(tf.tensor1d([0.5, 2])).arraySync());
 * // [ 0.2323571890592575, 0.9150466918945312 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 15; draws by
 * Michael, Schucany and Haas, The American Statistician 30 (1976).
 */
export function inverseGaussian(options: InverseGaussianOptions): InverseGaussian {
  return make(options) as unknown as InverseGaussian;
}
