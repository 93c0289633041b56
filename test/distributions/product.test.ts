import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  bernoulli,
  categorical,
  type Distribution,
  exponential,
  multivariateNormal,
  normal,
  ParameterError,
  product,
  ShapeError,
  stream,
  uniform,
} from '../../src/index.js';
import { call, has, scalars } from './samples.js';

beforeAll(async () => {
  await tf.setBackend('cpu');
});

const coordinates = () => normal({ mean: tf.zeros([5, 3]), sd: [1, 2, 3] });

describe('a product', () => {
  it('moves axes from the array to the point', () => {
    tf.tidy(() => {
      const d = product(coordinates());
      expect([d.family, d.route, d.arrayShape, d.pointShape, d.axes]).toEqual([
        'product<normal>',
        'pathwise',
        [5],
        [3],
        1,
      ]);
      expect(d.support).toEqual({ name: 'real', pointRank: 1, discrete: false });
      const both = product(coordinates(), 2);
      expect([both.arrayShape, both.pointShape, both.axes]).toEqual([[], [5, 3], 2]);
      expect(both.support.pointRank).toBe(2);
      expect(Object.isFrozen(d)).toBe(true);
      expect(d.base.arrayShape).toEqual([5, 3]);
    });
  });

  it.each(Object.keys(scalars))(
    'of %s sums log densities and entropies, and keeps the other closed forms',
    (family) => {
      const { make, members } = scalars[family]!;
      tf.tidy(() => {
        const base = make({ ...members });
        const d = product(base as Distribution);
        const x = base.draw(stream(4), 6);
        const wanted = base.logDensity(x).sum(-1).dataSync();
        d.logDensity(x)
          .dataSync()
          .forEach((v, i) => {
            // The product rounds once, the sum of rounded densities three times more.
            expect(Math.abs(v - wanted[i]!)).toBeLessThanOrEqual(
              4e-7 * Math.max(1, Math.abs(wanted[i]!)) * 3,
            );
          });
        for (const name of ['mean', 'variance', 'mode']) {
          expect(has(d, name)).toBe(has(base, name));
          if (has(base, name)) {
            expect(Array.from(call(d, name).dataSync())).toEqual(Array.from(call(base, name).dataSync()));
          }
        }
        expect(has(d, 'entropy')).toBe(has(base, 'entropy'));
        if (has(base, 'entropy')) {
          expect(call(d, 'entropy').shape).toEqual([]);
          expect(call(d, 'entropy').dataSync()[0]).toBeCloseTo(call(base, 'entropy').sum().dataSync()[0]!, 5);
        }
        // A joint distribution function is not the coordinates' one.
        expect(has(d, 'cdf')).toBe(false);
        expect(has(d, 'quantile')).toBe(false);
      });
    },
  );

  it('draws what its coordinates draw, and scores it', () => {
    tf.tidy(() => {
      const base = coordinates();
      const d = product(base);
      expect(Array.from(d.draw(stream(2), 4).dataSync())).toEqual(
        Array.from(base.draw(stream(2), 4).dataSync()),
      );
      const { value, logDensity } = d.drawScored(stream(2), 4);
      expect(value.shape).toEqual([4, 5, 3]);
      expect(logDensity.shape).toEqual([4, 5]);
      expect(Array.from(logDensity.dataSync())).toEqual(Array.from(d.logDensity(value).dataSync()));
    });
  });

  it('of a product folds further, in one pass', () => {
    tf.tidy(() => {
      const nested = product(product(coordinates()));
      expect(nested.family).toBe('product<product<normal>>');
      expect([nested.arrayShape, nested.pointShape]).toEqual([[], [5, 3]]);
      const x = coordinates().draw(stream(3), 7);
      expect(nested.logDensity(x).shape).toEqual([7]);
      expect(Array.from(nested.logDensity(x).dataSync())).toEqual(
        Array.from(product(coordinates(), 2).logDensity(x).dataSync()),
      );
    });
  });

  it('of distributions over vectors puts its axes in front of theirs', () => {
    tf.tidy(() => {
      const base = multivariateNormal({ mean: tf.zeros([4, 2]), covarianceFactor: tf.eye(2) });
      const d = product(base);
      expect([d.arrayShape, d.pointShape]).toEqual([[], [4, 2]]);
      const x = d.draw(stream(1), 3);
      expect(d.logDensity(x).shape).toEqual([3]);
      const wanted = base.logDensity(x).sum(-1).dataSync();
      d.logDensity(x)
        .dataSync()
        .forEach((v, i) => {
          expect(v).toBeCloseTo(wanted[i]!, 5);
        });
      const labels = product(categorical({ logits: tf.zeros([4, 3]) }));
      expect(labels.logDensity(labels.draw(stream(1), 5)).shape).toEqual([5]);
    });
  });

  it('passes gradients, also to parameters that its coordinates share, and detached cuts them', () => {
    tf.tidy(() => {
      const x = tf.tensor2d([
        [1, 2],
        [3, 5],
      ]);
      const score = (rate: tf.Tensor): tf.Tensor => {
        const base = exponential({ rate: tf.mul(rate, tf.ones([2])) });
        return product(base).logDensity(x).sum();
      };
      // d/dr Σ (log r − r x) = 4 / r − 11.
      expect(tf.grad(score)(tf.scalar(2)).dataSync()[0]).toBeCloseTo(-9, 5);
      const shared = (sd: tf.Tensor): tf.Tensor =>
        product(normal({ mean: [0, 0], sd }))
          .logDensity(x)
          .sum();
      expect(tf.grad(shared)(tf.scalar(1)).dataSync()[0]).toBeCloseTo(35, 4);
      const cut = (sd: tf.Tensor): tf.Tensor =>
        product(normal({ mean: [0, 0], sd }))
          .detached()
          .logDensity(x)
          .sum();
      expect(() => tf.grad(cut)(tf.scalar(1))).toThrow('Cannot compute gradient');
      expect(product(normal({ mean: [0, 0], sd: 1 })).detached().family).toBe('product<normal>');
    });
  });

  it('leaves exactly its results alive', () => {
    const d = product(uniform({ lower: [0, 1], upper: 3 }));
    const x = tf.tensor2d([[1, 2]]);
    const before = tf.memory().numTensors;
    const results = [d.draw(stream(1)), d.logDensity(x), d.mean(), d.variance(), d.entropy()];
    const scored = d.drawScored(stream(1), 2);
    expect(tf.memory().numTensors - before).toBe(7);
    tf.dispose([results, scored, x] as unknown as tf.TensorContainer);
    expect(tf.memory().numTensors).toBe(before - 1);
  });
});

