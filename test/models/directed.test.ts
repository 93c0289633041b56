import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  directed,
  exponential,
  kl,
  ModelError,
  masked,
  normal,
  ParameterError,
  poisson,
  product,
  ShapeError,
  StreamError,
  stream,
} from '../../src/index.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

const counts = () =>
  directed()
    .given('exposure')
    .latent('rate', () => product(exponential({ rate: [1, 2] })))
    .observed('count', ({ rate, exposure }) => product(poisson({ rate: tf.mul(rate, exposure) })));

describe('simulate', () => {
  test('draws ancestrally: the joint moments are those of the hierarchy', () => {
    const rows = 40_000;
    const exposure = tf.fill([rows, 1], 3);
    const { rate, count } = counts().simulate(stream(51), rows, { exposure });
    expect(rate.shape).toEqual([rows, 2]);
    expect(count.shape).toEqual([rows, 2]);
    const mean = (t: tf.Tensor) => [...tf.mean(t, 0).dataSync()];
    const deviations = [1, 0.5];
    // E rate = 1/λ with deviation 1/λ; 5 standard errors, false alarm 6e-7 each.
    mean(rate).forEach((v, i) => {
      expect(Math.abs(v - deviations[i]!)).toBeLessThan((5 * deviations[i]!) / Math.sqrt(rows));
    });
    // E count = 3 E rate; Var count = 3/λ + 9/λ².
    mean(count).forEach((v, i) => {
      const expected = 3 * deviations[i]!;
      const deviation = Math.sqrt(expected + expected ** 2);
      expect(Math.abs(v - expected)).toBeLessThan((5 * deviation) / Math.sqrt(rows));
    });
    // Cov(rate, count) = 3 / λ²: the count was drawn from this very rate.
    const centred = tf.mul(tf.sub(rate, mean(rate)), tf.sub(count, mean(count)));
    mean(centred).forEach((v, i) => {
      const expected = 3 * deviations[i]! ** 2;
      // The product's deviation is below 5 times its mean here.
      expect(Math.abs(v - expected)).toBeLessThan((5 * 5 * expected) / Math.sqrt(rows));
    });
  });

  test('the same stream draws the same values, and nothing leaks', () => {
    const exposure = tf.ones([3, 1]);
    const first = counts().simulate(stream(52), 3, { exposure });
    const before = tf.memory().numTensors;
    const second = counts().simulate(stream(52), 3, { exposure });
    expect(tf.memory().numTensors - before).toBe(2);
    expect(second.rate.arraySync()).toEqual(first.rate.arraySync());
    expect(second.count.arraySync()).toEqual(first.count.arraySync());
  });
});

describe('logJoint', () => {
  test('adds the log densities of latents and observed values', () => {
    const model = counts();
    const values = {
      exposure: tf.tensor2d([[1], [2]]),
      rate: tf.tensor2d([
        [0.5, 1],
        [2, 0.1],
      ]),
      count: tf.tensor2d([
        [0, 1],
        [3, 0],
      ]),
    };
    const before = tf.memory().numTensors;
    const joint = model.logJoint(values);
    expect(tf.memory().numTensors - before).toBe(1);
    const byHand = (r: number[], c: number[], e: number) =>
      [1, 2].reduce((sum, lambda, i) => {
        const mean = r[i]! * e;
        const factorial = [1, 1, 2, 6][c[i]!]!;
        return sum + Math.log(lambda) - lambda * r[i]! + c[i]! * Math.log(mean) - mean - Math.log(factorial);
      }, 0);
    const expected = [byHand([0.5, 1], [0, 1], 1), byHand([2, 0.1], [3, 0], 2)];
    joint.dataSync().forEach((v, i) => {
      expect(v).toBeCloseTo(expected[i]!, 5);
    });
  });

  test('its gradient reaches the latents, and masked values add nothing', () => {
    const model = directed()
      .latent('z', () => product(normal({ mean: [0], sd: 1 })))
      .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
    const x = masked(tf.tensor2d([[2], [Number.NaN]]), tf.tensor1d([1, 0]));
    const gradient = tf.grad((z: tf.Tensor) => tf.sum(model.logJoint({ z, x })));
    // d/dz (−z²/2 − (x − z)²/2) = x − 2z where x is seen, −z where it is missing.
    expect(gradient(tf.tensor2d([[0.5], [0.5]])).arraySync()).toEqual([[1], [-0.5]]);
  });
});

test('models are immutable: a longer model leaves the shorter one as it was', () => {
  const short = directed().latent('z', () => product(normal({ mean: [0], sd: 1 })));
  const long = short.observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
  expect(short.nodes.map((n) => n.name)).toEqual(['z']);
  expect(long.nodes.map((n) => `${n.kind} ${n.name}`)).toEqual(['latent z', 'observed x']);
});

test('a prior that all rows share meets a recognizer with one member per row', () => {
  const prior = product(normal({ mean: [0, 0], sd: 1 }));
  const q = product(normal({ mean: tf.ones([5, 2]), sd: 1 }));
  expect(kl(q, prior).arraySync()).toEqual([1, 1, 1, 1, 1]);
});

