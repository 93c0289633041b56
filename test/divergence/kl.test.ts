import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  asymmetricLaplace,
  bernoulli,
  beta,
  categorical,
  cauchy,
  chiSquared,
  continuousBernoulli,
  type Distribution,
  DivergenceError,
  exponential,
  gamma,
  gumbel,
  halfCauchy,
  halfNormal,
  hasClosedKl,
  inverseGamma,
  inverseGaussian,
  laplace,
  logistic,
  logitNormal,
  logNormal,
  multivariateNormal,
  normal,
  ParameterError,
  pareto,
  poisson,
  product,
  rayleigh,
  reciprocal,
  registerKl,
  ShapeError,
  StreamError,
  sampledKl,
  stream,
  kl as typedKl,
  uniform,
  vonMises,
  weibull,
} from '../../src/index.js';
import { composed } from '../../src/tensor/composed.js';
import { factoriesOf } from '../conformance/factories.js';
import { normalLimit } from '../random/laws.js';

beforeAll(async () => {
  await tf.setBackend('cpu');
});

// The tests take any pair; that a pair without a closed form does not compile is tested with the types.
const kl = typedKl as (q: Distribution, p: Distribution) => tf.Tensor;
const value = (t: tf.Tensor): number => t.dataSync()[0]!;

const skewed = [
  [1, 0],
  [0.5, 0.7],
];
/** Two members of every family that has a divergence with itself, the second covering the first. */
const pairs: Record<string, () => [Distribution, Distribution]> = {
  normal: () => [normal({ mean: 0.5, sd: 0.7 }), normal({ mean: -0.2, logVariance: 0.3 })],
  logNormal: () => [logNormal({ location: 0.5, scale: 0.7 }), logNormal({ location: -0.2, logScale: 0.3 })],
  laplace: () => [laplace({ location: 0.5, scale: 0.7 }), laplace({ location: -0.2, scale: 1.3 })],
  uniform: () => [uniform({ lower: 0, upper: 1 }), uniform({ lower: -1, upper: 3 })],
  exponential: () => [exponential({ rate: 2 }), exponential({ mean: 0.9 })],
  bernoulli: () => [bernoulli({ logit: 0.4 }), bernoulli({ probability: 0.2 })],
  poisson: () => [poisson({ rate: 3 }), poisson({ rate: 4.5 })],
  gumbel: () => [gumbel({ location: 0.5, scale: 0.7 }), gumbel({ location: -0.2, logScale: 0.3 })],
  weibull: () => [weibull({ scale: 0.7, shape: 2 }), weibull({ logScale: 0.2, shape: 1.2 })],
  rayleigh: () => [rayleigh({ scale: 0.7 }), rayleigh({ logScale: 0.3 })],
  halfNormal: () => [halfNormal({ scale: 0.7 }), halfNormal({ logScale: 0.3 })],
  cauchy: () => [cauchy({ location: 0.5, scale: 0.7 }), cauchy({ location: -0.2, logScale: 0.3 })],
  halfCauchy: () => [halfCauchy({ scale: 0.7 }), halfCauchy({ logScale: 0.3 })],
  pareto: () => [pareto({ scale: 0.7, shape: 3 }), pareto({ scale: 0.5, logShape: 0.3 })],
  gamma: () => [gamma({ shape: 2, rate: 0.7 }), gamma({ mean: 1.5, dispersion: 0.4 })],
  inverseGamma: () => [inverseGamma({ shape: 2, scale: 0.7 }), inverseGamma({ shape: 3, logScale: 0.4 })],
  chiSquared: () => [chiSquared({ degreesOfFreedom: 3 }), chiSquared({ degreesOfFreedom: 5 })],
  beta: () => [beta({ alpha: 2, beta: 3 }), beta({ mean: 0.4, concentration: 3 })],
  inverseGaussian: () => [
    inverseGaussian({ mean: 1, shape: 2 }),
    inverseGaussian({ mean: 1.4, logShape: 0.2 }),
  ],
  vonMises: () => [
    vonMises({ location: 0.5, concentration: 2 }),
    vonMises({ location: -0.2, concentration: 1 }),
  ],
  reciprocal: () => [reciprocal({ lower: 1, upper: 2 }), reciprocal({ lower: 0.5, upper: 3 })],
  logitNormal: () => [
    logitNormal({ location: 0.5, scale: 0.7 }),
    logitNormal({ location: -0.2, logScale: 0.3 }),
  ],
  asymmetricLaplace: () => [
    asymmetricLaplace({ location: 0.5, scale: 0.7, asymmetry: 1.2 }),
    asymmetricLaplace({ location: -0.2, scale: 1.3, asymmetry: 0.8 }),
  ],
  continuousBernoulli: () => [continuousBernoulli({ logit: 0.4 }), continuousBernoulli({ probability: 0.2 })],
  categorical: () => [categorical({ logits: [0.3, -1, 2] }), categorical({ probabilities: [0.3, 0.3, 0.4] })],
  multivariateNormal: () => [
    multivariateNormal({ mean: [0.5, -0.3], covarianceFactor: skewed }),
    multivariateNormal({ mean: [0, 0], covarianceFactor: tf.eye(2) }),
  ],
};

