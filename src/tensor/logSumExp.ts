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
    forward: ([data]) => {
      const { largest, rest } = rowLogSums(data!, n);
      return Float32Array.from(largest, (most, row) => most + rest[row]!);
    },
    gradient: (_k, [data], upstream) => {
      const { largest, rest } = rowLogSums(data!, n);
      return Float32Array.from(data!, (v, i) => {
        const row = Math.floor(i / n);
        const most = largest[row]!;
        // The slope of an infinite sum lies where the infinity is, and an empty one has none.
        const infinite = most === Number.POSITIVE_INFINITY || most === Number.NEGATIVE_INFINITY;
        const share = infinite ? Number(v === Number.POSITIVE_INFINITY) : Math.exp(v - most - rest[row]!);
        return upstream[row]! * share;
      });
    },
  });
}

/** The log-sum-exps of rows, each in two parts: their sum may round away what the smaller one says. */
export interface RowLogSums {
  /** The largest number of each row; what is not finite stands here, and 0 beside it. */
  readonly largest: Float64Array;
  /** log1p of the others' exponentials, relative to the largest. */
  readonly rest: Float64Array;
}

/** The log-sum-exp of each row of `n`, in double precision. */
export function rowLogSums(data: ArrayLike<number>, n: number): RowLogSums {
  const rows = data.length / n;
  const [largest, rest] = [new Float64Array(rows), new Float64Array(rows)];
  for (let row = 0; row < rows; row++) {
    const start = row * n;
    let best = start;
    let broken = false;
    for (let i = start; i < start + n; i++) {
      if (data[i]! > data[best]!) best = i;
      broken ||= Number.isNaN(data[i]!);
    }
    const most = broken ? Number.NaN : data[best]!;
    largest[row] = most;
    if (!Number.isFinite(most)) continue;
    let others = 0;
    for (let i = start; i < start + n; i++) if (i !== best) others += Math.exp(data[i]! - most);
    rest[row] = Math.log1p(others);
  }
  return { largest, rest };
}
