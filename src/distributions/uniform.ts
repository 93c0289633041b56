import * as tf from '@tensorflow/tfjs';
import { interval } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { choose, composedLog1p, stepwise, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import type {
  Distribution,
  HasEntropy,
  HasMean,
  HasQuantiles,
  HasTails,
  HasVariance,
} from './distribution.js';
import { requireOrderedBounds } from './orderedBounds.js';
import { finite } from './parameters.js';
import { quantileRoute } from './routes.js';

/** Parameters of {@link uniform}. */
export interface UniformOptions {
  readonly lower: ParameterValue;
  readonly upper: ParameterValue;
}

/** An array of uniform distributions. */
export interface Uniform
  extends Distribution<'uniform', 'pathwise'>,
    HasMean,
    HasVariance,
    HasEntropy,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'lower' | 'upper'): tf.Tensor;
}

// Where a point stands: the distance from one bound, the interval's width, and the function beyond each end.
function inside(x: tf.Tensor, a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  return tf.logicalAnd(tf.greater(x, a), tf.less(x, b));
}

function held(
  form: (x: tf.Tensor, a: tf.Tensor, b: tf.Tensor) => tf.Tensor,
  below: number,
  above: number,
): (...values: tf.Tensor[]) => tf.Tensor {
  return (x, a, b) => {
    const within = inside(x!, a!, b!);
    const middle = tf.mul(0.5, tf.add(a!, b!));
    const value = form(
      when(within, tf.add(x!, tf.zerosLike(middle)), tf.add(middle, tf.zerosLike(x!))),
      a!,
      b!,
    );
    const high = tf.greaterEqual(x!, b!);
    const ends = when(
      tf.logicalAnd(high, tf.onesLike(value).cast('bool')),
      tf.fill(value.shape, above),
      tf.fill(value.shape, below),
    );
    return tf.add(choose(within, value, 0), choose(tf.logicalNot(within), ends, 0));
  };
}

const share = (part: tf.Tensor, rest: tf.Tensor, width: tf.Tensor): tf.Tensor => {
  const most = tf.less(rest, part);
  const small = tf.neg(tf.div(when(most, rest, tf.zerosLike(rest)), width));
  return when(most, composedLog1p(small), tf.log(tf.div(when(most, width, part), width)));
};

const uniformQuantile = (p: tf.Tensor, a: tf.Tensor, b: tf.Tensor): tf.Tensor =>
  tf.add(a, tf.mul(p, tf.sub(b, a)));

const make = quantileRoute({
  family: 'uniform',
  support: interval,
  parameters: { lower: { lower: { domain: finite } }, upper: { upper: { domain: finite } } },
  logDensity: (x, a, b) => {
    const within = tf.logicalAnd(tf.greaterEqual(x!, a!), tf.lessEqual(x!, b!));
    const value = choose(within, tf.neg(tf.log(tf.sub(b!, a!))), Number.NEGATIVE_INFINITY);
    // A point has a gradient, and it is zero.
    return tf.add(value, stepwise(x!, tf.zerosLike));
  },
  draw: { noise: 'uniform', composed: kernel('uniformQuantile', (p, a, b) => uniformQuantile(p!, a!, b!)) },
  forms: {
    mean: (a, b) => tf.mul(0.5, tf.add(a!, b!)),
    variance: (a, b) => tf.div(tf.square(tf.sub(b!, a!)), 12),
    entropy: (a, b) => tf.log(tf.sub(b!, a!)),
    cdf: held((x, a, b) => tf.div(tf.sub(x, a), tf.sub(b, a)), 0, 1),
    survival: held((x, a, b) => tf.div(tf.sub(b, x), tf.sub(b, a)), 1, 0),
    logCdf: held((x, a, b) => share(tf.sub(x, a), tf.sub(b, x), tf.sub(b, a)), Number.NEGATIVE_INFINITY, 0),
    logSurvival: held(
      (x, a, b) => share(tf.sub(b, x), tf.sub(x, a), tf.sub(b, a)),
      0,
      Number.NEGATIVE_INFINITY,
    ),
    quantile: (p, a, b) => uniformQuantile(p!, a!, b!),
    upperQuantile: (p, a, b) => uniformQuantile(p!, b!, a!),
  },
  check: requireOrderedBounds('uniform'),
});

/**
 * The uniform distribution between two bounds: every point of the interval alike.
 *
 * Log density: −log(upper − lower) on the closed interval, −∞ outside, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = lower + noise · (upper − lower). A draw moves with the bounds, but the
 * density jumps there: a gradient through `logDensity` does not see the jump.
 *
 * @param options - `lower` and `upper`
 * @throws ParameterError when a bound is missing or not finite, or upper is not above lower.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { uniform } from 'leadline';
 * const d = uniform({ lower: 0, upper: 4 });
 * console.log(d.logDensity(tf.tensor1d([1, 5])).arraySync());
 * // [ -1.3862943649291992, -Infinity ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 26.
 */
export function uniform(options: UniformOptions): Uniform {
  return make(options) as unknown as Uniform;
}
