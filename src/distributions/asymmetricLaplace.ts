import * as tf from '@tensorflow/tfjs';
import { real } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { composedExp, composedLog1p, composedSoftplus, when } from '../tensor/composedMath.js';
import { composedExpm1 } from '../tensor/composedRemainders.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { type LocationScaleOptions, locationItself, locationScaleParameters } from './locationScale.js';
import { aboveZero } from './parameters.js';
import { locationScaleRoute } from './routes.js';
import { logShare } from './shares.js';

/** Parameters of {@link asymmetricLaplace}. */
export type AsymmetricLaplaceOptions = LocationScaleOptions & { readonly asymmetry: ParameterValue };

/** An array of asymmetric Laplace distributions. */
export interface AsymmetricLaplace
  extends Distribution<'asymmetricLaplace', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'scale' | 'asymmetry'): tf.Tensor;
}

/** One formula below zero and another above, each read only on its own side. */
function bySide(
  [z, k]: tf.Tensor[],
  lower: (z: tf.Tensor, k: tf.Tensor) => tf.Tensor,
  upper: (z: tf.Tensor, k: tf.Tensor) => tf.Tensor,
): tf.Tensor {
  const given = tf.add(z!, tf.zerosLike(k!));
  const isLower = tf.less(given, 0);
  const zero = tf.zerosLike(given);
  return when(isLower, lower(when(isLower, given, zero), k!), upper(when(isLower, zero, given), k!));
}

const width = (k: tf.Tensor): tf.Tensor => tf.log(tf.add(k, tf.div(1, k)));
const lowerShare = (k: tf.Tensor): tf.Tensor => tf.div(tf.square(k), tf.add(1, tf.square(k)));
const upperShare = (k: tf.Tensor): tf.Tensor => tf.div(1, tf.add(1, tf.square(k)));
const fall = (z: tf.Tensor, k: tf.Tensor): tf.Tensor => tf.neg(tf.mul(k, z));

function cdf(...v: tf.Tensor[]): tf.Tensor {
  return bySide(
    v,
    (z, k) => tf.mul(lowerShare(k), composedExp(tf.div(z, k))),
    (z, k) => {
      const rest = tf.mul(upperShare(k), composedExp(fall(z, k)));
      const plain = tf.sub(lowerShare(k), tf.mul(upperShare(k), composedExpm1(fall(z, k))));
      return when(tf.less(rest, 0.5), tf.sub(1, rest), plain);
    },
  );
}
function survival(...v: tf.Tensor[]): tf.Tensor {
  return bySide(
    v,
    (z, k) => {
      const rest = tf.mul(lowerShare(k), composedExp(tf.div(z, k)));
      const plain = tf.sub(upperShare(k), tf.mul(lowerShare(k), composedExpm1(tf.div(z, k))));
      return when(tf.less(rest, 0.5), tf.sub(1, rest), plain);
    },
    (z, k) => tf.mul(upperShare(k), composedExp(fall(z, k))),
  );
}

/** The point with these shares on its sides, whose logarithms are given. */
function pointAt(logBelow: tf.Tensor, logAbove: tf.Tensor, k: tf.Tensor): tf.Tensor {
  const lower = tf.mul(k, tf.add(logBelow, composedLog1p(tf.div(1, tf.square(k)))));
  const upper = tf.neg(tf.div(tf.add(logAbove, composedLog1p(tf.square(k))), k));
  return when(tf.less(lower, 0), lower, upper);
}

const make = locationScaleRoute({
  family: 'asymmetricLaplace',
  support: real,
  parameters: {
    ...locationScaleParameters,
    asymmetry: { asymmetry: { domain: aboveZero } },
  },
  logDensity: (...v) => {
    const fallen = bySide(v, (z, k) => tf.div(z, k), fall);
    // At the kink the derivative in the point is zero.
    const atKink = tf.equal(tf.add(v[0]!, tf.zerosLike(fallen)), 0);
    return tf.sub(when(atKink, tf.zerosLike(fallen), fallen), width(v[1]!));
  },
  draw: {
    noise: 'logistic',
    composed: (e, k) => pointAt(tf.neg(composedSoftplus(tf.neg(e!))), tf.neg(composedSoftplus(e!)), k!),
  },
  forms: {
    mean: (k) => tf.div(tf.mul(tf.sub(1, k!), tf.add(1, k!)), k!),
    mode: locationItself,
    variance: (k) => tf.add(tf.square(k!), tf.div(1, tf.square(k!))),
    entropy: (k) => tf.add(1, width(k!)),
    cdf,
    survival,
    logCdf: (...v) =>
      bySide(
        v,
        (z, k) => tf.sub(tf.div(z, k), composedLog1p(tf.div(1, tf.square(k)))),
        (z, k) => logShare(cdf(z, k), survival(z, k)),
      ),
    logSurvival: (...v) =>
      bySide(
        v,
        (z, k) => logShare(survival(z, k), cdf(z, k)),
        (z, k) => tf.sub(fall(z, k), composedLog1p(tf.square(k))),
      ),
    quantile: (p, k) => pointAt(tf.log(p!), composedLog1p(tf.neg(p!)), k!),
    upperQuantile: (p, k) => pointAt(composedLog1p(tf.neg(p!)), tf.log(p!), k!),
  },
});

/**
 * The asymmetric Laplace distribution: exponential tails of unlike lengths, for skewed errors; maximizing its
 * density in the location is quantile regression.
 *
 * Log density: −κ z for z ≥ 0 and z / κ below, less log(κ + 1 / κ) + log scale, with z = (x − location) / scale and
 * κ = asymmetry, in nats; κ = 1 is the Laplace distribution, and location is the quantile of κ² / (1 + κ²).
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = quantile of a uniform number.
 * The closed divergence of two of these has no form in tensor operations: call it outside `composed`.
 *
 * @param options - `location`, one of `scale`, `logScale`, and `asymmetry`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the scale or the asymmetry is not
 *   positive, or logScale lies beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { asymmetricLaplace } from 'leadline';
 * const d = asymmetricLaplace({ location: 0, scale: 1, asymmetry: 2 });
 * console.log(d.cdf(tf.tensor1d([-1, 0, 1])).arraySync());
 * // [ 0.48522451519966125, 0.800000011920929, 0.9729329347610474 ]
 * ```
 * Source: Kotz, Kozubowski and Podgórski, The Laplace Distribution and Generalizations (2001), section 3.1, whose
 * scale is √2 times this one.
 */
export function asymmetricLaplace(options: AsymmetricLaplaceOptions): AsymmetricLaplace {
  return make(options) as unknown as AsymmetricLaplace;
}
