import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  composedExp,
  composedLogSoftmax,
  composedLogSumExp,
  composedSigmoid,
  composedSoftplus,
} from '../../src/tensor/composedMath.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

const s = (x: number) => 1 / (1 + Math.exp(-x));
const derivatives = (f: (x: tf.Tensor) => tf.Tensor, x: number): number[] => {
  const first = tf.grad((v: tf.Tensor) => tf.sum(f(v)));
  const second = tf.grad((v: tf.Tensor) => tf.sum(first(v)));
  const third = tf.grad((v: tf.Tensor) => tf.sum(second(v)));
  return [f, first, second, third].map((g) => g(tf.tensor1d([x])).dataSync()[0]!);
};

describe.each([-3, -0.5, 0, 0.75, 4])('at %f', (x) => {
  test.each([
    ['exp', composedExp, [0, 1, 2, 3].map(() => Math.exp(x))],
    [
      'sigmoid',
      composedSigmoid,
      [s(x), s(x) * s(-x), s(x) * s(-x) * (1 - 2 * s(x)), s(x) * s(-x) * (1 - 6 * s(x) * s(-x))],
    ],
    [
      'softplus',
      composedSoftplus,
      [Math.log1p(Math.exp(x)), s(x), s(x) * s(-x), s(x) * s(-x) * (1 - 2 * s(x))],
    ],
    [
      'log-sum-exp of (x, 2x)',
      (v: tf.Tensor) => composedLogSumExp(tf.stack([v, tf.mul(v, 2)], -1)),
      // x + softplus(x).
      [x + Math.log1p(Math.exp(x)), 1 + s(x), s(x) * s(-x), s(x) * s(-x) * (1 - 2 * s(x))],
    ],
    [
      'log-softmax of (x, 2x)',
      (v: tf.Tensor) => tf.slice(composedLogSoftmax(tf.stack([v, tf.mul(v, 2)], -1)), [0, 0], [1, 1]),
      // −softplus(x).
      [-Math.log1p(Math.exp(x)), -s(x), -s(x) * s(-x), -s(x) * s(-x) * (1 - 2 * s(x))],
    ],
  ] as [string, (x: tf.Tensor) => tf.Tensor, number[]][])(
    '%s and three derivatives',
    (_name, f, expected) => {
      const got = derivatives(f, x);
      expected.forEach((v, order) => {
        // Float32 operations in a row: a few units in the last place of terms up to the size of the largest.
        expect(Math.abs(got[order]! - v)).toBeLessThan(2e-6 * Math.max(1, ...expected.map(Math.abs)));
      });
    },
  );
});

test('a row of −∞ sums to −∞', () => {
  const row = tf.tensor2d([[Number.NEGATIVE_INFINITY, Number.NEGATIVE_INFINITY]]);
  expect(composedLogSumExp(row).dataSync()[0]).toBe(Number.NEGATIVE_INFINITY);
});
