import * as fc from 'fast-check';
import { type GumbelOptions, gumbel } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, real, scale, within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: gumbel as (options: GumbelOptions) => ReturnType<typeof gumbel>,
  parametrizations: [
    { location: 0.5, scale: 0.7 },
    { location: 0.5, logScale: -0.3 },
  ],
  arbitraries: [fc.record({ location: real, scale }), fc.record({ location: real, logScale: logarithm })],
  invalid: [{ location: 0, scale: 0 }, { location: Number.NaN, scale: 1 }, { location: 0 }],
  divergence: true,
  // A narrower one makes the log ratio's tail too heavy to be sampled.
  others: fc.record({ location: within(-2, 2), scale: within(5, 9) }),
  members: { location: [0, -1.5, 2], scale: [1, 0.3, 0.8] },
  seed: 8111,
  cdf: formulas.gumbelCdf.value,
  survival: formulas.gumbelSurvival.value,
  quantile: formulas.gumbelQuantile.value,
  extremes: [
    { location: 0, scale: 1e-20 },
    { location: 3, scale: 1e30 },
  ],
  roundings: 16,
  resting: { location: 0, scale: 1 },
};
