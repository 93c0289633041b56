import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { stream } from '../../src/random/stream.js';
import { snapshot } from '../../src/training/snapshot.js';
import { train } from '../../src/training/train.js';
import type { Progress, TrainOptions } from '../../src/training/trainOptions.js';
import { bits, refusal, toy, toyData } from './toy.js';

type Data = { x: tf.Tensor };

/** Runs to the end and returns everything that was yielded. */
async function collect(options: TrainOptions<Data>): Promise<Progress[]> {
  const all: Progress[] = [];
  for await (const progress of train(options)) all.push(progress);
  return all;
}

/** Progress without what the clock decides. */
const timeless = (all: readonly Progress[]) => all.map(({ rate: _, timeLeft: __, ...rest }) => rest);

const data = { x: toyData(50) };

describe('the steps', () => {
  it('equal those of a loop written by hand', async () => {
    const ours = toy();
    const hand = toy();
    const optimizer = tf.train.adam(0.05);
    const byHand = tf.train.adam(0.05);
    const x = tf.tensor2d(data.x.map((row) => [...row]));
    // One batch of all rows; the order of rows decides which noise each gets, so it is taken from the run.
    const order = stream(3).fork('minibatches');
    for await (const progress of train({
      bound: ours.bound,
      data,
      optimizer,
      stream: stream(3),
      batchSize: 50,
      steps: 20,
      variables: ours.variables,
    })) {
      const batch = tf.gather(x, order.fork(progress.epoch).permutation(50));
      const value = byHand.minimize(
        () =>
          hand.bound
            .estimate({ x: batch }, stream(3).fork('steps').fork(progress.step))
            .surrogate.div(-50)
            .asScalar(),
        true,
        hand.list,
      )!;
      expect(progress.bound).toBeCloseTo(-value.arraySync(), 5);
      expect(bits(ours.list)).toBe(bits(hand.list));
      const { logLikelihood, divergence } = progress.parts;
      expect(logLikelihood.x! - divergence.z!).toBeCloseTo(progress.bound, 5);
    }
  });

  it('report step, epoch, norm, rate, time left and the end', async () => {
    const { bound, variables } = toy();
    const options = { bound, data, variables, stream: stream(4), batchSize: 20 };
    const all = await collect({ ...options, optimizer: tf.train.sgd(0.01), epochs: 2 });
    expect(all.map(({ step, epoch }) => [step, epoch])).toEqual([
      [1, 1],
      [2, 1],
      [3, 1],
      [4, 2],
      [5, 2],
      [6, 2],
    ]);
    expect(all.map(({ ended }) => ended)).toEqual([...new Array(5).fill(undefined), 'steps']);
    for (const { gradientNorm, rate, timeLeft, step } of all) {
      expect(gradientNorm).toBeGreaterThan(0);
      expect(rate).toBeGreaterThan(0);
      expect(timeLeft).toBeCloseTo((6 - step) / rate, 10);
    }
    expect(JSON.parse(JSON.stringify(all))).toEqual(all);
    const endless = train({ ...options, optimizer: tf.train.sgd(0.01) });
    expect((await endless.next()).value!.timeLeft).toBe(Number.POSITIVE_INFINITY);
    await endless.return();
  });

  it('find the variables by themselves, and train only what is named and trainable', async () => {
    const named = toy();
    const alone = toy();
    const options = { data, stream: stream(5), steps: 5 };
    await collect({
      ...options,
      bound: named.bound,
      optimizer: tf.train.adam(0.1),
      variables: named.variables,
    });
    await collect({ ...options, bound: alone.bound, optimizer: tf.train.adam(0.1) });
    expect(bits(alone.list)).toBe(bits(named.list));
    const partly = toy();
    const before = bits(partly.variables.decoder);
    await collect({
      ...options,
      bound: partly.bound,
      optimizer: tf.train.adam(0.1),
      variables: partly.variables.encoder,
    });
    expect(bits(partly.variables.decoder)).toBe(before);
    expect(bits([partly.variables.encoder.weight])).not.toBe(bits([toy().variables.encoder.weight]));
  });

  it('train the weights of a tf.layers model', async () => {
    const model = tf.sequential({
      layers: [tf.layers.dense({ units: 1, inputShape: [4], kernelInitializer: 'zeros' })],
    });
    const bound = {
      estimate: ({ x }: Data) => {
        const value = tf.tidy(() =>
          tf.neg(tf.square(tf.sub((model.predict(x) as tf.Tensor).flatten(), tf.sum(x, 1)))),
        );
        return { value, surrogate: tf.sum(value), parts: { logLikelihood: { y: value }, divergence: {} } };
      },
    };
    await collect({
      bound,
      data,
      optimizer: tf.train.adam(0.1),
      stream: stream(6),
      steps: 300,
      variables: { model },
    });
    for (const weight of model.getWeights()[0]!.dataSync()) expect(weight).toBeCloseTo(1, 2);
  });

  it('clip the gradient to a norm, and report the norm before', async () => {
    const free = toy();
    const clipped = toy();
    const options = { data, stream: stream(7), steps: 1, batchSize: 50 };
    const [before] = [bits(free.list)];
    const start = free.list.map((variable) => variable.clone());
    const [a] = await collect({
      ...options,
      bound: free.bound,
      optimizer: tf.train.sgd(1),
      variables: free.variables,
    });
    const [b] = await collect({
      ...options,
      bound: clipped.bound,
      optimizer: tf.train.sgd(1),
      variables: clipped.variables,
      clip: 0.125,
    });
    expect(bits(start)).toBe(before);
    expect(b!.gradientNorm).toBe(a!.gradientNorm);
    const length = (list: tf.Tensor[]) =>
      Math.sqrt(
        list
          .flatMap((variable, i) => [...tf.sub(variable, start[i]!).dataSync()])
          .reduce((sum, difference) => sum + difference ** 2, 0),
      );
    expect(a!.gradientNorm).toBeGreaterThan(1);
    // A step of rate 1 moves by the gradient itself; float32 differences of values near 1 leave 1e-6.
    expect(Math.abs(length(free.list) / a!.gradientNorm - 1)).toBeLessThan(1e-5);
    expect(Math.abs(length(clipped.list) / 0.125 - 1)).toBeLessThan(1e-5);
  });

  it('leave no tensors behind over 2,000 of them, with everything switched on', async () => {
    const { bound, variables } = toy();
    const best = snapshot(variables);
    const optimizer = tf.train.adam(1e-3);
    const outside = tf.memory().numTensors;
    let first = 0;
    let bytes = 0;
    for await (const { step } of train({
      bound,
      data,
      optimizer,
      stream: stream(8),
      batchSize: 25,
      steps: 2000,
      variables,
      clip: 1,
      heldOut: { data: { x: toyData(20, 13) }, every: 50, best, patience: 100 },
    })) {
      if (step === 1) {
        first = tf.memory().numTensors;
        bytes = tf.memory().numBytes;
      }
      if (step > 1 && tf.memory().numTensors !== first) expect(`step ${step}`).toBe('without new tensors');
    }
    expect(tf.memory().numBytes).toBeLessThanOrEqual(bytes);
    // What stays is what Adam made: two slots for each of four variables.
    expect(tf.memory().numTensors).toBe(outside + 8);
  });
});

