import * as tf from '@tensorflow/tfjs';
import { TrainingError } from '../errors.js';
import { requireStream, type Stream } from '../random/stream.js';
import { requireKnownKeys } from '../tensor/checks.js';
import type { BatchData, DataFor } from './batchData.js';
import { minibatches } from './minibatches.js';
import { listParts, type Parts, partsOf, type Trainable } from './trainable.js';

/** A bound over a whole data set. */
export interface EvaluatedBound {
  /** The mean bound, in nats per data point. */
  readonly bound: number;
  /** The standard error of that mean over data points; NaN for a single one. */
  readonly standardError: number;
  /** The mean of each part, in nats per data point. */
  readonly parts: Parts<number>;
  /** The number of data points. */
  readonly points: number;
}

/** How {@link evaluateBound} goes through the data. */
export interface EvaluateOptions {
  /** Where draws come from; only forks of it are used. */
  readonly stream: Stream;
  /** Data points at a time, which bounds memory; 500 by default. Draws depend on it. */
  readonly batchSize?: number;
}

/**
 * The mean of a bound over a data set without training on it, in batches: for held-out data, which alone tell
 * whether a model learned more than its examples.
 *
 * bound = (1/n) Σ value_i, standardError = sqrt(Σ (value_i − bound)² / (n (n − 1))), summed in double
 * precision. In nats per data point. The same stream gives the same draws, so evaluations of one model at
 * different times differ by the model alone. No gradient. The stream is not advanced.
 *
 * Throws a `TrainingError` where a value is NaN, with its row; `ParameterError` and `ShapeError` as
 * {@link minibatches} does.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { evaluateBound, stream } from 'leadline';
 * const squared = {
 *   estimate: ({ x }: { x: tf.Tensor }) => {
 *     const value = tf.neg(tf.square(x));
 *     return { value, surrogate: tf.sum(value), parts: { logLikelihood: { x: value }, divergence: {} } };
 *   },
 * };
 * const { bound, standardError, points } = await evaluateBound(squared, { x: [1, 2, 3] }, { stream: stream(1) });
 * console.log(bound.toFixed(4), standardError.toFixed(4), points);
 * // -4.6667 2.3333 3
 * ```
 */
export async function evaluateBound<Data>(
  bound: Trainable<Data>,
  data: DataFor<NoInfer<Data>>,
  options: EvaluateOptions,
): Promise<EvaluatedBound> {
  requireKnownKeys('evaluateBound', options, ['stream', 'batchSize']);
  const { stream, batchSize = 500 } = options;
  requireStream('evaluateBound', stream);
  const values: number[] = [];
  let names: ReturnType<typeof listParts> = [];
  let sums: number[] = [];
  for (const batch of minibatches(data as BatchData, { batchSize, epochs: 1 })) {
    const { value, list } = tf.tidy(() => {
      const estimate = bound.estimate(batch.data as Data, stream.fork(batch.index));
      return { value: estimate.value, list: listParts(estimate.parts).map((part) => ({ ...part })) };
    });
    const got = await value.data();
    for (const [i, point] of got.entries()) {
      if (!Number.isNaN(point)) continue;
      tf.dispose([value, ...list.map(({ term }) => term)]);
      throw new TrainingError(
        `evaluateBound: every value must be a number; got NaN at row ${batch.rows[i] ?? i}; check that row and the model's parameters`,
      );
    }
    values.push(...got);
    names = list;
    if (sums.length === 0) sums = list.map(() => 0);
    for (const [i, { term }] of list.entries()) {
      for (const point of await term.data()) sums[i]! += point;
    }
    tf.dispose([value, ...list.map(({ term }) => term)]);
  }
  const points = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / points;
  const spread = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return {
    bound: mean,
    standardError: Math.sqrt(spread / (points * (points - 1))),
    parts: partsOf(
      names,
      sums.map((sum) => sum / points),
    ),
    points,
  };
}
