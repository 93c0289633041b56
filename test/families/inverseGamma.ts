import * as fc from 'fast-check';
import { type InverseGammaOptions, inverseGamma } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale, within } from './parameters.js';

// With a variance, and a fourth moment for its standard error.
const shape = within(5, 20);

export const entry: FamilyEntry = {
  factory: inverseGamma as (options: InverseGammaOptions) => ReturnType<typeof inverseGamma>,
  parametrizations: [
    { shape: 3.5, scale: 2 },
    { shape: 3.5, logScale: 0.7 },
    { logShape: 1.2, scale: 2 },
  ],
  arbitraries: [
    fc.record({ shape, scale }),
    fc.record({ shape, logScale: logarithm }),
    fc.record({ logShape: within(1.7, 3), scale }),
  ],
  invalid: [
    { shape: 0, scale: 1 },
    { shape: 1, scale: -1 },
    { shape: 1 },
    { shape: 1, scale: 1, logScale: 0 },
  ],
  divergence: true,
  members: { shape: [1.5, 0.4, 20], scale: [1, 0.3, 8] },
  seed: 8181,
  cdf: formulas.inverseGammaCdf.value,
  survival: formulas.inverseGammaSurvival.value,
  quantile: formulas.inverseGammaQuantile.value,
  extremes: [
    { shape: 1e-3, scale: 1 },
    { shape: 0.1, scale: 1e-20 },
    { shape: 1, scale: 1e20 },
    { shape: 30, scale: 1 },
    { shape: 1e6, scale: 1 },
  ],
  heavyTailed: true,
  roundings: 32,
  kernelOnly: ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile'],
  resting: { shape: 1, scale: 1 },
};
