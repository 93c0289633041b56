import * as tf from '@tensorflow/tfjs';
import { expect, it } from 'vitest';
import { stream } from '../../src/random/stream.js';
import { evaluateBound } from '../../src/training/evaluateBound.js';
import { bits, refusal, toy, toyData } from './toy.js';

const rows = toyData(23);

it('gives mean, standard error and parts over all rows, batch by batch', async () => {
  const { bound, list } = toy();
  const before = tf.memory().numTensors;
  const result = await evaluateBound(bound, { x: rows }, { stream: stream(41), batchSize: 10 });
  expect(tf.memory().numTensors).toBe(before);
  const values: number[] = [];
  const likelihoods: number[] = [];
  for (const [i, start] of [0, 10, 20].entries()) {
    const x = tf.tensor2d(rows.slice(start, start + 10).map((row) => [...row]));
    const { value, parts } = bound.estimate({ x }, stream(41).fork(i));
    values.push(...value.dataSync());
    likelihoods.push(...parts.logLikelihood.x.dataSync());
  }
  const mean = values.reduce((a, b) => a + b) / 23;
  const variance = values.reduce((a, b) => a + (b - mean) ** 2, 0) / 22;
  expect(result.points).toBe(23);
  expect(result.bound).toBeCloseTo(mean, 10);
  expect(result.standardError).toBeCloseTo(Math.sqrt(variance / 23), 10);
  expect(result.parts.logLikelihood.x).toBeCloseTo(likelihoods.reduce((a, b) => a + b) / 23, 10);
  expect(result.parts.logLikelihood.x! - result.parts.divergence.z!).toBeCloseTo(mean, 5);
  expect(bits(list)).toBe(bits(toy().list));
});

it('is the same each time, does not advance the stream, and follows the seed', async () => {
  const { bound } = toy();
  const source = stream(42);
  const state = source.save();
  const first = await evaluateBound(bound, { x: rows }, { stream: source });
  expect(source.save()).toEqual(state);
  expect(await evaluateBound(bound, { x: rows }, { stream: source })).toEqual(first);
  expect((await evaluateBound(bound, { x: rows }, { stream: stream(43) })).bound).not.toBe(first.bound);
});

it('lets −∞ be, and refuses NaN with its row', async () => {
  const direct = {
    estimate: ({ x }: { x: tf.Tensor }) => {
      const value = tf.clone(x);
      return { value, surrogate: tf.sum(value), parts: { logLikelihood: { x: value }, divergence: {} } };
    },
  };
  const infinite = await evaluateBound(direct, { x: [1, Number.NEGATIVE_INFINITY] }, { stream: stream(44) });
  expect(infinite.bound).toBe(Number.NEGATIVE_INFINITY);
  const run = () =>
    evaluateBound(direct, { x: [1, 2, 3, 4, Number.NaN, 6] }, { stream: stream(44), batchSize: 3 });
  const before = tf.memory().numTensors;
  expect(await refusal(run)).toBe(
    "TrainingError: evaluateBound: every value must be a number; got NaN at row 4; check that row and the model's parameters",
  );
  expect(tf.memory().numTensors).toBe(before);
});

it('refuses wrong options', async () => {
  const { bound } = toy();
  const run = (options: object) => () => evaluateBound(bound, { x: rows }, options as { stream: never });
  expect(await refusal(run({}))).toBe(
    'StreamError: evaluateBound: stream must be a Stream; got a value of type undefined; pass stream(seed) or a fork of one',
  );
  expect(await refusal(run({ stream: stream(1), draws: 3 }))).toBe(
    "ParameterError: evaluateBound: options must be among stream, batchSize; got 'draws'; remove or rename it",
  );
  expect(await refusal(run({ stream: stream(1), batchSize: -1 }))).toBe(
    'ParameterError: minibatches: batchSize must be a whole number of at least 1; got -1; pass for example 1',
  );
});
