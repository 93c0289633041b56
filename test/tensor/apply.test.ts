import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import { GradientError, ShapeError } from '../../src/errors.js';
import {
  normalLogDensity,
  normalLogDensity_mean,
  normalLogDensity_sd,
  normalLogDensity_x,
} from '../../src/numeric/families/normal.js';
import { expHalf, expHalf_v } from '../../src/numeric/transforms.js';
import { applyFormula } from '../../src/tensor/apply.js';
import { composed } from '../../src/tensor/composed.js';
import { type Formula, kernel } from '../../src/tensor/formula.js';
import type { Operand } from '../../src/tensor/operand.js';
import { expHalf as toSd } from '../../src/tensor/transforms.js';
import { score } from '../numeric/ulp.js';
import { broadcast, type NaiveArray, naiveGradient, naiveValue, sizeOf } from './naive.js';

// The normal log density of (x, mean, log variance): three arguments, one of them transformed on the way.
const f = (x: number, mean: number, v: number): number => normalLogDensity(x, mean, expHalf(v));
const partials = [
  (x: number, mean: number, v: number) => normalLogDensity_x(x, mean, expHalf(v)),
  (x: number, mean: number, v: number) => normalLogDensity_mean(x, mean, expHalf(v)),
  (x: number, mean: number, v: number) => normalLogDensity_sd(x, mean, expHalf(v)) * expHalf_v(v),
];
const composedForm = (x?: tf.Tensor, m?: tf.Tensor, s?: tf.Tensor): tf.Tensor => {
  const z = tf.div(tf.sub(x!, m!), s!);
  return tf.sub(tf.mul(-0.5, tf.square(z)), tf.add(tf.log(s!), 0.5 * Math.log(2 * Math.PI)));
};
const compiledFormula = kernel('normalLogDensity', composedForm);
const plainFormula: Formula = {
  name: 'plain',
  parameters: ['x', 'mean', 'sd'],
  value: normalLogDensity,
  partials: [normalLogDensity_x, normalLogDensity_mean, normalLogDensity_sd],
  composed: composedForm,
};

function numbers(count: number, seed: number): Float32Array {
  let state = seed;
  return Float32Array.from({ length: count }, () => {
    state = (Math.imul(state, 1664525) + 1013904223) | 0;
    return (state / 2 ** 31) * 2;
  });
}

function arraysOf(
  shapes: readonly (readonly number[])[],
  seed: number,
): (NaiveArray & { data: Float32Array })[] {
  return shapes.map((shape, k) => ({ shape, data: numbers(sizeOf(shape), seed + 17 * k + 1) }));
}

function operands(tensors: readonly tf.Tensor[]): Operand[] {
  return tensors.map((source, k) => ({
    shape: source.shape,
    source,
    transform: k === 2 ? toSd : undefined,
    constant: false,
  }));
}

const apply = (formula: Formula, tensors: readonly tf.Tensor[], fold: number): tf.Tensor =>
  applyFormula('probe', formula, operands(tensors), { fold });

/** Half a unit for the rounding, and a trace for another order of summation in double precision. */
function expectRounded(got: ArrayLike<number>, exact: NaiveArray, what: string): void {
  expect(got.length, what).toBe(exact.data.length);
  for (let i = 0; i < got.length; i++) {
    const error = score(got[i]!, exact.data[i]!);
    if (!(error <= 0.500001)) expect.fail(`${what}[${i}]: got ${got[i]}, exact ${exact.data[i]}`);
  }
}

const layouts: [string, number[][], number][] = [
  ['scalars', [[], [], []], 0],
  ['a full array and scalars', [[3, 4], [], []], 0],
  ['a scalar point and full parameters', [[], [3, 4], [3, 4]], 0],
  ['a row and a column', [[4], [3, 1], []], 0],
  ['a full array, a row and a column', [[3, 4], [4], [3, 1]], 0],
  ['odd higher ranks', [[2, 1, 3], [4, 1], []], 0],
  ['every axis broadcast by another', [[5, 1, 1], [3, 1], [2]], 0],
  [
    'alternating ones',
    [
      [2, 1, 2, 1, 2],
      [2, 1, 2, 1],
      [1, 2, 1],
    ],
    0,
  ],
  ['axes of size one', [[1, 1, 1], [1], []], 0],
  ['one fold of a vector', [[7], [7], []], 1],
  ['one fold of rows', [[3, 4], [4], [3, 1]], 1],
  ['one fold where only a parameter has the axis', [[3, 1], [4], []], 1],
  ['two folds', [[2, 3, 4], [3, 1], [4]], 2],
  ['three folds', [[2, 3, 4], [3, 1], [4]], 3],
  ['a fold of ones', [[3, 1], [1], []], 1],
  ['a fold in the middle of broadcasting', [[2, 1, 3], [4, 1], []], 2],
  ['no elements', [[0, 3], [3], []], 0],
  ['no elements in a parameter', [[1], [2, 0], []], 0],
  ['a fold of nothing', [[3, 0], [], []], 1],
  ['two folds of nothing', [[3, 0, 2], [2], []], 2],
  ['a block and an edge', [[513], [513], [513]], 0],
  ['blocks with a constant row', [[2, 1300], [], [1300]], 0],
  ['blocks with a column', [[3, 600], [3, 1], [600]], 0],
  ['a fold over blocks', [[2, 1025], [1025], [2, 1]], 1],
  ['a fold over rows of blocks', [[600], [4, 600], [4, 1]], 2],
  ['exactly one block', [[512], [], [512]], 1],
];

