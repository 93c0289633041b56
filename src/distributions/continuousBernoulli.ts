import * as tf from '@tensorflow/tfjs';
import { unitInterval } from '../support/support.js';
import {
  choose,
  composedAbs,
  composedExp,
  composedLog1p,
  composedSigmoid,
  stepwise,
  when,
} from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import { logOdds } from '../tensor/transforms.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
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

// Coefficients of l², l⁴, … of log(sinh(l / 2) / (l / 2)): see the double-precision formulas.
const terms = [
  0.041666666666666664, -0.00034722222222222224, 5.5114638447971785e-6, -1.033399470899471e-7,
  2.08767569878681e-9, -4.403491782239578e-11,
];

/** Σ cₖ l^2k, lowest power first. */
function even(l: tf.Tensor, coefficients: readonly number[]): tf.Tensor {
  const square = tf.square(l);
  return coefficients.reduceRight<tf.Tensor>((sum, c) => tf.add(c, tf.mul(square, sum)), tf.zerosLike(l));
}

/** One formula of l next to zero, and another of |l| farther off. */
function bySize(
  l: tf.Tensor,
  edge: number,
  near: (l: tf.Tensor) => tf.Tensor,
  far: (l: tf.Tensor, size: tf.Tensor) => tf.Tensor,
): tf.Tensor {
  const small = tf.lessEqual(tf.abs(l), edge);
  const outer = when(small, tf.onesLike(l), l);
  return when(small, near(when(small, l, tf.zerosLike(l))), far(outer, composedAbs(outer)));
}

/** log(sinh(l / 2) / (l / 2)). */
const evenLog = (l: tf.Tensor): tf.Tensor =>
  bySize(
    l,
    1,
    (v) => tf.mul(tf.square(v), even(v, terms)),
    (_, size) => tf.add(tf.mul(0.5, size), tf.sub(composedLog1mexp(tf.neg(size)), tf.log(size))),
  );

/** The mean for log odds of any sign; below −1 without taking from one half. */
const mean = (l: tf.Tensor): tf.Tensor =>
  bySize(
    l,
    1,
    (v) =>
      tf.add(
        0.5,
        tf.mul(
          v,
          even(
            v,
            terms.map((c, k) => (2 * k + 2) * c),
          ),
        ),
      ),
    (v, size) => {
      const lower = tf.sub(tf.div(1, size), tf.div(1, composedExpm1(size)));
      return when(tf.less(v, 0), lower, tf.sub(1, lower));
    },
  );

const variance = (l: tf.Tensor): tf.Tensor =>
  bySize(
    l,
    1,
    (v) =>
      even(
        v,
        terms.map((c, k) => (2 * k + 2) * (2 * k + 1) * c),
      ),
    (_, size) => {
      const e = composedExp(tf.neg(size));
      return tf.sub(tf.div(1, tf.square(size)), tf.div(e, tf.square(tf.sub(1, e))));
    },
  );

const entropy = (l: tf.Tensor): tf.Tensor =>
  bySize(
    l,
    1,
    (v) =>
      tf.mul(
        tf.square(v),
        even(
          v,
          terms.map((c, k) => -(2 * k + 1) * c),
        ),
      ),
    (_, size) =>
      tf.sub(
        tf.add(1, tf.sub(composedLog1mexp(tf.neg(size)), tf.log(size))),
        tf.div(size, composedExpm1(size)),
      ),
  );

/** The share below x, whose remainder is `rest`: by Bernoulli polynomials next to l = 0 (DLMF 24.2.3). */
function share(x: tf.Tensor, rest: tf.Tensor, l: tf.Tensor): tf.Tensor {
  return bySize(
    l,
    0.1,
    (v) => {
      const bend = tf.add(
        -0.5,
        tf.mul(v, tf.add(tf.div(tf.sub(0.5, x), 6), tf.div(tf.mul(v, tf.mul(x, rest)), 24))),
      );
      return tf.mul(x, tf.add(1, tf.mul(tf.mul(v, rest), bend)));
    },
    (v, size) => {
      const upper = tf.greater(v, 0);
      const fall = tf.div(composedExpm1(tf.neg(tf.mul(size, x))), composedExpm1(tf.neg(size)));
      const held = when(upper, tf.neg(tf.mul(size, rest)), tf.zerosLike(v));
      return tf.mul(composedExp(held), fall);
    },
  );
}

/** A function of x, 1 − x and l inside (0, 1), with what it is below and above. */
function between(inside: typeof share, below: number, above: number) {
  return (...[given, logit]: tf.Tensor[]): tf.Tensor => {
    const x = tf.add(given!, tf.zerosLike(logit!));
    const l = tf.add(logit!, tf.zerosLike(x));
    const within = tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1));
    const held = when(within, x, tf.fill(x.shape, 0.5));
    const ends = when(tf.lessEqual(x, 0), tf.fill(x.shape, below), tf.fill(x.shape, above));
    return when(within, inside(held, tf.sub(1, held), l), ends);
  };
}
const shareAbove: typeof share = (x, rest, l) => share(rest, x, tf.neg(l));

/** The point with these shares on its sides; next to l = 0 by the cumulants of a Bernoulli variable. */
function pointAt(below: tf.Tensor, above: tf.Tensor, logit: tf.Tensor): tf.Tensor {
  const p = tf.add(below, tf.zerosLike(logit));
  const q = tf.add(above, tf.zerosLike(logit));
  const l = tf.add(logit, tf.zerosLike(p));
  return bySize(
    l,
    0.1,
    (v) => {
      const pq = tf.mul(p, q);
      const third = tf.add(tf.div(tf.sub(q, p), 6), tf.mul(v, tf.div(tf.sub(1, tf.mul(6, pq)), 24)));
      return tf.add(p, tf.mul(tf.mul(pq, v), tf.add(0.5, tf.mul(v, third))));
    },
    (v) => {
      const high = tf.greater(v, 60);
      const held = when(high, tf.onesLike(v), v);
      const lost = tf.neg(tf.mul(p, composedExpm1(held)));
      const much = tf.greater(lost, 0.5);
      const plain = composedLog1p(tf.neg(when(much, tf.zerosLike(lost), lost)));
      const left = tf.log(when(much, tf.add(q, tf.mul(p, composedExp(held))), tf.onesLike(lost)));
      return when(high, tf.add(1, tf.div(tf.log(p), v)), tf.div(when(much, left, plain), held));
    },
  );
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
    cdf: between(share, 0, 1),
    survival: between(shareAbove, 1, 0),
    logCdf: between((...v) => logShare(share(...v), shareAbove(...v)), Number.NEGATIVE_INFINITY, 0),
    logSurvival: between((...v) => logShare(shareAbove(...v), share(...v)), 0, Number.NEGATIVE_INFINITY),
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
