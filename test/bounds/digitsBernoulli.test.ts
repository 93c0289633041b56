import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  bernoulli,
  directed,
  elbo,
  evaluateBound,
  head,
  multilayerPerceptron,
  normal,
  product,
  stream,
  train,
  useFastestBackend,
} from '../../src/index.js';
import { readDigits } from '../data/digits.js';

// The digits: Alpaydin and Kaynak (1998); see test/data/README.md. A pixel is on from 8 of 16.
const { pixels, rows } = readDigits();
const binary = pixels.map((v) => (v >= 8 ? 1 : 0));
const trainingRows = 1500;

beforeAll(async () => {
  tf.enableProdMode();
  await useFastestBackend();
});

async function heldOutBound(seed: string, latents: number) {
  const images = tf.tensor2d(binary, [rows, 64]);
  const training = tf.slice(images, [0, 0], [trainingRows, 64]);
  const heldOut = tf.slice(images, [trainingRows, 0], [rows - trainingRows, 64]);
  const weights = stream(seed);
  const encoder = multilayerPerceptron(weights, { sizes: [64, 128], outputActivation: 'tanh' });
  const posterior = head(weights, 128, { mean: latents, logVariance: latents });
  const decoder = multilayerPerceptron(weights, { sizes: [latents, 128, 64] });

  const model = directed()
    .latent('z', () => product(normal({ mean: tf.zeros([latents]), sd: 1 })))
    .observed('x', ({ z }) => product(bernoulli({ logit: decoder(z) })));
  const recognizer = directed()
    .given('x')
    .latent('z', ({ x }) => product(normal(posterior(encoder(x)))));
  const bound = elbo(model, recognizer);

  const run = train({
    bound,
    data: { x: training },
    optimizer: tf.train.adam(0.002),
    stream: stream(`${seed} training`),
    epochs: 200,
    batchSize: 100,
  });
  // 200 passes are 3,000 steps; what is alive after the first is alive after the last, and nothing more.
  let first = 0;
  for await (const { step } of run) {
    if (step === 1) first = tf.memory().numTensors;
    else if (tf.memory().numTensors !== first) throw new Error(`step ${step} leaks`);
  }
  const many = elbo(model, recognizer, { draws: 10 });
  const result = await evaluateBound(many, { x: heldOut }, { stream: stream(`${seed} held out`) });
  const perDimension = tf.tidy(() => {
    const { mean, logVariance } = posterior(encoder(heldOut));
    const square = tf.add(tf.square(mean), tf.exp(logVariance));
    return tf.mul(0.5, tf.mean(tf.sub(square, tf.add(1, logVariance)), 0)).dataSync();
  });
  tf.dispose([images, training, heldOut, ...encoder.variables, ...posterior.variables, ...decoder.variables]);
  if (process.env.SHOW) console.log(seed, latents, result, perDimension);
  return { bound: result.bound, alive: perDimension.filter((v) => v > 0.05).length };
}

describe('a nonlinear model on the binarised digits', () => {
  const reached: { bound: number; alive: number }[] = [];

  test('one draw and batches of 100 reach −18.6 nats on held-out images, averaged over 3 seeds', async () => {
    for (const seed of ['first', 'second', 'third']) reached.push(await heldOutBound(seed, 8));
    const average = reached.reduce((sum, { bound }) => sum + bound, 0) / reached.length;
    expect(average).toBeGreaterThan(-18.6);
  }, 900_000);

  test('with 40 latents the superfluous ones switch off, and the bound is not worse by more than 0.5 nats', async () => {
    const few = reached[0]!;
    const many = await heldOutBound('first', 40);
    expect(many.bound).toBeGreaterThan(few.bound - 0.5);
    expect(few.alive).toBe(8);
    expect(many.alive).toBeLessThan(20);
  }, 900_000);
});