describe.each(Object.entries(pairs))('the divergence of %s', (family, pair) => {
  // Σ over draws of log q − log p, beside the closed form; |z| < 4.892 with odds 1e-6.
  it('is the mean of the sampled one', () => {
    tf.tidy(() => {
      const [q, p] = pair();
      const n = 40_000;
      const { value: x, logDensity } = q.drawScored(stream(`kl ${family}`), n);
      const each = Float64Array.from(tf.sub(logDensity, p.logDensity(x)).dataSync());
      const mean = each.reduce((a, b) => a + b, 0) / n;
      const variance = each.reduce((a, b) => a + (b - mean) ** 2, 0) / (n - 1);
      const exact = value(kl(q, p));
      expect(exact).toBeGreaterThan(0.01);
      expect(Math.abs(mean - exact)).toBeLessThan(normalLimit * Math.sqrt(variance / n) + 1e-6);
      const sampled = value(sampledKl(q, p, stream(`kl ${family}`), n));
      expect(sampled).toBeCloseTo(mean, 4);
    });
  });

  it('is zero between equals, positive otherwise, and symmetric only for the Cauchy families', () => {
    tf.tidy(() => {
      const [q, p] = pair();
      expect(value(kl(q, q))).toBe(0);
      expect(value(kl(p, p))).toBe(0);
      expect(value(kl(q, p))).toBeGreaterThan(0);
      // Of the scale families only the Cauchy's divergence is symmetric.
      const symmetric = ['cauchy', 'halfCauchy'].includes(family);
      expect(value(kl(p, q)) === value(kl(q, p))).toBe(symmetric);
    });
  });

  it('is registered, under its own name and in products', () => {
    expect(hasClosedKl(family, family)).toBe(true);
    expect(hasClosedKl(`product<${family}>`, `product<${family}>`)).toBe(true);
    expect(hasClosedKl(family, `product<${family}>`)).toBe(false);
  });

  it('from tensor operations agrees, or says that there is no such form', () => {
    tf.tidy(() => {
      const [q, p] = pair();
      if (['beta', 'vonMises', 'asymmetricLaplace', 'continuousBernoulli'].includes(family)) {
        expect(() => composed(() => kl(q, p))).toThrow('it must be evaluated by its kernel');
        return;
      }
      const exact = value(kl(q, p));
      expect(Math.abs(value(composed(() => kl(q, p))) - exact)).toBeLessThan(2e-6 * Math.max(1, exact));
    });
  });

  it.each(['cpu', 'wasm'])('leaves exactly its result alive on %s', async (backend) => {
    await tf.setBackend(backend);
    const [q, p] = pair();
    const before = tf.memory().numTensors;
    const result = kl(q, p);
    const sampled = sampledKl(q, p, stream(1), 3);
    expect(tf.memory().numTensors).toBe(before + 2);
    tf.dispose([result, sampled]);
    await tf.setBackend('cpu');
  });
});

