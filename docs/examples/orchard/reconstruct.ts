import * as tf from '@tensorflow/tfjs';
import type { Stream } from 'leadline';
import type { SpectrumModel } from './model.js';

/** One band of one row as measured, and as the model would have it. */
export interface Reconstructed {
  readonly measured: number;
  readonly mean: number;
  /** The ends of the band that should hold 95 % of such measurements. */
  readonly low: number;
  readonly high: number;
}

const draws = 40;

/**
 * Each row as the model sees it again: causes are drawn from the recognizer, spectra from them. The 95 % band
 * is mean ± 1.96 sd, where the variance is that of the spectra over the draws plus the learned noise.
 */
export function reconstruct(model: SpectrumModel, x: tf.Tensor2D, stream: Stream): Reconstructed[][] {
  const [rows, bands] = x.shape;
  const { means, sds } = tf.tidy(() => {
    const z = tf.reshape(model.causes(x).draw(stream, draws), [draws * rows, model.latents]);
    const spectra = tf.reshape(model.spectrum(z).mean(), [draws, rows, bands]);
    const { mean, variance } = tf.moments(spectra, 0);
    const sd = tf.sqrt(tf.add(variance, tf.square(model.noise())));
    return { means: mean.dataSync(), sds: sd.dataSync() };
  });
  const measured = x.dataSync();
  return Array.from({ length: rows }, (_, i) =>
    Array.from({ length: bands }, (_, k) => {
      const at = i * bands + k;
      const [mean, sd] = [means[at]!, sds[at]!];
      return { measured: measured[at]!, mean, low: mean - 1.96 * sd, high: mean + 1.96 * sd };
    }),
  );
}

/** The share of measured values that lie inside their band. */
export function coverage(rows: readonly Reconstructed[][]): number {
  const all = rows.flat();
  return all.filter(({ measured, low, high }) => measured >= low && measured <= high).length / all.length;
}