describe('stopping', () => {
  const options = () => {
    const { bound, variables, list } = toy();
    return {
      list,
      run: { bound, data, variables, optimizer: tf.train.sgd(0.01), stream: stream(9), batchSize: 10 },
    };
  };

  it('by break disposes what the run made', async () => {
    const { run } = options();
    const before = tf.memory().numTensors;
    for await (const { step } of train(run)) if (step === 3) break;
    expect(tf.memory().numTensors).toBe(before);
  });

  it('by a signal ends after the step under way, without an error', async () => {
    const { run } = options();
    const control = new AbortController();
    const before = tf.memory().numTensors;
    const steps: number[] = [];
    for await (const { step } of train({ ...run, signal: control.signal })) {
      steps.push(step);
      if (step === 3) control.abort();
    }
    expect(steps).toEqual([1, 2, 3]);
    expect(tf.memory().numTensors).toBe(before);
    for await (const _ of train({ ...run, signal: AbortSignal.abort() })) throw new Error('must not step');
  });

  it('by a timer works, since training lets the event loop turn', async () => {
    const { run } = options();
    const control = new AbortController();
    setTimeout(() => control.abort(), 50);
    let steps = 0;
    for await (const _ of train({ ...run, signal: control.signal })) steps++;
    expect(steps).toBeGreaterThan(0);
  });

  it('by patience puts the best weights back, those of the best held-out bound', async () => {
    const { bound, variables, list } = toy();
    const best = snapshot(variables);
    // Few rows, and held-out ones from another plane: what helps on the one comes to hurt on the other.
    const seen: { step: number; bound: number; improved: boolean; bits: string }[] = [];
    let end: Progress | undefined;
    for await (const progress of train({
      bound,
      data: { x: toyData(6) },
      optimizer: tf.train.adam(0.2),
      stream: stream(10),
      steps: 3000,
      variables,
      heldOut: { data: { x: toyData(100, 13) }, every: 5, patience: 4, best },
    })) {
      if (progress.heldOut) {
        seen.push({
          step: progress.step,
          bound: progress.heldOut.bound,
          improved: progress.heldOut.improved,
          bits: bits(list),
        });
      }
      end = progress;
    }
    expect(end!.ended).toBe('patience');
    expect(end!.timeLeft).toBe(0);
    const top = seen.reduce((a, b) => (b.bound > a.bound ? b : a));
    expect(seen.at(-1)!.step).toBe(top.step + 4 * 5);
    expect(top.improved).toBe(true);
    expect(seen.slice(-4).map(({ improved }) => improved)).toEqual([false, false, false, false]);
    expect(bits(list)).toBe(top.bits);
    expect(seen.at(-1)!.bits).not.toBe(top.bits);
    expect(best.step).toBe(top.step);
    expect(end!.cursor.heldOut).toEqual({ best: top.bound, bestStep: top.step, waited: 4 });
    const again = train({
      bound,
      data: { x: toyData(6) },
      optimizer: tf.train.adam(0.2),
      stream: stream(10),
      variables,
      heldOut: { data: { x: toyData(100, 13) }, every: 5, patience: 4, best },
      from: end!.cursor,
    });
    expect((await again.next()).done).toBe(true);
  });

  it('counts only improvements beyond the margin', async () => {
    const { run } = options();
    const all = await collect({
      ...run,
      heldOut: { data: { x: toyData(30, 13) }, every: 2, patience: 3, margin: 1000 },
    });
    expect(all.length).toBe(8);
    expect(all.filter(({ heldOut }) => heldOut).map(({ heldOut }) => heldOut!.improved)).toEqual([
      true,
      false,
      false,
      false,
    ]);
  });
});

