import * as fc from 'fast-check';
import { type TriangularOptions, triangular } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { finiteDomain, real, scale, within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: triangular as (options: TriangularOptions) => ReturnType<typeof triangular>,
  parametrizations: [{ lower: -1, peak: 0.7, upper: 2.5 }],
  arbitraries: [
    fc
      .tuple(real, scale, within(0.15, 0.85))
      .map(([lower, width, t]) => ({ lower, peak: lower + t * width, upper: lower + width })),
  ],
  invalid: [
    { lower: 1, peak: 1, upper: 1 },
    { lower: 2, peak: 1.5, upper: 1 },
    { lower: 0, peak: 2, upper: 1 },
    { lower: 0, peak: -0.5, upper: 1 },
    { lower: Number.NEGATIVE_INFINITY, peak: 0, upper: 1 },
    { lower: 0, upper: 1 },
  ],
  divergence: false,
  members: { lower: [0, -1.5, 20], peak: [0.3, -1.5, 27], upper: [1, -1, 27] },
  seed: 8151,
  cdf: formulas.triangularCdf.value,
  survival: formulas.triangularSurvival.value,
  quantile: formulas.triangularQuantile.value,
  extremes: [
    { lower: 0, peak: 2 ** -140, upper: 1 },
    { lower: -3e38, peak: 0, upper: 3e38 },
    { lower: 0, peak: 2 ** -126, upper: 2 ** -126 },
    { lower: 0, peak: 0, upper: 1e-30 },
  ],
  roundings: 16,
  resting: { lower: -3.4028234663852886e38, peak: 0, upper: 3.4028234663852886e38 },
  domains: { peak: finiteDomain },
};
