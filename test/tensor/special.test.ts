import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import * as library from '../../src/index.js';
import { scalarOf, specialNames, withoutComposedForm } from './specialNames.js';

type Special = (x: tf.Tensor) => tf.Tensor;

const names = specialNames.filter((name) => scalarOf(name).parameters.length === 1);
const exported = new Map<string, unknown>(Object.entries(library));
const points = [-30, -3, -1, -0.5, -1e-3, 0, 1e-20, 1e-3, 0.2, 0.5, 0.75, 0.999, 1, 1.4616, 2, 3.7, 20, 90];

it('there are special functions', () => {
  expect(names.length).toBeGreaterThanOrEqual(24);
});

describe.each(names)('%s', (name) => {
  const f = exported.get(name) as Special;
  const kernel = scalarOf(name);

  it.each(['cpu', 'wasm'])('gives the formula rounded once, and its derivative, on %s', async (backend) => {
    await tf.setBackend(backend);
    tf.tidy(() => {
      const x = tf.tensor2d(points, [3, points.length / 3]);
      const rounded = x.dataSync();
      const value = f(x);
      expect(value.shape).toEqual(x.shape);
      const slope = tf.grad((t) => f(t).sum())(x);
      rounded.forEach((v, i) => {
        expect(value.dataSync()[i], `at ${v}`).toBe(Math.fround(kernel.value(v)));
        expect(slope.dataSync()[i], `derivative at ${v}`).toBe(Math.fround(kernel.partials[0]!(v)));
      });
    });
  });

  it('leaves exactly its result alive', () => {
    const x = tf.tensor1d([0.25, 0.5]);
    const before = tf.memory().numTensors;
    const results = [f(x), tf.grad((t) => f(t).sum())(x)];
    expect(tf.memory().numTensors).toBe(before + 2);
    tf.dispose([...results, x]);
  });

  it('refuses what is no tensor of numbers', () => {
    const wrong = f as unknown as (x: unknown) => unknown;
    expect(() => wrong(0.5)).toThrow(
      new library.ParameterError(`${name}: x must be a tensor; got 0.5; wrap it in tf.tensor(…)`),
    );
    tf.tidy(() => {
      expect(() => f(tf.tensor1d(['a']))).toThrow(
        new library.ParameterError(
          `${name}: x must hold real numbers; got dtype string; convert it to float32`,
        ),
      );
    });
  });

  it('throws on a second derivative, and names the cure', () => {
    tf.tidy(() => {
      const second = (wrap: (compute: () => tf.Tensor) => tf.Tensor): tf.Tensor =>
        tf.grad((t) =>
          tf
            .grad((u) => wrap(() => f(u)).sum())(t)
            .sum(),
        )(tf.tensor1d([sample(name)]));
      expect(() => second((compute) => compute())).toThrow(
        new library.GradientError(
          `${name}: a kernel must be differentiated once only; got a second derivative; wrap the computation in composed(() => …)`,
        ),
      );
      // Either the cure works, or it says that there is none.
      const x = sample(name);
      const h = 1e-5;
      const exact = (kernel.partials[0]!(x + h) - kernel.partials[0]!(x - h)) / (2 * h);
      if (withoutComposedForm.includes(name)) {
        expect(() => second(library.composed)).toThrow(
          new library.GradientError(
            `${name}: it must be evaluated by its kernel, outside composed(…); got composed(…), and it has no form in tensor operations; move it out of composed`,
          ),
        );
      } else {
        const got = second(library.composed).dataSync()[0]!;
        expect(Math.abs(got - exact)).toBeLessThan(1e-4 * Math.max(1, Math.abs(exact)));
      }
    });
  });
});

/** A point inside the function's domain. */
function sample(name: string): number {
  return name === 'log1mexp' || name === 'normalQuantileFromLog' ? -0.8 : 0.7;
}

beforeAll(async () => {
  await tf.setBackend('cpu');
});
