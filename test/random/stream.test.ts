import * as tf from '@tensorflow/tfjs';
import '@tensorflow/tfjs-backend-wasm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ParameterError, ShapeError, StreamError } from '../../src/errors.js';
import {
  betaDraws,
  betaPrimeDraws,
  categoricalDraws,
  gammaDraws,
  inverseGaussianDraws,
  logGammaDraws,
  noise,
  poissonDraws,
  studentTDraws,
  vonMisesDraws,
} from '../../src/random/noise.js';
import { randomWords } from '../../src/random/randomWords.js';
import {
  permutationArray,
  requireStream,
  restoreStream,
  type Stream,
  type StreamState,
  stream,
  wordsOf,
} from '../../src/random/stream.js';

let before: string;
beforeAll(async () => {
  await tf.ready();
  before = tf.getBackend();
});
afterAll(() => tf.setBackend(before).then(() => undefined));

/** The values of a tensor that is then gone. */
function values(tensor: tf.Tensor): number[] {
  const read = [...tensor.dataSync()];
  tensor.dispose();
  return read;
}

/** Parameters that repeat every three draws: calls that start at a multiple of three have the same ones. */
const varied = (n: number) => Float32Array.from({ length: n }, (_, i) => [0.3, 2, 30][i % 3]!);

/** Every way to draw, `n` at a time. */
const ways: Record<string, (s: Stream, n: number) => number[]> = {
  'Stream.uniform': (s, n) => values(s.uniform([n])),
  'Stream.normal': (s, n) => values(s.normal([n])),
  'Stream.exponential': (s, n) => values(s.exponential([n])),
  'Stream.integers': (s, n) => values(s.integers(1_000_000_007, [n])),
  'noise uniform': (s, n) => [...noise(s, 'uniform', n)],
  'noise normal': (s, n) => [...noise(s, 'normal', n)],
  'noise exponential': (s, n) => [...noise(s, 'exponential', n)],
  'noise laplace': (s, n) => [...noise(s, 'laplace', n)],
  'noise logistic': (s, n) => [...noise(s, 'logistic', n)],
  'noise gumbel': (s, n) => [...noise(s, 'gumbel', n)],
  'poissonDraws small': (s, n) => [...poissonDraws(s, new Float32Array(n).fill(3))],
  'poissonDraws large': (s, n) => [...poissonDraws(s, new Float32Array(n).fill(300))],
  categoricalDraws: (s, n) => [...categoricalDraws(s, new Float32Array(7 * n), 7)],
  gammaDraws: (s, n) => [...gammaDraws(s, new Float32Array(n).fill(0.7))],
  'noise cauchy': (s, n) => [...noise(s, 'cauchy', n)],
  'gammaDraws of many shapes': (s, n) => [...gammaDraws(s, varied(n))],
  betaDraws: (s, n) => [...betaDraws(s, varied(n), new Float32Array(n).fill(0.7))],
  betaPrimeDraws: (s, n) => [...betaPrimeDraws(s, varied(n), varied(n), varied(n))],
  studentTDraws: (s, n) => [...studentTDraws(s, varied(n))],
  vonMisesDraws: (s, n) => [...vonMisesDraws(s, new Float32Array(n).fill(2))],
  inverseGaussianDraws: (s, n) => [...inverseGaussianDraws(s, varied(n), new Float32Array(n).fill(1))],
  randomWords: (s, n) => [...randomWords(s, 2 * n)],
  logGammaDraws: (s, n) => [...logGammaDraws(s, new Float32Array(n).fill(0.01))],
};

const kept = (s: Stream): StreamState => JSON.parse(JSON.stringify(s.save()));

describe.each(Object.entries(ways))('%s', (_, draw) => {
  it('continues bit for bit from a saved state, after odd counts too', () => {
    const s = stream(601);
    for (const n of [1, 7, 70_001]) {
      draw(s, n);
      const copy = restoreStream(kept(s));
      expect(draw(copy, 101)).toEqual(draw(s, 101));
      expect(copy.save()).toEqual(s.save());
    }
  });

  it('is the same however it is cut into calls', () => {
    const whole = draw(stream(602), 140_000);
    const s = stream(602);
    expect([3, 65_535, 6, 74_456].flatMap((n) => draw(s, n))).toEqual(whole);
  });

  it('draws nothing without moving', () => {
    const s = stream(603);
    expect(draw(s, 0)).toEqual([]);
    expect(s.save()).toEqual(stream(603).save());
  });
});

