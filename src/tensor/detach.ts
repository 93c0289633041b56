import * as tf from '@tensorflow/tfjs';
import { requireTensor } from './checks.js';
import { runOnTape } from './engine.js';

/**
 * Cuts the gradient: the same numbers, treated as a constant from here on. Estimators need it wherever a
 * quantity is to be used without being differentiated, and tfjs has no such operation.
 *
 * Shapes: any; the result has the input's shape and type and shares its memory. Gradient route: none, and
 * nothing upstream is visited in the backward pass.
 *
 * @param tensor - any tensor
 * @throws ParameterError when given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { detach } from 'leadline';
 * const gradient = tf.grad((x) => tf.mul(x, detach(x)).sum());
 * console.log(gradient(tf.tensor1d([3])).arraySync());
 * // [ 3 ]
 * ```
 */
export function detach<T extends tf.Tensor>(tensor: T): T {
  requireTensor('detach', 'tensor', tensor);
  return runOnTape({
    inputs: {},
    // Inside an operation the engine records nothing, so the copy is not connected to its source.
    forward: () => tf.engine().runKernel('Identity', { x: tensor }) as tf.Tensor,
    backward: () => ({}),
  }) as T;
}
