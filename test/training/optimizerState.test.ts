import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { stream } from '../../src/random/stream.js';
import { decodeCheckpoint, encodeCheckpoint } from '../../src/training/checkpointBytes.js';
import { readOptimizer } from '../../src/training/optimizerState.js';
import { train } from '../../src/training/train.js';
import { bits, refusal, toy, toyData } from './toy.js';

const rows = toyData(30);

/** Every optimizer that tfjs has, with the options that give it more memory. */
const optimizers: Record<string, () => tf.Optimizer> = {
  sgd: () => tf.train.sgd(0.01),
  momentum: () => tf.train.momentum(0.01, 0.9),
  nesterov: () => tf.train.momentum(0.01, 0.9, true),
  adagrad: () => tf.train.adagrad(0.05),
  adadelta: () => tf.train.adadelta(0.01, 0.9),
  adam: () => tf.train.adam(0.05),
  adamax: () => tf.train.adamax(0.05, 0.9, 0.999, 1e-8, 0.01),
  rmsprop: () => tf.train.rmsprop(0.01, 0.9, 0.5),
  // tfjs subtracts epsilon under this one's square root, so a larger one makes the first step NaN.
  'centered rmsprop': () => tf.train.rmsprop(0.001, 0.9, 0.5, 1e-12, true),
};

it('are all of them', () => {
  const known = new Set(Object.values(optimizers).map((make) => make().getClassName()));
  expect([...known].sort()).toEqual(['Adadelta', 'Adagrad', 'Adam', 'Adamax', 'Momentum', 'RMSProp', 'SGD']);
  const makers = Object.keys(tf.train).filter((name) => {
    const maker = (tf.train as unknown as Record<string, unknown>)[name];
    return typeof maker === 'function';
  });
  expect(makers.sort()).toEqual(['adadelta', 'adagrad', 'adam', 'adamax', 'momentum', 'rmsprop', 'sgd']);
});

function state(optimizer: tf.Optimizer) {
  const { kind, iterations, singles, lists } = readOptimizer(optimizer);
  return {
    kind,
    iterations,
    singles: [...singles].map(([field, variable]) => [field, bits([variable])]),
    lists: [...lists].map(([field, slots]) => [field, bits(slots.map(({ variable }) => variable))]),
  };
}

describe.each(Object.entries(optimizers))('%s', (_, make) => {
  it('goes on bit for bit from a checkpoint taken anywhere', async () => {
    const run = (model: ReturnType<typeof toy>, optimizer: tf.Optimizer) => ({
      bound: model.bound,
      data: { x: rows },
      variables: model.variables,
      optimizer,
      stream: stream(51),
      batchSize: 10,
      steps: 12,
    });
    const whole = toy();
    const wholeOptimizer = make();
    const saved: { bytes: Uint8Array; step: number }[] = [];
    saved.push({
      bytes: await encodeCheckpoint({ variables: whole.variables, optimizer: wholeOptimizer }),
      step: 0,
    });
    for await (const { step, cursor } of train(run(whole, wholeOptimizer))) {
      const { variables } = whole;
      saved.push({ bytes: await encodeCheckpoint({ variables, optimizer: wholeOptimizer, cursor }), step });
    }
    for (const { bytes, step } of saved) {
      // Another seed, so that nothing is right by chance, and once more memory than the file has.
      const model = toy(99);
      const optimizer = make();
      if (step % 2 === 0) for await (const _ of train({ ...run(model, optimizer), steps: 2 }));
      const tensors = tf.memory().numTensors;
      const slots = () => [...readOptimizer(optimizer).lists.values()].flat().length;
      const slotsBefore = slots();
      const { cursor } = await decodeCheckpoint(bytes, { variables: model.variables, optimizer });
      expect(tf.memory().numTensors - tensors).toBe(slots() - slotsBefore);
      expect(cursor?.step ?? 0).toBe(step);
      const from = cursor === undefined ? {} : { from: cursor };
      for await (const _ of train({ ...run(model, optimizer), ...from }));
      expect(bits(model.list)).toBe(bits(whole.list));
      expect(state(optimizer)).toEqual(state(wholeOptimizer));
      model.dispose();
    }
  });
});

it('Adam by its own getWeights and setWeights would not: why the fields are read instead', async () => {
  const model = toy();
  const adam = tf.train.adam(0.05);
  for await (const _ of train({
    bound: model.bound,
    data: { x: rows },
    optimizer: adam,
    stream: stream(52),
    variables: model.variables,
    steps: 40,
  }));
  const copy = tf.train.adam(0.05);
  await copy.setWeights(await adam.getWeights());
  expect(state(copy).singles).not.toEqual(state(adam).singles);
});

it('a checkpoint refuses an optimizer with memory of a variable that it does not keep', async () => {
  const model = toy();
  const optimizer = tf.train.adam(0.05);
  const run = { bound: model.bound, data: { x: rows }, optimizer, stream: stream(53), steps: 1 };
  for await (const _ of train(run));
  const before = tf.memory().numTensors;
  expect(await refusal(() => encodeCheckpoint({ variables: model.variables.decoder, optimizer }))).toBe(
    `CheckpointError: encodeCheckpoint: variables must include every one that the optimizer has stepped; got none named ${model.list[0]!.name}; add it`,
  );
  expect(tf.memory().numTensors).toBe(before);
});
