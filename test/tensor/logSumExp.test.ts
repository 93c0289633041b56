import '@tensorflow/tfjs-backend-wasm';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import { composed, logSumExp, ParameterError, ShapeError } from '../../src/index.js';
import { score } from '../numeric/ulp.js';

interface Case {
  readonly x: readonly number[];
  readonly exact: number;
  readonly size: number;
  readonly slopes: { readonly x: { readonly exact: readonly number[]; readonly sizes: readonly number[] } };
}
const cases = (
  JSON.parse(readFileSync(join(import.meta.dirname, '../reference/vectors/logSumExp.json'), 'utf8')) as {
    logSumExp: Case[];
  }
).logSumExp;

describe.each(['cpu', 'wasm'])('on the %s backend', (backend) => {
  beforeAll(async () => {
    await tf.setBackend(backend);
  });

  // Half a unit for the rounding, a hundredth for the double; where the largest and the rest cancel, 2^-50 of them.
  it(`is within 0.51 float32 units of mpmath, derivatives too, at ${cases.length} rows`, () => {
    expect(cases.length).toBeGreaterThan(250);
    let worst = { error: 0, text: '' };
    const note = (got: number, exact: number, allowed: number, text: string): void => {
      const error = Math.abs(got - exact) <= allowed ? 0 : score(got, exact);
      if (!(error <= worst.error)) worst = { error, text: `${text}: got ${got}, exact ${exact}` };
    };
    for (const { x, exact, slopes } of cases) {
      tf.tidy(() => {
        const row = tf.tensor1d([...x]);
        const most = Math.max(...x);
        const allowed = 2 ** -50 * (Math.abs(most) + Math.abs(exact - most));
        note(logSumExp(row).dataSync()[0]!, Number(exact), allowed, `value of ${x.join(', ')}`);
        tf.grad((t) => logSumExp(t))(row)
          .dataSync()
          .forEach((g, i) => {
            note(g, Number(slopes.x.exact[i]), 0, `derivative ${i} of ${x.join(', ')}`);
          });
      });
    }
    expect(worst.error, worst.text).toBeLessThanOrEqual(0.51);
  });

  it('takes the last axis of any shape, and leaves only its result alive', () => {
    const x = tf.reshape(tf.range(0, 12), [2, 1, 3, 2]);
    const before = tf.memory().numTensors;
    const result = logSumExp(x);
    expect(tf.memory().numTensors).toBe(before + 1);
    expect(result.shape).toEqual([2, 1, 3]);
    result.dataSync().forEach((v, i) => {
      expect(v).toBeCloseTo(2 * i + 1 + Math.log1p(Math.exp(-1)), 5);
    });
    tf.dispose([result, x]);
  });
});

it('infinities and NaN go through, with a gradient that is a number where the sum is one', () => {
  tf.tidy(() => {
    const { POSITIVE_INFINITY: inf, NEGATIVE_INFINITY: none, NaN: nan } = Number;
    const rows = tf.tensor2d([
      [none, none],
      [none, 1],
      [inf, 1],
      [nan, 1],
      [1, nan],
    ]);
    expect(Array.from(logSumExp(rows).dataSync())).toEqual([none, 1, inf, nan, nan]);
    const gradient = tf
      .grad((t) => logSumExp(t).sum())(rows)
      .arraySync() as number[][];
    expect(gradient.slice(0, 3)).toEqual([
      [0, 0],
      [0, 1],
      [1, 0],
    ]);
    expect(logSumExp(tf.zeros([0, 3])).shape).toEqual([0]);
  });
});

it('from tensor operations agrees', () => {
  tf.tidy(() => {
    const x = tf.tensor2d([
      [1, 2, 3],
      [-50, 20, 19.5],
    ]);
    const [kernel, operations] = [logSumExp(x), composed(() => logSumExp(x))].map((t) => t.dataSync());
    operations!.forEach((v, i) => {
      expect(v).toBeCloseTo(kernel![i]!, 5);
    });
  });
});

it('refuses what has no row', () => {
  const wrong = logSumExp as unknown as (x: unknown) => unknown;
  expect(() => wrong([1, 2])).toThrow(
    new ParameterError('logSumExp: x must be a tensor; got an array of 2; wrap it in tf.tensor(…)'),
  );
  for (const [shape, text] of [
    [[], '[]'],
    [[3, 0], '[3, 0]'],
  ] as const) {
    expect(() => logSumExp(tf.zeros([...shape]))).toThrow(
      new ShapeError(
        `logSumExp: x must have a last axis with at least one element; got shape ${text}; reshape it`,
      ),
    );
  }
});
