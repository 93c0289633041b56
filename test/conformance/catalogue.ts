import * as fc from 'fast-check';
import * as library from '../../src/index.js';
import { entries } from '../families/entry.js';

/** A family's parametrizations, and options that it must refuse. */
interface Entry {
  readonly factory: (options: never) => library.Distribution;
  readonly parametrizations: readonly fc.Arbitrary<object>[];
  readonly invalid: readonly object[];
  /** Its divergence from another member of its family has a closed form. */
  readonly divergence: boolean;
  /** The other members, where not just any will do. */
  readonly others?: fc.Arbitrary<object>;
}

const within = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const real = within(-5, 5);
const scale = within(0.1, 6);
const log = within(-2, 2);
const vector = (length: number, of: fc.Arbitrary<number>) =>
  fc.array(of, { minLength: length, maxLength: length });

function entry<Options extends object>(
  factory: (options: Options) => library.Distribution,
  parametrizations: readonly fc.Arbitrary<Options>[],
  invalid: readonly object[],
  divergence = true,
): Entry {
  return { factory, parametrizations, invalid, divergence } as unknown as Entry;
}

const probabilities = vector(4, within(0.05, 1)).map((weights) => {
  const total = weights.reduce((a, b) => a + b, 0);
  return weights.map((w) => w / total);
});

/** Every scalar family of the library. */
export const catalogue: Readonly<Record<string, Entry>> = {
  normal: entry<library.NormalOptions>(
    library.normal,
    [
      fc.record({ mean: real, sd: scale }),
      fc.record({ mean: real, logSd: log }),
      fc.record({ mean: real, variance: scale }),
      fc.record({ mean: real, logVariance: log }),
      fc.record({ mean: real, precision: scale }),
    ],
    [
      { mean: 0, sd: 0 },
      { mean: 0, sd: -1 },
      { mean: Number.NaN, sd: 1 },
      { mean: 0 },
      { mean: 0, sd: 1, variance: 1 },
    ],
  ),
  logNormal: entry<library.LogNormalOptions>(
    library.logNormal,
    // Beyond a scale of 1 the variance lies so far out that it has nothing to do with what is drawn.
    [
      fc.record({ location: within(-3, 3), scale: within(0.1, 1) }),
      fc.record({ location: within(-3, 3), logScale: within(-2, 0) }),
    ],
    [{ location: 0, scale: 0 }, { location: Number.POSITIVE_INFINITY, scale: 1 }, { scale: 1 }],
  ),
  laplace: entry<library.LaplaceOptions>(
    library.laplace,
    [fc.record({ location: real, scale }), fc.record({ location: real, logScale: log })],
    [{ location: 0, scale: -1 }, { location: 0, scale: Number.NaN }, {}],
  ),
  logistic: entry<library.LogisticOptions>(
    library.logistic,
    [fc.record({ location: real, scale }), fc.record({ location: real, logScale: log })],
    [
      { location: 0, scale: 0 },
      { location: 'zero', scale: 1 },
    ],
    false,
  ),
  uniform: {
    ...entry<library.UniformOptions>(
      library.uniform,
      [fc.tuple(real, scale).map(([lower, width]) => ({ lower, upper: lower + width }))],
      [
        { lower: 1, upper: 1 },
        { lower: 2, upper: 1 },
        { lower: Number.NEGATIVE_INFINITY, upper: 1 },
      ],
    ),
    // The divergence is finite, and has a derivative, only where the other interval holds this one.
    others: fc.record({ lower: within(-9, -5.5), upper: within(11.5, 15) }),
  },
  exponential: entry<library.ExponentialOptions>(
    library.exponential,
    [fc.record({ rate: scale }), fc.record({ logRate: log }), fc.record({ mean: scale })],
    [{ rate: 0 }, { rate: -1 }, { rate: 1, mean: 1 }],
  ),
  bernoulli: entry<library.BernoulliOptions>(
    library.bernoulli,
    [fc.record({ logit: real }), fc.record({ probability: within(0.02, 0.98) })],
    [{ probability: 1 }, { probability: -0.5 }, { logit: Number.NaN }, {}],
  ),
  poisson: entry<library.PoissonOptions>(
    library.poisson,
    [fc.record({ rate: within(0.1, 40) }), fc.record({ logRate: log }), fc.record({ mean: within(0.1, 40) })],
    [{ rate: 0 }, { rate: Number.POSITIVE_INFINITY }, { rate: 1, logRate: 0 }],
  ),
  categorical: entry<library.CategoricalOptions>(
    library.categorical,
    [fc.record({ logits: vector(4, real) }), fc.record({ probabilities })],
    [{ probabilities: [0.5, 0.4] }, { logits: [] }, { logits: [0, Number.NaN] }, { logits: 1 }],
  ),
  ...Object.fromEntries(
    Object.entries(entries).map(([family, { factory, arbitraries, invalid, divergence, others }]) => [
      family,
      { factory, parametrizations: arbitraries, invalid, divergence, ...(others ? { others } : {}) },
    ]),
  ),
};

/** Families of vectors: what is scalar in the laws does not apply to them. */
export const vectors: Readonly<Record<string, Entry>> = {
  multivariateNormal: entry<library.MultivariateNormalOptions>(
    library.multivariateNormal,
    [
      fc.tuple(vector(2, real), within(0.5, 2), within(0.5, 2), within(-0.4, 0.4)).map(([mean, a, b, c]) => ({
        mean,
        covarianceFactor: [
          [a, 0],
          [c, b],
        ],
      })),
    ],
    [],
    false,
  ),
};
