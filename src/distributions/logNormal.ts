import * as tf from '@tensorflow/tfjs';
import { positive } from '../support/support.js';
import { choose, composedExp, when } from '../tensor/composedMath.js';
import { composedNormalCdf, composedNormalQuantile } from '../tensor/composedNormal.js';
import { kernel } from '../tensor/formula.js';
import type { Distribution, HasContinuousForms } from './distribution.js';
import { type LocationScaleOptions, locationScaleParameters } from './locationScale.js';
import { scalarFamily } from './scalarFamily.js';

/** Parameters of {@link logNormal}: location and scale of the logarithm. */
export type LogNormalOptions = LocationScaleOptions;

/** An array of log-normal distributions. */
export interface LogNormal extends Distribution<'logNormal', 'pathwise'>, HasContinuousForms {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

const halfLogTwoPi = 0.5 * Math.log(2 * Math.PI);
const safe = (x: tf.Tensor): tf.Tensor => when(tf.greater(x, 0), x, tf.onesLike(x));

const make = scalarFamily({
  family: 'logNormal',
  route: 'pathwise',
  support: positive,
  parameters: locationScaleParameters,
  logDensity: kernel('logNormalLogDensity', (x, l, s) => {
    const logX = tf.log(safe(x!));
    const z = tf.div(tf.sub(logX, l!), s!);
    const inside = tf.sub(tf.mul(-0.5, tf.square(z)), tf.add(tf.add(logX, tf.log(s!)), halfLogTwoPi));
    return choose(tf.greater(x!, 0), inside, Number.NEGATIVE_INFINITY);
  }),
  draw: {
    noise: 'normal',
    formula: kernel('logNormalDraw', (e, l, s) => composedExp(tf.add(l!, tf.mul(s!, e!)))),
  },
  summaries: {
    mean: kernel('logNormalMean', (l, s) => composedExp(tf.add(l!, tf.mul(0.5, tf.square(s!))))),
    variance: kernel('logNormalVariance', (l, s) => {
      const v = tf.square(s!);
      return tf.neg(tf.mul(tf.expm1(tf.neg(v)), composedExp(tf.mul(2, tf.add(l!, v)))));
    }),
    mode: kernel('logNormalMode', (l, s) => composedExp(tf.sub(l!, tf.square(s!)))),
    entropy: kernel('logNormalEntropy', (l, s) => tf.add(tf.add(l!, tf.log(s!)), halfLogTwoPi + 0.5)),
  },
  functions: {
    cdf: kernel('logNormalCdfOf', (x, l, s) =>
      choose(tf.greater(x!, 0), composedNormalCdf(tf.div(tf.sub(tf.log(safe(x!)), l!), s!)), 0),
    ),
    quantile: kernel('logNormalQuantileOf', (p, l, s) =>
      composedExp(tf.add(l!, tf.mul(s!, composedNormalQuantile(p!)))),
    ),
  },
});

/**
 * The log-normal distribution: positive quantities whose logarithm is normal, such as sizes and durations
 * that grow by factors.
 *
 * Log density: −½ z² − log x − log scale − ½ log 2π with z = (log x − location) / scale, in nats; −∞ for
 * x ≤ 0. Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = exp(location + scale · noise).
 *
 * @param options - `location`, and one of `scale`, `logScale`, of the logarithm of a point
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logNormal } from 'leadline';
 * const d = logNormal({ location: 0, scale: 0.5 });
 * console.log(d.logDensity(tf.tensor1d([-1, 1])).arraySync());
 * // [ -Infinity, -0.2257913500070572 ]
 * console.log(d.mean().arraySync());
 * // 1.133148431777954
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 14.
 */
export function logNormal(options: LogNormalOptions): LogNormal {
  return make(options) as unknown as LogNormal;
}
