import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';

/** Nested arrays of numbers, as tfjs takes them. */
export type NestedNumbers = readonly (number | NestedNumbers)[];

/** What a parameter may be given as: a tensor, a number, nested arrays or a typed array. */
export type ParameterValue = tf.Tensor | number | NestedNumbers | Float32Array | Float64Array | Int32Array;

/** Names the type of a wrong value for an error message. */
export function describe(value: unknown): string {
  if (value === null) return 'null';
  if (typeof value === 'string') return `the string '${value}'`;
  if (typeof value === 'number' || typeof value === 'boolean' || typeof value === 'undefined')
    return `${value}`;
  if (Array.isArray(value)) return `an array of ${value.length}`;
  if (value instanceof tf.Tensor) return `a tensor of shape ${shapeText(value.shape)}`;
  if (typeof value === 'function') return 'a function';
  const prototype: unknown = Object.getPrototypeOf(value);
  if (prototype !== null && prototype !== Object.prototype) {
    return `an instance of ${(value as object).constructor.name}`;
  }
  const keys = Object.keys(value);
  const shown = keys.slice(0, 6).join(', ') || '(none)';
  return `an object with keys ${shown}${keys.length > 6 ? ', …' : ''}`;
}

/** A shape as messages print it. */
export function shapeText(shape: readonly number[]): string {
  return `[${shape.join(', ')}]`;
}

/** Refuses anything that is not a live tensor of numbers. */
export function requireTensor(where: string, name: string, value: unknown): asserts value is tf.Tensor {
  if (!(value instanceof tf.Tensor)) {
    throw new ParameterError(
      `${where}: ${name} must be a tensor; got ${describe(value)}; wrap it in tf.tensor(…)`,
    );
  }
  if (value.isDisposed) {
    throw new ParameterError(
      `${where}: ${name} must be alive; got a disposed tensor of shape ${shapeText(value.shape)}; keep it with tf.keep(…) or use it inside the same tf.tidy`,
    );
  }
  if (value.dtype === 'string' || value.dtype === 'complex64') {
    throw new ParameterError(
      `${where}: ${name} must hold real numbers; got dtype ${value.dtype}; convert it to float32`,
    );
  }
}

/** Refuses a size that is not a non-negative (or positive) whole number. */
export function requireCount(
  where: string,
  name: string,
  value: unknown,
  least = 0,
): asserts value is number {
  if (!(typeof value === 'number' && Number.isSafeInteger(value) && value >= least)) {
    throw new ParameterError(
      `${where}: ${name} must be a whole number of at least ${least}; got ${describe(value)}; pass for example ${Math.max(1, least)}`,
    );
  }
}

/** Refuses a number that is not finite, or lies below `least`. */
export function requireNumber(
  where: string,
  name: string,
  value: unknown,
  least = Number.NEGATIVE_INFINITY,
): asserts value is number {
  if (!(typeof value === 'number' && Number.isFinite(value) && value >= least)) {
    const domain =
      least === Number.NEGATIVE_INFINITY ? 'a finite number' : `a finite number of at least ${least}`;
    throw new ParameterError(`${where}: ${name} must be ${domain}; got ${describe(value)}; mend the value`);
  }
}

/** Refuses keys of an options object that are not among `known`. */
export function requireKnownKeys(where: string, options: unknown, known: readonly string[]): void {
  if (
    typeof options !== 'object' ||
    options === null ||
    options instanceof tf.Tensor ||
    Array.isArray(options)
  ) {
    throw new ParameterError(
      `${where}: options must be an object; got ${describe(options)}; pass { ${known.slice(0, 2).join(', ')} }`,
    );
  }
  for (const key of Object.keys(options)) {
    if (!known.includes(key)) {
      throw new ParameterError(
        `${where}: options must be among ${known.join(', ')}; got '${key}'; remove or rename it`,
      );
    }
  }
}

/** Flattens nested arrays into float32 numbers and their shape. */
export function flatten(
  where: string,
  name: string,
  value: NestedNumbers,
): { data: Float32Array; shape: number[] } {
  const shape: number[] = [];
  let level: unknown = value;
  while (Array.isArray(level)) {
    shape.push(level.length);
    level = level[0];
  }
  const data: number[] = [];
  const walk = (part: unknown, depth: number): void => {
    if (depth === shape.length) {
      if (typeof part !== 'number') {
        throw new ParameterError(
          `${where}: ${name} must hold numbers; got ${describe(part)}; mend the array`,
        );
      }
      data.push(part);
      return;
    }
    if (!Array.isArray(part) || part.length !== shape[depth]) {
      throw new ShapeError(
        `${where}: ${name} must be a regular nested array of shape ${shapeText(shape)}; got ${describe(part)} at depth ${depth}; make every row equally long`,
      );
    }
    for (const item of part) walk(item, depth + 1);
  };
  walk(value, 0);
  return { data: Float32Array.from(data), shape };
}

/** The position of a flat index in an array of `shape`, as `[row, column]`. */
export function positionText(index: number, shape: readonly number[]): string {
  const position: number[] = [];
  let rest = index;
  for (let axis = shape.length - 1; axis >= 0; axis--) {
    position.unshift(rest % shape[axis]!);
    rest = Math.floor(rest / shape[axis]!);
  }
  return shapeText(position);
}