it('every family has a divergence with itself, except those without a closed form', () => {
  const without = ['logistic', 'logLogistic', 'gompertz', 'studentT', 'triangular', 'kumaraswamy'];
  expect([...Object.keys(pairs), ...without].sort()).toEqual(factoriesOf('src/index.ts').sort());
  for (const family of without) expect(hasClosedKl(family, family)).toBe(false);
});

describe('shapes', () => {
  it('the arrays of both sides broadcast, products fold', () => {
    tf.tidy(() => {
      const q = normal({ mean: tf.zeros([5, 3]), sd: [1, 2, 3] });
      expect(kl(q, normal({ mean: 0, sd: 1 })).shape).toEqual([5, 3]);
      expect(kl(normal({ mean: 0, sd: 1 }), q).shape).toEqual([5, 3]);
      const folded = kl(product(q), product(normal({ mean: tf.zeros([3]), sd: 1 })));
      expect(folded.shape).toEqual([5]);
      const apart = kl(q, normal({ mean: 0, sd: 1 }))
        .sum(-1)
        .dataSync();
      folded.dataSync().forEach((v, i) => {
        expect(v).toBeCloseTo(apart[i]!, 5);
      });
      expect(kl(product(q, 2), product(normal({ mean: tf.zeros([5, 3]), sd: 1 }), 2)).shape).toEqual([]);
      expect(
        kl(product(product(q)), product(product(normal({ mean: tf.ones([5, 3]), sd: 1 })))).shape,
      ).toEqual([]);
      const labels = categorical({ logits: tf.zeros([4, 2, 3]) });
      expect(kl(labels, categorical({ logits: [0, 1, 2] })).shape).toEqual([4, 2]);
      expect(kl(product(labels), product(categorical({ logits: tf.zeros([2, 3]) }))).shape).toEqual([4]);
      expect(kl(product(product(labels)), product(product(labels))).shape).toEqual([]);
    });
  });

  it('a multivariate normal meets a product of normals, on either side', () => {
    tf.tidy(() => {
      const joint = multivariateNormal({ mean: tf.fill([4, 2], 0.3), covarianceFactor: skewed });
      const apart = product(normal({ mean: [0.1, -1], sd: [0.5, 2] }));
      const same = multivariateNormal({ mean: [0.1, -1], covarianceFactor: tf.diag(tf.tensor1d([0.5, 2])) });
      for (const [a, b, c, d] of [
        [joint, apart, joint, same],
        [apart, joint, same, joint],
      ] as [Distribution, Distribution, Distribution, Distribution][]) {
        const got = kl(a, b);
        expect(got.shape).toEqual([4]);
        const wanted = kl(c, d).dataSync();
        got.dataSync().forEach((v, i) => {
          expect(v).toBeCloseTo(wanted[i]!, 5);
        });
        expect(kl(product(wide(a)), product(wide(b))).shape).toEqual([]);
      }
    });

    function wide(d: Distribution): Distribution {
      if (d.arrayShape.length > 0) return d;
      return product(normal({ mean: tf.tile(tf.tensor2d([[0.1, -1]]), [4, 1]), sd: [0.5, 2] }));
    }
  });

  it('gradients reach both sides, and only what is not detached', () => {
    tf.tidy(() => {
      const both = (q: tf.Tensor, p: tf.Tensor): tf.Tensor =>
        kl(normal({ mean: q, sd: 1 }), normal({ mean: p, sd: 1 })).sum();
      const [inQ, inP] = tf.grads(both)([tf.tensor1d([1, 2]), tf.scalar(0)]);
      expect(Array.from(inQ!.dataSync())).toEqual([1, 2]);
      expect(inP!.dataSync()[0]).toBe(-3);
      const cut = (p: tf.Tensor): tf.Tensor =>
        kl(normal({ mean: [1], sd: 1 }), normal({ mean: p, sd: 1 }).detached()).sum();
      expect(() => tf.grad(cut)(tf.scalar(0))).toThrow('Cannot compute gradient');
      const labels = (q: tf.Tensor): tf.Tensor =>
        kl(categorical({ logits: q }).detached(), categorical({ logits: [0, 1] }));
      expect(() => tf.grad(labels)(tf.tensor1d([0, 1]))).toThrow('Cannot compute gradient');
      const joint = (m: tf.Tensor): tf.Tensor =>
        kl(
          multivariateNormal({ mean: m, covarianceFactor: skewed }).detached(),
          multivariateNormal({ mean: [0, 0], covarianceFactor: skewed }),
        );
      expect(() => tf.grad(joint)(tf.tensor1d([0, 1]))).toThrow('Cannot compute gradient');
    });
  });

  it('a second derivative through a kernel throws, and composed cures it', () => {
    tf.tidy(() => {
      const second = (wrap: (compute: () => tf.Tensor) => tf.Tensor): tf.Tensor =>
        tf.grad((m) =>
          tf
            .grad((v) => wrap(() => kl(normal({ mean: v, sd: 1 }), normal({ mean: 0, sd: 2 }))).sum())(m)
            .sum(),
        )(tf.scalar(1));
      expect(() => second((compute) => compute())).toThrow(
        'kl: a kernel must be differentiated once only; got a second derivative; wrap the computation in composed(() => …)',
      );
      expect(value(second(composed))).toBeCloseTo(0.25, 6);
    });
  });
});

