import * as tf from '@tensorflow/tfjs';
import { interval } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { composedLogRatio } from '../tensor/composedLogRatio.js';
import { choose, composedExp, composedSigmoid, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import { between } from './between.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { requireOrderedBounds } from './orderedBounds.js';
import { aboveZero } from './parameters.js';
import { quantileRoute } from './routes.js';
import { logShare } from './shares.js';

/** Parameters of {@link reciprocal}: the bounds, both positive. */
export interface ReciprocalOptions {
  readonly lower: ParameterValue;
  readonly upper: ParameterValue;
}

/** An array of reciprocal distributions. */
export interface Reciprocal
  extends Distribution<'reciprocal', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'lower' | 'upper'): tf.Tensor;
}

type Bounded = (x: tf.Tensor, a: tf.Tensor, b: tf.Tensor) => tf.Tensor;

/** A function of a point inside the open interval, with what it is below and above. */
const inInterval = (f: Bounded, below: number, above: number) => between(f, [1.5, 1, 2], below, above);

const near: Bounded = (x, a, b) => tf.div(composedLogRatio(x, a), composedLogRatio(b, a));
const far: Bounded = (x, a, b) => tf.div(composedLogRatio(b, x), composedLogRatio(b, a));
/** Each share by the smaller of the two: a share near one moves by as little as the other. */
const below: Bounded = (x, a, b) => bySmaller(near(x, a, b), far(x, a, b));
const above: Bounded = (x, a, b) => bySmaller(far(x, a, b), near(x, a, b));
const bySmaller = (share: tf.Tensor, rest: tf.Tensor): tf.Tensor =>
  when(tf.less(share, 0.5), share, tf.sub(1, rest));

const pointAt = (share: tf.Tensor, rest: tf.Tensor, a: tf.Tensor, b: tf.Tensor): tf.Tensor => {
  const l = composedLogRatio(b, a);
  const fromLower = tf.mul(a, composedExp(tf.mul(share, l)));
  return when(
    tf.less(tf.add(share, tf.zerosLike(l)), 0.5),
    fromLower,
    tf.mul(b, composedExp(tf.neg(tf.mul(rest, l)))),
  );
};

/** Σ cₖ h^2k, lowest power first. */
function even(h: tf.Tensor, coefficients: readonly number[]): tf.Tensor {
  const square = tf.square(h);
  return coefficients.reduceRight<tf.Tensor>((sum, c) => tf.add(c, tf.mul(square, sum)), tf.zerosLike(h));
}

const sinhTerms = [1, 1 / 6, 1 / 120, 1 / 5040, 1 / 362880, 1 / 39916800];
const excessTerms = sinhTerms.map((c, k) => 2 * k * c);

/** By h = ½ log(upper / lower) in a narrow interval, where the plain formula, given as `wide`, cancels. */
function byWidth(
  a: tf.Tensor,
  b: tf.Tensor,
  narrow: (square: tf.Tensor, h: tf.Tensor) => tf.Tensor,
  wide: (mean: tf.Tensor) => tf.Tensor,
): tf.Tensor {
  const h = tf.mul(0.5, composedLogRatio(b, a));
  const isNarrow = tf.less(h, 1);
  const close = narrow(tf.mul(a, b), when(isNarrow, h, tf.onesLike(h)));
  const far = wide(tf.div(tf.sub(b, a), tf.mul(2, when(isNarrow, tf.onesLike(h), h))));
  return when(isNarrow, close, far);
}

const mean = (a: tf.Tensor, b: tf.Tensor): tf.Tensor =>
  byWidth(
    a,
    b,
    (square, h) => tf.mul(tf.sqrt(square), even(h, sinhTerms)),
    (m) => m,
  );

const variance = (a: tf.Tensor, b: tf.Tensor): tf.Tensor =>
  byWidth(
    a,
    b,
    (square, h) => tf.mul(square, tf.mul(even(h, sinhTerms), even(h, excessTerms))),
    (m) => tf.mul(m, tf.sub(tf.mul(0.5, tf.add(a, b)), m)),
  );

const make = quantileRoute({
  family: 'reciprocal',
  support: interval,
  parameters: { lower: { lower: { domain: aboveZero } }, upper: { upper: { domain: aboveZero } } },
  logDensity: (...[given, a, b]) => {
    const x = tf.add(given!, tf.zerosLike(tf.add(a!, b!)));
    const inside = tf.logicalAnd(tf.greaterEqual(x, a!), tf.lessEqual(x, b!));
    const held = when(inside, x, tf.onesLike(x));
    const value = tf.neg(tf.add(tf.log(held), tf.log(composedLogRatio(b!, a!))));
    return choose(inside, value, Number.NEGATIVE_INFINITY);
  },
  draw: {
    noise: 'logistic',
    composed: (e, a, b) => pointAt(composedSigmoid(e!), composedSigmoid(tf.neg(e!)), a!, b!),
  },
  forms: {
    mean: (a, b) => mean(a!, b!),
    mode: { ...kernel('identity', (v) => v.clone()), parameters: ['lower'] },
    variance: (a, b) => variance(a!, b!),
    entropy: (a, b) => tf.add(tf.log(composedLogRatio(b!, a!)), tf.mul(0.5, tf.add(tf.log(a!), tf.log(b!)))),
    cdf: inInterval(below, 0, 1),
    survival: inInterval(above, 1, 0),
    logCdf: inInterval((x, a, b) => logShare(below(x, a, b), above(x, a, b)), Number.NEGATIVE_INFINITY, 0),
    logSurvival: inInterval(
      (x, a, b) => logShare(above(x, a, b), below(x, a, b)),
      0,
      Number.NEGATIVE_INFINITY,
    ),
    quantile: (p, a, b) => pointAt(p!, tf.sub(1, p!), a!, b!),
    upperQuantile: (p, a, b) => pointAt(tf.sub(1, p!), p!, a!, b!),
  },
  check: requireOrderedBounds('reciprocal'),
});

/**
 * The reciprocal (log-uniform) distribution between two positive bounds: every order of magnitude alike, the usual
 * choice for a scale or a learning rate of unknown size.
 *
 * Log density: −log x − log log(upper / lower) on the closed interval, −∞ outside, in nats.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = lower · (upper / lower)^u with u uniform. A draw moves with the bounds, but the
 * density jumps there: a gradient through `logDensity` does not see the jump.
 *
 * @param options - `lower` and `upper`
 * @throws ParameterError when a bound is missing, not positive or not finite, or upper is not above lower.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { reciprocal } from 'leadline';
 * const d = reciprocal({ lower: 0.001, upper: 10 });
 * console.log(d.cdf(tf.tensor1d([0.001, 0.1, 1])).arraySync());
 * // [ 0, 0.5, 0.75 ]
 * ```
 * Source: Hamming (1970), "On the distribution of numbers", Bell System Technical Journal 49, section 2.
 */
export function reciprocal(options: ReciprocalOptions): Reciprocal {
  return make(options) as unknown as Reciprocal;
}