it('continues a shuffle bit for bit from a saved state', () => {
  const s = stream(604);
  permutationArray(s, 9);
  const copy = restoreStream(kept(s));
  expect(permutationArray(copy, 1001)).toEqual(permutationArray(s, 1001));
  expect(values(copy.permutation(5))).toEqual(values(s.permutation(5)));
});

it('restores the forks as well', () => {
  const s = stream(605).fork('part');
  s.normal([3]).dispose();
  expect(restoreStream(kept(s)).fork('inner').save()).toEqual(s.fork('inner').save());
});

it('saves plain data that does not change afterwards', () => {
  const s = stream(606);
  const state = s.save();
  const text = JSON.stringify(state);
  s.normal([10]).dispose();
  expect(JSON.stringify(state)).toBe(text);
  expect(Object.keys(state)).toEqual(['version', 'generator', 'seed', 'state']);
});

it('gives the same bits on the cpu and wasm backends', async () => {
  const drawn = new Map<string, number[][]>();
  for (const backend of ['cpu', 'wasm']) {
    await tf.setBackend(backend);
    expect(tf.getBackend()).toBe(backend);
    const s = stream(607);
    drawn.set(backend, [
      values(s.uniform([1001])),
      values(s.normal([7, 11, 13])),
      values(s.exponential([1001])),
      values(s.integers(2_000_000_000, [1001])),
      values(s.permutation(1001)),
    ]);
  }
  expect(drawn.get('wasm')).toEqual(drawn.get('cpu'));
});

it('makes tensors of the shape and type asked for, and leaves nothing else', async () => {
  for (const backend of ['cpu', 'wasm']) {
    await tf.setBackend(backend);
    const s = stream(608);
    const alive = tf.memory().numTensors;
    const made = [
      s.uniform([2, 3]),
      s.normal([]),
      s.exponential([0, 4]),
      s.integers(9, [4, 1, 2]),
      s.permutation(6),
      s.permutation(0),
    ];
    expect(tf.memory().numTensors).toBe(alive + 6);
    expect(made.map((t) => [t.shape, t.dtype])).toEqual([
      [[2, 3], 'float32'],
      [[], 'float32'],
      [[0, 4], 'float32'],
      [[4, 1, 2], 'int32'],
      [[6], 'int32'],
      [[0], 'int32'],
    ]);
    tf.dispose(made);
    restoreStream(s.fork(1).save());
    expect(tf.memory().numTensors).toBe(alive);
  }
});

it('hands out draws of its own, not views that the next call overwrites', () => {
  const s = stream(609);
  const first = s.normal([100]);
  const noted = [...first.dataSync()];
  s.normal([100]).dispose();
  expect(values(first)).toEqual(noted);
});

/** The error of `run`, for its class and text. */
function failure(run: () => unknown): [unknown, string] {
  try {
    run();
  } catch (error) {
    return [(error as Error).constructor, (error as Error).message];
  }
  return [undefined, 'no error'];
}

// What a JavaScript user may pass by mistake.
const wrong = <T>(value: unknown) => value as T;

