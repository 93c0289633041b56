import type * as tf from '@tensorflow/tfjs';
import { GradientError } from '../errors.js';
import { borrowedFloats, runOnTape, tensorOf } from './engine.js';

/**
 * An operation computed on the host from the numbers of its inputs, with one gradient per input. The numbers
 * are borrowed: neither function may keep them, or run a tensor operation before it has read them.
 */
export interface HostOperation {
  /** Names the caller in errors. */
  readonly where: string;
  readonly inputs: readonly tf.Tensor[];
  readonly outShape: readonly number[];
  forward(data: readonly Float32Array[]): Float32Array;
  /**
   * The gradient of input `k`, of its shape, given the upstream gradient. `pass` is one object for all
   * gradients that are asked for in one backward pass, with one upstream gradient.
   */
  gradient(k: number, data: readonly Float32Array[], upstream: Float32Array, pass: object): Float32Array;
}

/**
 * Runs a host operation on the tape. Each gradient is computed only when it is asked for; a second
 * derivative is refused, since the gradients are numbers without a history.
 */
export function runHostOperation(operation: HostOperation): tf.Tensor {
  const { where, inputs, outShape } = operation;
  return runOnTape({
    inputs: keyed(inputs),
    forward: () => tensorOf(operation.forward(inputs.map(borrowedFloats)), outShape),
    backward: (dy, saved) => {
      const pass = {};
      const gradient = (k: number) => () =>
        runOnTape({
          inputs: { ...keyed(saved), dy },
          forward: () =>
            tensorOf(
              operation.gradient(k, saved.map(borrowedFloats), borrowedFloats(dy), pass),
              inputs[k]!.shape,
            ),
          backward: () => refuseSecondDerivative(where, [...Object.keys(saved), 'dy']),
        });
      return Object.fromEntries(inputs.map((_, k) => [String(k), gradient(k)]));
    },
  });
}

function keyed(tensors: readonly tf.Tensor[]): Record<string, tf.Tensor> {
  return Object.fromEntries(tensors.map((tensor, k) => [String(k), tensor]));
}

function refuseSecondDerivative(where: string, keys: readonly string[]): Record<string, () => tf.Tensor> {
  const refuse = (): tf.Tensor => {
    throw new GradientError(
      `${where}: a kernel must be differentiated once only; got a second derivative; wrap the computation in composed(() => …)`,
    );
  };
  return Object.fromEntries(keys.map((key) => [key, refuse]));
}