describe('going on from a cursor', () => {
  const options = (model: ReturnType<typeof toy>, optimizer: tf.Optimizer) => ({
    bound: model.bound,
    data,
    variables: model.variables,
    optimizer,
    stream: stream(14),
    batchSize: 20,
    heldOut: { data: { x: toyData(30, 13) }, every: 4, patience: 50 },
  });

  it('yields what the uninterrupted run yields, from every step', async () => {
    const whole = toy();
    const expected = timeless(await collect({ ...options(whole, tf.train.momentum(0.01, 0.9)), steps: 12 }));
    for (let cut = 1; cut < 12; cut++) {
      const model = toy();
      const optimizer = tf.train.momentum(0.01, 0.9);
      const first = await collect({ ...options(model, optimizer), steps: cut });
      const from = JSON.parse(JSON.stringify(first.at(-1)!.cursor));
      const second = await collect({ ...options(model, optimizer), steps: 12, from });
      const { ended, ...last } = timeless(first).at(-1)!;
      expect(ended).toBe('steps');
      expect([...timeless(first).slice(0, -1), last, ...timeless(second)]).toEqual(expected);
      expect(bits(model.list)).toBe(bits(whole.list));
    }
  });

  it('takes no step when there is none left', async () => {
    const model = toy();
    const [, last] = await collect({ ...options(model, tf.train.sgd(0.01)), steps: 2 });
    expect(await collect({ ...options(model, tf.train.sgd(0.01)), steps: 2, from: last!.cursor })).toEqual(
      [],
    );
    expect(
      await collect({
        ...options(model, tf.train.sgd(0.01)),
        batchSize: 50,
        epochs: 1,
        from: { ...last!.cursor, batches: { ...last!.cursor.batches, batchSize: 50 } },
      }),
    ).toEqual([]);
  });
});

