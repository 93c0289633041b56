import * as tf from '@tensorflow/tfjs';
import { CheckpointError, ParameterError } from '../errors.js';
import { requireStream, restoreStream, type Stream, type StreamState } from '../random/stream.js';
import { describe, requireKnownKeys } from '../tensor/checks.js';
import { type Json, requireJson } from './json.js';
import { matchTensors } from './matchTensors.js';
import {
  readOptimizer,
  requireOptimizer,
  setIterations,
  setSlots,
  slotOwner,
  slotRole,
} from './optimizerState.js';
import { decodeSafetensors, encodeSafetensors, type StoredTensor, type StoredType } from './safetensors.js';
import { sealFile, verifySeal } from './seal.js';
import type { TrainingCursor } from './trainOptions.js';
import { type FoundVariable, findVariables, type VariableSource } from './variables.js';

/** What a checkpoint keeps. */
export interface CheckpointContents {
  /** Every variable that the run changes; a record gives them the clearest names. */
  readonly variables: VariableSource;
  /** The optimizer's memory and step counter; its settings, such as the learning rate, are not kept. */
  readonly optimizer?: tf.Optimizer;
  /** Streams by a name of your own. */
  readonly streams?: Readonly<Record<string, Stream>>;
  /** Where the run stands: `progress.cursor`, a batch's cursor, or any JSON value of your own. */
  readonly cursor?: Json;
}

/** What a checkpoint is put back into. */
export interface CheckpointTargets {
  readonly variables: VariableSource;
  /** Made like the one in the checkpoint; leave it out to use the model without training it further. */
  readonly optimizer?: tf.Optimizer;
}

/** What a checkpoint gives back beside the values it puts into variables and optimizer. */
export interface Resumed<Cursor = TrainingCursor> {
  /** The streams, where they stood. */
  readonly streams: Readonly<Record<string, Stream>>;
  /** The cursor, as it was given; undefined if there was none. */
  readonly cursor: Cursor | undefined;
}

/** The file's state, beside the tensors, as it stands in the metadata. */
interface SavedState {
  readonly streams: Record<string, StreamState>;
  readonly cursor?: Json;
  readonly optimizer?: {
    readonly kind: string;
    readonly iterations: number;
    /** For each list of slots, the paths of the variables that its slots belong to, in order. */
    readonly lists: Record<string, { path: string; role: string }[]>;
  };
}

const format = 'leadline checkpoint 1';
const storedTypes: Readonly<Record<string, StoredType>> = { float32: 'F32', int32: 'I32', bool: 'BOOL' };
const variableName = (path: string): string => `variables/${path}`;
const slotName = (field: string, path: string): string => `optimizer/${field}/${path}`;
const singleName = (field: string): string => `optimizer/${field}`;

/**
 * A checkpoint as bytes, for a page to store where it likes (IndexedDB, a download); {@link checkpoint} writes
 * the same to a file. All values are those of the moment of the call, even if training goes on meanwhile.
 *
 * The layout is safetensors, an open format: variables under `variables/<path>`, optimizer memory under
 * `optimizer/<field>/<path>`, and in the metadata the streams, the cursor and a SHA-256 checksum of the whole
 * file, taken with the checksum's own digits set to 0.
 *
 * Throws a `CheckpointError` if the optimizer has stepped a variable that is not among `variables`, a
 * `TrainingError` or `ParameterError` for contents of the wrong kind.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { decodeCheckpoint, encodeCheckpoint, stream } from 'leadline';
 * const weight = tf.variable(tf.tensor1d([1, 2]));
 * const draws = stream(5);
 * const bytes = await encodeCheckpoint({ variables: { weight }, streams: { draws }, cursor: { step: 10 } });
 * weight.assign(tf.tensor1d([0, 0]));
 * const { cursor } = await decodeCheckpoint<{ step: number }>(bytes, { variables: { weight } });
 * console.log(weight.arraySync(), cursor?.step);
 * // [ 1, 2 ] 10
 * ```
 */
export async function encodeCheckpoint(contents: CheckpointContents): Promise<Uint8Array> {
  return encodeFor('encodeCheckpoint', contents);
}

