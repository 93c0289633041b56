import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import { categorical, type Distribution, multivariateNormal, normal, stream } from '../../src/index.js';
import { call, has, type Sample, scalars, vectors } from './samples.js';

beforeAll(async () => {
  await tf.setBackend('cpu');
});

const families: Record<string, Omit<Sample, 'members'>> = { ...scalars, ...vectors };
const summaries = ['mean', 'variance', 'mode', 'entropy', 'logProbabilities'];
const functions = ['logDensity', 'cdf', 'quantile'];

/** Every parameter of a parametrization as a tensor with one array axis of two members. */
function tensorsOf(options: Sample['parametrizations'][number]): Record<string, tf.Tensor> {
  return Object.fromEntries(
    Object.entries(options).map(([name, value]) => {
      const one = tf.tensor(value as tf.TensorLike);
      return [name, tf.stack([one, one])];
    }),
  );
}

/** A point, or a probability, that every family takes. */
function pointFor(d: Distribution): tf.Tensor {
  const discrete = d.support.discrete;
  return tf.fill([3, 2, ...d.pointShape], discrete ? 1 : 0.5);
}

describe.each(Object.entries(families))('%s', (_family, { make, parametrizations }) => {
  it('is frozen, its shapes too', () => {
    const d = make(parametrizations[0]!);
    expect(Object.isFrozen(d)).toBe(true);
    expect(Object.isFrozen(d.arrayShape)).toBe(true);
    expect(Object.isFrozen(d.pointShape)).toBe(true);
    expect(() => {
      (d as { family: string }).family = 'other';
    }).toThrow(TypeError);
  });

  it('does not see what happens to an array that it was given', () => {
    for (const options of parametrizations) {
      for (const copy of [(v: unknown) => structuredClone(v), toTyped]) {
        const given = Object.fromEntries(Object.entries(options).map(([name, v]) => [name, copy(v)]));
        tf.tidy(() => {
          const d = make(given);
          const x = pointFor(d);
          const before = Array.from(d.logDensity(x).dataSync());
          for (const value of Object.values(given)) spoil(value);
          expect(Array.from(d.logDensity(x).dataSync())).toEqual(before);
        });
      }
    }
  });

  it.each(['cpu', 'wasm'])('leaves exactly its results alive on %s', async (backend) => {
    await tf.setBackend(backend);
    for (const options of parametrizations) {
      for (const asTensors of [false, true]) {
        const outer = tf.memory().numTensors;
        const given = asTensors ? tf.tidy(() => tensorsOf(options)) : options;
        const d = make({ ...given });
        const x = tf.tidy(() => pointFor(d));
        const held = tf.memory().numTensors;
        const leaves = (what: string, count: number, compute: () => unknown): void => {
          const results = compute() as tf.TensorContainer;
          expect(tf.memory().numTensors - held, what).toBe(count);
          tf.dispose(results);
          expect(tf.memory().numTensors, what).toBe(held);
        };
        leaves('detached', 0, () => {
          d.detached();
          return [];
        });
        leaves('draw', 1, () => d.draw(stream(1)));
        leaves('draw of many', 1, () => d.draw(stream(1), 4));
        leaves('drawScored', 2, () => d.drawScored(stream(1), 4));
        for (const name of summaries.filter((n) => has(d, n))) leaves(name, 1, () => call(d, name));
        for (const name of functions.filter((n) => has(d, n))) leaves(name, 1, () => call(d, name, x));
        if (asTensors) {
          const tensors = given as Record<string, tf.Tensor>;
          for (const [name, t] of Object.entries(tensors)) {
            leaves(`gradient in ${name}`, 1, () =>
              tf.grad((v) => make({ ...tensors, [name]: v }).logDensity(x))(t),
            );
          }
        }
        tf.dispose([x, asTensors ? (given as Record<string, tf.Tensor>) : []]);
        expect(tf.memory().numTensors).toBe(outer);
      }
    }
    await tf.setBackend('cpu');
  });

  it('detached keeps the numbers and cuts the gradient of every parameter, everywhere', () => {
    for (const options of parametrizations) {
      tf.tidy(() => {
        const tensors = tensorsOf(options);
        const d = make({ ...tensors });
        const x = pointFor(d);
        const methods = [
          ...summaries.filter((n) => has(d, n)).map((n) => (e: Distribution) => call(e, n)),
          ...functions.filter((n) => has(d, n)).map((n) => (e: Distribution) => call(e, n, x)),
          (e: Distribution) => e.drawScored(stream(1)).logDensity,
        ];
        for (const method of methods) {
          expect(Array.from(method(d.detached()).dataSync())).toEqual(Array.from(method(d).dataSync()));
          for (const [name, t] of Object.entries(tensors)) {
            const through = (v: tf.Tensor): tf.Tensor =>
              method(make({ ...tensors, [name]: v }).detached())
                .toFloat()
                .sum();
            expect(() => tf.grad(through)(t)).toThrow('Cannot compute gradient');
          }
        }
        expect(d.detached().family).toBe(d.family);
        expect(d.detached().arrayShape).toEqual(d.arrayShape);
      });
    }
  });
});

