import * as fc from 'fast-check';
import { type GompertzOptions, gompertz } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale, within } from './parameters.js';

const shape = within(0.05, 5);
const logShape = within(-3.0, 1.61);

export const entry: FamilyEntry = {
  factory: gompertz as (options: GompertzOptions) => ReturnType<typeof gompertz>,
  parametrizations: [
    { shape: 0.7, rate: 1.5 },
    { logShape: -1, rate: 1.5 },
    { shape: 0.7, logRate: 1.1 },
    { logShape: -1, logRate: 1.1 },
  ],
  arbitraries: [
    fc.record({ shape, rate: scale }),
    fc.record({ logShape, rate: scale }),
    fc.record({ shape, logRate: logarithm }),
    fc.record({ logShape, logRate: logarithm }),
  ],
  invalid: [
    { shape: 1, rate: 0 },
    { shape: -1, rate: 2 },
    { shape: 1 },
    { shape: 1, rate: Number.NaN },
    { shape: 1, rate: 1, logRate: 0 },
  ],
  divergence: false,
  members: { shape: [1.5, 0.02, 12], rate: [1, 0.3, 8] },
  seed: 8127,
  cdf: formulas.gompertzCdf.value,
  survival: formulas.gompertzSurvival.value,
  quantile: formulas.gompertzQuantile.value,
  extremes: [
    { shape: 1e-6, rate: 1 },
    { shape: 1e6, rate: 1 },
    { shape: 1, rate: 1e-20 },
    { shape: 0.01, rate: 1e20 },
  ],
  roundings: 16,
};
