import * as tf from '@tensorflow/tfjs';
import { detach } from './detach.js';
import { runOnTape } from './engine.js';

// Special functions from differentiable tensor operations, for `composed` and for accelerators. tfjs's own
// softplus and erf are not accurate enough to build on. Its exp, sigmoid, tanh and softmax have a wrong second
// derivative: they save their output, the engine records the saved copy before the operation that made it, and
// so the way back through that copy is lost without a word. Here every derivative is a function of the input.

/** An operation whose derivative is another one: both are given as functions of the input. */
export function withSlope(
  x: tf.Tensor,
  value: (x: tf.Tensor) => tf.Tensor,
  slope: (x: tf.Tensor) => tf.Tensor,
): tf.Tensor {
  return runOnTape({
    inputs: { x },
    forward: () => value(x),
    backward: (dy, [saved]) => ({ x: () => tf.mul(dy, slope(saved!)) }),
  });
}

/** exp(x), with every derivative. */
export function composedExp(x: tf.Tensor): tf.Tensor {
  return withSlope(x, tf.exp, composedExp);
}

/** 1 / (1 + exp(−x)), with every derivative. */
export function composedSigmoid(x: tf.Tensor): tf.Tensor {
  return withSlope(x, tf.sigmoid, (v) => tf.mul(composedSigmoid(v), composedSigmoid(tf.neg(v))));
}

/** log(1 + exp(x)) as max(x, 0) + log1p(exp(−|x|)), with every derivative, at the kink too. */
export function composedSoftplus(x: tf.Tensor): tf.Tensor {
  return withSlope(x, (v) => tf.add(tf.relu(v), log1pValue(tf.exp(tf.neg(tf.abs(v))))), composedSigmoid);
}

/** log Σ exp(x) along the last axis, with every derivative. */
export function composedLogSumExp(x: tf.Tensor): tf.Tensor {
  const most = detach(tf.max(x, -1, true));
  const finite = when(tf.isFinite(most), most, tf.zerosLike(most));
  return tf.add(tf.log(tf.sum(composedExp(tf.sub(x, finite)), -1)), tf.squeeze(finite, [-1]));
}

/** x − log Σ exp(x) along the last axis, with every derivative. */
export function composedLogSoftmax(x: tf.Tensor): tf.Tensor {
  return tf.sub(x, tf.expandDims(composedLogSumExp(x), -1));
}

/**
 * log(1 + x) with relative accuracy near zero, where some backends compute the logarithm of the rounded sum: that
 * times x / (sum − 1). Source: Goldberg, ACM Computing Surveys 23 (1991), theorem 4.
 */
export function composedLog1p(x: tf.Tensor): tf.Tensor {
  return withSlope(x, log1pValue, (v) => tf.div(1, tf.add(1, v)));
}

function log1pValue(x: tf.Tensor): tf.Tensor {
  const sum = tf.add(1, x);
  const grown = tf.sub(sum, 1);
  const near = tf.logicalOr(tf.equal(grown, 0), tf.logicalNot(tf.isFinite(sum)));
  const factor = tf.where(near, tf.onesLike(x), tf.div(x, grown));
  return tf.where(tf.equal(grown, 0), x, tf.mul(tf.log(sum), factor));
}

/** log(p / (1 − p)), with relative accuracy near its zero. */
export function composedLogOdds(p: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor => {
    const w = tf.sub(1, v);
    const middle = tf.logicalAnd(tf.greater(v, 0.25), tf.less(v, 0.75));
    return tf.where(middle, log1pValue(tf.div(tf.sub(v, w), w)), tf.sub(tf.log(v), tf.log(w)));
  };
  return withSlope(p, value, (v) => tf.div(1, tf.mul(v, tf.sub(1, v))));
}

/** x / m − 1: from the difference where the two are close, from the ratio elsewhere, whose derivative is one term. */
export function relativeDistance(x: tf.Tensor, m: tf.Tensor): tf.Tensor {
  const difference = tf.div(tf.sub(x, m), m);
  const ratio = tf.sub(tf.div(x, m), 1);
  return when(tf.less(tf.abs(difference), 0.25), difference, ratio);
}

/** |x|, whose derivative at zero is zero. */
export function composedAbs(x: tf.Tensor): tf.Tensor {
  return tf.mul(x, detach(tf.sign(x)));
}

/** A function that moves in steps, such as a mode: its derivative is zero. */
export function stepwise(x: tf.Tensor, f: (x: tf.Tensor) => tf.Tensor): tf.Tensor {
  return withSlope(x, (v) => tf.cast(f(v), 'float32'), tf.zerosLike);
}

/** log Γ(x) for x > 0: Stirling's series, below eight eight steps up with the recurrence down (DLMF 5.11.1, 5.5.1). */
export function composedLogGamma(x: tf.Tensor): tf.Tensor {
  const steps = 8;
  const low = tf.less(x, steps);
  const small = when(low, x, tf.onesLike(x));
  let product: tf.Tensor = small;
  for (let k = 1; k < steps; k++) product = tf.mul(product, tf.add(small, k));
  const z = when(low, tf.add(x, steps), x);
  const inverse = tf.div(1, z);
  const square = tf.square(inverse);
  const series = tf.mul(inverse, tf.add(1 / 12, tf.mul(square, tf.add(-1 / 360, tf.mul(square, 1 / 1260)))));
  const stirling = tf.add(
    tf.sub(tf.mul(tf.sub(z, 0.5), tf.log(z)), z),
    tf.add(series, 0.5 * Math.log(2 * Math.PI)),
  );
  return when(low, tf.sub(stirling, tf.log(product)), stirling);
}

/**
 * One value or the other. The condition is cut from the gradient: the engine looks for a derivative of every
 * comparison on the way, and has none.
 */
export function when(condition: tf.Tensor, value: tf.Tensor, otherwise: tf.Tensor): tf.Tensor {
  return tf.where(detach(condition), value, otherwise);
}

/** Where `inside` holds, `value`; elsewhere `otherwise`. Gradients are zero where it does not hold. */
export function choose(inside: tf.Tensor, value: tf.Tensor, otherwise: number): tf.Tensor {
  const shape = tf.broadcastTo(detach(inside), broadcast(inside.shape, value.shape));
  return tf.where(shape, tf.broadcastTo(value, shape.shape), tf.fill(shape.shape, otherwise));
}

function broadcast(a: readonly number[], b: readonly number[]): number[] {
  const rank = Math.max(a.length, b.length);
  return Array.from({ length: rank }, (_, i) =>
    Math.max(a[a.length - rank + i] ?? 1, b[b.length - rank + i] ?? 1),
  );
}
