import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  bernoulli,
  directed,
  EnvironmentError,
  elbo,
  head,
  multilayerPerceptron,
  normal,
  ParameterError,
  product,
  ShapeError,
  seedWeights,
  stream,
  train,
} from '../../src/index.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

describe('multilayerPerceptron', () => {
  test('computes activation(x W + b) layer by layer', () => {
    const net = multilayerPerceptron(stream(61), {
      sizes: [2, 3, 1],
      activation: 'relu',
      outputActivation: 'sigmoid',
    });
    const [w1, b1, w2, b2] = net.variables.map((v) => v.arraySync()) as [
      number[][],
      number[],
      number[][],
      number[],
    ];
    const x = [0.4, -1.3];
    const hidden = b1.map((b, j) => Math.max(0, b + x[0]! * w1[0]![j]! + x[1]! * w1[1]![j]!));
    const out = 1 / (1 + Math.exp(-(b2[0]! + hidden.reduce((s, h, j) => s + h * w2[j]![0]!, 0))));
    expect(net(tf.tensor2d([x])).dataSync()[0]).toBeCloseTo(out, 6);
    net.dispose();
  });

  test('starts from the stream: the same twice, another for another seed, inside the law’s limits', () => {
    const start = (seed: number) => {
      const net = multilayerPerceptron(stream(seed), { sizes: [50, 40] });
      const values = [...net.variables[0]!.dataSync()];
      net.dispose();
      return values;
    };
    const values = start(62);
    expect(start(62)).toEqual(values);
    expect(start(63)).not.toEqual(values);
    const limit = Math.sqrt(6 / 90);
    expect(Math.max(...values.map(Math.abs))).toBeLessThanOrEqual(Math.fround(limit));
    // Variance limit²/3 of 2,000 values; relative deviation of the estimate √(0.8/2000) = 0.02, 5 of them.
    const variance = values.reduce((sum, v) => sum + v * v, 0) / values.length;
    expect(Math.abs(variance / (limit ** 2 / 3) - 1)).toBeLessThan(0.1);
  });

  test('leaves one tensor per call, and frees its variables', () => {
    const before = tf.memory().numTensors;
    const net = multilayerPerceptron(stream(64), { sizes: [4, 5, 6] });
    const x = tf.zeros([2, 4]);
    expect(tf.memory().numTensors - before).toBe(5);
    const y = net(x);
    expect(tf.memory().numTensors - before).toBe(6);
    tf.dispose([x, y]);
    net.dispose();
    expect(tf.memory().numTensors).toBe(before);
  });
});

test('head splits one linear layer into named parameters', () => {
  const posterior = head(stream(65), 3, { mean: 2, logVariance: 1 });
  const [weights, bias] = posterior.variables as [tf.Variable<tf.Rank.R2>, tf.Variable];
  const features = tf.tensor2d([[1, -2, 0.5]]);
  const all = tf.add(tf.matMul(features, weights), bias).arraySync() as number[][];
  const { mean, logVariance } = posterior(features);
  expect([...(mean.arraySync() as number[][])[0]!, ...(logVariance.arraySync() as number[][])[0]!]).toEqual(
    all[0],
  );
  posterior.dispose();
});