/** {@link encodeCheckpoint}, with messages in the name of another function. */
export async function encodeFor(where: string, contents: CheckpointContents): Promise<Uint8Array> {
  requireKnownKeys(where, contents, ['variables', 'optimizer', 'streams', 'cursor']);
  const { optimizer, streams = {}, cursor } = contents;
  const found = findVariables(where, contents.variables);
  const live = new Map<string, tf.Tensor>();
  for (const { path, variable } of found) add(where, live, variableName(path), variable);
  const state: { -readonly [Key in keyof SavedState]: SavedState[Key] } = { streams: {} };
  for (const [name, stream] of Object.entries(streams)) {
    requireStream(`${where}: streams.${name}`, stream);
    state.streams[name] = stream.save();
  }
  if (cursor !== undefined) {
    requireJson(where, 'cursor', cursor);
    state.cursor = cursor;
  }
  if (optimizer !== undefined) {
    requireOptimizer(where, optimizer);
    state.optimizer = describeOptimizer(where, optimizer, found, live);
  }
  // Clones hold the present data without copying it, whatever is assigned while it is read.
  const clones = [...live].map(([name, tensor]) => [name, tf.keep(tf.clone(tensor))] as const);
  try {
    const tensors = new Map<string, StoredTensor>();
    for (const [name, tensor] of clones) {
      const data = ofType(tensor.dtype, await tensor.data());
      tensors.set(name, {
        dtype: storedTypes[tensor.dtype]!,
        shape: tensor.shape,
        bytes: new Uint8Array(data.buffer, data.byteOffset, data.byteLength),
      });
    }
    return await sealFile((sha256) =>
      encodeSafetensors({ metadata: { sha256, format, state: JSON.stringify(state) }, tensors }),
    );
  } finally {
    for (const [, tensor] of clones) tensor.dispose();
  }
}

function add(where: string, live: Map<string, tf.Tensor>, name: string, tensor: tf.Tensor): void {
  if (!(tensor.dtype in storedTypes)) {
    throw new CheckpointError(
      `${where}: variables must be float32, int32 or bool; got ${tensor.dtype} for ${name}; leave it out`,
    );
  }
  if (live.has(name)) {
    throw new CheckpointError(`${where}: names must be unique; got ${name} twice; rename a key`);
  }
  live.set(name, tensor);
}

/** Backends hand out integers in whatever array they computed them in. */
function ofType(dtype: tf.DataType, data: ArrayLike<number>): Float32Array | Int32Array | Uint8Array {
  if (dtype === 'float32') return data instanceof Float32Array ? data : Float32Array.from(data);
  if (dtype === 'int32') return data instanceof Int32Array ? data : Int32Array.from(data);
  return data instanceof Uint8Array ? data : Uint8Array.from(data);
}

function describeOptimizer(
  where: string,
  optimizer: tf.Optimizer,
  found: readonly FoundVariable[],
  live: Map<string, tf.Tensor>,
): NonNullable<SavedState['optimizer']> {
  const paths = new Map(found.map(({ path, variable }) => [variable.name, path]));
  const { kind, iterations, singles, lists } = readOptimizer(optimizer);
  for (const [field, variable] of singles) add(where, live, singleName(field), variable);
  const described: Record<string, { path: string; role: string }[]> = {};
  for (const [field, slots] of lists) {
    described[field] = slots.map((slot) => {
      const path = paths.get(slotOwner(slot));
      if (path === undefined) {
        throw new CheckpointError(
          `${where}: variables must include every one that the optimizer has stepped; got none named ${slotOwner(slot)}; add it`,
        );
      }
      add(where, live, slotName(field, path), slot.variable);
      return { path, role: slotRole(slot) };
    });
  }
  return { kind, iterations, lists: described };
}

/**
 * Puts a checkpoint's values back into variables and optimizer and returns its streams and cursor: the inverse
 * of {@link encodeCheckpoint}. Everything is checked before the first value is changed.
 *
 * Throws a `CheckpointError` if the bytes are damaged, truncated or not a checkpoint, or if they were made for
 * other variables (which name, shape or type differs is said) or another kind of optimizer.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { decodeCheckpoint, encodeCheckpoint } from 'leadline';
 * const bytes = await encodeCheckpoint({ variables: { weight: tf.variable(tf.zeros([2, 3])) } });
 * const other = tf.variable(tf.zeros([2, 4]));
 * await decodeCheckpoint(bytes, { variables: { weight: other } }).catch((error) => console.log(error.name));
 * // CheckpointError
 * ```
 */
