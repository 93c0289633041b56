import * as tf from '@tensorflow/tfjs';

/**
 * Solves L y = b by forward substitution from tensor operations, one coordinate at a time. `l` is `[..., d, d]`;
 * `b` holds the d coordinates, each `[...]`, or `[..., columns]` where there are several right-hand sides.
 */
export function composedSolveLower(l: tf.Tensor, b: readonly tf.Tensor[], columns = false): tf.Tensor[] {
  const rows = tf.unstack(l, -2).map((row) => tf.unstack(row, -1));
  const element = (i: number, j: number): tf.Tensor =>
    columns ? tf.expandDims(rows[i]![j]!, -1) : rows[i]![j]!;
  const y: tf.Tensor[] = [];
  b.forEach((own, i) => {
    let sum = own;
    for (let j = 0; j < i; j++) sum = tf.sub(sum, tf.mul(element(i, j), y[j]!));
    y.push(tf.div(sum, element(i, i)));
  });
  return y;
}
