import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import { beforeAll, describe, expect, expectTypeOf, test } from 'vitest';
import { lawsOfDistribution } from '../../src/conformance/index.js';
import {
  affineMap,
  bernoulli,
  composed,
  expMap,
  gumbel,
  laplace,
  logNormal,
  normal,
  type Pushforward,
  product,
  pushforward,
  sigmoidMap,
  softplusMap,
  stream,
} from '../../src/index.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

const arbitrary = fc.record({
  location: fc.double({ min: -1, max: 1, noNaN: true }),
  scale: fc.double({ min: 0.3, max: 1, noNaN: true }),
});

describe.each([expMap(), sigmoidMap(), softplusMap(), affineMap({ shift: 1, stretch: -2 })])(
  'a Gumbel distribution through $name',
  (map) => {
    const make = (options: { location: number; scale: number }) => pushforward(gumbel(options), map);
    // exp carries the Gumbel's exponential upper tail to one without a variance.
    const laws = lawsOfDistribution(make, arbitrary, { seed: 510 });
    test.each(laws)('$name', ({ check }) => check());
  },
);

test('a normal through exp is log-normal: density, tails, quantile, draws and their gradients', () => {
  tf.tidy(() => {
    const [own, known] = [
      pushforward(normal({ mean: 0.3, sd: 0.8 }), expMap()),
      logNormal({ location: 0.3, scale: 0.8 }),
    ];
    const x = tf.tensor1d([-1, 0, 1e-3, 0.5, 1, 20, Number.POSITIVE_INFINITY]);
    const close = (a: tf.Tensor, b: tf.Tensor): void => {
      const [p, q] = [a.dataSync(), b.dataSync()];
      p.forEach((v, i) => {
        if (v !== q[i]) expect(Math.abs(v - q[i]!)).toBeLessThan(2e-6 * (1 + Math.abs(q[i]!)));
      });
    };
    close(own.logDensity(x), known.logDensity(x));
    close(own.draw(stream(4), 50), known.draw(stream(4), 50));
    const slope = (make: (mean: tf.Tensor) => tf.Tensor) => tf.grad(make)(tf.scalar(0.3));
    close(
      slope((mean) =>
        pushforward(normal({ mean, sd: 0.8 }), expMap())
          .draw(stream(4), 50)
          .sum(),
      ),
      slope((location) => logNormal({ location, scale: 0.8 }).draw(stream(4), 50).sum()),
    );
    const y = tf.tensor1d([0.1, 1, 7]);
    close(
      slope((mean) =>
        pushforward(normal({ mean, sd: 0.8 }), expMap())
          .logDensity(y)
          .sum(),
      ),
      slope((location) => logNormal({ location, scale: 0.8 }).logDensity(y).sum()),
    );
    close(
      composed(() => own.logDensity(x)),
      known.logDensity(x),
    );
  });
});

test('a falling map swaps the tails', () => {
  tf.tidy(() => {
    const base = gumbel({ location: 0, scale: 1 });
    const d = pushforward(base, affineMap({ shift: 0, stretch: -1 }));
    const x = tf.tensor1d([-30, -1, 0, 2, 9]);
    expect(Array.from(d.cdf(x).dataSync())).toEqual(Array.from(base.survival(tf.neg(x)).dataSync()));
    expect(Array.from(d.logSurvival(x).dataSync())).toEqual(Array.from(base.logCdf(tf.neg(x)).dataSync()));
    const p = tf.tensor1d([1e-20, 0.3]);
    expect(Array.from(d.quantile(p).dataSync())).toEqual(
      Array.from(tf.neg(base.upperQuantile(p)).dataSync()),
    );
  });
});

test('beyond the image all or nothing lies on one side, and the gradient is zero', () => {
  tf.tidy(() => {
    const d = pushforward(gumbel({ location: 0, scale: 1 }), sigmoidMap());
    const x = tf.tensor1d([-2, 0, 1, 3]);
    expect(Array.from(d.cdf(x).dataSync())).toEqual([0, 0, 1, 1]);
    expect(Array.from(d.survival(x).dataSync())).toEqual([1, 1, 0, 0]);
    expect(Array.from(d.logCdf(x).dataSync())).toEqual([-Infinity, -Infinity, 0, 0]);
    expect(
      Array.from(
        tf
          .grad((v) => d.cdf(v).sum())(x)
          .dataSync(),
      ),
    ).toEqual([0, 0, 0, 0]);
    expect(d.cdf(tf.scalar(Number.NaN)).dataSync()[0]).toBeNaN();
  });
});

test('a product is mapped number by number, its log volumes summed', () => {
  tf.tidy(() => {
    const each = normal({ mean: [0, 1, 2], sd: [1, 2, 3] });
    const d = pushforward(product(each), expMap());
    expect(d.pointShape).toEqual([3]);
    const x = tf.tensor2d([
      [0.5, 2, 4],
      [1, -1, 3],
    ]);
    const [inside, outside] = Array.from(d.logDensity(x).dataSync());
    const sum = Array.from(
      logNormal({ location: [0, 1, 2], scale: [1, 2, 3] })
        .logDensity(tf.slice(x, [0, 0], [1, 3]))
        .dataSync(),
    ).reduce((a, b) => a + b, 0);
    expect(Math.abs(inside! - sum)).toBeLessThan(1e-5);
    expect(outside).toBe(-Infinity);
  });
});

test('drawScored scores its own draws without inverting the map', () => {
  tf.tidy(() => {
    const blind = { ...softplusMap(), invert: () => tf.fill([2], Number.NaN) };
    const { value, logDensity } = pushforward(normal({ mean: [0, 1], sd: 1 }), blind).drawScored(stream(1));
    const right = pushforward(normal({ mean: [0, 1], sd: 1 }), softplusMap())
      .logDensity(value)
      .dataSync();
    logDensity.dataSync().forEach((v, i) => {
      expect(Math.abs(v - right[i]!)).toBeLessThan(1e-5);
    });
  });
});

test('what cannot be pushed forward is refused', () => {
  expect(() => pushforward(1 as never, expMap())).toThrow(
    'pushforward: base must be a distribution; got 1; pass for example normal({ mean: 0, sd: 1 })',
  );
  expect(() => pushforward(bernoulli({ logit: 0 }), expMap())).toThrow(
    'pushforward: base must have a density; got bernoulli, which is counted; map its draws instead',
  );
  expect(() => pushforward(laplace({ location: 0, scale: 1 }), tf.exp as never)).toThrow(
    'pushforward: map must have apply, invert and logVolume; got a function; pass for example expMap()',
  );
  for (const bad of [{ shift: Number.NaN, stretch: 1 }, { shift: 0, stretch: 0 }, {}]) {
    expect(() => affineMap(bad as never)).toThrow(/^affineMap: (shift|stretch) must be a finite number/);
  }
});

test('the type says which functions are carried along', () => {
  const d = pushforward(gumbel({ location: 0, scale: 1 }), expMap());
  expectTypeOf(d).toMatchTypeOf<Pushforward<ReturnType<typeof gumbel>, 'expMap'>>();
  expectTypeOf(d.logSurvival).toBeFunction();
  expectTypeOf(d.route).toEqualTypeOf<'pathwise'>();
  expectTypeOf(d.family).toEqualTypeOf<'pushforward<gumbel, expMap>'>();
});