export async function decodeCheckpoint<Cursor = TrainingCursor>(
  bytes: Uint8Array,
  targets: CheckpointTargets,
): Promise<Resumed<Cursor>> {
  return decodeFor('decodeCheckpoint', bytes, targets);
}

/** {@link decodeCheckpoint}, with messages in the name of another function. */
export async function decodeFor<Cursor>(
  where: string,
  bytes: Uint8Array,
  targets: CheckpointTargets,
): Promise<Resumed<Cursor>> {
  requireKnownKeys(where, targets, ['variables', 'optimizer']);
  if (!(bytes instanceof Uint8Array)) {
    throw new ParameterError(
      `${where}: bytes must be a Uint8Array; got ${describe(bytes)}; pass what encodeCheckpoint returned`,
    );
  }
  const { optimizer } = targets;
  const found = findVariables(where, targets.variables);
  if (optimizer !== undefined) requireOptimizer(where, optimizer);
  const { metadata, tensors } = decodeSafetensors(where, bytes);
  if (metadata.format !== format || metadata.sha256 === undefined || metadata.state === undefined) {
    throw new CheckpointError(
      `${where}: the file must be a '${format}'; got a safetensors file of another kind (${metadata.format ?? 'unnamed'}); pass what checkpoint(…) wrote`,
    );
  }
  await verifySeal(where, bytes, metadata.sha256);
  const state = JSON.parse(metadata.state) as SavedState;
  const streams = Object.fromEntries(
    Object.entries(state.streams).map(([name, saved]) => [name, restoreStream(saved)]),
  );
  matchTensors(
    where,
    new Map(found.map(({ path, variable }) => [variableName(path), variable])),
    new Map([...tensors].filter(([name]) => name.startsWith('variables/'))),
  );
  const restoreOptimizer = optimizer && planOptimizer(where, optimizer, state, tensors, found);
  tf.tidy(() => {
    for (const { path, variable } of found) variable.assign(toTensor(tensors.get(variableName(path))!));
    restoreOptimizer?.();
  });
  return { streams, cursor: state.cursor as Cursor | undefined };
}

function toTensor({ dtype, shape, bytes }: StoredTensor): tf.Tensor {
  // Copied, because values need not start at a multiple of four in the caller's buffer; and not by slice(),
  // which for a Buffer of Node copies nothing.
  const { buffer } = new Uint8Array(bytes);
  if (dtype === 'F32') return tf.tensor(new Float32Array(buffer), [...shape], 'float32');
  if (dtype === 'I32') return tf.tensor(new Int32Array(buffer), [...shape], 'int32');
  return tf.tensor(new Uint8Array(buffer), [...shape], 'bool');
}

/** Checks that the saved memory fits the optimizer, and returns what puts it there. */
function planOptimizer(
  where: string,
  optimizer: tf.Optimizer,
  { optimizer: saved }: SavedState,
  tensors: ReadonlyMap<string, StoredTensor>,
  found: readonly FoundVariable[],
): () => void {
  const present = readOptimizer(optimizer);
  if (!saved || saved.kind !== present.kind) {
    throw new CheckpointError(
      `${where}: optimizer must be of the kind that was saved; got ${present.kind} where the file has ${saved?.kind ?? 'none'}; ${saved ? `make a ${saved.kind} optimizer` : 'leave it out'}`,
    );
  }
  const singles = [...present.singles].map(([field, variable]) => [singleName(field), variable] as const);
  const variables = new Map(found.map(({ path, variable }) => [path, variable]));
  const slots = Object.entries(saved.lists).flatMap(([field, list]) =>
    list.map(({ path }) => [slotName(field, path), variables.get(path)!] as const),
  );
  matchTensors(
    where,
    new Map([...singles, ...slots]),
    new Map([...tensors].filter(([name]) => name.startsWith('optimizer/'))),
  );
  return () => {
    for (const [name, variable] of singles) variable.assign(toTensor(tensors.get(name)!));
    for (const [field, list] of Object.entries(saved.lists)) {
      const fresh = list.map(({ path, role }) => ({
        originalName: `${variables.get(path)!.name}/${role}`,
        variable: tf.variable(toTensor(tensors.get(slotName(field, path))!), false),
      }));
      setSlots(optimizer, field, fresh);
    }
    setIterations(optimizer, saved.iterations);
  };
}
