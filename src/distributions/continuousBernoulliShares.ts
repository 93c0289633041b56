import * as tf from '@tensorflow/tfjs';
import { composedAbs, composedExp, composedLog1p, composedSoftplus, when } from '../tensor/composedMath.js';
import { composedExpm1, composedLog1mexp } from '../tensor/composedRemainders.js';
import { runOnTape } from '../tensor/engine.js';
import { byEven, nearLogSinh } from './evenPolynomial.js';

// The share of a continuous Bernoulli distribution below a point, and the point with given shares on its sides, from
// tensor operations: the double-precision formulas again, with every derivative. All arguments have one shape.

// Coefficients of l², l⁴, … of log(sinh(l / 2) / (l / 2)): see the double-precision formulas.
const terms = [
  0.041666666666666664, -0.00034722222222222224, 5.5114638447971785e-6, -1.033399470899471e-7,
  2.08767569878681e-9, -4.403491782239578e-11, 9.55895466477477e-13, -2.1185501852016142e-14,
  4.770034475709914e-16, -1.087434349279031e-17,
];
const edge = 2;

/**
 * Σ weight(k) cₖ first · l^(2k − 2) (1 + x)(1 + x² + … + x^(2k − 2)) for |l| within the edge: the differences of
 * 1 and x^2k over 1 − x.
 */
function differences(x: tf.Tensor, l: tf.Tensor, first: tf.Tensor, weight: (k: number) => number): tf.Tensor {
  const [square, held] = [tf.square(l), tf.square(x)];
  let geometric = tf.onesLike(x);
  let power = first;
  let sum: tf.Tensor = tf.zerosLike(x);
  terms.forEach((c, k) => {
    sum = tf.add(sum, tf.mul(weight(k + 1) * c, tf.mul(power, geometric)));
    geometric = tf.add(1, tf.mul(held, geometric));
    power = tf.mul(power, square);
  });
  return tf.mul(tf.add(1, x), sum);
}

/** One formula of l for |l| within the edge, and another beyond, each read only on its own side. */
function byEdge(
  l: tf.Tensor,
  near: (l: tf.Tensor) => tf.Tensor,
  far: (l: tf.Tensor) => tf.Tensor,
): tf.Tensor {
  const small = tf.lessEqual(tf.abs(l), edge);
  return when(small, near(when(small, l, tf.zerosLike(l))), far(when(small, tf.fill(l.shape, edge), l)));
}

/** The share below x, whose remainder is `rest`. */
export function shareBelow(x: tf.Tensor, rest: tf.Tensor, l: tf.Tensor): tf.Tensor {
  const near = (v: tf.Tensor): tf.Tensor => {
    const bend = tf.add(
      tf.mul(0.5, v),
      differences(x, v, tf.square(v), () => 1),
    );
    return tf.mul(x, composedExp(tf.neg(tf.mul(rest, bend))));
  };
  return byEdge(l, near, (v) => {
    const size = composedAbs(v);
    const fall = tf.div(composedExpm1(tf.neg(tf.mul(size, x))), composedExpm1(tf.neg(size)));
    const held = when(tf.greater(v, 0), tf.neg(tf.mul(size, rest)), tf.zerosLike(v));
    return tf.mul(composedExp(held), fall);
  });
}

/** (1 − exp(−a)) / a for a ≥ 0. */
function decay(a: tf.Tensor): tf.Tensor {
  return byEven(
    a,
    (low) => composedExp(tf.sub(nearLogSinh(low), tf.mul(0.5, low))),
    (high) => tf.neg(tf.div(composedExpm1(tf.neg(high)), high)),
  );
}

/** Minus the derivative in l of the log of the share below u = 1 − v, for l ≥ 0. */
function fallInLogit(u: tf.Tensor, v: tf.Tensor, l: tf.Tensor): tf.Tensor {
  const near = (a: tf.Tensor): tf.Tensor =>
    tf.mul(
      v,
      tf.add(
        0.5,
        differences(u, a, a, (k) => 2 * k),
      ),
    );
  return byEdge(l, near, (a) => {
    const ratio = tf.div(decay(tf.mul(a, v)), decay(tf.mul(a, u)));
    const between = tf.mul(composedExp(tf.neg(tf.mul(a, u))), ratio);
    return tf.neg(tf.div(tf.mul(v, tf.sub(1, between)), composedExpm1(tf.neg(a))));
  });
}

function pointValue(below: tf.Tensor, above: tf.Tensor, l: tf.Tensor): tf.Tensor {
  const up = tf.greater(l, 1);
  const size = when(up, l, tf.onesLike(l));
  const log = when(tf.less(below, 0.5), tf.log(below), composedLog1p(tf.neg(above)));
  const high = tf.div(composedSoftplus(tf.add(tf.add(size, log), composedLog1mexp(tf.neg(size)))), size);
  const flat = tf.equal(l, 0);
  const held = when(tf.logicalOr(up, flat), tf.fill(l.shape, -1), l);
  const lost = tf.neg(tf.mul(below, tf.expm1(held)));
  const left = tf.log(tf.add(above, tf.mul(below, tf.exp(held))));
  const low = tf.div(when(tf.greater(lost, 0.5), left, composedLog1p(tf.neg(lost))), held);
  return when(up, high, when(flat, below, low));
}

/** The point with these shares, which make one, on its sides; the derivative is counted to the share below. */
export function pointBetween(below: tf.Tensor, above: tf.Tensor, logit: tf.Tensor): tf.Tensor {
  return runOnTape({
    inputs: { below, above, logit },
    forward: () => pointValue(below, above, logit),
    backward: (dy, [p, q, l]) => ({
      below: () => tf.mul(dy, slopeInShare(p!, q!, l!)),
      above: () => tf.zerosLike(dy),
      logit: () => tf.mul(dy, slopeInLogit(p!, q!, l!)),
    }),
  });
}

function slopeInShare(below: tf.Tensor, above: tf.Tensor, l: tf.Tensor): tf.Tensor {
  const size = composedAbs(l);
  const e = composedExp(tf.neg(size));
  const down = tf.less(l, 0);
  const height = tf.add(when(down, above, below), tf.mul(when(down, below, above), e));
  return tf.div(decay(size), height);
}

function slopeInLogit(below: tf.Tensor, above: tf.Tensor, l: tf.Tensor): tf.Tensor {
  const x = pointBetween(below, above, l);
  const rest = pointBetween(above, below, tf.neg(l));
  const down = tf.less(l, 0);
  const [u, v] = [when(down, rest, x), when(down, x, rest)];
  const size = composedAbs(l);
  return tf.mul(tf.mul(fallInLogit(u, v, size), u), decay(tf.mul(size, u)));
}
