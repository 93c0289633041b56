import { CheckpointError, LeadlineError, ParameterError } from '../errors.js';
import { describe } from '../tensor/checks.js';
import {
  type CheckpointContents,
  type CheckpointTargets,
  decodeFor,
  encodeFor,
  type Resumed,
} from './checkpointBytes.js';
import { readWhole, writeWhole } from './files.js';
import type { TrainingCursor } from './trainOptions.js';

function requirePath(where: string, path: unknown): asserts path is string {
  if (typeof path !== 'string' || path === '') {
    throw new ParameterError(
      `${where}: path must be a file's path; got ${describe(path)}; pass for example 'run.safetensors'`,
    );
  }
}

/**
 * Writes all that a training run needs to go on after its process was killed: variables, the optimizer's
 * memory, streams, and where the run stands. A run resumed from it equals the uninterrupted one bit for bit.
 * Needs Node; in a browser use {@link encodeCheckpoint}, which says what the file holds.
 *
 * The bytes go to `<path>.unfinished`, are forced to the disk and renamed, so the path never holds half a
 * checkpoint. Values are those of the moment of the call, even if it is not awaited.
 *
 * Throws a `CheckpointError` if the file cannot be written or the optimizer has stepped other variables, an
 * `EnvironmentError` where there are no files.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { checkpoint, resume } from 'leadline';
 * const path = `${(await import('node:os')).tmpdir()}/leadline-example.safetensors`;
 * const weight = tf.variable(tf.tensor1d([1, 2]));
 * const optimizer = tf.train.adam(0.1);
 * await checkpoint(path, { variables: { weight }, optimizer, cursor: { step: 3 } });
 * weight.assign(tf.tensor1d([0, 0]));
 * const { cursor } = await resume<{ step: number }>(path, { variables: { weight }, optimizer });
 * console.log(weight.arraySync(), cursor?.step);
 * // [ 1, 2 ] 3
 * ```
 */
export async function checkpoint(path: string, contents: CheckpointContents): Promise<void> {
  const where = 'checkpoint';
  requirePath(where, path);
  const bytes = await encodeFor(where, contents);
  try {
    await writeWhole(where, path, bytes);
  } catch (cause) {
    if (cause instanceof LeadlineError) throw cause;
    throw new CheckpointError(
      `${where}: path must be writable; got ${path}: ${(cause as Error).message}; choose a folder that exists and has room`,
      { cause },
    );
  }
}

/**
 * Puts back what {@link checkpoint} wrote: values into variables and optimizer, streams and cursor as its
 * result. Make model and optimizer as the killed run did, then resume; nothing is changed unless all of it
 * fits. The optimizer's settings stay as you made it. Without `optimizer` only the variables are put back.
 * Needs Node; in a browser use {@link decodeCheckpoint}.
 *
 * Throws a `CheckpointError` if the file is missing, damaged, truncated or made for another model or
 * optimizer, and says what differs; an `EnvironmentError` where there are no files.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { checkpoint, resume, stream } from 'leadline';
 * const path = `${(await import('node:os')).tmpdir()}/leadline-example-streams.safetensors`;
 * const variables = { weight: tf.variable(tf.zeros([2])) };
 * const noise = stream(8);
 * await checkpoint(path, { variables, streams: { noise } });
 * const next = noise.integers(100, [1]).arraySync();
 * const { streams } = await resume(path, { variables });
 * console.log(`${streams.noise!.integers(100, [1]).arraySync()}` === `${next}`);
 * // true
 * ```
 */
export async function resume<Cursor = TrainingCursor>(
  path: string,
  targets: CheckpointTargets,
): Promise<Resumed<Cursor>> {
  const where = 'resume';
  requirePath(where, path);
  let bytes: Uint8Array;
  try {
    bytes = await readWhole(where, path);
  } catch (cause) {
    if (cause instanceof LeadlineError) throw cause;
    throw new CheckpointError(
      `${where}: path must be a readable checkpoint; got ${path}: ${(cause as Error).message}; start anew where there is none yet`,
      { cause },
    );
  }
  return decodeFor(where, bytes, targets);
}
