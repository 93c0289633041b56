import * as fc from 'fast-check';
import { type GammaOptions, gamma } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale, within } from './parameters.js';

// Not so small that draws differ by more than the steps of difference quotients.
const shape = within(0.8, 12);

export const entry: FamilyEntry = {
  factory: gamma as (options: GammaOptions) => ReturnType<typeof gamma>,
  parametrizations: [
    { shape: 2.5, scale: 0.7 },
    { shape: 2.5, rate: 1.5 },
    { shape: 2.5, logScale: -0.3 },
    { shape: 2.5, logRate: 0.4 },
    { logShape: 0.9, scale: 0.7 },
    { mean: 1.7, dispersion: 0.4 },
  ],
  arbitraries: [
    fc.record({ shape, scale }),
    fc.record({ shape, rate: scale }),
    fc.record({ logShape: within(-0.2, 2), logRate: logarithm }),
    fc.record({ mean: scale, dispersion: within(0.1, 1.2) }),
  ],
  invalid: [
    { shape: 0, scale: 1 },
    { shape: 1, rate: -1 },
    { shape: 1 },
    { shape: 1, scale: 1, mean: 1 },
    { mean: 1, dispersion: 0 },
    { mean: 1 },
  ],
  divergence: true,
  members: { shape: [1.5, 0.4, 20], scale: [1, 0.3, 0.8] },
  seed: 8180,
  cdf: formulas.gammaCdf.value,
  survival: formulas.gammaSurvival.value,
  quantile: formulas.gammaQuantile.value,
  extremes: [
    { shape: 1e-3, scale: 1 },
    { shape: 0.01, scale: 1 },
    { shape: 0.1, scale: 1e20 },
    { shape: 1, scale: 1e-20 },
    { shape: 30, scale: 1 },
    { shape: 1e6, scale: 1 },
    { shape: 3e7, scale: 1e-3 },
  ],
  roundings: 32,
  kernelOnly: ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile'],
  resting: { shape: 1, scale: 1 },
};