describe('refusals', () => {
  const { bound, variables, dispose } = toy();
  const optimizer = tf.train.sgd(0.1);
  const good = { bound, data, optimizer, stream: stream(15), variables, steps: 1 };
  const heldOut = { data };
  const cursor = { step: 1, batches: { epoch: 1, index: 1, rows: 50, batchSize: 100, seed: 'x' } };
  const stopping = { best: -3, bestStep: 5, waited: 0 };
  const scalarBound = {
    estimate: () => ({
      value: tf.scalar(1),
      surrogate: tf.scalar(1),
      parts: { logLikelihood: {}, divergence: {} },
    }),
  };
  const whole = tf.variable(tf.scalar(1, 'int32'));
  const frozen = tf.variable(tf.scalar(1), false);
  it.each<[string, object, string]>([
    [
      'an unknown key',
      { rate: 1 },
      "ParameterError: train: options must be among bound, data, optimizer, stream, batchSize, steps, epochs, variables, clip, heldOut, signal, from; got 'rate'; remove or rename it",
    ],
    [
      'no bound',
      { bound: undefined },
      'TrainingError: train: bound must have an estimate method; got undefined; pass for example elbo(…)',
    ],
    [
      'no optimizer',
      { optimizer: 'adam' },
      "TrainingError: train: optimizer must be a tfjs optimizer; got the string 'adam'; make one with for example tf.train.adam(1e-3)",
    ],
    [
      'no stream',
      { stream: 3 },
      'StreamError: train: stream must be a Stream; got a value of type number; pass stream(seed) or a fork of one',
    ],
    [
      'a batch of none',
      { batchSize: 0 },
      'ParameterError: train: batchSize must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      'NaN steps',
      { steps: Number.NaN },
      'ParameterError: train: steps must be a whole number of at least 1; got NaN; pass for example 1',
    ],
    [
      'half an epoch',
      { epochs: 0.5 },
      'ParameterError: train: epochs must be a whole number of at least 1; got 0.5; pass for example 1',
    ],
    [
      'a NaN clip',
      { clip: Number.NaN },
      'ParameterError: train: clip must be a positive number; got NaN; pass for example 10, or leave it out',
    ],
    [
      'no signal',
      { signal: {} },
      'ParameterError: train: signal must be an AbortSignal; got an object with keys (none); pass new AbortController().signal',
    ],
    [
      'bad data',
      { data: { x: 3 } },
      'ParameterError: minibatches: x must be a tensor, an array or an object of these; got 3; give it one row per data point',
    ],
    [
      'no variables',
      { variables: {} },
      "TrainingError: train: variables must hold at least one variable; got none; pass your model's",
    ],
    [
      'a tensor for a variable',
      { variables: { a: tf.scalar(1) } },
      'TrainingError: train: variables must hold tf.Variables; got a tensor of shape [] at a; make one with tf.variable(…)',
    ],
    [
      'a number for a variable',
      { variables: { a: [3] } },
      'TrainingError: train: variables must hold tf.Variables; got 3 at a/0; make one with tf.variable(…)',
    ],
    [
      'a variable twice',
      { variables: { a: frozen, b: [frozen] } },
      'TrainingError: train: variables must be distinct; got the same one at a and b/0; name each once',
    ],
    [
      'frozen variables',
      { variables: { frozen } },
      'TrainingError: train: variables must hold at least one trainable variable; got none; leave out frozen models',
    ],
    [
      'whole variables',
      { variables: { whole } },
      'TrainingError: train: trainable variables must be float32; got int32 for whole; make it with trainable set to false',
    ],
    [
      'an unreached variable',
      { variables: { variables, more: tf.variable(tf.scalar(1)) } },
      'TrainingError: train: every one of variables must be reached by the bound; got no gradient for more; leave it out, or use it in a conditional',
    ],
    [
      'a bound of wrong shape',
      { bound: scalarBound },
      'TrainingError: train: bound must estimate value as [dataPoints] and surrogate as a scalar; got shapes [] and []; sum the surrogate over data points',
    ],
    [
      'a bound without variables',
      {
        bound: {
          estimate: ({ x }: Data) => ({
            value: tf.sum(x, 1),
            surrogate: tf.sum(x),
            parts: { logLikelihood: {}, divergence: {} },
          }),
        },
      },
      "TrainingError: train: bound must depend on a trainable variable; got none; use your tf.Variables inside the model's conditionals, and detach() nothing on the way",
    ],
    [
      'unknown held-out keys',
      { heldOut: { ...heldOut, bets: 1 } },
      "ParameterError: train: heldOut: options must be among data, every, batchSize, patience, margin, best; got 'bets'; remove or rename it",
    ],
    [
      'no interval',
      { heldOut: { ...heldOut, every: 0 } },
      'ParameterError: train: heldOut.every must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      'no patience',
      { heldOut: { ...heldOut, patience: 0 } },
      'ParameterError: train: heldOut.patience must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      'a negative margin',
      { heldOut: { ...heldOut, margin: -1 } },
      'ParameterError: train: heldOut.margin must be a finite number of at least 0; got -1; mend the value',
    ],
    [
      'no snapshot',
      { heldOut: { ...heldOut, best: true } },
      'ParameterError: train: heldOut.best must be a snapshot; got true; pass snapshot(variables)',
    ],
    [
      'no cursor',
      { from: 3 },
      'ParameterError: train: from must be a training cursor; got 3; pass what progress.cursor gave',
    ],
    [
      'a cursor of no step',
      { from: {} },
      'ParameterError: train: from.step must be a whole number of at least 0; got undefined; pass for example 1',
    ],
    [
      'a cursor of another seed',
      { from: cursor, steps: 9 },
      'ParameterError: minibatches: cursor must come from a walk shuffled by the same stream; got one with another seed; restore the stream that was saved beside it',
    ],
    [
      'a cursor without the evaluation',
      { from: cursor, heldOut },
      'ParameterError: train: heldOut must be given as in the run that is continued; got some where that had none; continue with the same options',
    ],
    [
      'a cursor with an evaluation',
      { from: { ...cursor, heldOut: stopping } },
      'ParameterError: train: heldOut must be given as in the run that is continued; got none where that had some; continue with the same options',
    ],
    [
      'a cursor of another best',
      { from: { ...cursor, heldOut: stopping }, heldOut: { ...heldOut, best: snapshot(variables) } },
      'TrainingError: train: heldOut.best must hold the weights of step 5; got those of step 0; checkpoint and resume it beside the variables',
    ],
    [
      'a cursor with text',
      { from: { ...cursor, heldOut: { ...stopping, best: 'a' } }, heldOut },
      "ParameterError: train: from.heldOut.best must be a finite number; got the string 'a'; mend the value",
    ],
  ])('refuses %s', async (_, change, message) => {
    const before = tf.memory().numTensors;
    const weights = bits(toy().list);
    expect(await refusal(() => train({ ...good, ...change } as TrainOptions<Data>).next())).toBe(message);
    expect(bits(Object.values(variables.encoder).concat(variables.decoder))).toBe(weights);
    // Counting the four variables of the comparison above.
    if (!('bound' in change)) expect(tf.memory().numTensors).toBe(before + 4);
  });

  it('refuses a disposed model, and one whose optimizer remembers another', async () => {
    const [one, other] = [toy(), toy()];
    const adam = tf.train.adam(0.1);
    await collect({ ...good, bound: one.bound, variables: one.variables, optimizer: adam });
    const names = [one.list[0]!.name, other.list[0]!.name];
    for (const given of [{ variables: other.variables }, {}]) {
      const { variables: _, ...rest } = good;
      const wrong = { ...rest, bound: other.bound, optimizer: adam, ...given };
      expect(await refusal(() => train(wrong).next())).toBe(
        `TrainingError: train: optimizer must have stepped the same variables in the same order before; got the memory of ${names[0]} where ${names[1]} is trained; use a new optimizer`,
      );
    }
    dispose();
    expect(await refusal(() => train(good).next())).toBe(
      'TrainingError: train: variables must be alive; got a disposed one at encoder/weight; dispose a model only after its last use',
    );
  });
});

it('types data after the bound', () => {
  const { bound, dispose } = toy();
  const options = { bound, optimizer: tf.train.sgd(0.1), stream: stream(16) };
  // Made, never run: these lines are for the compiler.
  train({ ...options, data });
  train({ ...options, data: { x: tf.ones([2, 4]) } });
  // @ts-expect-error the bound reads x, not y
  train({ ...options, data: { y: tf.ones([2, 4]) } });
  // @ts-expect-error text is no data
  train({ ...options, data: { x: 'a' } });
  dispose();
});
