import * as fc from 'fast-check';
import { type LogitNormalOptions, logitNormal } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { within } from './parameters.js';

const location = within(-2, 2);

export const entry: FamilyEntry = {
  factory: logitNormal as (options: LogitNormalOptions) => ReturnType<typeof logitNormal>,
  parametrizations: [
    { location: 0.5, scale: 0.7 },
    { location: 0.5, logScale: -0.3 },
  ],
  arbitraries: [
    fc.record({ location, scale: within(0.1, 3) }),
    fc.record({ location, logScale: within(-2, 1) }),
  ],
  invalid: [{ location: 0, scale: 0 }, { location: Number.NaN, scale: 1 }, { location: 0 }],
  divergence: true,
  members: { location: [0, -1.5, 2], scale: [1, 0.3, 3] },
  seed: 8153,
  cdf: formulas.logitNormalCdf.value,
  survival: formulas.logitNormalSurvival.value,
  quantile: formulas.logitNormalQuantile.value,
  extremes: [
    { location: 0, scale: 30 },
    { location: -80, scale: 4 },
    { location: 10, scale: 2 },
  ],
  roundings: 24,
};
