import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  composed,
  detach,
  GradientError,
  lift,
  ParameterError,
  type ScalarFormula,
  ShapeError,
} from '../../src/index.js';

beforeAll(async () => {
  await tf.setBackend('cpu');
});

const weighted: ScalarFormula = {
  name: 'weighted',
  value: (x, w) => w * x * x,
  partials: [(x, w) => 2 * w * x, (x) => x * x],
  composed: (x, w) => tf.mul(w!, tf.square(x!)),
};

describe('a lifted formula', () => {
  it('broadcasts whatever parameters are, and is differentiable in tensors', () => {
    tf.tidy(() => {
      const f = lift(weighted);
      expect(f([[1], [2]], Float32Array.of(1, 10)).arraySync()).toEqual([
        [1, 10],
        [4, 40],
      ]);
      const x = tf.tensor2d([[1], [2]]);
      const w = tf.tensor1d([1, 10]);
      const [gx, gw] = tf.grads((a: tf.Tensor, b: tf.Tensor) => f(a, b))([x, w]);
      expect(gx!.arraySync()).toEqual([[22], [44]]);
      expect(gw!.arraySync()).toEqual([5, 5]);
    });
  });

  it('computes in double precision and rounds once', () => {
    tf.tidy(() => {
      const far = lift({ name: 'far', value: (x) => x + 1e8 - 1e8, partials: [() => 1] });
      expect(far(0.3).dataSync()[0]).toBe(Math.fround(Math.fround(0.3) + 1e8 - 1e8));
      expect(Math.abs(far(0.3).dataSync()[0]! - 0.3)).toBeLessThan(1e-7);
    });
  });

  it('may run tensor operations of its own inside', () => {
    tf.tidy(() => {
      const inner = lift({
        name: 'inner',
        value: (x): number => {
          const square = tf.square(x);
          const result = square.dataSync()[0]!;
          square.dispose();
          return result;
        },
        partials: [(x) => 2 * x],
      });
      expect(inner([1, 2, 3]).arraySync()).toEqual([1, 4, 9]);
    });
  });

  it('leaves exactly its result alive', () => {
    const x = tf.tensor1d([1, 2]);
    const before = tf.memory().numTensors;
    const results = [lift(weighted)(x, 2), tf.grad((t) => lift(weighted)(t, 2))(x)];
    expect(tf.memory().numTensors).toBe(before + 2);
    tf.dispose([...results, x]);
  });

  it('has a second derivative through its composed form only', () => {
    tf.tidy(() => {
      const second = (f: (t: tf.Tensor) => tf.Tensor): tf.Tensor =>
        tf.grad((t) =>
          tf
            .grad((u) => f(u).sum())(t)
            .sum(),
        )(tf.tensor1d([3]));
      expect(() => second((t) => lift(weighted)(t, 2))).toThrow(
        new GradientError(
          'weighted: a kernel must be differentiated once only; got a second derivative; wrap the computation in composed(() => …)',
        ),
      );
      expect(second((t) => composed(() => lift(weighted)(t, 2))).dataSync()[0]).toBe(4);
      const { composed: _, ...bare } = weighted;
      expect(() => composed(() => lift(bare)(1, 2))).toThrow(
        new GradientError(
          'weighted: the formula must have a composed form here; got none; give lift a composed function over tensors',
        ),
      );
    });
  });

  it('refuses a derivative that it was not given, unless it is cut', () => {
    tf.tidy(() => {
      const f = lift({ ...weighted, partials: [weighted.partials[0], undefined] });
      const w = tf.scalar(2);
      expect(() => tf.grad((t) => f(1, t))(w)).toThrow(
        new GradientError(
          'weighted: the derivative must exist; got one in argument 1, where the formula has none; cut that argument with detach(…)',
        ),
      );
      expect(
        tf
          .grad((t) => f(t, detach(w)))(tf.scalar(3))
          .dataSync()[0],
      ).toBe(12);
    });
  });

  it('refuses arguments of the wrong number, type or shape', () => {
    const f = lift(weighted);
    expect(() => f(1)).toThrow(
      new ParameterError('weighted: it must be called with 2 arguments; got 1; pass one per partial'),
    );
    expect(() => f('1' as never, 2)).toThrow(
      new ParameterError(
        "weighted: argument 0 must be a tensor, a number, nested numbers or a typed array; got the string '1'; pass for example argument 0: 1",
      ),
    );
    expect(() => f([1, 2], [1, 2, 3])).toThrow(
      new ShapeError(
        'weighted: shapes must broadcast from the right; got [2] and [3]; make the sizes of each axis equal, or 1',
      ),
    );
  });
});

