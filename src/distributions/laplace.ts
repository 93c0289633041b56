import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import { composedAbs, composedExp, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import type { Distribution, HasContinuousForms } from './distribution.js';
import {
  affineDraw,
  type LocationScaleOptions,
  locationItself,
  locationScaleParameters,
} from './locationScale.js';
import { scalarFamily } from './scalarFamily.js';

/** Parameters of {@link laplace}. */
export type LaplaceOptions = LocationScaleOptions;

/** An array of Laplace distributions. */
export interface Laplace extends Distribution<'laplace', 'pathwise'>, HasContinuousForms {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

const make = scalarFamily({
  family: 'laplace',
  route: 'pathwise',
  support: real,
  parameters: locationScaleParameters,
  logDensity: kernel('laplaceLogDensity', (x, l, s) =>
    tf.neg(tf.add(tf.div(composedAbs(tf.sub(x!, l!)), s!), tf.log(tf.mul(2, s!)))),
  ),
  draw: affineDraw('laplace'),
  summaries: {
    mean: locationItself,
    mode: locationItself,
    variance: kernel('laplaceVariance', (s) => tf.mul(2, tf.square(s!))),
    entropy: kernel('laplaceEntropy', (s) => tf.add(1, tf.log(tf.mul(2, s!)))),
  },
  functions: {
    cdf: kernel('laplaceCdf', (x, l, s) => {
      const z = tf.div(tf.sub(x!, l!), s!);
      const below = tf.less(z, 0);
      const tail = tf.mul(0.5, composedExp(when(below, z, tf.neg(z))));
      return when(below, tail, tf.sub(1, tail));
    }),
    quantile: kernel('laplaceQuantile', (p, l, s) => {
      const below = tf.less(p!, 0.5);
      const log = tf.log(tf.mul(2, when(below, p!, tf.sub(1, p!))));
      return tf.add(l!, tf.mul(s!, when(below, log, tf.neg(log))));
    }),
  },
});

/**
 * The Laplace distribution: noise with heavier tails than the normal, and a prior that favors values near
 * its location.
 *
 * Log density: −|x − location| / scale − log(2 scale), in nats. Its derivative in x at the location is
 * taken as zero. Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = location + scale · noise.
 *
 * @param options - `location`, and one of `scale`, `logScale`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { laplace } from 'leadline';
 * const d = laplace({ location: 0, scale: 1 });
 * console.log(d.cdf(tf.tensor1d([-1, 0])).arraySync());
 * // [ 0.18393972516059875, 0.5 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 24.
 */
export function laplace(options: LaplaceOptions): Laplace {
  return make(options) as unknown as Laplace;
}
