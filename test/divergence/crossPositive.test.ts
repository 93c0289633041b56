import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { lawsOfKl } from '../../src/conformance/index.js';
import * as library from '../../src/index.js';
import { composed } from '../../src/tensor/composed.js';
import { score } from '../numeric/ulp.js';

beforeAll(async () => {
  await tf.setBackend('cpu');
});

type Factory = (options: object) => library.Distribution;
interface Table {
  readonly q: string;
  readonly p: string;
  readonly parameters: readonly string[];
  readonly otherParameters: readonly string[];
  readonly rows: readonly (readonly number[])[];
}

const tables = JSON.parse(
  readFileSync(join(import.meta.dirname, '../reference/cross/positive.json'), 'utf8'),
) as Table[];
const factory = (name: string) => (library as unknown as Record<string, Factory>)[name]!;
const kl = library.kl as (q: library.Distribution, p: library.Distribution) => tf.Tensor;
const within = (min: number, max: number) => fc.double({ min, max, noNaN: true });

// Members whose log ratio has a variance, so that its mean over draws can be trusted.
const sides: Readonly<Record<string, fc.Arbitrary<object>>> = {
  exponential: fc.record({ rate: within(0.3, 3) }),
  weibull: fc.record({ scale: within(0.5, 2), shape: within(0.8, 2) }),
  rayleigh: fc.record({ scale: within(0.5, 2) }),
  halfNormal: fc.record({ scale: within(0.5, 2) }),
  pareto: fc.record({ scale: within(0.5, 2), shape: within(5, 12) }),
};

describe.each(tables)('the divergence of $q from $p', ({ q, p, parameters, otherParameters, rows }) => {
  test('agrees with quadrature', () => {
    expect(rows.length).toBeGreaterThanOrEqual(9);
    tf.tidy(() => {
      for (const row of rows) {
        const options = (names: readonly string[], from: number) =>
          Object.fromEntries(names.map((name, k) => [name, row[from + k]!]));
        const a = factory(q)(options(parameters, 0));
        const b = factory(p)(options(otherParameters, parameters.length));
        const exact = row[row.length - 1]!;
        const got = kl(a, b).dataSync()[0]!;
        // The quadrature is good to 1e-15, which is what is left of it where the two are the same.
        const error = Math.abs(exact) < 1e-12 ? Math.abs(got) / 1e-12 : score(got, exact);
        expect(error, `${row}: got ${got}`).toBeLessThanOrEqual(0.51);
        const close = composed(() => kl(a, b)).dataSync()[0]!;
        expect(Math.abs(close - exact), `composed at ${row}`).toBeLessThan(3e-6 * Math.max(1, exact));
      }
    });
  });

  const side = (name: string) => ({ factory: factory(name), arbitraryParameters: sides[name]! });
  test.each(lawsOfKl(side(q), side(p), { seed: 8140 }))('$name', ({ check }) => check());
});

test('a Pareto without a mean is infinitely far from an exponential', () => {
  tf.tidy(() => {
    const distance = (shape: tf.Tensor): tf.Tensor =>
      kl(library.pareto({ scale: 1, shape }), library.exponential({ rate: 1 })).sum();
    expect(distance(tf.scalar(1)).dataSync()[0]).toBe(Number.POSITIVE_INFINITY);
    expect(tf.grad(distance)(tf.scalar(1)).dataSync()[0]).toBe(0);
  });
});

test('a Pareto that begins below another is infinitely far from it', () => {
  tf.tidy(() => {
    const distance = (scale: tf.Tensor): tf.Tensor =>
      kl(library.pareto({ scale, shape: 2 }), library.pareto({ scale: 2, shape: 3 })).sum();
    expect(distance(tf.scalar(1)).dataSync()[0]).toBe(Number.POSITIVE_INFINITY);
    expect(composed(() => distance(tf.scalar(1))).dataSync()[0]).toBe(Number.POSITIVE_INFINITY);
    expect(tf.grad(distance)(tf.scalar(1)).dataSync()[0]).toBe(0);
    expect(distance(tf.scalar(2.5)).dataSync()[0]).toBeLessThan(1);
  });
});
