import * as tf from '@tensorflow/tfjs';
import { unitInterval } from '../support/support.js';
import { choose, composedLog1p, composedLogOdds, composedSigmoid, when } from '../tensor/composedMath.js';
import { composedLogNormalCdf, composedNormalCdf, composedNormalQuantile } from '../tensor/composedNormal.js';
import type { Distribution, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationScaleParameters } from './locationScale.js';
import { quantileRoute } from './routes.js';

/** Parameters of {@link logitNormal}: location and scale of the log odds. */
export type LogitNormalOptions = LocationScaleOptions;

/** An array of logit-normal distributions. */
export interface LogitNormal extends Distribution<'logitNormal', 'pathwise'>, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale'): tf.Tensor;
}

/** A function of z inside (0, 1), with what it is below and above. */
function between(inside: (z: tf.Tensor, x: tf.Tensor) => tf.Tensor, below: number, above: number) {
  return (...[given, l, s]: tf.Tensor[]): tf.Tensor => {
    const x = tf.add(given!, tf.zerosLike(tf.add(l!, s!)));
    const within = tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1));
    const held = when(within, x, tf.fill(x.shape, 0.5));
    const value = inside(tf.div(tf.sub(composedLogOdds(held), l!), s!), held);
    const ends = when(tf.lessEqual(x, 0), tf.fill(x.shape, below), tf.fill(x.shape, above));
    return when(within, value, ends);
  };
}

const halfLogTwoPi = 0.5 * Math.log(2 * Math.PI);

const make = quantileRoute({
  family: 'logitNormal',
  support: unitInterval,
  parameters: locationScaleParameters,
  logDensity: (...[x, l, s]) => {
    const inside = between(
      (z, held) =>
        tf.sub(
          tf.mul(-0.5, tf.square(z)),
          tf.add(tf.add(tf.log(held), composedLog1p(tf.neg(held))), tf.add(tf.log(s!), halfLogTwoPi)),
        ),
      0,
      0,
    )(x!, l!, s!);
    const given = tf.add(x!, tf.zerosLike(inside));
    return choose(tf.logicalAnd(tf.greater(given, 0), tf.less(given, 1)), inside, Number.NEGATIVE_INFINITY);
  },
  draw: {
    noise: 'normal',
    composed: (e, l, s) =>
      tf.clipByValue(composedSigmoid(tf.add(l!, tf.mul(s!, e!))), 2 ** -149, 1 - 2 ** -24),
  },
  forms: {
    cdf: between(composedNormalCdf, 0, 1),
    survival: between((z) => composedNormalCdf(tf.neg(z)), 1, 0),
    logCdf: between(composedLogNormalCdf, Number.NEGATIVE_INFINITY, 0),
    logSurvival: between((z) => composedLogNormalCdf(tf.neg(z)), 0, Number.NEGATIVE_INFINITY),
    quantile: (p, l, s) => composedSigmoid(tf.add(l!, tf.mul(s!, composedNormalQuantile(p!)))),
    upperQuantile: (p, l, s) => composedSigmoid(tf.sub(l!, tf.mul(s!, composedNormalQuantile(p!)))),
  },
});

/**
 * The logit-normal distribution: a proportion whose log odds are normal, the usual posterior for an unknown
 * probability in variational inference.
 *
 * Log density: −½ z² − log x − log(1 − x) − log scale − ½ log 2π with z = (log(x / (1 − x)) − location) / scale for
 * 0 < x < 1, −∞ elsewhere, in nats. Shapes: the parameters broadcast from the right to `arrayShape`; points are
 * scalars. Gradient route: pathwise, draw = 1 / (1 + exp(−location − scale · noise)), never 0 or 1. Mean, variance,
 * mode and entropy have no closed form, and are not offered.
 *
 * @param options - `location`, and one of `scale`, `logScale`, of a point's log odds
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale is not positive, or
 *   logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logitNormal } from 'leadline';
 * const d = logitNormal({ location: 0, scale: 1.5 });
 * console.log(d.cdf(tf.tensor1d([0, 0.5, 0.9])).arraySync());
 * // [ 0, 0.5, 0.9285144805908203 ]
 * ```
 * Source: Atchison and Shen (1980), "Logistic-normal distributions", Biometrika 67, section 2.
 */
export function logitNormal(options: LogitNormalOptions): LogitNormal {
  return make(options) as unknown as LogitNormal;
}