function toTyped(value: unknown): unknown {
  return Array.isArray(value) && typeof value[0] === 'number'
    ? Float32Array.from(value)
    : structuredClone(value);
}

function spoil(value: unknown): void {
  if (value instanceof Float32Array) value.fill(99);
  else if (Array.isArray(value)) {
    value.forEach((part, i) => {
      if (Array.isArray(part)) spoil(part);
      else value[i] = 99;
    });
  }
}

describe('parameters', () => {
  it('are what tfjs takes: numbers, nested and typed arrays, tensors of whole numbers and truth values', () => {
    tf.tidy(() => {
      const x = tf.scalar(0.3);
      const wanted = Array.from(
        normal({ mean: [0, 1], sd: 2 })
          .logDensity(x)
          .dataSync(),
      );
      for (const mean of [
        Float32Array.of(0, 1),
        Float64Array.of(0, 1),
        Int32Array.of(0, 1),
        tf.tensor1d([0, 1]),
        tf.tensor1d([0, 1], 'int32'),
        tf.tensor1d([false, true], 'bool'),
      ]) {
        expect(Array.from(normal({ mean, sd: 2 }).logDensity(x).dataSync())).toEqual(wanted);
      }
    });
  });

  it('as variables are read when the distribution is used', () => {
    const mean = tf.variable(tf.scalar(0));
    const d = normal({ mean, sd: 1 });
    tf.tidy(() => {
      const at = (): number => d.logDensity(tf.scalar(1)).dataSync()[0]!;
      const before = at();
      mean.assign(tf.scalar(1));
      expect(at()).toBeCloseTo(before + 0.5, 6);
    });
    mean.dispose();
  });

  it('come back in the form that the formulas read, differentiable', () => {
    tf.tidy(() => {
      const logVariance = tf.tensor1d([0, 2]);
      expect(normal({ mean: 0, logVariance }).parameter('sd').dataSync()[1]).toBeCloseTo(Math.E, 6);
      const slope = tf.grad((v) => normal({ mean: 0, logVariance: v }).parameter('sd').sum())(logVariance);
      expect(slope.dataSync()[1]).toBeCloseTo(Math.E / 2, 6);
    });
  });
});

describe('vectors', () => {
  it('a multivariate normal with a diagonal factor is the product of its coordinates', () => {
    tf.tidy(() => {
      const d = multivariateNormal({ mean: [1, -2], covarianceFactor: tf.diag(tf.tensor1d([0.5, 3])) });
      const x = tf.tensor2d([
        [0, 0],
        [1.5, -4],
      ]);
      const apart = normal({ mean: [1, -2], sd: [0.5, 3] });
      const wanted = apart.logDensity(x).sum(-1).dataSync();
      d.logDensity(x)
        .dataSync()
        .forEach((v, i) => {
          expect(v).toBeCloseTo(wanted[i]!, 5);
        });
      expect(d.entropy().dataSync()[0]).toBeCloseTo(apart.entropy().sum().dataSync()[0]!, 5);
      expect(Array.from(d.variance().dataSync())).toEqual([0.25, 9]);
    });
  });

  it('a multivariate normal broadcasts its leading axes', () => {
    tf.tidy(() => {
      const d = multivariateNormal({
        mean: tf.zeros([3, 1, 2]),
        covarianceFactor: tf.stack([tf.eye(2), tf.eye(2)]),
      });
      expect(d.arrayShape).toEqual([3, 2]);
      expect(d.logDensity(tf.zeros([5, 1, 1, 2])).shape).toEqual([5, 3, 2]);
      expect(d.draw(stream(1), 4).shape).toEqual([4, 3, 2, 2]);
      expect(d.mean().shape).toEqual([3, 2, 2]);
      expect(d.entropy().shape).toEqual([3, 2]);
    });
  });

  it('impossible categories are impossible, and leave the gradient alone', () => {
    tf.tidy(() => {
      const p = tf.tensor1d([0.25, 0, 0.75]);
      const d = categorical({ probabilities: p });
      expect(
        Array.from(
          d
            .logDensity(tf.tensor1d([0, 1, 2, 3, -1, 0.5]))
            .dataSync()
            .slice(1),
        ),
      ).toEqual([
        Number.NEGATIVE_INFINITY,
        Math.fround(Math.log(0.75)),
        Number.NEGATIVE_INFINITY,
        Number.NEGATIVE_INFINITY,
        Number.NEGATIVE_INFINITY,
      ]);
      const gradient = tf
        .grad((t) => categorical({ probabilities: t }).entropy())(p)
        .dataSync();
      expect(Array.from(gradient).every(Number.isFinite)).toBe(true);
      expect(gradient[1]).toBe(0);
      const own = tf
        .grad((t) => categorical({ probabilities: t }).logDensity(tf.scalar(0)))(p)
        .dataSync();
      // d/dp of log (p₀ / Σ p).
      expect(Array.from(own)).toEqual([3, -1, -1]);
      expect(d.mode().dataSync()[0]).toBe(2);
      expect(d.mode().dtype).toBe('int32');
    });
  });
});
