import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { poissonDraws } from '../random/noise.js';
import { count } from '../support/support.js';
import { choose, composedLogGamma, stepwise, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import { exponentiated } from '../tensor/transforms.js';
import type { Distribution, HasCdf, HasMean, HasMode, HasVariance } from './distribution.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, logarithmic, runaway } from './parameters.js';
import { scalarFamily } from './scalarFamily.js';

/** Parameters of {@link poisson}: exactly one. */
export type PoissonOptions = OneOf<'rate' | 'logRate' | 'mean'>;

/** An array of Poisson distributions. */
export interface Poisson extends Distribution<'poisson', 'none'>, HasMean, HasVariance, HasMode, HasCdf {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'rate'): tf.Tensor;
}

const rate = { ...kernel('identity', (v) => v.clone()), parameters: ['rate'] };
/** Beyond it neighboring counts are no longer told apart. */
const mostDrawn = 1e15;
const fix = 'pass logRate if your network can produce negative values';

const make = scalarFamily({
  family: 'poisson',
  route: 'none',
  support: count,
  parameters: {
    rate: {
      rate: { domain: aboveZero, fix },
      logRate: { domain: logarithmic, fix: runaway, transform: exponentiated },
      mean: { domain: aboveZero, fix },
    },
  },
  logDensity: kernel('poissonLogDensity', (x, r) => {
    const whole = tf.logicalAnd(tf.greaterEqual(x!, 0), tf.equal(x!, tf.floor(x!)));
    const safe = when(whole, x!, tf.zerosLike(x!));
    const inside = tf.sub(tf.sub(tf.mul(safe, tf.log(r!)), r!), composedLogGamma(tf.add(safe, 1)));
    return choose(whole, inside, Number.NEGATIVE_INFINITY);
  }),
  draw: {
    sampler: (stream, values) => {
      const rates = values.rate!;
      const at = rates.findIndex((r) => !(r <= mostDrawn));
      if (at >= 0) {
        throw new ParameterError(
          `poisson.draw: rate must be at most ${mostDrawn} to be drawn; got ${rates[at]} at element ${at}; look for what made it so large`,
        );
      }
      return poissonDraws(stream, rates);
    },
  },
  summaries: {
    mean: rate,
    variance: rate,
    mode: kernel('poissonMode', (r) => stepwise(r!, tf.floor)),
  },
  functions: { cdf: kernel('poissonCdf', noComposedForm('poisson.cdf')) },
});

/**
 * The Poisson distribution: counts of independent events.
 *
 * Log mass: x log rate − rate − log x! at whole numbers from zero, −∞ elsewhere, in nats, computed by
 * Loader's saddle-point form so that large counts lose nothing. Shapes: the parameter's shape is
 * `arrayShape`; points are scalars, float32. Gradient route: none. `cdf` is the upper incomplete gamma function
 * Q(⌊x⌋ + 1, rate), by its kernel alone: not inside `composed`.
 *
 * @param options - one of `rate`, `logRate`, `mean`; rate and mean are the same
 * @throws ParameterError when no parameter or more than one is given, or a rate is not positive and finite
 *   (logRate: within ±700); when a rate above 1e15 is drawn from.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { poisson } from 'leadline';
 * const d = poisson({ rate: 3 });
 * console.log(d.logDensity(tf.tensor1d([0, 2.5])).arraySync());
 * // [ -3, -Infinity ]
 * ```
 * Source: Johnson, Kemp and Kotz, Univariate Discrete Distributions, 3rd edition (2005), chapter 4; Loader,
 * Fast and Accurate Computation of Binomial Probabilities (2000).
 */
export function poisson(options: PoissonOptions): Poisson {
  return make(options) as unknown as Poisson;
}