describe('a product refuses', () => {
  const wrong = product as unknown as (d: unknown, axes?: unknown) => unknown;

  it.each([
    [1, '1'],
    [null, 'null'],
    [undefined, 'undefined'],
    [{}, 'an object with keys (none)'],
  ])('%s in place of a distribution', (value, got) => {
    expect(() => wrong(value)).toThrow(
      new ParameterError(
        `product: d must be a distribution; got ${got}; pass for example normal({ mean, sd })`,
      ),
    );
  });

  it.each([
    [0, '0'],
    [-1, '-1'],
    [1.5, '1.5'],
    [Number.NaN, 'NaN'],
    ['1', "the string '1'"],
  ])('%s axes', (axes, got) => {
    expect(() => wrong(normal({ mean: [0, 1], sd: 1 }), axes)).toThrow(
      new ParameterError(
        `product: axes must be a whole number of at least 1; got ${got}; pass for example 1`,
      ),
    );
  });

  it('more axes than the array has', () => {
    expect(() => product(bernoulli({ logit: [0, 1] }), 2)).toThrow(
      new ShapeError(
        'product: axes must be at most the number of array axes, 1; got 2 for arrayShape [2]; give a parameter the missing axes, for example mean: tf.zeros([8])',
      ),
    );
    expect(() => product(normal({ mean: 0, sd: 1 }))).toThrow(
      new ShapeError(
        'product: axes must be at most the number of array axes, 0; got 1 for arrayShape []; give a parameter the missing axes, for example mean: tf.zeros([8])',
      ),
    );
  });

  it('points of another shape, even ones that would broadcast', () => {
    tf.tidy(() => {
      const d = product(normal({ mean: [0, 1], sd: 1 }));
      for (const [x, shape] of [
        [tf.zeros([3]), '[3]'],
        [tf.zeros([2, 1]), '[2, 1]'],
        [tf.scalar(1), '[]'],
      ] as const) {
        expect(() => d.logDensity(x)).toThrow(
          new ShapeError(
            `product<normal>.logDensity: x must end in the point shape [2]; got shape ${shape}; reshape x, or fold another number of axes with product(d, axes)`,
          ),
        );
      }
    });
  });
});
