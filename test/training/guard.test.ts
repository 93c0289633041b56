import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { type Stream, stream } from '../../src/random/stream.js';
import { readOptimizer } from '../../src/training/optimizerState.js';
import { train } from '../../src/training/train.js';
import { bits, refusal, toy, toyData } from './toy.js';

/** Everything that a refused step must leave as it was. */
function memory(optimizer: tf.Optimizer, list: readonly tf.Variable[]): string {
  const { iterations, singles, lists } = readOptimizer(optimizer);
  const slots = [...lists.values()].flat().map(({ variable }) => variable);
  return `${iterations} ${slots.length} ${bits([...list, ...singles.values(), ...slots])}`;
}

/** Trains until a step is refused: the message, and whether anything changed in that step. */
async function refused(options: Parameters<typeof train<{ x: tf.Tensor }>>[0], list: readonly tf.Variable[]) {
  let before = memory(options.optimizer, list);
  let steps = 0;
  const tensors = tf.memory().numTensors;
  const slots = () => [...readOptimizer(options.optimizer).lists.values()].flat().length;
  const slotsBefore = slots();
  const message = await refusal(async () => {
    for await (const { step } of train(options)) {
      steps = step;
      before = memory(options.optimizer, list);
    }
  });
  return {
    message,
    steps,
    unchanged: memory(options.optimizer, list) === before,
    leaked: tf.memory().numTensors - tensors - (slots() - slotsBefore),
  };
}

const rows = toyData(20);
const tail = 'no variable was changed: check those rows, lower the learning rate, or clip the gradient';

describe.each([
  ['sgd', () => tf.train.sgd(0.01)],
  ['adam', () => tf.train.adam(0.01)],
  ['momentum', () => tf.train.momentum(0.01, 0.9)],
])('with %s, a step', (_, make) => {
  it('with a wrong data value is refused with node, row of the data and variable', async () => {
    const { bound, variables, list } = toy();
    const broken = rows.map((row) => row.slice());
    broken[17]![2] = Number.NaN;
    const { message, steps, ...rest } = await refused(
      { bound, data: { x: broken }, variables, optimizer: make(), stream: stream(31), batchSize: 4 },
      list,
    );
    expect(message).toBe(
      `TrainingError: train: step ${steps + 1} must be finite; got log-likelihood of x = NaN at row 17, divergence of z = NaN at row 17, the bound = NaN at row 17, gradient of encoder/weight with NaN, gradient of encoder/logSd with NaN, gradient of decoder/0 with NaN, gradient of decoder/1 with NaN; ${tail}`,
    );
    expect(rest).toEqual({ unchanged: true, leaked: 0 });
  });

  it('that goes wrong later is refused with everything as after the step before', async () => {
    const { bound, variables, list } = toy();
    let calls = 0;
    const later = {
      estimate(data: { x: tf.Tensor }, draws: Stream) {
        const estimate = bound.estimate(data, draws);
        if (++calls < 6) return estimate;
        const divergence = tf.div(estimate.parts.divergence.z, 0);
        const value = tf.sub(estimate.parts.logLikelihood.x, divergence);
        return {
          value,
          surrogate: tf.sum(value),
          parts: { logLikelihood: estimate.parts.logLikelihood, divergence: { z: divergence } },
        };
      },
    };
    const { message, ...rest } = await refused(
      { bound: later, data: { x: rows }, variables, optimizer: make(), stream: stream(32), batchSize: 20 },
      list,
    );
    // The infinite derivatives have both signs, so that their sums over rows are NaN.
    expect(message.replace(/row \d+/g, 'row N')).toBe(
      `TrainingError: train: step 6 must be finite; got divergence of z = Infinity at row N, the bound = -Infinity at row N, gradient of encoder/weight with NaN, gradient of encoder/logSd with NaN; ${tail}`,
    );
    expect(rest.steps).toBe(5);
    expect(rest.unchanged).toBe(true);
  });

  it('with finite parts and a gradient that is not is traced to its node', async () => {
    const { variables, list, bound } = toy();
    // sqrt at 0: the value is 0, its derivative is infinite, and times 0 it is NaN.
    const kinked = {
      estimate(data: { x: tf.Tensor }, draws: Stream) {
        return tf.tidy(() => {
          const estimate = bound.estimate(data, draws);
          const zero = tf.sqrt(tf.sum(tf.mul(variables.encoder.logSd, 0)));
          const divergence = tf.add(estimate.parts.divergence.z, zero);
          const value = tf.sub(estimate.parts.logLikelihood.x, divergence);
          return {
            value,
            surrogate: tf.sum(value),
            parts: { logLikelihood: estimate.parts.logLikelihood, divergence: { z: divergence } },
          };
        });
      },
    };
    const { message, ...rest } = await refused(
      { bound: kinked, data: { x: rows }, variables, optimizer: make(), stream: stream(33) },
      list,
    );
    expect(message).toBe(
      `TrainingError: train: step 1 must be finite; got a gradient that is not finite from the divergence of z (through encoder/logSd), gradient of encoder/logSd with NaN; ${tail}`,
    );
    expect(rest).toEqual({ steps: 0, unchanged: true, leaked: 0 });
  });

  it('with a surrogate that is not finite is refused', async () => {
    const { bound, list } = toy();
    const odd = {
      estimate(data: { x: tf.Tensor }, draws: Stream) {
        const estimate = bound.estimate(data, draws);
        return { ...estimate, surrogate: tf.add(estimate.surrogate, Number.NaN) };
      },
    };
    const { message, unchanged } = await refused(
      { bound: odd, data: { x: rows }, optimizer: make(), stream: stream(34) },
      list,
    );
    expect(message).toBe(
      `TrainingError: train: step 1 must be finite; got a surrogate that is not finite; ${tail}`,
    );
    expect(unchanged).toBe(true);
  });
});

