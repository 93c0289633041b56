import * as tf from '@tensorflow/tfjs';
import { ShapeError } from '../errors.js';
import { sameShape } from '../kernels/layout.js';
import { requireTensor, shapeText } from '../tensor/checks.js';
import type { Distribution } from './distribution.js';

/** A distribution that can sum its log density over trailing array axes in one pass. */
export interface Foldable {
  foldedLogDensity(x: tf.Tensor, axes: number): tf.Tensor;
}

function isFoldable(d: Distribution): d is Distribution & Foldable {
  return 'foldedLogDensity' in d;
}

/** Log density summed over the last `axes` array axes: fused where the family can, else summed afterwards. */
export function foldLogDensity(d: Distribution, x: tf.Tensor, axes: number): tf.Tensor {
  if (isFoldable(d)) return d.foldedLogDensity(x, axes);
  return tf.tidy(() => sumTrailing(d.logDensity(x), axes));
}

/** Sums the last `axes` axes. */
export function sumTrailing(x: tf.Tensor, axes: number): tf.Tensor {
  if (axes === 0) return x;
  return tf.sum(
    x,
    Array.from({ length: axes }, (_, i) => x.shape.length - axes + i),
  );
}

/** Refuses points whose trailing axes are not exactly the point shape. */
export function requirePoints(where: string, x: tf.Tensor, pointShape: readonly number[]): void {
  requireTensor(where, 'x', x);
  const trailing = x.shape.slice(Math.max(0, x.shape.length - pointShape.length));
  if (!sameShape(trailing, pointShape)) {
    throw new ShapeError(
      `${where}: x must end in the point shape ${shapeText(pointShape)}; got shape ${shapeText(x.shape)}; reshape x, or fold another number of axes with product(d, axes)`,
    );
  }
}