describe.each(['cpu', 'wasm'])('on the %s backend', (backend) => {
  beforeAll(async () => {
    await tf.setBackend(backend);
  });

  describe.each([
    ['compiled', compiledFormula],
    ['plain', plainFormula],
  ] as const)('a %s formula', (_kind, formula) => {
    it.each(layouts)('over %s is what a naive loop gives', (_title, shapes, fold) => {
      const arrays = arraysOf(shapes, 5);
      const exact = naiveValue(f, arrays, fold);
      const upstreamData = numbers(sizeOf(exact.shape), 99);
      const before = tf.memory().numTensors;
      const tensors = arrays.map((a) => tf.tensor(a.data, a.shape as number[]));
      const dy = tf.tensor(upstreamData, exact.shape as number[]);
      const value = apply(formula, tensors, fold);
      expect(value.shape).toEqual(exact.shape);
      expect(value.dtype).toBe('float32');
      expectRounded(value.dataSync(), exact, 'value');

      const gradients = tf.grads((...t: tf.Tensor[]) => apply(formula, t, fold))(tensors, dy);
      gradients.forEach((gradient, k) => {
        const wanted = naiveGradient(partials[k]!, arrays, k, { shape: exact.shape, data: upstreamData });
        expect(gradient.shape).toEqual(wanted.shape);
        expectRounded(gradient.dataSync(), wanted, `gradient ${k}`);
      });
      tf.dispose([value, dy, ...tensors, ...gradients]);
      expect(tf.memory().numTensors).toBe(before);
    });
  });

  it('two hundred random layouts are what a naive loop gives', () => {
    let state = 20250;
    const below = (n: number): number => {
      state = (Math.imul(state, 1664525) + 1013904223) | 0;
      return Math.floor(((state >>> 0) / 2 ** 32) * n);
    };
    for (let round = 0; round < 200; round++) {
      const rank = below(5);
      const full = Array.from({ length: rank }, () => [1, 2, 3, 5][below(4)]!);
      const shapes = [0, 1, 2].map(() =>
        full.slice(below(rank + 1)).map((size) => (below(3) === 0 ? 1 : size)),
      );
      const arrays = arraysOf(shapes, round);
      const fold = below(broadcast(shapes).length + 1);
      const exact = naiveValue(f, arrays, fold);
      const upstreamData = numbers(sizeOf(exact.shape), round + 7);
      tf.tidy(() => {
        const tensors = arrays.map((a) => tf.tensor(a.data, a.shape as number[]));
        expectRounded(apply(compiledFormula, tensors, fold).dataSync(), exact, JSON.stringify(shapes));
        const dy = tf.tensor(upstreamData, exact.shape as number[]);
        tf.grads((...t: tf.Tensor[]) => apply(compiledFormula, t, fold))(tensors, dy).forEach(
          (gradient, k) => {
            const wanted = naiveGradient(partials[k]!, arrays, k, { shape: exact.shape, data: upstreamData });
            expectRounded(
              gradient.dataSync(),
              wanted,
              `${JSON.stringify(shapes)} fold ${fold}, gradient ${k}`,
            );
          },
        );
      });
    }
  });

  it('reads whole numbers and booleans as numbers', () => {
    tf.tidy(() => {
      const parameters = [tf.scalar(0.5), tf.scalar(0.3)];
      for (const x of [tf.tensor1d([0, 1, 2], 'int32'), tf.tensor1d([true, false], 'bool')]) {
        const got = apply(compiledFormula, [x, ...parameters], 0);
        expect(got.dtype).toBe('float32');
        const data = [
          { shape: x.shape, data: x.dataSync() },
          ...parameters.map((p) => ({ shape: [], data: p.dataSync() })),
        ];
        expectRounded(got.dataSync(), naiveValue(f, data, 0), x.dtype);
      }
    });
  });

  it('computes only the gradients that are asked for', () => {
    const asked: number[] = [];
    const watched: Formula = {
      ...plainFormula,
      partials: plainFormula.partials!.map((partial, k) => (...values: number[]) => {
        asked.push(k);
        return partial!(...values);
      }),
    };
    tf.tidy(() => {
      const [x, mean, v] = [tf.scalar(1), tf.scalar(0), tf.scalar(0)];
      tf.grad((m) => apply(watched, [x, m, v], 0))(mean);
    });
    expect(asked).toEqual([1]);
  });

  it('a zero upstream gradient silences an infinite partial', () => {
    tf.tidy(() => {
      const [x, mean, v] = [tf.tensor1d([1, 2]), tf.scalar(0), tf.tensor1d([-1000, 0])];
      for (const formula of [compiledFormula, plainFormula]) {
        const gradient = tf.grad((t) => apply(formula, [x, mean, t], 0))(v, tf.tensor1d([0, 1]));
        expect(Array.from(gradient.dataSync())).toEqual([0, 1.5]);
      }
    });
  });

  it('a second derivative throws and names the cure, which works', () => {
    const x = tf.tensor1d([0.5, -1]);
    const curvature = (wrap: (compute: () => tf.Tensor) => tf.Tensor): tf.Tensor =>
      tf.tidy(() => {
        const [mean, v] = [tf.scalar(0), tf.scalar(2 * Math.log(0.5))];
        return tf.grad((t) =>
          tf
            .grad((u) => wrap(() => apply(compiledFormula, [u, mean, v], 0)).sum())(t)
            .sum(),
        )(x);
      });
    let thrown: unknown;
    try {
      curvature((compute) => compute());
    } catch (error) {
      thrown = error;
    }
    expect(thrown).toBeInstanceOf(GradientError);
    expect((thrown as Error).message).toBe(
      'probe: a kernel must be differentiated once only; got a second derivative; wrap the computation in composed(() => …)',
    );
    // Only from here on: tfjs itself forgets what it saved for a backward pass that throws.
    const before = tf.memory().numTensors;
    tf.tidy(() => {
      for (const second of curvature(composed).dataSync()) expect(second).toBeCloseTo(-4, 5);
    });
    expect(tf.memory().numTensors).toBe(before);
  });
});

