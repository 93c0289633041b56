import * as tf from '@tensorflow/tfjs';
import {
  continuousBernoulliEntropy,
  continuousBernoulliMean,
  continuousBernoulliVariance,
} from '../numeric/families/continuousBernoulli.js';
import { unitInterval } from '../support/support.js';
import { choose, composedExp, composedSigmoid, stepwise, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import { logOdds } from '../tensor/transforms.js';
import { pointBetween, shareBelow } from './continuousBernoulliShares.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { byEven, evenPolynomial, nearLogSinh } from './evenPolynomial.js';
import type { OneOf } from './oneOf.js';
import { finite, insideUnit } from './parameters.js';
import { quantileRoute } from './routes.js';
import { logShare } from './shares.js';

/** Parameters of {@link continuousBernoulli}: exactly one. */
export type ContinuousBernoulliOptions = OneOf<'logit' | 'probability'>;

/** An array of continuous Bernoulli distributions. */
export interface ContinuousBernoulli
  extends Distribution<'continuousBernoulli', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'logit'): tf.Tensor;
}

/** log(sinh(l / 2) / (l / 2)). */
const evenLog = (l: tf.Tensor): tf.Tensor =>
  byEven(l, nearLogSinh, (_, size) =>
    tf.add(tf.mul(0.5, size), tf.sub(composedLog1mexp(tf.neg(size)), tf.log(size))),
  );

const nearMean = evenPolynomial((l) => (continuousBernoulliMean(l) - 0.5) / l);
/** The mean for log odds of any sign; far below zero without taking from one half. */
const mean = (l: tf.Tensor): tf.Tensor =>
  byEven(
    l,
    (v) => tf.add(0.5, tf.mul(v, nearMean(v))),
    (v, size) => {
      const lower = tf.sub(tf.div(1, size), tf.div(1, composedExpm1(size)));
      return when(tf.less(v, 0), lower, tf.sub(1, lower));
    },
  );

const nearVariance = evenPolynomial(continuousBernoulliVariance);
const variance = (l: tf.Tensor): tf.Tensor =>
  byEven(l, nearVariance, (_, size) => {
    const e = composedExp(tf.neg(size));
    return tf.sub(tf.div(1, tf.square(size)), tf.div(e, tf.square(tf.sub(1, e))));
  });

const nearEntropy = evenPolynomial((l) => continuousBernoulliEntropy(l) / (l * l));
const entropy = (l: tf.Tensor): tf.Tensor =>
  byEven(
    l,
    (v) => tf.mul(tf.square(v), nearEntropy(v)),
    (_, size) =>
      tf.sub(
        tf.add(1, tf.sub(composedLog1mexp(tf.neg(size)), tf.log(size))),
        tf.div(size, composedExpm1(size)),
      ),
  );

/** A function of x, 1 − x and l inside (0, 1), with what it is below and above. */
function between(inside: typeof shareBelow, below: number, above: number) {
  return (...[given, logit]: tf.Tensor[]): tf.Tensor => {
    const x = tf.add(given!, tf.zerosLike(logit!));
    const l = tf.add(logit!, tf.zerosLike(x));
    const within = tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1));
    const held = when(within, x, tf.fill(x.shape, 0.5));
    const ends = when(tf.lessEqual(x, 0), tf.fill(x.shape, below), tf.fill(x.shape, above));
    return when(within, inside(held, tf.sub(1, held), l), ends);
  };
}
const shareAbove: typeof shareBelow = (x, rest, l) => shareBelow(rest, x, tf.neg(l));

/** The point with these shares on its sides. */
function pointAt(below: tf.Tensor, above: tf.Tensor, logit: tf.Tensor): tf.Tensor {
  const p = tf.add(below, tf.zerosLike(logit));
  return pointBetween(p, tf.add(above, tf.zerosLike(logit)), tf.add(logit, tf.zerosLike(p)));
}

const make = quantileRoute({
  family: 'continuousBernoulli',
  support: unitInterval,
  parameters: {
    logit: {
      logit: { domain: finite },
      probability: {
        domain: insideUnit,
        transform: logOdds,
        fix: 'pass logit, which a network can produce freely',
      },
    },
  },
  logDensity: (...[x, l]) => {
    const inside = tf.logicalAnd(tf.greaterEqual(x!, 0), tf.lessEqual(x!, 1));
    return choose(inside, tf.sub(tf.mul(l!, tf.sub(x!, 0.5)), evenLog(l!)), Number.NEGATIVE_INFINITY);
  },
  draw: {
    noise: 'logistic',
    composed: (e, l) =>
      tf.clipByValue(pointAt(composedSigmoid(e!), composedSigmoid(tf.neg(e!)), l!), 2 ** -149, 1 - 2 ** -24),
  },
  forms: {
    mean: (l) => mean(l!),
    variance: (l) => variance(l!),
    mode: (l) => stepwise(l!, (v) => tf.mul(0.5, tf.add(1, tf.sign(v)))),
    entropy: (l) => entropy(l!),
    cdf: between(shareBelow, 0, 1),
    survival: between(shareAbove, 1, 0),
    logCdf: between((...v) => logShare(shareBelow(...v), shareAbove(...v)), Number.NEGATIVE_INFINITY, 0),
    logSurvival: between((...v) => logShare(shareAbove(...v), shareBelow(...v)), 0, Number.NEGATIVE_INFINITY),
    quantile: (p, l) => pointAt(p!, tf.sub(1, p!), l!),
    upperQuantile: (p, l) => pointAt(tf.sub(1, p!), p!, l!),
  },
});

/**
 * The continuous Bernoulli distribution on [0, 1]: the Bernoulli likelihood made a density, for grey pixels, for
 * which the discrete one is not normalized.
 *
 * Log density: l x − log((exp(l) − 1) / l) for 0 ≤ x ≤ 1 with l = logit, −∞ outside, in nats; uniform at l = 0.
 * Shapes: the parameter's shape is `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = log(1 + u (exp(l) − 1)) / l with u uniform, never 0 or 1.
 * The closed divergence of two of these has no form in tensor operations: call it outside `composed`.
 *
 * @param options - one of `logit`, `probability`; the probability is 1 / (1 + exp(−logit)), which is not the mean
 * @throws ParameterError when neither or both are given, a logit is not finite, or a probability is not strictly
 *   between 0 and 1.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { continuousBernoulli } from 'leadline';
 * const d = continuousBernoulli({ logit: [0, 2] });
 * console.log(d.mean().arraySync());
 * // [ 0.5, 0.6565176248550415 ]
 * ```
 * Source: Loaiza-Ganem and Cunningham (2019), "The continuous Bernoulli: fixing a pervasive error in variational
 * autoencoders", arXiv 1907.06845, section 3.
 */
export function continuousBernoulli(options: ContinuousBernoulliOptions): ContinuousBernoulli {
  return make(options) as unknown as ContinuousBernoulli;
}
