import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  composed,
  GradientError,
  implicitFamily,
  kl,
  locationScaleFamily,
  logistic,
  normal,
  ParameterError,
  product,
  quantileFamily,
  registerKl,
  stream,
} from '../../src/index.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

// The logistic distribution three times over: the library's own is the oracle for each route.
const sigmoid = (z: number) => 1 / (1 + Math.exp(-z));
const standardLogDensity = {
  value: (z: number) => -Math.abs(z) - 2 * Math.log1p(Math.exp(-Math.abs(z))),
  derivative: (z: number) => -Math.tanh(z / 2),
  // tfjs's exp has no second derivative, so the test's composed form is softplus, whose derivative it has.
  composed: (z: tf.Tensor) => tf.sub(tf.neg(z), tf.mul(2, tf.softplus(tf.neg(z)))),
};
const logDensity = {
  value: (x: number, l: number, s: number) => standardLogDensity.value((x - l) / s) - Math.log(s),
  partials: [
    (x: number, l: number, s: number) => standardLogDensity.derivative((x - l) / s) / s,
    (x: number, l: number, s: number) => -standardLogDensity.derivative((x - l) / s) / s,
    (x: number, l: number, s: number) =>
      (-((x - l) / s) * standardLogDensity.derivative((x - l) / s) - 1) / s,
  ],
};
const slope = (x: number, l: number, s: number) => sigmoid((x - l) / s) * sigmoid((l - x) / s);
const cdf = {
  value: (x: number, l: number, s: number) => sigmoid((x - l) / s),
  partials: [
    (x: number, l: number, s: number) => slope(x, l, s) / s,
    (x: number, l: number, s: number) => -slope(x, l, s) / s,
    (x: number, l: number, s: number) => (-slope(x, l, s) * (x - l)) / (s * s),
  ],
};
const logit = (p: number) => Math.log(p) - Math.log1p(-p);

const byStandard = locationScaleFamily({
  family: 'logisticByStandard',
  logDensity: standardLogDensity,
  draw: (source, shape) => {
    const u = source.uniform(shape);
    return tf.sub(tf.log(u), tf.log(tf.sub(1, u)));
  },
  cdf: { value: sigmoid, derivative: (z) => sigmoid(z) * sigmoid(-z) },
  quantile: { value: logit, derivative: (p) => 1 / (p * (1 - p)) },
  mean: 0,
  mode: 0,
  variance: Math.PI ** 2 / 3,
  entropy: 2,
});
const byQuantile = quantileFamily({
  family: 'logisticByQuantile',
  parameters: { location: 'real', scale: 'positive' },
  logDensity,
  cdf,
  quantile: {
    value: (p, l, s) => l! + s! * logit(p!),
    partials: [(p, _l, s) => s! / (p! * (1 - p!)), () => 1, (p) => logit(p!)],
  },
});
const byCdf = implicitFamily({
  family: 'logisticByCdf',
  parameters: { location: 'real', scale: 'positive' },
  logDensity,
  cdf,
  draw: (source, { location, scale }) => {
    const u = source.uniform(location.shape);
    return tf.add(location, tf.mul(scale, tf.sub(tf.log(u), tf.log(tf.sub(1, u)))));
  },
});
const routes = { locationScaleFamily: byStandard, quantileFamily: byQuantile, implicitFamily: byCdf };
const location = [[-1], [2]];
const scale = [0.5, 1, 3];

