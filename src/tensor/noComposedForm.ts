import type * as tf from '@tensorflow/tfjs';
import { GradientError } from '../errors.js';

/** The composed form of a formula that has none: it says so when it is asked for. */
export function noComposedForm(name: string): () => tf.Tensor {
  return () => {
    throw new GradientError(
      `${name}: it must be evaluated by its kernel, on the cpu or wasm backend; got composed(…) or an accelerator; move it out of composed, or change the backend with tf.setBackend`,
    );
  };
}
