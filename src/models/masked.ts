import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { sameShape } from '../kernels/layout.js';
import { valuesAreChecked } from '../tensor/backend.js';
import {
  describe,
  flatten,
  type NestedNumbers,
  positionText,
  requireTensor,
  shapeText,
} from '../tensor/checks.js';

/** Observed values some of which are missing. */
export interface Masked {
  readonly values: tf.Tensor;
  /** One where a value was observed, zero where it is missing: `[rows]`, or the shape of the values. */
  readonly mask: tf.Tensor;
}

/**
 * Marks which observed values are missing. A missing value adds nothing to the log-likelihood, and what
 * stands in its place, NaN included, is never read.
 *
 * Shapes: `mask` is `[rows]`, where whole points are missing, or the shape of `values`, where single
 * coordinates of a product are. A conditional that reads the node sees zeros in place of missing values;
 * give it the mask as a value of its own if the network should know. Gradient route: none.
 *
 * @param values - the observed values, `[rows, …]`
 * @param mask - true or 1 where observed, false or 0 where missing
 * @throws ParameterError when either is not a tensor, or the mask holds something other than 0 and 1;
 *   ShapeError when the shapes do not fit.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { masked } from 'leadline';
 * const x = masked(tf.tensor2d([[1, Number.NaN], [2, 3]]), tf.tensor2d([[1, 0], [1, 1]]));
 * console.log(x.mask.shape);
 * // [ 2, 2 ]
 * ```
 */
export function masked(values: tf.Tensor, mask: tf.Tensor): Masked {
  requireTensor('masked', 'values', values);
  requireTensor('masked', 'mask', mask);
  const whole = mask.shape.length === 1 && mask.shape[0] === values.shape[0];
  const same = sameShape(mask.shape, values.shape);
  if (!whole && !same) {
    throw new ShapeError(
      `masked: mask must be [rows] or have the shape of values, ${shapeText(values.shape)}; got ${shapeText(mask.shape)}; reshape the mask`,
    );
  }
  if (valuesAreChecked()) requireZerosAndOnes(mask);
  return { values, mask };
}

/** A mask with weights in it would be rounded, and not the same way on every backend. */
function requireZerosAndOnes(mask: tf.Tensor): void {
  const data = mask.dataSync();
  for (let i = 0; i < data.length; i++) {
    if (data[i] === 0 || data[i] === 1) continue;
    throw new ParameterError(
      `masked: mask must hold 0 and 1 only; got ${data[i]} at ${positionText(i, mask.shape)}; compare it first, for example with tf.greater(mask, 0.5)`,
    );
  }
}

/** Whether a data value is masked. */
export function isMasked(value: unknown): value is Masked {
  return typeof value === 'object' && value !== null && 'mask' in value && 'values' in value;
}

/** Splits a data value into its numbers, zeros where missing, and its mask as booleans. */
export function splitMasked(
  where: string,
  name: string,
  value: unknown,
): { values: tf.Tensor; mask?: tf.Tensor } {
  if (isMasked(value)) {
    requireTensor(where, `the values of ${name}`, value.values);
    requireTensor(where, `the mask of ${name}`, value.mask);
    const mask = tf.cast(value.mask, 'bool');
    const spread =
      mask.shape.length === value.values.shape.length ? mask : spreadRows(mask, value.values.shape);
    return { values: tf.where(spread, value.values, tf.zerosLike(value.values)), mask };
  }
  if (value instanceof tf.Tensor) {
    requireTensor(where, name, value);
    return { values: value };
  }
  if (Array.isArray(value)) {
    // Rows may be typed arrays. Not left to tf.tensor, which reads ragged rows as if they were regular.
    const rows = value.map((row) => (ArrayBuffer.isView(row) ? Array.from(row as Float32Array) : row));
    const { data, shape } = flatten(where, name, rows as NestedNumbers);
    return { values: tf.tensor(data, shape) };
  }
  if (typeof value === 'number' || ArrayBuffer.isView(value)) {
    return { values: tf.tensor(value as tf.TensorLike) };
  }
  throw new ParameterError(
    `${where}: ${name} must be a tensor, nested numbers or masked(values, mask); got ${describe(value)}; give the data for '${name}'`,
  );
}

/** A `[rows]` mask spread over the other axes of `shape`. */
export function spreadRows(mask: tf.Tensor, shape: readonly number[]): tf.Tensor {
  const column = tf.reshape(mask, [mask.shape[0]!, ...new Array<number>(shape.length - 1).fill(1)]);
  return tf.broadcastTo(column, [...shape]);
}
