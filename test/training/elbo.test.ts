import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { elbo } from '../../src/bounds/elbo.js';
import { normal } from '../../src/distributions/normal.js';
import { product } from '../../src/distributions/product.js';
import { directed } from '../../src/models/directed.js';
import { masked } from '../../src/models/masked.js';
import { multilayerPerceptron } from '../../src/networks/multilayerPerceptron.js';
import { stream } from '../../src/random/stream.js';
import { decodeCheckpoint, encodeCheckpoint } from '../../src/training/checkpointBytes.js';
import { evaluateBound } from '../../src/training/evaluateBound.js';
import { train } from '../../src/training/train.js';
import { bits, refusal, toyData } from './toy.js';

await tf.setBackend('cpu');

/** A directed model with a network on either side. */
function networks(seed = 81) {
  const weights = stream(seed);
  const encoder = multilayerPerceptron(weights, { sizes: [4, 8, 4] });
  const decoder = multilayerPerceptron(weights, { sizes: [2, 8, 4] });
  const model = directed()
    .latent('z', () => product(normal({ mean: [0, 0], sd: 1 })))
    .observed('x', ({ z }) => product(normal({ mean: decoder(z), sd: 0.5 })));
  const recognizer = directed()
    .given('x')
    .latent('z', ({ x }) => {
      const [mean, logVariance] = tf.split(encoder(x), 2, -1) as [tf.Tensor, tf.Tensor];
      return product(normal({ mean, logVariance }));
    });
  return {
    bound: elbo(model, recognizer),
    variables: { encoder, decoder },
    list: [...encoder.variables, ...decoder.variables],
  };
}

const rows = toyData(100);
const data = { x: rows.slice(0, 60) };

describe.each(['cpu', 'wasm'])('on the %s backend', (backend) => {
  it('a directed model trains, and goes on from bytes bit for bit', async () => {
    await tf.setBackend(backend);
    const run = (model: ReturnType<typeof networks>, optimizer: tf.Optimizer) => ({
      bound: model.bound,
      data,
      variables: model.variables,
      optimizer,
      stream: stream(82),
      batchSize: 20,
      clip: 100,
      heldOut: { data: { x: rows.slice(60) }, every: 10 },
    });
    const whole = networks();
    const optimizer = tf.train.adam(0.01);
    let bytes = new Uint8Array();
    const held: number[] = [];
    for await (const { step, cursor, heldOut } of train({ ...run(whole, optimizer), steps: 200 })) {
      if (heldOut) held.push(heldOut.bound);
      if (step === 137)
        bytes = new Uint8Array(await encodeCheckpoint({ variables: whole.variables, optimizer, cursor }));
    }
    // A model that learned nothing would stay where it was.
    expect(held.at(-1)!).toBeGreaterThan(held[0]! + 2);
    const other = networks(83);
    const fresh = tf.train.adam(0.01);
    const { cursor } = await decodeCheckpoint(bytes, { variables: other.variables, optimizer: fresh });
    for await (const _ of train({ ...run(other, fresh), steps: 200, from: cursor! }));
    expect(bits(other.list)).toBe(bits(whole.list));
  });

  it('masked data are batched with their masks', async () => {
    await tf.setBackend(backend);
    const mean = tf.tidy(() => tf.variable(tf.zeros([2])));
    const model = directed()
      .latent('z', () => product(normal({ mean: [0, 0], sd: 1 })))
      .observed('x', ({ z }) => product(normal({ mean: tf.add(z, mean), sd: 1 })));
    const recognizer = directed()
      .given('x')
      .latent('z', ({ x }) => product(normal({ mean: tf.mul(tf.sub(x, mean), 0.5), variance: 0.5 })));
    // What stands in missing places must not matter: NaN there would spoil everything.
    const values = [
      [1, Number.NaN],
      [3, 10],
      [Number.NaN, 14],
      [5, 12],
    ];
    const mask = values.map((row) => row.map((value) => (Number.isNaN(value) ? 0 : 1)));
    const x = masked(tf.tensor2d(values), tf.tensor2d(mask));
    for await (const { bound } of train({
      bound: elbo(model, recognizer),
      data: { x },
      optimizer: tf.train.sgd(0.05),
      stream: stream(84),
      batchSize: 3,
      steps: 50,
    })) {
      expect(Number.isFinite(bound)).toBe(true);
    }
    for (const value of mean.dataSync()) expect(Number.isFinite(value)).toBe(true);
  });
});

