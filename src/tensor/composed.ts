import { ParameterError } from '../errors.js';
import { onAccelerator } from './backend.js';

let depth = 0;

/**
 * Runs `compute` with every density, divergence and special function built from ordinary differentiable
 * tensor operations instead of compiled kernels. Kernels have a first derivative only; this is the cure
 * when a second one is needed (curvature, gradient penalties, implicit differentiation).
 *
 * Shapes and values are those of the kernels, at float32 accuracy of the operations. Gradient route: any
 * derivative that tfjs's own operations have.
 *
 * @param compute - a synchronous function; everything evaluated inside it uses the composed form
 * @returns whatever `compute` returns
 * @throws ParameterError when `compute` is not a function or is asynchronous.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { composed, normal } from 'leadline';
 * const logDensity = (x: tf.Tensor) => composed(() => normal({ mean: 0, sd: 0.5 }).logDensity(x));
 * const curvature = tf.grad((x) => tf.grad((y) => logDensity(y).sum())(x).sum());
 * console.log(curvature(tf.tensor1d([0.25])).arraySync());
 * // [ -4 ]
 * ```
 */
export function composed<T>(compute: () => T): T {
  if (typeof compute !== 'function') {
    throw new ParameterError(`composed: compute must be a function; got ${typeof compute}; pass () => …`);
  }
  depth++;
  try {
    const result = compute();
    if (result instanceof Promise) {
      throw new ParameterError(
        'composed: compute must be synchronous; got a promise; await outside and compute inside',
      );
    }
    return result;
  } finally {
    depth--;
  }
}

/** Whether this runs inside `composed`. */
export function insideComposed(): boolean {
  return depth > 0;
}

/** Whether formulas are to be evaluated from tensor operations now. */
export function usesComposedForm(): boolean {
  return depth > 0 || onAccelerator();
}
