import * as tf from '@tensorflow/tfjs';
import { type EvaluatedBound, elbo, evaluateBound, kl, normal, product, type Stream } from 'leadline';
import type { Dataset, Part } from './dataset.js';
import { explained, leastSquares } from './linearFit.js';
import type { SpectrumModel } from './model.js';

/** A latent dimension counts as alive if its mean divergence on held-out rows is above this, in nats. */
export const aliveAbove = 0.05;

/** One latent dimension. */
export interface Dimension {
  /** Counted from 1. */
  readonly number: number;
  /** Its mean divergence from the prior on held-out rows, in nats. */
  readonly divergence: number;
  readonly alive: boolean;
}

/** What was found about the trained model, all of it on held-out rows. */
export interface Findings {
  /** By 20 draws a row. */
  readonly bound: EvaluatedBound;
  /** The same rows under a normal distribution for each band by itself, fitted to the training rows. */
  readonly withoutCauses: { readonly bound: number; readonly standardError: number };
  /** The one with the largest divergence first. */
  readonly dimensions: readonly Dimension[];
  /** Share of each cause's variance that a linear fit on the live dimensions explains. */
  readonly causes: ReadonlyMap<string, number>;
  /** Posterior means, `[rows][latents]`. */
  readonly means: readonly Float32Array[];
  /** The learned noise of each band, as a standard deviation in the file's units. */
  readonly noise: Float32Array;
}

/** Measures the trained model on the rows that were held out. */
export async function examine(model: SpectrumModel, data: Dataset, stream: Stream): Promise<Findings> {
  const { heldOut, training, center, scale } = data;
  const bound = await evaluateBound(
    elbo(model.generative, model.recognizer, { draws: 20 }),
    { x: heldOut.x },
    { stream, batchSize: 100 },
  );
  const alone = tf.tidy(() =>
    product(normal({ mean: [...center], sd: [...scale] }))
      .logDensity(heldOut.x)
      .dataSync(),
  );
  const divergences = tf.tidy(() =>
    tf.mean(kl(model.causes(heldOut.x), normal({ mean: 0, sd: 1 })), 0).dataSync(),
  );
  const dimensions = [...divergences]
    .map((divergence, k) => ({ number: k + 1, divergence, alive: divergence > aliveAbove }))
    .sort((a, b) => b.divergence - a.divergence);
  const live = dimensions.filter(({ alive }) => alive).map(({ number }) => number - 1);
  const means = posteriorMeans(model, heldOut);
  const pick = (rows: readonly Float32Array[]) => rows.map((row) => live.map((k) => row[k]!));
  const known = pick(posteriorMeans(model, training));
  const causes = [...heldOut.causes].map(([name, values]) => {
    const coefficients = leastSquares(known, training.causes.get(name)!);
    return [name, explained(coefficients, pick(means), values)] as const;
  });
  return {
    bound,
    withoutCauses: summarize(alone),
    dimensions,
    causes: new Map(causes),
    means,
    noise: tf.tidy(() => model.noise().dataSync()) as Float32Array,
  };
}

function posteriorMeans(model: SpectrumModel, { x }: Part): Float32Array[] {
  const flat = tf.tidy(() => model.causes(x).mean().dataSync());
  return Array.from({ length: x.shape[0] }, (_, i) =>
    Float32Array.from(flat.slice(i * model.latents, (i + 1) * model.latents)),
  );
}

function summarize(values: ArrayLike<number>): { bound: number; standardError: number } {
  const list = Array.from(values);
  const mean = list.reduce((sum, value) => sum + value, 0) / list.length;
  const squares = list.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { bound: mean, standardError: Math.sqrt(squares / (list.length * (list.length - 1))) };
}
