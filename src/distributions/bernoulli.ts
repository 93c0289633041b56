import * as tf from '@tensorflow/tfjs';
import { binary } from '../support/support.js';
import { choose, composedAbs, composedSigmoid, composedSoftplus, stepwise } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import { logOdds } from '../tensor/transforms.js';
import type { Distribution, HasCdf, HasEntropy, HasMean, HasMode, HasVariance } from './distribution.js';
import type { OneOf } from './oneOf.js';
import { finite, insideUnit } from './parameters.js';
import { scalarFamily } from './scalarFamily.js';

/** Parameters of {@link bernoulli}: exactly one. */
export type BernoulliOptions = OneOf<'logit' | 'probability'>;

/** An array of Bernoulli distributions. */
export interface Bernoulli
  extends Distribution<'bernoulli', 'none'>,
    HasMean,
    HasVariance,
    HasMode,
    HasEntropy,
    HasCdf {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'logit'): tf.Tensor;
}

const make = scalarFamily({
  family: 'bernoulli',
  route: 'none',
  support: binary,
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
  logDensity: kernel('bernoulliLogDensity', (x, l) =>
    choose(
      tf.logicalOr(tf.equal(x!, 0), tf.equal(x!, 1)),
      tf.neg(composedSoftplus(tf.mul(l!, tf.sub(1, tf.mul(2, x!))))),
      Number.NEGATIVE_INFINITY,
    ),
  ),
  draw: {
    noise: 'logistic',
    formula: kernel('bernoulliDraw', (e, l) => tf.cast(tf.greater(tf.add(e!, l!), 0), 'float32')),
  },
  summaries: {
    mean: kernel('bernoulliMean', (l) => composedSigmoid(l!)),
    variance: kernel('bernoulliVariance', (l) => tf.mul(composedSigmoid(l!), composedSigmoid(tf.neg(l!)))),
    mode: kernel('bernoulliMode', (l) => stepwise(l!, (v) => tf.greater(v, 0))),
    entropy: kernel('bernoulliEntropy', (l) => {
      const a = composedAbs(l!);
      return tf.add(composedSoftplus(tf.neg(a)), tf.mul(a, composedSigmoid(tf.neg(a))));
    }),
  },
  functions: {
    cdf: kernel('bernoulliCdf', (x, l) =>
      choose(tf.greaterEqual(x!, 1), tf.onesLike(tf.add(x!, l!)), 0).add(
        choose(
          tf.logicalAnd(tf.greaterEqual(x!, 0), tf.less(x!, 1)),
          composedSigmoid(tf.neg(tf.add(l!, tf.zerosLike(x!)))),
          0,
        ),
      ),
    ),
  },
});

/**
 * The Bernoulli distribution: yes or no, one or zero; the usual choice for black-and-white pixels.
 *
 * Log mass: −softplus(−logit) at 1 and −softplus(logit) at 0, −∞ elsewhere, in nats; it never rounds to −∞
 * however large the logit. Shapes: the parameter's shape is `arrayShape`; points are scalars, float32 0 or 1.
 * Gradient route: none.
 *
 * @param options - one of `logit`, `probability`
 * @throws ParameterError when neither or both are given, a logit is not finite, or a probability is not
 *   strictly between 0 and 1.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { bernoulli } from 'leadline';
 * const d = bernoulli({ logit: 100 });
 * console.log(d.logDensity(tf.tensor1d([0, 0.5])).arraySync());
 * // [ -100, -Infinity ]
 * ```
 * Source: Johnson, Kemp and Kotz, Univariate Discrete Distributions, 3rd edition (2005), section 3.2.
 */
export function bernoulli(options: BernoulliOptions): Bernoulli {
  return make(options) as unknown as Bernoulli;
}
