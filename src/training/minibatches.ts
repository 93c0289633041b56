import { ParameterError } from '../errors.js';
import { permutationArray, requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount, requireKnownKeys } from '../tensor/checks.js';
import { type BatchData, RowSource, type Tensors } from './batchData.js';

/** Where a walk over batches stands: a plain JSON value, to be kept and given back. */
export type BatchCursor = {
  /** The pass over the data, counted from 1. */
  readonly epoch: number;
  /** How many batches of this pass have been taken. */
  readonly index: number;
  /** The number of data points. */
  readonly rows: number;
  readonly batchSize: number;
  /** The seed of the stream that shuffles, or null for data in its own order. */
  readonly seed: string | null;
};

/** Some data points, as tensors that live until the next batch is taken or the loop ends. */
export interface Batch<Data> {
  readonly data: Data;
  /** The pass over the data, counted from 1. */
  readonly epoch: number;
  /** The batch's place in its pass, counted from 0. */
  readonly index: number;
  /** Which rows of the data these are. */
  readonly rows: Int32Array;
  /** Where the walk stands after this batch. */
  readonly cursor: BatchCursor;
}

/** How {@link minibatches} walks. */
export interface MinibatchOptions {
  /** Data points in a batch; the last of a pass may have fewer. 100 by default. */
  readonly batchSize?: number;
  /** Shuffles every pass anew; without it, the data's own order. */
  readonly stream?: Stream;
  /** How many passes; without end by default. */
  readonly epochs?: number;
  /** Continue after this cursor. */
  readonly cursor?: BatchCursor;
}

const where = 'minibatches';

/**
 * Walks over data in small batches, shuffled anew in every pass, which is what stochastic gradients are
 * computed from. Each pass takes every row once. The order depends on the stream's seed and the pass alone,
 * so that a walk continued from a saved cursor takes the very batches that an uninterrupted one would.
 *
 * Entries are tensors, typed or nested arrays of shape `[rows, …]`, or objects holding such (values with their
 * mask); batches have the same names, with tensors of shape `[batch, …]`. A batch's tensors are disposed when
 * the next one is taken, and when the loop ends by any way, `break` included. The stream is not advanced.
 *
 * Throws a `ParameterError` or `ShapeError` for data without a common number of rows, and for a cursor that
 * comes from other data, another batch size or another stream.
 *
 * @example
 * ```ts
 * import { minibatches, stream } from 'leadline';
 * const x = [[0], [1], [2], [3], [4]];
 * const seen: number[] = [];
 * for (const batch of minibatches({ x }, { batchSize: 2, stream: stream(3), epochs: 1 })) {
 *   console.log(batch.index, batch.data.x.shape);
 *   // 0 [ 2, 1 ]
 *   // 1 [ 2, 1 ]
 *   // 2 [ 1, 1 ]
 *   seen.push(...batch.rows);
 * }
 * console.log(seen.sort());
 * // [ 0, 1, 2, 3, 4 ]
 * ```
 */
export function* minibatches<Data extends BatchData>(
  data: Data,
  options: MinibatchOptions = {},
): Generator<Batch<Tensors<Data>>, void, undefined> {
  requireKnownKeys(where, options, ['batchSize', 'stream', 'epochs', 'cursor']);
  const { batchSize = 100, stream, epochs = Number.POSITIVE_INFINITY, cursor } = options;
  requireCount(where, 'batchSize', batchSize, 1);
  if (epochs !== Number.POSITIVE_INFINITY) requireCount(where, 'epochs', epochs, 1);
  if (stream !== undefined) requireStream(where, stream);
  const source = new RowSource(where, data);
  let release = (): void => {};
  try {
    const own = { rows: source.rows, batchSize, seed: stream?.save().seed ?? null };
    const batches = Math.ceil(source.rows / batchSize);
    if (cursor !== undefined) requireBatchCursor(where, 'cursor', cursor, own);
    for (let epoch = cursor?.epoch ?? 1; epoch <= epochs; epoch++) {
      const order = stream
        ? permutationArray(stream.fork(epoch), source.rows)
        : Int32Array.from({ length: source.rows }, (_, i) => i);
      for (let index = epoch === cursor?.epoch ? cursor.index : 0; index < batches; index++) {
        const rows = order.slice(index * batchSize, (index + 1) * batchSize);
        const gathered = source.gather(rows);
        release = gathered.dispose;
        yield { data: gathered.data, epoch, index, rows, cursor: { epoch, index: index + 1, ...own } };
        release();
      }
    }
  } finally {
    release();
    source.dispose();
  }
}

/** Refuses a cursor that another walk left. */
export function requireBatchCursor(
  caller: string,
  name: string,
  cursor: unknown,
  own: { rows: number; batchSize: number; seed: string | null },
): asserts cursor is BatchCursor {
  if (typeof cursor !== 'object' || cursor === null) {
    throw new ParameterError(
      `${caller}: ${name} must be a batch's cursor; got ${describe(cursor)}; pass what batch.cursor gave`,
    );
  }
  const { epoch, index, rows, batchSize, seed } = cursor as Record<string, unknown>;
  requireCount(caller, `${name}.epoch`, epoch, 1);
  requireCount(caller, `${name}.index`, index);
  if (rows !== own.rows || batchSize !== own.batchSize) {
    throw new ParameterError(
      `${caller}: ${name} must come from ${own.rows} rows in batches of ${own.batchSize}; got one of ${describe(rows)} rows in batches of ${describe(batchSize)}; continue with the same data and batchSize`,
    );
  }
  if (seed !== own.seed) {
    throw new ParameterError(
      `${caller}: ${name} must come from a walk shuffled by the same stream; got one with another seed; restore the stream that was saved beside it`,
    );
  }
}
