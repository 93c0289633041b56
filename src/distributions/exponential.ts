import * as tf from '@tensorflow/tfjs';
import { positive } from '../support/support.js';
import { choose, composedExp, composedLog1p, stepwise, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import { kernel } from '../tensor/formula.js';
import { exponentiated, reciprocal } from '../tensor/transforms.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, logarithmic, runaway } from './parameters.js';
import { quantileRoute } from './routes.js';

/** Parameters of {@link exponential}: exactly one. */
export type ExponentialOptions = OneOf<'rate' | 'logRate' | 'scale' | 'mean'>;

/** An array of exponential distributions. */
export interface Exponential
  extends Distribution<'exponential', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'rate'): tf.Tensor;
}

const fix = 'pass logRate if your network can produce negative values';

const make = quantileRoute({
  family: 'exponential',
  support: positive,
  parameters: {
    rate: {
      rate: { domain: aboveZero, fix },
      logRate: { domain: logarithmic, fix: runaway, transform: exponentiated },
      scale: { domain: aboveZero, transform: reciprocal, fix },
      mean: { domain: aboveZero, transform: reciprocal, fix },
    },
  },
  logDensity: kernel('exponentialLogDensity', (x, r) =>
    choose(tf.greaterEqual(x!, 0), tf.sub(tf.log(r!), tf.mul(r!, x!)), Number.NEGATIVE_INFINITY),
  ),
  draw: { noise: 'exponential', composed: kernel('exponentialDraw', (e, r) => tf.div(e!, r!)) },
  forms: {
    mean: { ...kernel('reciprocal', (r) => tf.div(1, r!)), parameters: ['rate'] },
    variance: kernel('exponentialVariance', (r) => tf.div(1, tf.square(r!))),
    mode: kernel('exponentialMode', (r) => stepwise(r!, tf.zerosLike)),
    entropy: kernel('exponentialEntropy', (r) => tf.sub(1, tf.log(r!))),
    cdf: kernel('exponentialCdf', (x, r) =>
      choose(tf.greaterEqual(x!, 0), tf.neg(composedExpm1(tf.neg(tf.mul(r!, x!)))), 0),
    ),
    survival: kernel('exponentialSurvival', (x, r) =>
      choose(tf.greaterEqual(x!, 0), composedExp(tf.neg(tf.mul(r!, x!))), 1),
    ),
    logCdf: kernel('exponentialLogCdf', (x, r) => {
      const inside = tf.greater(x!, 0);
      const held = tf.mul(r!, when(inside, x!, tf.onesLike(x!)));
      return choose(inside, composedLog1mexp(tf.neg(held)), Number.NEGATIVE_INFINITY);
    }),
    logSurvival: kernel('exponentialLogSurvival', (x, r) =>
      choose(tf.greaterEqual(x!, 0), tf.neg(tf.mul(r!, x!)), 0),
    ),
    quantile: kernel('exponentialQuantile', (p, r) => tf.neg(tf.div(composedLog1p(tf.neg(p!)), r!))),
    upperQuantile: kernel('exponentialUpperQuantile', (p, r) => tf.neg(tf.div(tf.log(p!), r!))),
  },
});

/**
 * The exponential distribution: waiting times without memory.
 *
 * Log density: log rate − rate · x for x ≥ 0, −∞ below, in nats.
 * Shapes: the parameter's shape is `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = noise / rate.
 *
 * @param options - one of `rate`, `logRate`, `scale`, `mean`; scale and mean are both 1 / rate
 * @throws ParameterError when no parameter or more than one is given, or it is not positive and finite (logRate:
 *   within ±700).
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { exponential } from 'leadline';
 * const d = exponential({ rate: 2 });
 * console.log(d.logDensity(tf.tensor1d([-1, 0, 1])).arraySync());
 * // [ -Infinity, 0.6931471824645996, -1.3068528175354004 ]
 * console.log(d.mean().arraySync());
 * // 0.5
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 19.
 */
export function exponential(options: ExponentialOptions): Exponential {
  return make(options) as unknown as Exponential;
}
