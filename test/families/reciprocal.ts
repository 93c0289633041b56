import * as fc from 'fast-check';
import { type ReciprocalOptions, reciprocal } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { positiveDomain, within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: reciprocal as (options: ReciprocalOptions) => ReturnType<typeof reciprocal>,
  parametrizations: [{ lower: 0.2, upper: 3 }],
  arbitraries: [
    fc.tuple(within(0.1, 3), within(0.2, 3)).map(([lower, h]) => ({ lower, upper: lower * Math.exp(h) })),
  ],
  invalid: [
    { lower: 0, upper: 1 },
    { lower: 2, upper: 1 },
    { lower: 1, upper: 1 },
    { lower: 1, upper: Number.POSITIVE_INFINITY },
    { lower: 1 },
  ],
  divergence: true,
  // The divergence is finite, and has a derivative, only where the other interval holds this one.
  others: fc.record({ lower: within(0.01, 0.09), upper: within(70, 100) }),
  members: { lower: [0.1, 1, 1e-3], upper: [3, 1.5, 1e3] },
  seed: 8150,
  cdf: formulas.reciprocalCdf.value,
  survival: formulas.reciprocalSurvival.value,
  quantile: formulas.reciprocalQuantile.value,
  extremes: [
    { lower: 2 ** -149, upper: 2 ** 127 },
    { lower: 1, upper: 1 + 2 ** -10 },
    { lower: 2 ** -149, upper: 2 ** -100 },
  ],
  roundings: 16,
  resting: { lower: 1, upper: 3.4028234663852886e38 },
  domains: { lower: positiveDomain, upper: positiveDomain },
};
