import * as fc from 'fast-check';
import { type ChiSquaredOptions, chiSquared } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: chiSquared as (options: ChiSquaredOptions) => ReturnType<typeof chiSquared>,
  parametrizations: [{ degreesOfFreedom: 3.5 }],
  arbitraries: [fc.record({ degreesOfFreedom: within(1.6, 20) })],
  invalid: [{ degreesOfFreedom: 0 }, { degreesOfFreedom: Number.NaN }, {}],
  divergence: true,
  members: { degreesOfFreedom: [1, 3, 40] },
  seed: 8182,
  cdf: (x, k) => formulas.gammaCdf.value(x!, k! / 2, 2),
  survival: (x, k) => formulas.gammaSurvival.value(x!, k! / 2, 2),
  quantile: (p, k) => formulas.gammaQuantile.value(p!, k! / 2, 2),
  extremes: [{ degreesOfFreedom: 2e-3 }, { degreesOfFreedom: 1 }, { degreesOfFreedom: 1e6 }],
  fixed: { scale: 2 },
  roundings: 32,
  kernelOnly: ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile'],
};
