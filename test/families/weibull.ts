import * as fc from 'fast-check';
import { type WeibullOptions, weibull } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale, within } from './parameters.js';

const shape = within(0.6, 5);
const logShape = within(-0.51, 1.61);

export const entry: FamilyEntry = {
  factory: weibull as (options: WeibullOptions) => ReturnType<typeof weibull>,
  parametrizations: [
    { scale: 0.7, shape: 2.5 },
    { logScale: -1, shape: 2.5 },
    { scale: 0.7, logShape: 1.1 },
    { logScale: -1, logShape: 1.1 },
  ],
  arbitraries: [
    fc.record({ scale, shape }),
    fc.record({ logScale: logarithm, shape }),
    fc.record({ scale, logShape }),
    fc.record({ logScale: logarithm, logShape }),
  ],
  invalid: [
    { scale: 1, shape: 0 },
    { scale: -1, shape: 2 },
    { scale: 1 },
    { scale: 1, shape: Number.NaN },
    { scale: 1, shape: 1, logShape: 0 },
  ],
  divergence: true,
  members: { scale: [1, 0.3, 8], shape: [1.5, 0.7, 12] },
  seed: 8120,
  cdf: formulas.weibullCdf.value,
  survival: formulas.weibullSurvival.value,
  quantile: formulas.weibullQuantile.value,
  extremes: [
    { scale: 1, shape: 0.05 },
    { scale: 1e-20, shape: 2 },
    { scale: 1e20, shape: 1000 },
    { scale: 3, shape: 1e6 },
  ],
  roundings: 16,
};
