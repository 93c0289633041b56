import * as tf from '@tensorflow/tfjs';
import { interval } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { choose, composedSigmoid, when } from '../tensor/composedMath.js';
import { kernel } from '../tensor/formula.js';
import { between } from './between.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { requireTogether } from './orderedBounds.js';
import { finite } from './parameters.js';
import { quantileRoute } from './routes.js';
import { logShare, safeLog } from './shares.js';

/** Parameters of {@link triangular}; the peak may stand at an end. */
export interface TriangularOptions {
  readonly lower: ParameterValue;
  readonly peak: ParameterValue;
  readonly upper: ParameterValue;
}

/** An array of triangular distributions. */
export interface Triangular
  extends Distribution<'triangular', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'lower' | 'peak' | 'upper'): tf.Tensor;
}

type Sided = (a: tf.Tensor, c: tf.Tensor, b: tf.Tensor) => tf.Tensor;

/** a / b, or one where b is zero. */
function ratio(a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const zero = tf.equal(b, 0);
  return tf.div(a, when(zero, tf.onesLike(b), b));
}

/** The distribution function inside. Past the peak by the smaller of the two shares; see the double-precision formula. */
function shareBelow(x: tf.Tensor, a: tf.Tensor, c: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const [d, e, f, w] = [tf.sub(x, a), tf.sub(b, x), tf.sub(x, c), tf.sub(b, a)];
  const [u, v] = [tf.sub(c, a), tf.sub(b, c)];
  const before = tf.mul(tf.div(d, w), ratio(d, u));
  const after = tf.add(tf.mul(tf.div(e, w), ratio(tf.add(f, d), v)), tf.mul(tf.div(d, w), ratio(f, v)));
  const beyond = tf.sub(1, tf.mul(tf.div(e, w), ratio(e, v)));
  return when(tf.less(f, 0), before, when(tf.less(after, 0.5), after, beyond));
}
function shareAbove(x: tf.Tensor, a: tf.Tensor, c: tf.Tensor, b: tf.Tensor): tf.Tensor {
  return shareBelow(tf.neg(x), tf.neg(b), tf.neg(c), tf.neg(a));
}

/** A function inside the open interval, with what it is below and above. */
const inInterval = (f: typeof shareBelow, below: number, above: number) =>
  between(f, [0.25, 0, 0.5, 1], below, above);

/** The point with these shares below and above; see the double-precision formula. */
function pointAt(below: tf.Tensor, above: tf.Tensor, ...[a, c, b]: Parameters<Sided>): tf.Tensor {
  const [u, v, w] = [tf.sub(c, a), tf.sub(b, c), tf.sub(b, a)];
  const zero = tf.zerosLike(tf.add(below, tf.add(u, v)));
  const before = tf.lessEqual(tf.add(tf.mul(below, w), zero), u);
  const root = (share: tf.Tensor, side: tf.Tensor, used: tf.Tensor): tf.Tensor => {
    const square = tf.add(tf.mul(share, tf.div(side, w)), zero);
    return tf.sqrt(when(used, square, tf.onesLike(square)));
  };
  const after = tf.logicalNot(before);
  const [t, s] = [root(below, u, before), root(above, v, after)];
  const fromLower = when(before, t, tf.div(tf.add(below, tf.mul(above, tf.div(u, w))), tf.add(1, s)));
  const fromUpper = when(before, tf.div(tf.add(above, tf.mul(below, tf.div(v, w))), tf.add(1, t)), s);
  return when(tf.less(fromLower, 0.5), tf.add(a, tf.mul(w, fromLower)), tf.sub(b, tf.mul(w, fromUpper)));
}

