import * as tf from '@tensorflow/tfjs';
import { type Member, memberFrom, parameterTensors, type Subject, scoped } from './subject.js';

/**
 * Gradients in every parameter of the sum of what `compute` makes, each as flat numbers. Where there is no
 * dependence the gradient is exactly zero.
 */
export function parameterGradients(
  subject: Subject,
  compute: (d: Member) => tf.Tensor,
  tensors: readonly tf.Tensor[] = parameterTensors(subject),
): Float64Array[] {
  return scoped(() => {
    // Without a term in every parameter the engine refuses to differentiate what does not depend on one.
    const total = (...given: tf.Tensor[]) =>
      given.reduce(
        (sum, t) => tf.add(sum, tf.sum(tf.mul(t, 0))),
        tf.sum(compute(memberFrom(subject, given))),
      );
    return tf
      .grads(total as (...x: tf.Tensor[]) => tf.Tensor)([...tensors])
      .map((g) => Float64Array.from(g.dataSync()));
  });
}

/** One copy of every parameter for each of `count` members, stacked in front. */
export function copies(subject: Subject, count: number): tf.Tensor[] {
  return Object.values(subject.parameters).map(({ data, shape }) =>
    tf.tile(tf.tensor(data, [1, ...shape]), [count, ...shape.map(() => 1)]),
  );
}