describe('closed and sampled divergences refuse', () => {
  const wrongKl = kl as unknown as (q: unknown, p?: unknown) => unknown;
  const wrongSampled = sampledKl as unknown as (...given: unknown[]) => unknown;
  const d = normal({ mean: [0, 1], sd: 1 });

  it('what is no distribution', () => {
    expect(() => wrongKl(1, d)).toThrow(
      new ParameterError('kl: q must be a distribution; got 1; pass for example normal({ mean, sd })'),
    );
    expect(() => wrongKl(d)).toThrow(
      new ParameterError(
        'kl: p must be a distribution; got undefined; pass for example normal({ mean, sd })',
      ),
    );
    expect(() => wrongSampled(undefined, d, stream(1))).toThrow(
      new ParameterError(
        'sampledKl: q must be a distribution; got undefined; pass for example normal({ mean, sd })',
      ),
    );
    expect(() => wrongSampled(d, {}, stream(1))).toThrow(
      new ParameterError(
        'sampledKl: p must be a distribution; got an object with keys (none); pass for example normal({ mean, sd })',
      ),
    );
  });

  it('a pair without a closed form', () => {
    expect(() => kl(d, laplace({ location: 0, scale: 1 }))).toThrow(
      new DivergenceError(
        "kl: the pair must have a closed form; got (normal, laplace); use sampledKl(q, p, stream), or registerKl('normal', 'laplace', …)",
      ),
    );
    const logistics = () => kl(logistic({ location: 0, scale: 1 }), logistic({ location: 0, scale: 1 }));
    expect(logistics).toThrow(DivergenceError);
  });

  it('points of unlike shapes', () => {
    expect(() => kl(product(d), d)).toThrow(
      new ShapeError(
        'kl: q and p must have points of one shape; got [2] for product<normal> and [] for normal; fold the same axes with product(d, axes)',
      ),
    );
    expect(() => sampledKl(product(d), product(normal({ mean: [0, 1, 2], sd: 1 })), stream(1))).toThrow(
      new ShapeError(
        'sampledKl: q and p must have points of one shape; got [2] for product<normal> and [3] for product<normal>; fold the same axes with product(d, axes)',
      ),
    );
    const deep = normal({ mean: [[0]], sd: 1 });
    expect(() => kl(product(deep), product(deep, 2))).toThrow('kl: q and p must have points of one shape');
  });

  it('arrays that do not broadcast', () => {
    expect(() => kl(d, normal({ mean: [0, 1, 2], sd: 1 }))).toThrow(
      new ShapeError(
        'kl: the arrayShapes of q and p must broadcast from the right; got [2] and [3]; make the sizes of each axis equal, or 1',
      ),
    );
    expect(() =>
      kl(
        categorical({
          logits: [
            [0, 1],
            [0, 1],
          ],
        }),
        categorical({
          logits: [
            [0, 1],
            [0, 1],
            [1, 1],
          ],
        }),
      ),
    ).toThrow('kl: the arrayShapes of q and p must broadcast from the right; got [2] and [3]');
  });

  it('unlike numbers of categories', () => {
    expect(() => kl(categorical({ logits: [0, 1] }), categorical({ logits: [0, 1, 2] }))).toThrow(
      new ShapeError(
        'kl: both categorical distributions must have equally many categories; got 2 and 3; pad the logits',
      ),
    );
  });

  it('a wrong stream or number of draws', () => {
    expect(() => wrongSampled(d, d)).toThrow(
      new StreamError(
        'sampledKl: stream must be a Stream; got a value of type undefined; pass stream(seed) or a fork of one',
      ),
    );
    for (const draws of [0, 1.5, -1, Number.NaN]) {
      expect(() => sampledKl(d, d, stream(1), draws)).toThrow(
        new ParameterError(
          `sampledKl: draws must be a whole number of at least 1; got ${draws}; pass for example 1`,
        ),
      );
    }
  });
});