describe('lift refuses', () => {
  const one = (): number => 1;
  const wrong = lift as unknown as (formula: unknown) => unknown;
  const text = (got: string): string =>
    `lift: formula must have a name, a value function and an array of partials, each a function or undefined; got ${got}; pass { name, value, partials }`;

  it.each([
    [undefined, 'undefined'],
    [null, 'null'],
    [one, 'a function'],
    [{ name: 'f', value: 1, partials: [] }, 'an object with keys name, value, partials'],
    [{ value: one, partials: [] }, 'an object with keys value, partials'],
    [{ name: '', value: one, partials: [] }, 'an object with keys name, value, partials'],
    [{ name: 'f', value: one }, 'an object with keys name, value'],
    [{ name: 'f', value: one, partials: [1] }, 'an object with keys name, value, partials'],
  ])('%o', (formula, got) => {
    expect(() => wrong(formula)).toThrow(new ParameterError(text(got)));
  });
});

describe('detach', () => {
  it('keeps numbers, shape and type, and cuts the gradient', () => {
    tf.tidy(() => {
      for (const t of [tf.tensor2d([[1, 2]]), tf.tensor1d([3], 'int32'), tf.tensor1d([true], 'bool')]) {
        const cut = detach(t as tf.Tensor);
        expect([cut.shape, cut.dtype, Array.from(cut.dataSync())]).toEqual([
          t.shape,
          t.dtype,
          Array.from(t.dataSync()),
        ]);
        expect(cut).not.toBe(t);
      }
      expect(
        tf
          .grad((x) => tf.mul(x, detach(x)).sum())(tf.tensor1d([3]))
          .dataSync()[0],
      ).toBe(3);
      expect(() => tf.grad((x) => detach(x))(tf.scalar(1))).toThrow('Cannot compute gradient');
    });
  });

  it('outlives its source, and leaves one tensor', () => {
    const source = tf.tensor1d([1, 2]);
    const before = tf.memory().numTensors;
    const cut = detach(source);
    expect(tf.memory().numTensors).toBe(before + 1);
    source.dispose();
    expect(Array.from(cut.dataSync())).toEqual([1, 2]);
    cut.dispose();
    expect(tf.memory().numTensors).toBe(before - 1);
  });

  it('refuses what is no tensor', () => {
    expect(() => detach(1 as never)).toThrow(
      new ParameterError('detach: tensor must be a tensor; got 1; wrap it in tf.tensor(…)'),
    );
  });
});

describe('composed', () => {
  it('returns what its function returns, nests, and ends where the function throws', () => {
    tf.tidy(() => {
      const used: string[] = [];
      const f = lift({
        name: 'watched',
        value: (x) => {
          used.push('kernel');
          return x;
        },
        partials: [() => 1],
        composed: (x) => {
          used.push('operations');
          return x!.clone();
        },
      });
      expect(composed(() => 7)).toBe(7);
      composed(() => {
        composed(() => f(1));
        f(1);
      });
      f(1);
      expect(() =>
        composed(() => {
          throw new Error('inside');
        }),
      ).toThrow('inside');
      f(1);
      expect(used).toEqual(['operations', 'operations', 'kernel', 'kernel']);
    });
  });

  it('refuses what is no function, or waits', () => {
    expect(() => composed(1 as never)).toThrow(
      new ParameterError('composed: compute must be a function; got number; pass () => …'),
    );
    expect(() => composed(async () => 1)).toThrow(
      new ParameterError(
        'composed: compute must be synchronous; got a promise; await outside and compute inside',
      ),
    );
  });
});