describe('wrong use', () => {
  const text = (act: () => unknown) => {
    try {
      act();
    } catch (error) {
      return [(error as Error).constructor, (error as Error).message];
    }
    return undefined;
  };
  const any = (v: unknown) => v as never;

  test('has one clear message each', () => {
    const model = counts();
    expect(text(() => model.simulate(any(7), 3, any({})))).toEqual([
      StreamError,
      'simulate: stream must be a Stream; got a value of type number; pass stream(seed) or a fork of one',
    ]);
    expect(text(() => model.simulate(stream(1), 0, any({})))).toEqual([
      ParameterError,
      'simulate: rows must be a whole number of at least 1; got 0; pass for example 1',
    ]);
    expect(text(() => model.simulate(stream(1), 3, any({})))).toEqual([
      ModelError,
      "simulate: data must have a value for 'exposure'; got none; add exposure to the data",
    ]);
    expect(text(() => model.simulate(stream(1), 3, { exposure: [[1], [2]] }))).toEqual([
      ShapeError,
      "simulate: all values must have the same number of rows; got 3 and, for 'exposure', 2; slice or repeat the data",
    ]);
    expect(text(() => model.logJoint(any({ exposure: [[1]], rate: [[1, 1]] })))).toEqual([
      ModelError,
      "logJoint: data must have a value for 'count'; got exposure, rate; add count to the data",
    ]);
    expect(text(() => masked(tf.zeros([2, 3]), tf.zeros([3])))).toEqual([
      ShapeError,
      'masked: mask must be [rows] or have the shape of values, [2, 3]; got [3]; reshape the mask',
    ]);
    expect(text(() => masked(any([1]), tf.zeros([3])))).toEqual([
      ParameterError,
      'masked: values must be a tensor; got an array of 1; wrap it in tf.tensor(…)',
    ]);
    const whole = directed()
      .latent('z', () => product(normal({ mean: [0], sd: 1 })))
      .observed('x', ({ z }) => normal({ mean: tf.reshape(z, [-1]), sd: 1 }));
    expect(text(() => whole.logJoint({ z: [[0]], x: masked(tf.zeros([1, 1]), tf.ones([1, 1])) }))?.[1]).toBe(
      "logJoint: 'x' must have points of shape [], as its normal has; got [1]; reshape the data, or fold another number of axes with product(d, axes)",
    );
  });

  test('nested numbers must be regular and masks zeros and ones, and both alive', () => {
    const model = directed().observed('x', () => product(normal({ mean: [0, 0], sd: 1 })));
    const message = (x: unknown) => text(() => model.logJoint({ x: any(x) }))?.[1];
    expect(message([[1, 2], [3]])).toBe(
      'logJoint: x must be a regular nested array of shape [2, 2]; got an array of 1 at depth 1; make every row equally long',
    );
    expect(message([[1, 'a']])).toBe("logJoint: x must hold numbers; got the string 'a'; mend the array");
    expect(message(tf.zeros([0, 2]))).toBe(
      "logJoint: 'x' must have at least one row; got shape [0, 2]; skip empty batches",
    );
    expect(model.logJoint({ x: any([new Float32Array(2), new Float32Array(2)]) }).shape).toEqual([2]);
    expect(
      text(() =>
        masked(
          tf.zeros([2, 2]),
          tf.tensor2d([
            [1, 0],
            [1, 0.5],
          ]),
        ),
      ),
    ).toEqual([
      ParameterError,
      'masked: mask must hold 0 and 1 only; got 0.5 at [1, 1]; compare it first, for example with tf.greater(mask, 0.5)',
    ]);
    expect(text(() => masked(tf.zeros([1]), tf.tensor1d([Number.NaN])))?.[1]).toMatch(/got NaN at \[0\]/);
    expect(masked(tf.zeros([2]), tf.tensor1d([true, false], 'bool')).mask.dtype).toBe('bool');
    const gone = masked(tf.zeros([1, 2]), tf.ones([1]));
    gone.values.dispose();
    expect(message(gone)).toBe(
      'logJoint: the values of x must be alive; got a disposed tensor of shape [1, 2]; keep it with tf.keep(…) or use it inside the same tf.tidy',
    );
  });

  test('an error inside a conditional says whose it was, and keeps its class', () => {
    const model = directed()
      .given('u')
      .observed('x', ({ u }) => product(normal({ mean: u, sd: 1 })));
    expect(text(() => model.logJoint({ u: [[Number.NaN]], x: [[0]] }))).toEqual([
      ParameterError,
      "logJoint: in the conditional of 'x': normal: mean must be finite; got NaN at [0, 0] (shape [1, 1]); look for the division or logarithm that made it",
    ]);
    const own = directed().observed('x', () => {
      throw new TypeError('mine');
    });
    expect(() => own.logJoint({ x: [[0]] })).toThrow(new TypeError('mine'));
  });
});
