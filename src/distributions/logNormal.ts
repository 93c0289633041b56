import * as tf from '@tensorflow/tfjs';
import { positive } from '../support/support.js';
import { composedExp } from '../tensor/composedMath.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationScaleParameters } from './locationScale.js';
import { halfLogTwoPi, normalForms } from './normalForms.js';
import { throughExp } from './ownMaps.js';
import { pushforwardRoute } from './routes.js';

/** Parameters of {@link logNormal}: location and scale of the logarithm. */
export type LogNormalOptions = LocationScaleOptions;

/** An array of log-normal distributions. */
export interface LogNormal extends Distribution<'logNormal', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

const make = pushforwardRoute({
  family: 'logNormal',
  support: positive,
  parameters: locationScaleParameters,
  map: throughExp,
  base: normalForms,
  noise: 'normal',
  forms: {
    mean: (l, s) => composedExp(tf.add(l!, tf.mul(0.5, tf.square(s!)))),
    variance: (l, s) => {
      const v = tf.square(s!);
      return tf.neg(tf.mul(tf.expm1(tf.neg(v)), composedExp(tf.mul(2, tf.add(l!, v)))));
    },
    mode: (l, s) => composedExp(tf.sub(l!, tf.square(s!))),
    entropy: (l, s) => tf.add(tf.add(l!, tf.log(s!)), halfLogTwoPi + 0.5),
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