describe('an update', () => {
  it('that would overflow a variable is refused and undone', async () => {
    const { bound, variables, list } = toy();
    const { message, ...rest } = await refused(
      { bound, data: { x: rows }, variables, optimizer: tf.train.sgd(3e38), stream: stream(35), clip: 100 },
      list,
    );
    expect(message).toMatch(
      /^TrainingError: train: step 1 must leave variables finite; got -?Infinity for encoder\/weight from a finite gradient of norm \d+\.\d+; no variable was changed: lower the learning rate, or give the optimizer a positive epsilon$/,
    );
    expect(rest).toEqual({ steps: 0, unchanged: true, leaked: 0 });
  });

  it('of 0/0 by Adam without epsilon is refused, with its memory put back', async () => {
    const { bound, list } = toy();
    const unused = tf.variable(tf.ones([3]));
    const padded = {
      estimate(data: { x: tf.Tensor }, draws: Stream) {
        return tf.tidy(() => {
          const estimate = bound.estimate(data, draws);
          return { ...estimate, surrogate: tf.add(estimate.surrogate, tf.sum(tf.mul(unused, 0))) };
        });
      },
    };
    const optimizer = tf.train.adam(0.1, 0.9, 0.999, 0);
    (optimizer as unknown as { epsilon: number }).epsilon = 0;
    const { message, ...rest } = await refused(
      { bound: padded, data: { x: rows }, variables: { unused, list }, optimizer, stream: stream(36) },
      [unused, ...list],
    );
    expect(message).toMatch(/step 1 must leave variables finite; got NaN for unused from a finite gradient/);
    expect(rest).toEqual({ steps: 0, unchanged: true, leaked: 0 });
  });
});

describe('gradients whose squares overflow', () => {
  const steep = (weight: tf.Variable) => ({
    estimate: ({ x }: { x: tf.Tensor }) =>
      tf.tidy(() => {
        const value = tf.mul(tf.add(tf.mul(x, weight), 0), 1e25) as tf.Tensor1D;
        return { value, surrogate: tf.sum(value), parts: { logLikelihood: { x: value }, divergence: {} } };
      }),
  });

  it('are clipped to the right length', async () => {
    const weight = tf.variable(tf.scalar(1));
    const run = train({
      bound: steep(weight),
      data: { x: [1, 2, 3] },
      optimizer: tf.train.sgd(1),
      stream: stream(37),
      variables: { weight },
      clip: 0.5,
    });
    const { value } = await run.next();
    expect(value!.gradientNorm / 2e25).toBeCloseTo(1, 6);
    expect(weight.arraySync()).toBeCloseTo(1.5, 6);
    await run.return();
  });

  it('are refused without clipping, since they would fill the memory of Adam with infinities', async () => {
    const weight = tf.variable(tf.scalar(1));
    const { message, ...rest } = await refused(
      {
        bound: steep(weight),
        data: { x: [1, 2, 3] },
        optimizer: tf.train.adam(1),
        stream: stream(38),
        variables: { weight },
      },
      [weight],
    );
    expect(message).toMatch(
      /^TrainingError: train: step 1 must have a gradient whose square a float32 can hold; got elements up to (1\.99|2\.0)\d*e\+25; no variable was changed: pass clip, or scale the data$/,
    );
    expect(rest).toEqual({ steps: 0, unchanged: true, leaked: 0 });
  });
});