it('gives the same bits on both backends', async () => {
  const bits: string[] = [];
  for (const backend of ['cpu', 'wasm']) {
    await tf.setBackend(backend);
    tf.tidy(() => {
      const arrays = arraysOf([[40, 30], [30], [40, 1]], 3);
      const tensors = arrays.map((a) => tf.tensor(a.data, a.shape as number[]));
      const values = [apply(compiledFormula, tensors, 0), apply(compiledFormula, tensors, 1)];
      const gradients = tf.grads((...t: tf.Tensor[]) => apply(compiledFormula, t, 1))(tensors);
      bits.push(
        [...values, ...gradients].map((t) => Buffer.from(t.dataSync().buffer).toString('base64')).join(),
      );
    });
  }
  expect(bits[0]).toBe(bits[1]);
});

describe('refuses', () => {
  it('shapes that do not broadcast', () => {
    const probe = (): tf.Tensor => apply(compiledFormula, [tf.zeros([3]), tf.zeros([2]), tf.scalar(1)], 0);
    expect(() => tf.tidy(probe)).toThrow(ShapeError);
    expect(() => tf.tidy(probe)).toThrow(
      'probe: shapes must broadcast from the right; got [3] and [2] and []; make the sizes of each axis equal, or 1',
    );
  });

  it('a derivative that does not exist', () => {
    const mass = kernel('poissonLogDensity', (x) => x!);
    const probe = (): tf.Tensor =>
      tf.grad((x) =>
        applyFormula('probe', mass, [
          { shape: [], source: x, transform: undefined, constant: false },
          { shape: [], source: Float32Array.of(2), transform: undefined, constant: true },
        ]),
      )(tf.scalar(1));
    expect(() => tf.tidy(probe)).toThrow(GradientError);
    expect(() => tf.tidy(probe)).toThrow(
      'probe: the derivative must exist; got one in x, where the formula has none; cut that argument with detach(…)',
    );
  });
});