describe('refuses', () => {
  it.each<[unknown, string]>([
    [Number.NaN, 'NaN'],
    [Number.POSITIVE_INFINITY, 'Infinity'],
    ['', "''"],
    [null, 'null'],
    [undefined, 'a value of type undefined'],
    [{}, 'a value of type object'],
    [1n, 'a value of type bigint'],
  ])('%s as a seed or label', (value, got) => {
    const text = `must be a finite number or a text that is not empty; got ${got}; pass for example 1 or 'weights'`;
    expect(failure(() => stream(wrong(value)))).toEqual([StreamError, `stream: seed ${text}`]);
    expect(failure(() => stream(1).fork(wrong(value)))).toEqual([StreamError, `Stream.fork: label ${text}`]);
  });

  it.each(['uniform', 'normal', 'exponential', 'integers'] as const)('a bad shape in %s', (method) => {
    const draw = (shape: unknown) => () => {
      const s = stream(1);
      return method === 'integers' ? s.integers(5, wrong(shape)) : s[method](wrong(shape));
    };
    for (const [shape, got] of [
      [[2, -1], '-1 at axis 1'],
      [[2.5], '2.5 at axis 0'],
      [[Number.NaN], 'NaN at axis 0'],
      [['3'], "'3' at axis 0"],
      [[1, undefined], 'undefined at axis 1'],
    ] as const) {
      expect(failure(draw(shape))).toEqual([
        ShapeError,
        `Stream.${method}: shape must hold whole numbers from 0 up; got ${got}; pass lengths such as [100, 8]`,
      ]);
    }
    for (const [shape, got] of [
      [3, '3'],
      [undefined, 'undefined'],
      ['3', "'3'"],
      [{}, 'a value of type object'],
    ]) {
      expect(failure(draw(shape))).toEqual([
        ShapeError,
        `Stream.${method}: shape must be an array of whole numbers; got ${got}; pass [] for one draw or [n] for n`,
      ]);
    }
    expect(failure(draw([2 ** 20, 2 ** 11]))).toEqual([
      ShapeError,
      `Stream.${method}: shape must have at most 1073741824 elements; got [1048576, 2048]; draw in several calls`,
    ]);
  });

  it('a hole in a shape', () => {
    const shape = [2, 3];
    delete shape[1];
    expect(failure(() => stream(1).uniform(shape))).toEqual([
      ShapeError,
      'Stream.uniform: shape must hold whole numbers from 0 up; got undefined at axis 1; pass lengths such as [100, 8]',
    ]);
  });

  it.each<[unknown, string]>([
    [0, '0'],
    [-3, '-3'],
    [2.5, '2.5'],
    [Number.NaN, 'NaN'],
    [2 ** 31, '2147483648'],
    ['6', "'6'"],
  ])('%s as the bound of integers', (below, got) => {
    expect(failure(() => stream(1).integers(wrong(below), [2]))).toEqual([
      ParameterError,
      `Stream.integers: below must be a whole number from 1 to 2147483647; got ${got}; results run from 0 to below − 1`,
    ]);
  });

  it.each<[unknown, string]>([
    [-1, '-1'],
    [1.5, '1.5'],
    [Number.NaN, 'NaN'],
    ['3', "'3'"],
    [2 ** 31, '2147483648'],
    [undefined, 'undefined'],
  ])('%s as a count', (count, got) => {
    const text = `must be a whole number from 0 to 1073741824; got ${got}; round it or draw in several calls`;
    expect(failure(() => stream(1).permutation(wrong(count)))).toEqual([
      ParameterError,
      `Stream.permutation: n ${text}`,
    ]);
    expect(failure(() => noise(stream(1), 'normal', wrong(count)))).toEqual([
      ParameterError,
      `noise: count ${text}`,
    ]);
  });

  it('states that save() did not write', () => {
    const good = stream(1).save();
    const zeros = '0'.repeat(64);
    const digits = 'must be 64 hexadecimal digits, not all of them 0';
    const cases: [unknown, string][] = [
      [null, 'state must be an object; got null'],
      [undefined, 'state must be an object; got undefined'],
      ['state', "state must be an object; got 'state'"],
      [{}, 'state.version must be 1; got undefined'],
      [{ ...good, version: 2 }, 'state.version must be 1; got 2'],
      [{ ...good, generator: 'x' }, "state.generator must be 'xoshiro256++'; got 'x'"],
      [{ ...good, seed: 5 }, `state.seed ${digits}; got 5`],
      [{ ...good, seed: good.seed.toUpperCase() }, `state.seed ${digits}; got '${good.seed.toUpperCase()}'`],
      [{ ...good, seed: zeros }, `state.seed ${digits}; got '${zeros}'`],
      [{ ...good, state: good.state.slice(1) }, `state.state ${digits}; got '${good.state.slice(1)}'`],
      [{ ...good, state: `${good.state}\n` }, `state.state ${digits}; got '${good.state}\n'`],
      [{ ...good, state: zeros }, `state.state ${digits}; got '${zeros}'`],
    ];
    for (const [state, text] of cases) {
      expect(failure(() => restoreStream(wrong(state)))).toEqual([
        StreamError,
        `restoreStream: ${text}; pass what save() returned, unchanged`,
      ]);
    }
  });

  it('anything else in place of a stream', () => {
    for (const [value, got] of [
      [undefined, 'a value of type undefined'],
      [null, 'null'],
      [7, 'a value of type number'],
      [{ normal() {} }, 'a value of type object'],
      [stream(1).save(), 'a value of type object'],
    ] as const) {
      const text = `stream must be a Stream; got ${got}; pass stream(seed) or a fork of one`;
      expect(failure(() => requireStream('f', value))).toEqual([StreamError, `f: ${text}`]);
      expect(failure(() => wordsOf('f', wrong(value)))).toEqual([StreamError, `f: ${text}`]);
      expect(failure(() => noise(wrong(value), 'normal', 1))).toEqual([StreamError, `noise: ${text}`]);
    }
  });
});
