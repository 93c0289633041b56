import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import * as library from '../../src/index.js';
import { scalarOf, specialNames, withoutComposedForm } from './specialNames.js';

type Special = (...values: (tf.Tensor | number | number[])[]) => tf.Tensor;

const names = specialNames.filter((name) => scalarOf(name).parameters.length > 1);
const exported = new Map<string, unknown>(Object.entries(library));

/** Points inside the domain of each parameter. */
function pointsOf(name: string): number[][] {
  const real = [-40, -1, -1e-3, 0.3, 5];
  if (['logAddExp', 'logSubExp', 'owenT'].includes(name)) return [real, real];
  const beta = name.includes('eta');
  return scalarOf(name).parameters.map((parameter) => {
    if (['p', 'q'].includes(parameter) || (parameter === 'x' && beta)) return [1e-4, 0.2, 0.5, 0.7, 0.999];
    if (parameter === 'logP') return [-400, -30, -1, -0.1, -1e-3];
    return [1e-3, 0.4, 1, 2.5, 70];
  });
}

it('there are special functions of several arguments', () => {
  expect(names.length).toBeGreaterThanOrEqual(17);
});

describe.each(names)('%s', (name) => {
  const f = exported.get(name) as Special;
  const { value, partials, parameters } = scalarOf(name);
  const points = pointsOf(name);
  const rank = parameters.length;

  /** Each argument along an axis of its own, so that every combination is met. */
  const spread = (): tf.Tensor[] =>
    points.map((data, k) =>
      tf.tensor(
        data,
        points.map((p, j) => (j === k ? p.length : 1)),
      ),
    );

  it.each(['cpu', 'wasm'])(
    'broadcasts, gives the formula rounded once, and its derivatives, on %s',
    async (backend) => {
      await tf.setBackend(backend);
      tf.tidy(() => {
        const inputs = spread();
        const rounded = inputs.map((t) => t.dataSync());
        const result = f(...inputs);
        expect(result.shape).toEqual(points.map((p) => p.length));
        const got = result.dataSync();
        const full = inputs.map((t) => tf.broadcastTo(t, result.shape).add(0));
        const slopes = tf
          .grads((...t: tf.Tensor[]) => f(...t).sum())(full)
          .map((t) => t.dataSync());
        got.forEach((v, i) => {
          const at = rounded.map(
            (data, k) =>
              data[Math.floor(i / points.slice(k + 1).reduce((n, p) => n * p.length, 1)) % data.length]!,
          );
          expect(v, `at ${at}`).toBe(Math.fround(value(...at)));
          for (let k = 0; k < rank; k++) {
            expect(slopes[k]![i], `derivative in ${parameters[k]} at ${at}`).toBe(
              Math.fround(partials[k]!(...at)),
            );
          }
        });
      });
    },
  );

  it('takes plain numbers, leaves exactly its result alive, and refuses what is neither', () => {
    const at = points.map((data) => data[1]!);
    const before = tf.memory().numTensors;
    const results = [f(...at), f(...at.map((v) => [v, v])), f(...at.slice(0, -1), tf.scalar(at.at(-1)!))];
    expect(results[1]!.shape).toEqual([2]);
    for (const result of results) expect(result.dataSync()[0]).toBe(results[0]!.dataSync()[0]);
    expect(tf.memory().numTensors).toBe(before + 4);
    tf.disposeVariables();
    tf.dispose(results);
    const wrong = f as unknown as (...values: unknown[]) => unknown;
    expect(() => wrong('much', ...at.slice(1))).toThrow(
      new library.ParameterError(
        `${name}: ${parameters[0]} must be a tensor, a number, nested numbers or a typed array; got the string 'much'; pass for example ${parameters[0]}: 1`,
      ),
    );
    expect(() => f([1, 2, 3], [1, 2], ...at.slice(2))).toThrow(library.ShapeError);
  });

  it('has a composed form that agrees, or says that there is none', () => {
    tf.tidy(() => {
      const at = points.map((data) => tf.scalar(data.at(-2)!));
      // The second argument must be the smaller one of a difference.
      if (name === 'logSubExp') at.reverse();
      if (name === 'logSubExp') at[1] = tf.scalar(-2);
      const compute = (): tf.Tensor => library.composed(() => f(...at));
      if (withoutComposedForm.includes(name)) {
        expect(compute).toThrow(
          new library.GradientError(
            `${name}: it must be evaluated by its kernel, outside composed(…); got composed(…), and it has no form in tensor operations; move it out of composed`,
          ),
        );
      } else {
        const exact = f(...at).dataSync()[0]!;
        expect(Math.abs(compute().dataSync()[0]! - exact)).toBeLessThan(1e-6 * Math.max(1, Math.abs(exact)));
      }
    });
  });
});

beforeAll(async () => {
  await tf.setBackend('cpu');
});