it('learns the closed-form maximum of the evidence of a conjugate model', async () => {
  await tf.setBackend('cpu');
  // z ~ N(0, 1), x | z ~ N(z + m, 1): the evidence N(x; m, 2) is largest at the mean of the data, and the
  // recognizer below holds the exact posterior for every m, so that bound and evidence are equal.
  const mean = tf.tidy(() => tf.variable(tf.zeros([1])));
  const model = directed()
    .latent('z', () => product(normal({ mean: [0], sd: 1 })))
    .observed('x', ({ z }) => product(normal({ mean: tf.add(z, mean), sd: 1 })));
  const recognizer = directed()
    .given('x')
    .latent('z', ({ x }) => product(normal({ mean: tf.mul(tf.sub(x, mean), 0.5), variance: 0.5 })));
  const bound = elbo(model, recognizer);
  const x = Array.from({ length: 200 }, (_, i) => [3 + Math.sin(i)]);
  const average = x.reduce((sum, [value]) => sum + value!, 0) / 200;
  for await (const _ of train({
    bound,
    data: { x },
    optimizer: tf.train.sgd(0.05),
    stream: stream(85),
    steps: 600,
  }));
  const learned = mean.dataSync()[0]!;
  // Differentiating by hand, a point's gradient of m is (x − m)/2 − ε/sqrt(8), of variance at most 1/8 + 1/8; a
  // batch of 100 divides it by 100. Steps of rate r then hold m normally about the maximum with variance
  // r²/400 / (1 − (1 − r/2)²) = 1.27e-4, so 0.06 is 5.3 standard deviations: 1 false alarm in 1e7.
  expect(Math.abs(learned - average)).toBeLessThan(0.06);
  const evidence =
    x.reduce((sum, [value]) => sum - 0.5 * Math.log(4 * Math.PI) - (value! - learned) ** 2 / 4, 0) / 200;
  const { bound: estimate } = await evaluateBound(
    bound,
    { x: Array.from({ length: 50 }, () => x).flat() },
    { stream: stream(86) },
  );
  // A point's estimate is −r²/2 up to constants, r = a + ε/sqrt(2) with |a| < 0.56: variance (1/2 + 2 a²)/4 < 0.29.
  // Over 10,000 points the standard error is below 0.0054, so 0.03 is 5.5 of them: 1 false alarm in 1e7.
  expect(Math.abs(estimate - evidence)).toBeLessThan(0.03);
});

it('names the node of a real model that goes wrong', async () => {
  await tf.setBackend('cpu');
  const { bound, variables, list } = networks();
  const x = toyData(60);
  x[33]![1] = Number.POSITIVE_INFINITY;
  const before = bits(list);
  const message = await refusal(async () => {
    const run = {
      bound,
      data: { x },
      variables,
      optimizer: tf.train.adam(0.01),
      stream: stream(87),
      batchSize: 60,
    };
    for await (const _ of train(run));
  });
  expect(message).toContain('at row 33');
  expect(bits(list)).toBe(before);
});

it('a first step that throws leaves nothing behind, whatever it had saved for its gradient', async () => {
  await tf.setBackend('cpu');
  const shift = tf.variable(tf.zeros([2]));
  const idle = tf.variable(tf.zeros([1]));
  const model = directed()
    .latent('z', () => product(normal({ mean: [0, 0], sd: 1 })))
    .observed('x', ({ z }) => product(normal({ mean: tf.add(z, tf.exp(shift)), sd: 1 })));
  const recognizer = directed()
    .given('x')
    .latent('z', ({ x }) => product(normal({ mean: tf.div(x, 2), sd: 1 })));
  const bound = elbo(model, recognizer);
  const optimizer = tf.train.sgd(0.1);
  const attempt = async (x: number[][], variables?: tf.Variable[]) => {
    const before = tf.memory().numTensors;
    const run = train({
      bound,
      data: { x },
      optimizer,
      stream: stream(85),
      ...(variables ? { variables } : {}),
    });
    const message = await run.next().then(
      () => 'none',
      (error: Error) => error.message,
    );
    return [tf.memory().numTensors - before, message.slice(0, 50)];
  };
  expect(await attempt([[1, Number.NaN]])).toEqual([0, "elbo: in the conditional of 'z': normal: mean must"]);
  expect(await attempt([[1, 2, 3]])).toEqual([0, 'Operands could not be broadcast together with shap']);
  expect(await attempt([[1, 2]], [idle])).toEqual([0, 'train: bound must depend on a trainable variable; ']);
});
