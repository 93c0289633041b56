import * as tf from '@tensorflow/tfjs';
import { runHostOperation } from './hostOperation.js';
import { live, type Operand, operandData } from './operand.js';

/** A host operation over operands, some of which are plain numbers or cut from the gradient. */
export interface OperandOperation {
  /** Names the caller in errors. */
  readonly where: string;
  readonly operands: readonly Operand[];
  readonly outShape: readonly number[];
  /** From the numbers of every operand, before their transforms. */
  forward(data: readonly Float32Array[]): Float32Array;
  /** The gradient of operand `k` in its numbers; `backward` tells one backward pass from another. */
  gradient(k: number, data: readonly Float32Array[], upstream: Float32Array, backward: object): Float32Array;
}

/** Runs an operation on the tape with those operands as inputs whose gradient may be asked for. */
export function runOperandOperation(operation: OperandOperation): tf.Tensor {
  const { where, operands, outShape } = operation;
  const tracked = operands.flatMap((o, k) => (!o.constant && o.source instanceof tf.Tensor ? [k] : []));
  // The numbers of every operand: tracked ones as the operation hands them over, the others from here.
  const gather = (data: readonly Float32Array[]): Float32Array[] =>
    operands.map((o, k) => (tracked.includes(k) ? data[tracked.indexOf(k)]! : operandData(o)));
  return runHostOperation({
    where,
    inputs: tracked.map((k) => live(operands[k]!.source as tf.Tensor)),
    outShape,
    forward: (data) => operation.forward(gather(data)),
    gradient: (at, data, upstream, backward) =>
      operation.gradient(tracked[at]!, gather(data), upstream, backward),
  });
}
