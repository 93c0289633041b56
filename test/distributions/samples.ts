import type * as tf from '@tensorflow/tfjs';
import * as library from '../../src/index.js';
import { entries, type Parametrization } from '../families/entry.js';

export type { Parametrization };

/** What the tests need to know of a family beyond its formulas. */
export interface Sample {
  readonly make: (options: Record<string, unknown>) => library.Distribution & Record<string, unknown>;
  /** Every parametrization, each with all its parameters. */
  readonly parametrizations: readonly Parametrization[];
  /** Three members in the natural parameters, for draws. */
  readonly members: Readonly<Record<string, readonly number[]>>;
}

type Make = Sample['make'];
const make = (factory: unknown): Make => factory as Make;

const located = (factory: unknown): Sample => ({
  make: make(factory),
  parametrizations: [
    { location: 0.5, scale: 0.7 },
    { location: 0.5, logScale: -0.3 },
  ],
  members: { location: [0, -1.5, 2], scale: [1, 0.3, 0.8] },
});

/** The families of scalars. */
export const scalars: Readonly<Record<string, Sample>> = {
  normal: {
    make: make(library.normal),
    parametrizations: [
      { mean: 0.5, sd: 0.7 },
      { mean: 0.5, logSd: -0.3 },
      { mean: 0.5, variance: 0.5 },
      { mean: 0.5, logVariance: -0.6 },
      { mean: 0.5, precision: 2 },
    ],
    members: { mean: [0, -1.5, 20], sd: [1, 0.3, 7] },
  },
  logNormal: located(library.logNormal),
  laplace: located(library.laplace),
  logistic: located(library.logistic),
  uniform: {
    make: make(library.uniform),
    parametrizations: [{ lower: -1, upper: 2.5 }],
    members: { lower: [0, -1.5, 20], upper: [1, -1, 27] },
  },
  exponential: {
    make: make(library.exponential),
    parametrizations: [{ rate: 2 }, { logRate: 0.6 }, { scale: 0.5 }, { mean: 0.5 }],
    members: { rate: [1, 0.2, 30] },
  },
  bernoulli: {
    make: make(library.bernoulli),
    parametrizations: [{ logit: -0.4 }, { probability: 0.4 }],
    members: { logit: [0, -3, 1.5] },
  },
  poisson: {
    make: make(library.poisson),
    parametrizations: [{ rate: 3 }, { logRate: 1.1 }, { mean: 3 }],
    members: { rate: [0.4, 6, 350] },
  },
  ...Object.fromEntries(
    Object.entries(entries).map(([family, { factory, parametrizations, members }]) => [
      family,
      { make: make(factory), parametrizations, members },
    ]),
  ),
};

/** The families whose parameters are vectors. */
export const vectors: Readonly<Record<string, Omit<Sample, 'members'>>> = {
  categorical: {
    make: make(library.categorical),
    parametrizations: [{ logits: [0.1, -2, 0.7] }, { probabilities: [0.25, 0.5, 0.25] }],
  },
  multivariateNormal: {
    make: make(library.multivariateNormal),
    parametrizations: [
      {
        mean: [0.5, -1],
        covarianceFactor: [
          [1, 0],
          [0.5, 0.7],
        ],
      },
    ],
  },
};

/** Calls a method of a distribution that its type does not promise. */
export function call(d: library.Distribution, method: string, ...given: unknown[]): tf.Tensor {
  return (d as unknown as Record<string, (...values: unknown[]) => tf.Tensor>)[method]!(...given);
}

export const has = (d: library.Distribution, method: string): boolean => method in d;
