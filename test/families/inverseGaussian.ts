import * as fc from 'fast-check';
import { type InverseGaussianOptions, inverseGaussian } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: inverseGaussian as (options: InverseGaussianOptions) => ReturnType<typeof inverseGaussian>,
  parametrizations: [
    { mean: 0.8, shape: 1.5 },
    { logMean: -0.2, shape: 1.5 },
    { mean: 0.8, logShape: 0.4 },
    { logMean: -0.2, logShape: 0.4 },
  ],
  arbitraries: [
    fc.record({ mean: within(0.3, 4), shape: within(1, 9) }),
    fc.record({ logMean: within(-1, 1), shape: within(1, 9) }),
    fc.record({ mean: within(0.3, 4), logShape: within(0, 2) }),
    fc.record({ logMean: within(-1, 1), logShape: within(0, 2) }),
  ],
  invalid: [{ mean: 0, shape: 1 }, { mean: 1, shape: -1 }, { mean: 1, shape: Number.NaN }, { shape: 1 }],
  divergence: true,
  members: { mean: [0.8, 2, 0.3], shape: [1.5, 0.5, 6] },
  seed: 8210,
  cdf: formulas.inverseGaussianCdf.value,
  survival: formulas.inverseGaussianSurvival.value,
  quantile: formulas.inverseGaussianQuantile.value,
  extremes: [
    { mean: 1, shape: 1e-3 },
    { mean: 1e3, shape: 1 },
    { mean: 1e-3, shape: 1e3 },
    { mean: 1, shape: 1e6 },
    { mean: 1e6, shape: 1 },
    { mean: 1e-20, shape: 1e-20 },
  ],
  roundings: 16,
  resting: { mean: 1, shape: 1 },
  kernelOnly: ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile', 'entropy'],
};
