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

interface TapeState {
  readonly state?: {
    readonly gradientDepth?: number;
    activeTape?: readonly { readonly saved?: readonly tf.Tensor[] }[] | null;
  };
}

/**
 * Frees what the engine saved for the gradient of a computation that has thrown: it does so itself only
 * after one that succeeded. Does nothing while a gradient is being computed.
 */
export function forgetFailedTape(): void {
  const { state } = tf.engine() as unknown as TapeState;
  if (state?.gradientDepth !== 0 || !state.activeTape) return;
  for (const { saved } of state.activeTape) tf.dispose((saved ?? []) as tf.Tensor[]);
  state.activeTape = null;
}

/** A tensor over `values`, which it may keep without copying. */
export function tensorOf(values: Float32Array | Int32Array, shape: readonly number[]): tf.Tensor {
  const dtype = values instanceof Int32Array ? 'int32' : 'float32';
  return tf.engine().makeTensor(values, [...shape], dtype);
}

/**
 * Whether a tensor made now copies its values at once, so that it may be made over memory which is about to
 * be overwritten.
 */
export function copiesOnWrite(): boolean {
  return tf.getBackend() === 'wasm';
}

/** The parts of the wasm backend that lead to a tensor's numbers in its memory. */
interface HeapBackend {
  readonly wasm?: { readonly HEAPU8?: Uint8Array };
  readonly dataIdMap?: { get(dataId: object): { readonly memoryOffset?: number | null } | undefined };
}

interface EngineState {
  readonly state?: {
    readonly tensorInfo?: { get(dataId: object): { readonly backend?: unknown } | undefined };
  };
}

/**
 * The numbers of a tensor as float32, without a copy where the backend lets one look at its memory. To be
 * read at once: any tensor operation may free, move or overwrite them.
 */
export function borrowedFloats(tensor: tf.Tensor): Float32Array {
  if (tensor.dtype === 'float32' && !tensor.isDisposed) {
    // A backend of another make has no such parts, and the public way below serves it.
    const engine = tf.engine() as unknown as EngineState;
    const backend = engine.state?.tensorInfo?.get(tensor.dataId)?.backend as HeapBackend | undefined;
    const heap = backend?.wasm?.HEAPU8;
    const offset = backend?.dataIdMap?.get(tensor.dataId)?.memoryOffset;
    if (heap && typeof offset === 'number') return new Float32Array(heap.buffer, offset, tensor.size);
  }
  return floatsOf(tensor);
}

/** The numbers of a tensor as float32, whatever its type, to keep but not to change. */
export function floatsOf(tensor: tf.Tensor): Float32Array {
  const data = tensor.dataSync();
  return data instanceof Float32Array ? data : Float32Array.from(data);
}
