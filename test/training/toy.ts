import * as tf from '@tensorflow/tfjs';
import { type Stream, stream } from '../../src/random/stream.js';

/** A linear Gaussian model and recognizer with hand-written terms, small enough to see through. */
export function toy(seed = 11) {
  const weights = stream(seed).fork('weights');
  const make = (label: string, shape: number[]) =>
    tf.tidy(() => tf.variable(tf.mul(weights.fork(label).normal(shape), 0.3)));
  const variables = {
    encoder: { weight: make('e', [4, 2]), logSd: make('s', [2]) },
    decoder: [make('d', [2, 4]), make('b', [4])],
  };
  const bound = {
    estimate({ x }: { x: tf.Tensor }, draws: Stream) {
      return tf.tidy(() => {
        const mean = tf.matMul(x as tf.Tensor2D, variables.encoder.weight as tf.Tensor2D);
        const sd = tf.exp(variables.encoder.logSd);
        const z = tf.add(mean, tf.mul(sd, draws.normal(mean.shape)));
        const reconstruction = tf.add(
          tf.matMul(z as tf.Tensor2D, variables.decoder[0] as tf.Tensor2D),
          variables.decoder[1]!,
        );
        const likelihood = tf.mul(tf.sum(tf.squaredDifference(x, reconstruction), 1), -0.5);
        const divergence = tf.mul(
          tf.sum(
            tf.sub(tf.add(tf.square(mean), tf.square(sd)), tf.add(1, tf.mul(2, variables.encoder.logSd))),
            1,
          ),
          0.5,
        );
        const value = tf.sub(likelihood, divergence) as tf.Tensor1D;
        return {
          value,
          surrogate: tf.sum(value) as tf.Scalar,
          parts: { logLikelihood: { x: likelihood }, divergence: { z: divergence } },
        };
      });
    },
  };
  const list = [variables.encoder.weight, variables.encoder.logSd, ...variables.decoder];
  return { variables, bound, list, dispose: () => tf.dispose(list) };
}

/** Rows from a two-dimensional plane with noise. */
export function toyData(rows: number, seed = 12): Float32Array[] {
  const source = stream(seed);
  return tf.tidy(() => {
    const plane = tf.matMul(source.normal([rows, 2]) as tf.Tensor2D, source.normal([2, 4]) as tf.Tensor2D);
    const values = tf.add(plane, tf.mul(source.normal([rows, 4]), 0.3)).dataSync() as Float32Array;
    return Array.from({ length: rows }, (_, i) => values.slice(4 * i, 4 * i + 4));
  });
}

/** The exact bits of variables. */
export function bits(variables: readonly tf.Tensor[]): string {
  return variables
    .map((variable) => {
      const values = variable.dataSync() as Float32Array;
      return Buffer.from(values.buffer, values.byteOffset, values.byteLength).toString('hex');
    })
    .join(' ');
}

/** The message of the error that a function throws or rejects with, its class in front. */
export async function refusal(run: () => unknown): Promise<string> {
  try {
    await run();
  } catch (error) {
    return `${(error as Error).name}: ${(error as Error).message}`;
  }
  return 'nothing was thrown';
}
