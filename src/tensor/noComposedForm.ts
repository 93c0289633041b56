import type * as tf from '@tensorflow/tfjs';
import { GradientError } from '../errors.js';

type Composed = (...values: tf.Tensor[]) => tf.Tensor;

const refusals = new WeakSet<Composed>();

/** Marks a composed form that only says that there is none: on an accelerator its formula runs by the kernel. */
export function refusal(composed: Composed): Composed {
  refusals.add(composed);
  return composed;
}

/** Whether a composed form only says that there is none. */
export function isRefusal(composed: Composed): boolean {
  return refusals.has(composed);
}

/** The composed form of a formula that has none: it says so when it is asked for. */
export function noComposedForm(name: string): Composed {
  return refusal(() => {
    throw new GradientError(
      `${name}: it must be evaluated by its kernel, outside composed(…); got composed(…), and it has no form in tensor operations; move it out of composed`,
    );
  });
}
