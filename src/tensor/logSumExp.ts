import type * as tf from '@tensorflow/tfjs';
import { ShapeError } from '../errors.js';
import { requireTensor, shapeText } from './checks.js';
import { usesComposedForm } from './composed.js';
import { composedLogSumExp } from './composedMath.js';
import { runHostOperation } from './hostOperation.js';

/**
 * log Σ exp(x) along the last axis, without overflow and without the loss of accuracy where the result is
 * close to zero. For averaging probabilities that are known by their logarithms.
 *
 * Formula: m + log1p(Σ exp(xᵢ − m)) with m the largest and the sum over the others, in double precision.
 * Shapes: `[..., n]` to `[...]`. A row of −∞ gives −∞, a row with +∞ gives +∞. Gradient route: softmax of
 * the row, once.
 *
 * @param x - at least one axis, the last one not empty
 * @throws ParameterError when given something other than a tensor; ShapeError for a scalar or an empty row.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { logSumExp } from 'leadline';
 * console.log(logSumExp(tf.tensor1d([-0.0001, -9.2103901])).dataSync()[0]!.toPrecision(4));
 * // 3.059e-11
 * ```
 * Source: Blanchard, Higham and Higham, IMA J. Numer. Anal. 41 (2021) 2311–2330, algorithm 4.1.
 */
export function logSumExp(x: tf.Tensor): tf.Tensor {
  requireTensor('logSumExp', 'x', x);
  const n = x.shape[x.shape.length - 1];
  if (n === undefined || n === 0) {
    throw new ShapeError(
      `logSumExp: x must have a last axis with at least one element; got shape ${shapeText(x.shape)}; reshape it`,
    );
  }
  if (usesComposedForm()) return composedLogSumExp(x);
  return runHostOperation({
    where: 'logSumExp',
    inputs: [x],
    outShape: x.shape.slice(0, -1),
    forward: ([data]) => Float32Array.from(rowLogSums(data!, n)),
    gradient: (_k, [data], upstream) => {
      const sums = rowLogSums(data!, n);
      return Float32Array.from(data!, (v, i) => {
        const row = Math.floor(i / n);
        return sums[row] === Number.NEGATIVE_INFINITY ? 0 : upstream[row]! * Math.exp(v - sums[row]!);
      });
    },
  });
}

/** The log-sum-exp of each row of `n`, in double precision. */
export function rowLogSums(data: Float32Array | Float64Array, n: number): Float64Array {
  const result = new Float64Array(data.length / n);
  for (let row = 0; row < result.length; row++) {
    const start = row * n;
    let best = start;
    for (let i = start + 1; i < start + n; i++) if (data[i]! > data[best]!) best = i;
    const most = data[best]!;
    if (!Number.isFinite(most)) {
      result[row] = most;
      continue;
    }
    let others = 0;
    for (let i = start; i < start + n; i++) if (i !== best) others += Math.exp(data[i]! - most);
    result[row] = most + Math.log1p(others);
  }
  return result;
}
