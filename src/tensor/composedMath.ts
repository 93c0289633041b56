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
  return withSlope(x, (v) => tf.add(tf.relu(v), tf.log1p(tf.exp(tf.neg(tf.abs(v))))), composedSigmoid);
}

/** log Σ exp(x) along the last axis, with every derivative. */
export function composedLogSumExp(x: tf.Tensor): tf.Tensor {
  const most = detach(tf.max(x, -1, true));
  const finite = tf.where(tf.isFinite(most), most, tf.zerosLike(most));
  return tf.add(tf.log(tf.sum(composedExp(tf.sub(x, finite)), -1)), tf.squeeze(finite, [-1]));
}

/** x − log Σ exp(x) along the last axis, with every derivative. */
export function composedLogSoftmax(x: tf.Tensor): tf.Tensor {
  return tf.sub(x, tf.expandDims(composedLogSumExp(x), -1));
}

/** log Γ(x) for x > 0: Stirling's series eight steps up, then the recurrence down (DLMF 5.11.1, 5.5.1). */
export function composedLogGamma(x: tf.Tensor): tf.Tensor {
  const steps = 8;
  const z = tf.add(x, steps);
  let product: tf.Tensor = x;
  for (let k = 1; k < steps; k++) product = tf.mul(product, tf.add(x, k));
  const inverse = tf.div(1, z);
  const square = tf.square(inverse);
  const series = tf.mul(inverse, tf.add(1 / 12, tf.mul(square, tf.add(-1 / 360, tf.mul(square, 1 / 1260)))));
  const stirling = tf.add(
    tf.sub(tf.mul(tf.sub(z, 0.5), tf.log(z)), z),
    tf.add(series, 0.5 * Math.log(2 * Math.PI)),
  );
  return tf.sub(stirling, tf.log(product));
}

/** Where `inside` holds, `value`; elsewhere `otherwise`. Gradients are zero where it does not hold. */
export function choose(inside: tf.Tensor, value: tf.Tensor, otherwise: number): tf.Tensor {
  const shape = tf.broadcastTo(inside, broadcast(inside.shape, value.shape));
  return tf.where(shape, tf.broadcastTo(value, shape.shape), tf.fill(shape.shape, otherwise));
}

function broadcast(a: readonly number[], b: readonly number[]): number[] {
  const rank = Math.max(a.length, b.length);
  return Array.from({ length: rank }, (_, i) =>
    Math.max(a[a.length - rank + i] ?? 1, b[b.length - rank + i] ?? 1),
  );
}