describe('seedWeights', () => {
  const build = () =>
    tf.sequential({
      layers: [
        tf.layers.conv2d({
          inputShape: [8, 8, 1],
          filters: 4,
          kernelSize: 3,
          strides: 2,
          padding: 'same',
          activation: 'tanh',
        }),
        tf.layers.flatten(),
        tf.layers.dense({ units: 4 }),
      ],
    });
  const read = (model: tf.LayersModel) => model.getWeights().map((w) => [...w.dataSync()]);

  test('makes two models start alike, and keeps constant starts', () => {
    const [a, b] = [build(), build()];
    expect(read(a)[0]).not.toEqual(read(b)[0]);
    const before = tf.memory().numTensors;
    seedWeights(a, stream(66));
    seedWeights(b, stream(66));
    expect(tf.memory().numTensors).toBe(before);
    expect(read(a)).toEqual(read(b));
    expect(read(a)[1]).toEqual([0, 0, 0, 0]);
  });

  test('a convolutional tf.layers encoder and decoder train through the elbo', async () => {
    const encoder = build();
    const decoder = tf.sequential({
      layers: [
        tf.layers.dense({ inputShape: [2], units: 64, activation: 'tanh' }),
        tf.layers.reshape({ targetShape: [4, 4, 4] }),
        tf.layers.conv2dTranspose({ filters: 1, kernelSize: 3, strides: 2, padding: 'same' }),
      ],
    });
    seedWeights(encoder, stream(67));
    seedWeights(decoder, stream(68));
    const model = directed()
      .latent('z', () => product(normal({ mean: tf.zeros([2]), sd: 1 })))
      .observed('x', ({ z }) => product(bernoulli({ logit: decoder.predict(z) as tf.Tensor }), 3));
    const recognizer = directed()
      .given('x')
      .latent('z', ({ x }) => {
        const [mean, logVariance] = tf.split(encoder.predict(x) as tf.Tensor2D, 2, 1);
        return product(normal({ mean: mean!, logVariance: logVariance! }));
      });
    // Invented pictures: a bright half, left or right.
    const side = stream(69).integers(2, [60, 1, 1, 1]);
    const column = tf.reshape(tf.range(0, 8), [1, 1, 8, 1]);
    const x = tf.cast(
      tf.equal(tf.cast(tf.less(tf.mul(column, tf.ones([60, 8, 1, 1])), 4), 'int32'), side),
      'float32',
    );
    const seen: number[] = [];
    const run = train({
      bound: elbo(model, recognizer, { draws: 2 }),
      data: { x },
      optimizer: tf.train.adam(0.02),
      stream: stream(70),
      batchSize: 20,
      steps: 60,
    });
    for await (const { bound } of run) seen.push(bound);
    expect(seen[0]!).toBeLessThan(-40);
    // Two equally likely pictures: the evidence is −log 2, and the bound approaches it.
    expect(seen.at(-1)!).toBeGreaterThan(-6);
  });

  test('a backend that cannot train a layer is named, with the way out', async () => {
    await import('@tensorflow/tfjs-backend-wasm');
    await tf.setBackend('wasm');
    try {
      const encoder = build();
      seedWeights(encoder, stream(70));
      const model = directed()
        .latent('z', () => product(normal({ mean: tf.zeros([2]), sd: 1 })))
        .observed('x', ({ z }) => product(normal({ mean: tf.sum(z), sd: tf.ones([8, 8, 1]) }), 3));
      const recognizer = directed()
        .given('x')
        .latent('z', ({ x }) => {
          const [mean, logVariance] = tf.split(encoder.predict(x) as tf.Tensor2D, 2, 1);
          return product(normal({ mean: mean!, logVariance: logVariance! }));
        });
      const run = train({
        bound: elbo(model, recognizer),
        data: { x: tf.zeros([4, 8, 8, 1]) },
        optimizer: tf.train.sgd(0.1),
        stream: stream(71),
      });
      await expect(run.next()).rejects.toThrow(
        new EnvironmentError(
          "train: the backend must have every operation that the model and its gradient use; got wasm, which lacks Conv2DBackpropFilter; call await tf.setBackend('cpu') before the model is built",
        ),
      );
    } finally {
      await tf.setBackend('cpu');
    }
  });
});

test('wrong use has one clear message each', () => {
  const any = (v: unknown) => v as never;
  const net = multilayerPerceptron(stream(71), { sizes: [4, 2] });
  const posterior = head(stream(72), 4, { mean: 2 });
  const cases: [() => unknown, unknown, string][] = [
    [
      () => multilayerPerceptron(stream(1), { sizes: [4] }),
      ParameterError,
      'multilayerPerceptron: sizes must be at least two layer sizes; got an array of 1; pass for example sizes: [64, 128, 8]',
    ],
    [
      () => multilayerPerceptron(stream(1), { sizes: [4, 0] }),
      ParameterError,
      'multilayerPerceptron: each of sizes must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      () => multilayerPerceptron(stream(1), { sizes: [4, 1], activation: any('gelu') }),
      ParameterError,
      "multilayerPerceptron: activation must be one of tanh, relu, sigmoid, linear; got the string 'gelu'; pass one of these",
    ],
    [
      () => net(tf.zeros([3, 5])),
      ShapeError,
      "multilayerPerceptron: x must be [rows, 4]; got [3, 5]; flatten each row's features, or set sizes[0]",
    ],
    [
      () => net(any([1])),
      ParameterError,
      'multilayerPerceptron: x must be a tensor; got an array of 1; wrap it in tf.tensor(…)',
    ],
    [
      () => head(stream(1), 4, any({})),
      ParameterError,
      'head: outputs must map parameter names to sizes; got an object with keys (none); pass for example { mean: 8, logVariance: 8 }',
    ],
    [
      () => head(stream(1), 4, { mean: -1 }),
      ParameterError,
      'head: the size of mean must be a whole number of at least 1; got -1; pass for example 1',
    ],
    [
      () => posterior(tf.zeros([3, 5])),
      ShapeError,
      'head: features must be [rows, 4]; got [3, 5]; set inputs to the size of the last layer',
    ],
    [
      () => seedWeights(any({}), stream(1)),
      ParameterError,
      'seedWeights: model must be a built tf.layers model; got an object with keys (none); give its first layer an inputShape',
    ],
  ];
  for (const [act, kind, message] of cases) {
    let caught: unknown;
    try {
      act();
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(kind);
    expect((caught as Error).message).toBe(message);
  }
});