describe.each(Object.entries(routes))('%s', (_name, family) => {
  const points = () => tf.tensor([-30, -1, 0, 0.25, 4, 80], [6, 1, 1]);

  test('scores, and differentiates its scores, like the library’s own family', () => {
    const gradients = (make: (l: tf.Tensor, s: tf.Tensor) => { logDensity(x: tf.Tensor): tf.Tensor }) =>
      tf.grads((x: tf.Tensor, l: tf.Tensor, s: tf.Tensor) => tf.sum(make(l, s).logDensity(x)))([
        points(),
        tf.tensor(location),
        tf.tensor(scale),
      ]);
    const own = family({ location, scale });
    const oracle = logistic({ location, scale });
    expect(own.arrayShape).toEqual([2, 3]);
    const [got, expected] = [own, oracle].map((d) => d.logDensity(points()).dataSync());
    got!.forEach((v, i) => {
      // One rounding each; the numbers agree to a unit in the last place.
      expect(Math.abs(v - expected![i]!)).toBeLessThanOrEqual(Math.abs(expected![i]!) * 1.2e-7);
    });
    const mine = gradients((l, s) => family({ location: l, scale: s }));
    const theirs = gradients((l, s) => logistic({ location: l, scale: s }));
    mine.forEach((g, k) => {
      const values = theirs[k]!.dataSync();
      g.dataSync().forEach((v, i) => {
        expect(Math.abs(v - values[i]!)).toBeLessThanOrEqual(1e-5 * Math.max(1, Math.abs(values[i]!)));
      });
    });
  });

  test('draws points whose gradient is that of a fixed quantile', () => {
    const draw = (l: tf.Tensor, s: tf.Tensor) => family({ location: l, scale: s }).draw(stream(81), 50);
    const z = draw(tf.tensor(location), tf.tensor(scale)) as tf.Tensor3D;
    expect(z.shape).toEqual([50, 2, 3]);
    const weight = stream(82).normal([50, 2, 3]);
    const [dl, ds] = tf.grads((l: tf.Tensor, s: tf.Tensor) => tf.sum(tf.mul(draw(l, s), weight)))([
      tf.tensor(location),
      tf.tensor(scale),
    ]);
    // z = l + s e: the slopes are 1 and e = (z − l) / s.
    const e = tf.div(tf.sub(z, location), scale);
    const wanted = [tf.sum(weight, [0, 2]), tf.sum(tf.mul(weight, e), [0, 1])];
    [dl!, ds!].forEach((g, k) => {
      const expected = wanted[k]!.dataSync();
      g.dataSync().forEach((v, i) => {
        expect(Math.abs(v - expected[i]!)).toBeLessThan(2e-4 * Math.max(1, Math.abs(expected[i]!)));
      });
    });
    const scored = family({ location, scale }).drawScored(stream(81), 50);
    expect([...scored.value.dataSync()]).toEqual([...z.dataSync()]);
    expect(scored.logDensity.shape).toEqual([50, 2, 3]);
  });

  test('leaks nothing, folds into products and detaches', () => {
    const l = tf.tensor(location);
    const before = tf.memory().numTensors;
    const d = product(family({ location: l, scale }));
    expect(tf.memory().numTensors).toBe(before);
    const source = stream(83);
    tf.dispose([d.draw(source), d.logDensity(tf.zeros([2, 3]))]);
    expect(tf.memory().numTensors).toBe(before + 1);
    const slope = tf.grad((v: tf.Tensor) =>
      tf.add(tf.sum(family({ location: v, scale: 1 }).detached().draw(source)), tf.mul(v, 3)),
    );
    expect(slope(tf.scalar(1)).dataSync()[0]).toBe(3);
  });
});

test('closed forms follow from the standard member', () => {
  const own = byStandard({ location: [1, -2], scale: [2, 0.5] });
  const oracle = logistic({ location: [1, -2], scale: [2, 0.5] });
  const x = tf.tensor1d([0.5, -3]);
  const p = tf.tensor1d([0.1, 0.9]);
  for (const [got, expected] of [
    [own.mean(), oracle.mean()],
    [own.mode(), oracle.mode()],
    [own.variance(), oracle.variance()],
    [own.entropy(), oracle.entropy()],
    [own.cdf(x), oracle.cdf(x)],
    [own.quantile(p), oracle.quantile(p)],
  ] as const) {
    const values = expected.dataSync();
    got.dataSync().forEach((v, i) => {
      expect(v).toBeCloseTo(values[i]!, 5);
    });
  }
});

test('a second derivative needs the composed form, and says so where the definition has none', () => {
  const curvature = (x: tf.Tensor) =>
    tf.grad((v: tf.Tensor) =>
      tf.sum(
        tf.grad((u: tf.Tensor) =>
          tf.sum(composed(() => byStandard({ location: 0, scale: 1 }).logDensity(u))),
        )(v),
      ),
    )(x);
  // −2 σ(x) σ(−x) at 1.
  expect(curvature(tf.tensor1d([1])).dataSync()[0]).toBeCloseTo(-2 * sigmoid(1) * sigmoid(-1), 5);
  expect(() => composed(() => byQuantile({ location: 0, scale: 1 }).logDensity(tf.scalar(0)))).toThrow(
    new GradientError(
      'logisticByQuantile.logDensity: the formula must have a composed form here; got numbers alone; add composed to the definition',
    ),
  );
});

test('a definition in tensor operations alone works with any derivative', () => {
  const family = quantileFamily({
    family: 'byTensors',
    parameters: { location: 'real', scale: 'positive' },
    logDensity: (x, l, s) => {
      const z = tf.div(tf.sub(x!, l!), s!);
      return tf.neg(tf.add(tf.add(z, tf.mul(2, tf.softplus(tf.neg(z)))), tf.log(s!)));
    },
    quantile: (p, l, s) => tf.add(l!, tf.mul(s!, tf.sub(tf.log(p!), tf.log(tf.sub(1, p!))))),
  });
  const d = product(family({ location: tf.zeros([4, 2]), scale: 1 }));
  const before = tf.memory().numTensors;
  const value = d.logDensity(d.draw(stream(84)));
  expect(value.shape).toEqual([4]);
  expect(tf.memory().numTensors).toBe(before + 2);
  const second = tf.grad((x: tf.Tensor) =>
    tf.sum(tf.grad((u: tf.Tensor) => tf.sum(family({ location: 0, scale: 1 }).logDensity(u)))(x)),
  )(tf.tensor1d([0]));
  expect(second.dataSync()[0]).toBeCloseTo(-0.5, 6);
});