describe('registered divergences', () => {
  // A family of one's own: everything that kl asks of a distribution.
  const mine = (mean: number): Distribution =>
    ({ ...normal({ mean, sd: 1 }), family: 'mineForKl' }) as Distribution;
  const register = registerKl as unknown as (q: unknown, p: unknown, formula: unknown) => void;

  it('are used by kl, also inside products', () => {
    expect(hasClosedKl('mineForKl', 'normal')).toBe(false);
    expect(() => kl(mine(0), normal({ mean: 0, sd: 1 }))).toThrow(DivergenceError);
    registerKl('mineForKl', 'normal', (q) => tf.tidy(() => tf.add(tf.zeros([...q.arrayShape]), 0.75)));
    expect(hasClosedKl('mineForKl', 'normal')).toBe(true);
    expect(hasClosedKl('product<mineForKl>', 'product<normal>')).toBe(true);
    expect(hasClosedKl('normal', 'mineForKl')).toBe(false);
    tf.tidy(() => {
      expect(value(kl(mine(0), normal({ mean: 0, sd: 1 })))).toBe(0.75);
      const wide = { ...normal({ mean: tf.zeros([3]), sd: 1 }), family: 'mineForKl' } as Distribution;
      expect(value(kl(product(wide), product(normal({ mean: tf.zeros([3]), sd: 1 }))))).toBe(2.25);
    });
  });

  it('are not registered twice, and never in place of the own ones', () => {
    expect(() => registerKl('normal', 'normal', () => tf.scalar(0))).toThrow(
      new DivergenceError(
        'registerKl: the pair must be new; got (normal, normal), which is registered; give your family a name of its own',
      ),
    );
    registerKl('mineTwice', 'mineTwice', () => tf.scalar(1));
    expect(() => registerKl('mineTwice', 'mineTwice', () => tf.scalar(2))).toThrow(DivergenceError);
  });

  it.each([
    ['', 'normal', "the string '' and the string 'normal'"],
    [1, 'normal', "1 and the string 'normal'"],
    ['normal', undefined, "the string 'normal' and undefined"],
  ])('need names: %s, %s', (q, p, got) => {
    const text = (where: string): string =>
      `${where}: q and p must be family names; got ${got}; pass for example 'normal', 'laplace'`;
    expect(() => register(q, p, () => tf.scalar(0))).toThrow(new ParameterError(text('registerKl')));
    expect(() => (hasClosedKl as (a: unknown, b: unknown) => boolean)(q, p)).toThrow(
      new ParameterError(text('hasClosedKl')),
    );
  });

  it('need a function', () => {
    expect(() => register('mineToo', 'normal', 1)).toThrow(
      new ParameterError('registerKl: formula must be a function; got 1; pass (q, p) => …'),
    );
  });
});
