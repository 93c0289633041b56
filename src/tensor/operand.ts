import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { describe, flatten, type ParameterValue, requireTensor, shapeText } from './checks.js';
import { detach } from './detach.js';
import { borrowedFloats, tensorOf } from './engine.js';
import type { Transform } from './formula.js';

/**
 * One argument of a formula. It holds either a tensor, whose gradient may be wanted, or plain numbers, which
 * need no tensor at all; so a distribution with constant parameters owns nothing that could leak.
 */
export interface Operand {
  readonly shape: readonly number[];
  readonly source: tf.Tensor | Float32Array;
  /** The change of parametrisation it passes through before the formula reads it. */
  readonly transform: Transform | undefined;
  /** Whether its gradient is cut. */
  readonly constant: boolean;
}

/** An operand from whatever a parameter may be given as. */
export function operandFrom(
  where: string,
  name: string,
  value: ParameterValue,
  transform?: Transform,
  example = '1',
): Operand {
  if (typeof value === 'number') {
    return { shape: [], source: Float32Array.of(value), transform, constant: true };
  }
  if (value instanceof Float32Array) {
    return { shape: [value.length], source: value.slice(), transform, constant: true };
  }
  if (value instanceof Float64Array || value instanceof Int32Array) {
    return { shape: [value.length], source: Float32Array.from(value), transform, constant: true };
  }
  if (Array.isArray(value)) {
    const { data, shape } = flatten(where, name, value);
    return { shape, source: data, transform, constant: true };
  }
  if (!(value instanceof tf.Tensor)) {
    throw new ParameterError(
      `${where}: ${name} must be a tensor, a number, nested numbers or a typed array; got ${describe(value)}; pass for example ${name}: ${example}`,
    );
  }
  requireTensor(where, name, value);
  return { shape: value.shape, source: value, transform, constant: false };
}

/** The operand's numbers before its transform, to be read at once: see {@link borrowedFloats}. */
export function operandData(operand: Operand): Float32Array {
  return operand.source instanceof Float32Array ? operand.source : borrowedFloats(live(operand.source));
}

/** The tensor, unless it was disposed of. */
export function live(tensor: tf.Tensor): tf.Tensor {
  if (!tensor.isDisposed) return tensor;
  throw new ParameterError(
    `a distribution's parameters must be alive when it is used; got a disposed tensor of shape ${shapeText(tensor.shape)}; keep it with tf.keep(…), or make and use the distribution inside the same tf.tidy`,
  );
}

/** The same operand with its gradient cut. */
export function detachedOperand(operand: Operand): Operand {
  return operand.constant ? operand : { ...operand, constant: true };
}

/** The operand as a tensor before its transform: a new one, which the caller owns. */
export function rawTensor(operand: Operand): tf.Tensor {
  const { source, shape } = operand;
  if (source instanceof Float32Array) return tensorOf(source.slice(), shape);
  return tf.tidy(() => {
    const tensor = operand.constant ? detach(source) : live(source).clone();
    return tensor.dtype === 'float32' ? tensor : tensor.toFloat();
  });
}

/** The operand as a tensor after its transform, from ordinary tensor operations. */
export function composedTensor(operand: Operand): tf.Tensor {
  return tf.tidy(() => {
    const raw = rawTensor(operand);
    return operand.transform ? operand.transform.composed(raw) : raw;
  });
}
