import * as tf from '@tensorflow/tfjs';
import { unitInterval } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { composedExp, composedLog1p, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import { detach } from '../tensor/detach.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { aboveZero } from './parameters.js';
import { quantileRoute } from './routes.js';

/** Parameters of {@link kumaraswamy}: the two shapes. */
export interface KumaraswamyOptions {
  readonly alpha: ParameterValue;
  readonly beta: ParameterValue;
}

/** An array of Kumaraswamy distributions. */
export interface Kumaraswamy
  extends Distribution<'kumaraswamy', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'alpha' | 'beta'): tf.Tensor;
}

/** A function of a point inside (0, 1) and the shapes, with what it is below and above. */
function between(
  inside: (x: tf.Tensor, alpha: tf.Tensor, beta: tf.Tensor) => tf.Tensor,
  below: number,
  above: number,
) {
  return (...[given, alpha, beta]: tf.Tensor[]): tf.Tensor => {
    const x = tf.add(given!, tf.zerosLike(tf.add(alpha!, beta!)));
    const within = tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1));
    const value = inside(when(within, x, tf.fill(x.shape, 0.5)), alpha!, beta!);
    return when(within, value, when(tf.lessEqual(x, 0), tf.fill(x.shape, below), tf.fill(x.shape, above)));
  };
}

const logRest = (x: tf.Tensor, alpha: tf.Tensor): tf.Tensor => composedLog1mexp(tf.mul(alpha, tf.log(x)));
const logSurvival = (x: tf.Tensor, alpha: tf.Tensor, beta: tf.Tensor): tf.Tensor =>
  tf.mul(beta, logRest(x, alpha));
const pointAt = (e: tf.Tensor, alpha: tf.Tensor, beta: tf.Tensor): tf.Tensor =>
  composedExp(tf.div(composedLog1mexp(tf.neg(tf.div(e, beta))), alpha));

const make = quantileRoute({
  family: 'kumaraswamy',
  support: unitInterval,
  parameters: {
    alpha: { alpha: { domain: aboveZero } },
    beta: { beta: { domain: aboveZero } },
  },
  logDensity: (...[given, alpha, beta]) => {
    const inside = between(
      (x, a, b) =>
        tf.add(
          tf.add(tf.log(a), tf.log(b)),
          tf.add(tf.mul(tf.sub(a, 1), tf.log(x)), tf.mul(tf.sub(b, 1), logRest(x, a))),
        ),
      0,
      0,
    )(given!, alpha!, beta!);
    const x = detach(tf.add(given!, tf.zerosLike(inside)));
    const end = (at: number, shape: tf.Tensor, other: tf.Tensor): tf.Tensor => {
      const s = tf.add(shape, tf.zerosLike(x));
      const infinite = tf.mul(tf.sign(tf.sub(1, s)), Number.POSITIVE_INFINITY);
      const limit = tf.where(tf.equal(s, 1), tf.add(tf.log(other), tf.zerosLike(s)), infinite);
      return tf.where(tf.equal(x, at), limit, tf.fill(x.shape, Number.NEGATIVE_INFINITY));
    };
    const [a, b] = [detach(alpha!), detach(beta!)];
    const atEnds = tf.maximum(end(0, a, b), end(1, b, a));
    const within = tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1));
    return when(within, inside, atEnds);
  },
  draw: {
    noise: 'exponential',
    composed: (e, a, b) => tf.clipByValue(pointAt(e!, a!, b!), 2 ** -149, 1 - 2 ** -24),
  },
  forms: {
    mean: noComposedForm('kumaraswamyMean'),
    variance: noComposedForm('kumaraswamyVariance'),
    mode: (...[a, b]) => {
      const peaked = tf.logicalAnd(tf.greater(a!, 1), tf.greater(b!, 1));
      const zero = tf.zerosLike(tf.add(a!, b!));
      const alpha = when(peaked, tf.add(a!, zero), tf.add(zero, 2));
      const beta = when(peaked, tf.add(b!, zero), tf.add(zero, 2));
      const grown = tf.div(tf.mul(alpha, tf.sub(beta, 1)), tf.sub(alpha, 1));
      const peak = composedExp(tf.neg(tf.div(composedLog1p(grown), alpha)));
      // Elsewhere the mode moves in steps.
      const [c, d] = [detach(a!), detach(b!)];
      const unclear = tf.logicalOr(tf.equal(c, d), tf.logicalAnd(tf.less(c, 1), tf.less(d, 1)));
      const upper = tf.cast(tf.logicalAnd(tf.greaterEqual(c, 1), tf.lessEqual(d, 1)), 'float32');
      return when(peaked, peak, tf.where(unclear, tf.fill(zero.shape, Number.NaN), upper));
    },
    entropy: noComposedForm('kumaraswamyEntropy'),
    cdf: between((...v) => tf.neg(composedExpm1(logSurvival(...v))), 0, 1),
    survival: between((...v) => composedExp(logSurvival(...v)), 1, 0),
    logCdf: between((...v) => composedLog1mexp(logSurvival(...v)), Number.NEGATIVE_INFINITY, 0),
    logSurvival: between(logSurvival, 0, Number.NEGATIVE_INFINITY),
    quantile: (p, a, b) => pointAt(tf.neg(composedLog1p(tf.neg(p!))), a!, b!),
    upperQuantile: (p, a, b) => pointAt(tf.neg(tf.log(p!)), a!, b!),
  },
});

/**
 * The Kumaraswamy distribution: proportions with the shapes of a beta distribution, but with elementary distribution
 * function and quantile, so that a draw and its gradient are cheap.
 *
 * Log density: log alpha + log beta + (alpha − 1) log x + (beta − 1) log(1 − x^alpha) for 0 < x < 1, its limits at
 * 0 and 1, −∞ outside, in nats. Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = (1 − exp(−noise / beta))^(1 / alpha), never 0 or 1. The mode is NaN where the
 * density rises towards both ends or is flat. Mean, variance and entropy have no form in tensor operations: call them
 * outside `composed`. Two of these have no closed divergence: the mean of log(1 − x^alpha)
 * for another alpha is an infinite series; use `sampledKl`.
 *
 * @param options - `alpha` and `beta`: the powers of x and of 1 − x^alpha
 * @throws ParameterError when a shape is missing, not positive or not finite.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { kumaraswamy } from 'leadline';
 * const d = kumaraswamy({ alpha: 2, beta: 3 });
 * console.log(d.survival(tf.tensor1d([0, 0.5, 1])).arraySync());
 * // [ 1, 0.421875, 0 ]
 * ```
 * Source: Jones (2009), "Kumaraswamy's distribution", Statistical Methodology 6, sections 2 and 3.
 */
export function kumaraswamy(options: KumaraswamyOptions): Kumaraswamy {
  return make(options) as unknown as Kumaraswamy;
}