const make = quantileRoute({
  family: 'triangular',
  support: interval,
  parameters: {
    lower: { lower: { domain: finite } },
    peak: { peak: { domain: finite } },
    upper: { upper: { domain: finite } },
  },
  logDensity: (...[given, a, c, b]) => {
    const x = tf.add(given!, tf.zerosLike(tf.add(tf.add(a!, b!), c!)));
    const atPeak = tf.equal(x, c!);
    const within = tf.logicalAnd(tf.greater(x, a!), tf.less(x, b!));
    const before = tf.logicalAnd(within, tf.less(x, c!));
    const after = tf.logicalAnd(within, tf.greater(x, c!));
    const one = tf.onesLike(x);
    const rise = safeLog(when(before, ratio(tf.sub(x, a!), tf.add(tf.sub(c!, a!), tf.zerosLike(x))), one));
    const fall = safeLog(when(after, ratio(tf.sub(b!, x), tf.add(tf.sub(b!, c!), tf.zerosLike(x))), one));
    const value = tf.add(tf.sub(Math.LN2, tf.log(tf.sub(b!, a!))), tf.add(rise, fall));
    return choose(tf.logicalOr(within, atPeak), value, Number.NEGATIVE_INFINITY);
  },
  draw: {
    noise: 'logistic',
    composed: (e, a, c, b) => pointAt(composedSigmoid(e!), composedSigmoid(tf.neg(e!)), a!, c!, b!),
  },
  forms: {
    mean: (a, c, b) => tf.div(tf.add(tf.add(a!, c!), b!), 3),
    mode: { ...kernel('identity', (v) => v.clone()), parameters: ['peak'] },
    variance: (a, c, b) => {
      const [u, v] = [tf.sub(c!, a!), tf.sub(b!, c!)];
      return tf.div(tf.add(tf.add(tf.square(u), tf.mul(u, v)), tf.square(v)), 18);
    },
    entropy: (a, _c, b) => tf.add(0.5 - Math.LN2, tf.log(tf.sub(b!, a!))),
    cdf: inInterval(shareBelow, 0, 1),
    survival: inInterval(shareAbove, 1, 0),
    logCdf: inInterval((...v) => logShare(shareBelow(...v), shareAbove(...v)), Number.NEGATIVE_INFINITY, 0),
    logSurvival: inInterval(
      (...v) => logShare(shareAbove(...v), shareBelow(...v)),
      0,
      Number.NEGATIVE_INFINITY,
    ),
    quantile: (p, a, c, b) => pointAt(p!, tf.sub(1, p!), a!, c!, b!),
    upperQuantile: (p, a, c, b) => pointAt(tf.sub(1, p!), p!, a!, c!, b!),
  },
  check: ({ lower, peak, upper }) =>
    requireTogether('triangular', [lower!, peak!, upper!], ([a, c, b], at) => {
      if (!(a! < b!)) {
        return `triangular: upper must be above lower; got lower ${a} and upper ${b}${at}; swap them or widen the interval`;
      }
      if (c! >= a! && c! <= b!) return undefined;
      return `triangular: peak must lie between lower and upper; got lower ${a}, peak ${c} and upper ${b}${at}; clip it to the interval`;
    }),
});

/**
 * The triangular distribution: a quantity of which one knows the least, the most and the likeliest value.
 *
 * Log density: log 2 + log(x − lower) − log(peak − lower) − log(upper − lower) before the peak, and the mirror image
 * after it; −∞ outside, in nats. Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, draw = quantile of a uniform number. The density has a kink at the peak, where its
 * derivatives in the point and in the peak are given as zero. The divergence of two triangles is made of logarithms
 * of every side over every piece, which cancel where the two are close: it is not offered; use `sampledKl`.
 *
 * @param options - `lower`, `peak` and `upper`
 * @throws ParameterError when one is missing or not finite, upper is not above lower, or the peak lies outside them.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { triangular } from 'leadline';
 * const d = triangular({ lower: 0, peak: 1, upper: 4 });
 * console.log(d.cdf(tf.tensor1d([0, 1, 2, 4])).arraySync());
 * // [ 0, 0.25, 0.6666666865348816, 1 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), section 26.9.
 */
export function triangular(options: TriangularOptions): Triangular {
  return make(options) as unknown as Triangular;
}
