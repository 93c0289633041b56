import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { describe, flatten, type NestedNumbers, requireTensor, shapeText } from '../tensor/checks.js';

/** Typed arrays that an entry may be given as; integers become int32 tensors, the others float32. */
export type NumberArray =
  | Float32Array
  | Float64Array
  | Int32Array
  | Int16Array
  | Int8Array
  | Uint16Array
  | Uint8Array
  | Uint8ClampedArray;

/**
 * Values with one row per data point along the leading axis: a tensor, a typed array, an array of typed
 * arrays, nested arrays of numbers, or an object that holds such values, for example values with a mask.
 */
export type BatchEntry = tf.Tensor | NumberArray | readonly NumberArray[] | NestedNumbers | object;

/** Entries by name, all with the same number of rows. */
export type BatchData = { readonly [name: string]: BatchEntry };

/** An object that is not a function: inside a class instance, methods stay what they are. */
type Plain = object & { readonly call?: never };

/** An entry once batched: what was an array is a tensor. */
type Batched<Entry> = Entry extends tf.Tensor
  ? Entry
  : Entry extends NumberArray | readonly unknown[]
    ? tf.Tensor
    : Entry extends Plain
      ? { [Key in keyof Entry]: Batched<Entry[Key]> }
      : Entry;

/** Data once batched: the same names, with tensors for arrays. */
export type Tensors<Data> = { [Name in keyof Data]: Batched<Data[Name]> };

/** What batched data of type `Data` may be given as: tensors, or arrays in their place. */
export type DataFor<Data> = { readonly [Name in keyof Data]: EntryFor<Data[Name]> };

type EntryFor<Entry> = Entry extends tf.Tensor
  ? Entry | NumberArray | readonly NumberArray[] | NestedNumbers
  : Entry extends NumberArray | readonly unknown[]
    ? Entry
    : Entry extends Plain
      ? { readonly [Key in keyof Entry]: EntryFor<Entry[Key]> }
      : Entry;

const isNumberArray = (value: unknown): value is NumberArray =>
  ArrayBuffer.isView(value) && !(value instanceof DataView) && !/^Big/.test(value.constructor.name);

/** Maps every array and tensor inside a value, and keeps all else; objects keep their prototype. */
function mapTensors(
  value: unknown,
  path: string,
  map: (leaf: tf.Tensor | NumberArray | readonly unknown[], path: string) => unknown,
): unknown {
  if (value instanceof tf.Tensor || isNumberArray(value) || Array.isArray(value)) return map(value, path);
  if (typeof value !== 'object' || value === null) return value;
  const copy = Object.create(Object.getPrototypeOf(value));
  for (const key of Reflect.ownKeys(value)) {
    copy[key] = mapTensors((value as Record<PropertyKey, unknown>)[key], `${path}.${String(key)}`, map);
  }
  return copy;
}

function toTensor(
  where: string,
  name: string,
  value: tf.Tensor | NumberArray | readonly unknown[],
): tf.Tensor {
  if (value instanceof tf.Tensor) {
    requireTensor(where, name, value);
    return tf.clone(value);
  }
  if (isNumberArray(value)) return tf.tensor(plainArray(value));
  if (value.length > 0 && value.every(isNumberArray)) {
    const width = value[0]!.length;
    const ragged = value.findIndex((row) => row.length !== width);
    if (ragged >= 0) {
      throw new ShapeError(
        `${where}: ${name} must have rows of one length; got ${width} in row 0 and ${value[ragged]!.length} in row ${ragged}; make every row equally long`,
      );
    }
    const whole = value.every((row) => plainArray(row) instanceof Int32Array);
    const all = new (whole ? Int32Array : Float32Array)(value.length * width);
    for (const [i, row] of value.entries()) all.set(row, i * width);
    return tf.tensor(all, [value.length, width]);
  }
  let first: unknown = value;
  while (Array.isArray(first)) first = first[0];
  if (typeof first === 'boolean') return tf.tensor(value as boolean[], undefined, 'bool');
  const { data, shape } = flatten(where, name, value as NestedNumbers);
  return tf.tensor(data, shape, 'float32');
}

function plainArray(value: NumberArray): Float32Array | Int32Array {
  if (value instanceof Float32Array || value instanceof Int32Array) return value;
  return value instanceof Float64Array ? Float32Array.from(value) : Int32Array.from(value);
}

/** Data held as tensors, from which batches of rows are gathered. */
export class RowSource<Data> {
  /** The common number of rows. */
  readonly rows: number;
  readonly #data: Record<string, unknown>;
  readonly #owned: tf.Tensor[] = [];

  constructor(where: string, data: Data) {
    if (typeof data !== 'object' || data === null || data instanceof tf.Tensor || Array.isArray(data)) {
      throw new ParameterError(
        `${where}: data must be an object of named entries; got ${describe(data)}; pass for example { x }`,
      );
    }
    let first: { path: string; rows: number } | undefined;
    const hold = (leaf: tf.Tensor | NumberArray | readonly unknown[], path: string): tf.Tensor => {
      // Kept, so that a tf.tidy of the caller does not take it away between two batches.
      const tensor = tf.keep(toTensor(where, path, leaf));
      this.#owned.push(tensor);
      const rows = tensor.shape[0];
      if (rows === undefined || rows === 0) {
        throw new ShapeError(
          `${where}: ${path} must have at least one row; got shape ${shapeText(tensor.shape)}; give it a leading axis, one row per data point`,
        );
      }
      first ??= { path, rows };
      if (rows !== first.rows) {
        throw new ShapeError(
          `${where}: data must have one number of rows; got ${first.rows} in ${first.path} and ${rows} in ${path}; give each data point one row in every entry`,
        );
      }
      return tensor;
    };
    try {
      this.#data = {};
      for (const [name, entry] of Object.entries(data)) {
        if ((typeof entry !== 'object' || entry === null) && entry !== undefined) {
          throw new ParameterError(
            `${where}: ${name} must be a tensor, an array or an object of these; got ${describe(entry)}; give it one row per data point`,
          );
        }
        this.#data[name] = mapTensors(entry, name, hold);
      }
      if (!first) {
        throw new ParameterError(
          `${where}: data must have at least one entry; got none; pass for example { x }`,
        );
      }
      this.rows = first.rows;
    } catch (error) {
      this.dispose();
      throw error;
    }
  }

  /** The given rows of every entry, and a function that disposes them. */
  gather(rows: Int32Array): { data: Tensors<Data>; dispose: () => void } {
    const made: tf.Tensor[] = [];
    const index = tf.tensor1d(rows, 'int32');
    const gathered = (leaf: unknown): tf.Tensor => {
      const part = tf.keep(tf.gather(leaf as tf.Tensor, index));
      made.push(part);
      return part;
    };
    const data = Object.fromEntries(
      Object.entries(this.#data).map(([name, entry]) => [name, mapTensors(entry, name, gathered)]),
    );
    index.dispose();
    return { data: data as Tensors<Data>, dispose: () => tf.dispose(made) };
  }

  dispose(): void {
    tf.dispose(this.#owned);
  }
}
