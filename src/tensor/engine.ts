import * as tf from '@tensorflow/tfjs';

/** A differentiable operation: its gradients are asked for one by one, and only those that are needed. */
export interface TapeOperation {
  readonly inputs: Readonly<Record<string, tf.Tensor>>;
  forward(): tf.Tensor;
  /** `saved` holds the inputs, in the order of their keys. */
  backward(dy: tf.Tensor, saved: readonly tf.Tensor[]): Record<string, () => tf.Tensor>;
}

interface Tape {
  runKernelFunc(parameters: {
    inputs: Readonly<Record<string, tf.Tensor>>;
    forwardFunc(backend: unknown, save: (tensors: tf.Tensor[]) => void): tf.Tensor;
    backwardsFunc(dy: tf.Tensor, saved: tf.Tensor[]): Record<string, () => tf.Tensor>;
  }): tf.Tensor;
}

/**
 * Runs an operation on the engine's tape. The public `tf.customGrad` computes the gradient of every input
 * whether or not anything depends on it; the engine's own entry point asks for each one separately.
 */
export function runOnTape(operation: TapeOperation): tf.Tensor {
  const tape = tf.engine() as unknown as Tape;
  return tape.runKernelFunc({
    inputs: operation.inputs,
    forwardFunc: (_backend, save) => {
      const saved = Object.values(operation.inputs);
      if (saved.length > 0) save(saved);
      return operation.forward();
    },
    backwardsFunc: (dy, saved) => operation.backward(dy, saved),
  });
}

/** A tensor over `values`, which it may keep without copying. */
export function tensorOf(values: Float32Array | Int32Array, shape: readonly number[]): tf.Tensor {
  const dtype = values instanceof Int32Array ? 'int32' : 'float32';
  return tf.engine().makeTensor(values, [...shape], dtype);
}

/** The numbers of a tensor as float32, whatever its type. */
export function floatsOf(tensor: tf.Tensor): Float32Array {
  const data = tensor.dataSync();
  return data instanceof Float32Array ? data : Float32Array.from(data);
}
