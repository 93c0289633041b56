import * as fc from 'fast-check';
import { type HalfCauchyOptions, halfCauchy } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale } from './parameters.js';

export const entry: FamilyEntry = {
  factory: halfCauchy as (options: HalfCauchyOptions) => ReturnType<typeof halfCauchy>,
  parametrizations: [{ scale: 0.7 }, { logScale: -0.3 }],
  arbitraries: [fc.record({ scale }), fc.record({ logScale: logarithm })],
  invalid: [{ scale: 0 }, { scale: -1 }, { scale: Number.NaN }, {}, { scale: 1, logScale: 0 }],
  divergence: true,
  members: { scale: [1, 0.3, 8] },
  seed: 8123,
  cdf: formulas.halfCauchyCdf.value,
  survival: formulas.halfCauchySurvival.value,
  quantile: formulas.halfCauchyQuantile.value,
  extremes: [{ scale: 1e-20 }, { scale: 1e30 }],
  heavyTailed: true,
  roundings: 16,
  resting: { scale: 1 },
};
