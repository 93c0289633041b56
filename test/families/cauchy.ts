import * as fc from 'fast-check';
import { type CauchyOptions, cauchy } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, real, scale } from './parameters.js';

export const entry: FamilyEntry = {
  factory: cauchy as (options: CauchyOptions) => ReturnType<typeof cauchy>,
  parametrizations: [
    { location: 0.5, scale: 0.7 },
    { location: 0.5, logScale: -0.3 },
  ],
  arbitraries: [fc.record({ location: real, scale }), fc.record({ location: real, logScale: logarithm })],
  invalid: [{ location: 0, scale: 0 }, { location: Number.NaN, scale: 1 }, { location: 0 }],
  divergence: true,
  members: { location: [0, -1.5, 2], scale: [1, 0.3, 0.8] },
  seed: 8124,
  cdf: formulas.cauchyCdf.value,
  survival: formulas.cauchySurvival.value,
  quantile: formulas.cauchyQuantile.value,
  extremes: [
    { location: 0, scale: 1e-20 },
    { location: 3, scale: 1e30 },
  ],
  heavyTailed: true,
  roundings: 16,
  resting: { location: 0, scale: 1 },
};
