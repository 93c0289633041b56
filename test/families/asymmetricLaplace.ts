import * as fc from 'fast-check';
import { type AsymmetricLaplaceOptions, asymmetricLaplace } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, positiveDomain, real, scale, within } from './parameters.js';

const asymmetry = within(0.4, 2.5);
export const entry: FamilyEntry = {
  factory: asymmetricLaplace as (options: AsymmetricLaplaceOptions) => ReturnType<typeof asymmetricLaplace>,
  parametrizations: [
    { location: 0.3, scale: 0.7, asymmetry: 1.5 },
    { location: 0.3, logScale: -0.3, asymmetry: 1.5 },
  ],
  arbitraries: [
    fc.record({ location: real, scale, asymmetry }),
    fc.record({ location: real, logScale: logarithm, asymmetry }),
  ],
  invalid: [
    { location: 0, scale: 0, asymmetry: 1 },
    { location: 0, scale: 1, asymmetry: 0 },
    { location: Number.NaN, scale: 1, asymmetry: 1 },
    { location: 0, scale: 1 },
  ],
  divergence: true,
  members: { location: [0, -1.5, 2], scale: [1, 0.3, 0.8], asymmetry: [0.5, 1, 2] },
  seed: 8154,
  cdf: formulas.asymmetricLaplaceCdf.value,
  survival: formulas.asymmetricLaplaceSurvival.value,
  quantile: formulas.asymmetricLaplaceQuantile.value,
  extremes: [
    { location: 0, scale: 1e-20, asymmetry: 1 },
    { location: 3, scale: 1e30, asymmetry: 0.01 },
    { location: 0, scale: 1, asymmetry: 1e-6 },
    { location: 0, scale: 1, asymmetry: 1e6 },
  ],
  roundings: 24,
  resting: { location: 0, scale: 1 },
  kernelOnly: ['kl'],
  domains: { asymmetry: positiveDomain },
};