test('a registered divergence makes it a first-class family', () => {
  registerKl('logisticByStandard', 'normal', (q, p) =>
    tf.neg(tf.add((q as ReturnType<typeof byStandard>).entropy(), tf.zeros(p.arrayShape as number[]))),
  );
  const q = product(byStandard({ location: [0, 0], scale: 1 }));
  expect(kl(q, product(normal({ mean: [0, 0], sd: 1 })) as never).dataSync()[0]).toBeCloseTo(-4, 6);
});

describe('wrong definitions have one clear message each', () => {
  const any = (v: unknown) => v as never;
  const good = {
    family: 'f',
    parameters: { a: 'real' },
    logDensity: { value: () => 0, partials: [() => 0, () => 0] },
  };
  const quantile = { value: () => 0, partials: [undefined, () => 0] };
  test.each([
    [
      () => quantileFamily(any({ ...good, quantile, family: 'a|b' })),
      "quantileFamily: family must be a name without |, < and >; got the string 'a|b'; pass for example family: 'triangle'",
    ],
    [
      () => quantileFamily(any({ ...good, quantile, support: 'half' })),
      "quantileFamily: support of f must be one of real, positive, unitInterval, interval, ray, binary, count; got the string 'half'; name one of these",
    ],
    [
      () => quantileFamily(any({ ...good, quantile, parameters: {} })),
      "quantileFamily: parameters of f must map names to domains; got an object with keys (none); pass for example { location: 'real', scale: 'positive' }",
    ],
    [
      () => quantileFamily(any({ ...good, quantile, parameters: { a: 'any' } })),
      "quantileFamily: the domain of f's a must be one of real, positive, nonNegative, unitInterval; got the string 'any'; name one of these",
    ],
    [
      () => quantileFamily(any(good)),
      'f.quantile: it must be a function of tensors, or have a value and 2 partials, one for each of p, a; got undefined; pass undefined for a partial that does not exist',
    ],
    [
      () => quantileFamily(any({ ...good, quantile: { value: () => 0, partials: [() => 0] } })),
      'f.quantile: it must be a function of tensors, or have a value and 2 partials, one for each of p, a; got an object with keys value, partials with 1 partials; pass undefined for a partial that does not exist',
    ],
    [
      () => implicitFamily(any({ ...good, cdf: quantile })),
      'implicitFamily: draw of f must be a function of a stream and the parameters; got undefined; pass (stream, { a }) => … returning exact draws',
    ],
    [
      () => locationScaleFamily(any({ family: 'f', logDensity: { value: () => 0 } })),
      'f.logDensity: it must have a value and a derivative, both functions of z; got an object with keys value; pass { value: (z) => …, derivative: (z) => … }',
    ],
    [
      () => locationScaleFamily(any({ family: 'f', logDensity: standardLogDensity })),
      'locationScaleFamily: draw of f must be a function of a stream and a shape; got undefined; pass (stream, shape) => … returning standard draws',
    ],
    [
      () =>
        locationScaleFamily(
          any({ family: 'f', logDensity: standardLogDensity, draw: () => tf.scalar(0), mean: Number.NaN }),
        ),
      "locationScaleFamily: mean of f must be a finite number, the standard member's; got NaN; leave it out where there is none",
    ],
    [
      () => byStandard({ location: 0, scale: 1 }).parameter(any('sd')),
      "logisticByStandard.parameter: name must be one of location, scale; got the string 'sd'; ask for the form that the formulas read",
    ],
    [
      () =>
        quantileFamily(
          any({
            family: 'f',
            parameters: { a: 'positive' },
            logDensity: (z: tf.Tensor) => z,
            quantile: (p: tf.Tensor) => p,
            cfd: (z: tf.Tensor) => z,
          }),
        ),
      "quantileFamily: options must be among family, support, parameters, mean, variance, mode, entropy, cdf, survival, logCdf, logSurvival, quantile, upperQuantile, logDensity; got 'cfd'; remove or rename it",
    ],
    [
      () => byStandard({ location: 0, scale: -1 }),
      'logisticByStandard: scale must be positive; got -1; mend the value',
    ],
  ])('%#', (act, message) => {
    expect(act).toThrow(new ParameterError(message));
  });
});
