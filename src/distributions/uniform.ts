import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast } from '../kernels/layout.js';
import { interval } from '../support/support.js';
import { valuesAreChecked } from '../tensor/backend.js';
import { type ParameterValue, positionText } from '../tensor/checks.js';
import { choose, stepwise } from '../tensor/composedMath.js';
import { detach } from '../tensor/detach.js';
import { kernel } from '../tensor/formula.js';
import { type Operand, operandData } from '../tensor/operand.js';
import type { Distribution, HasCdf, HasEntropy, HasMean, HasQuantile, HasVariance } from './distribution.js';
import { finite } from './parameters.js';
import { scalarFamily } from './scalarFamily.js';

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
    HasCdf,
    HasQuantile {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'lower' | 'upper'): tf.Tensor;
}

const quantile = kernel('uniformQuantile', (p, a, b) => tf.add(a!, tf.mul(p!, tf.sub(b!, a!))));

const make = scalarFamily({
  family: 'uniform',
  route: 'pathwise',
  support: interval,
  parameters: { lower: { lower: { domain: finite } }, upper: { upper: { domain: finite } } },
  logDensity: kernel('uniformLogDensity', (x, a, b) => {
    const inside = tf.logicalAnd(tf.greaterEqual(x!, a!), tf.lessEqual(x!, b!));
    const value = choose(inside, tf.neg(tf.log(tf.sub(b!, a!))), Number.NEGATIVE_INFINITY);
    // A point has a gradient, and it is zero.
    return tf.add(value, stepwise(x!, tf.zerosLike));
  }),
  draw: { noise: 'uniform', formula: quantile },
  summaries: {
    mean: kernel('uniformMean', (a, b) => tf.mul(0.5, tf.add(a!, b!))),
    variance: kernel('uniformVariance', (a, b) => tf.div(tf.square(tf.sub(b!, a!)), 12)),
    entropy: kernel('uniformEntropy', (a, b) => tf.log(tf.sub(b!, a!))),
  },
  functions: {
    cdf: kernel('uniformCdf', (x, a, b) => {
      const above = tf.greaterEqual(x!, b!);
      const inside = tf.logicalAnd(tf.greater(x!, a!), tf.logicalNot(above));
      return tf.add(
        choose(inside, tf.div(tf.sub(x!, a!), tf.sub(b!, a!)), 0),
        tf.cast(detach(above), 'float32'),
      );
    }),
    quantile,
  },
  check: requireOrder,
});

function requireOrder({ lower, upper }: Record<string, Operand>): void {
  const accelerated = lower!.source instanceof tf.Tensor || upper!.source instanceof tf.Tensor;
  if (accelerated && !valuesAreChecked()) return;
  const shape = broadcastShapes('uniform', [lower!.shape, upper!.shape]);
  const [a, b] = [operandData(lower!), operandData(upper!)];
  const strides = [broadcastStrides(lower!.shape, shape), broadcastStrides(upper!.shape, shape)];
  forEachBroadcast(shape, strides, (i, offsets) => {
    const [low, high] = [a[offsets[0]!]!, b[offsets[1]!]!];
    if (low < high) return;
    const at = shape.length === 0 ? '' : ` at ${positionText(i, shape)}`;
    throw new ParameterError(
      `uniform: upper must be above lower; got lower ${low} and upper ${high}${at}; swap them or widen the interval`,
    );
  });
}

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
