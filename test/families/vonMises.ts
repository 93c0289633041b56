import * as fc from 'fast-check';
import { type VonMisesOptions, vonMises } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { within } from './parameters.js';

// Away from the cut at ±π: what is measured there along the line is not what is measured along the circle.
const location = within(-0.5, 0.5);

export const entry: FamilyEntry = {
  factory: vonMises as (options: VonMisesOptions) => ReturnType<typeof vonMises>,
  parametrizations: [
    { location: 0.3, concentration: 25 },
    { location: 0.3, logConcentration: 3.2 },
  ],
  arbitraries: [
    fc.record({ location, concentration: within(20, 60) }),
    fc.record({ location, logConcentration: within(3, 4) }),
  ],
  invalid: [
    { location: 0, concentration: 0 },
    { location: 0, concentration: -1 },
    { location: Number.NaN, concentration: 1 },
    { location: 0, logConcentration: 90 },
    { location: 0 },
  ],
  divergence: true,
  members: { location: [0, 0.3, -0.4], concentration: [0.5, 30, 200] },
  seed: 8212,
  cdf: formulas.vonMisesCdf.value,
  survival: formulas.vonMisesSurvival.value,
  quantile: formulas.vonMisesQuantile.value,
  extremes: [
    { location: 0, concentration: 1e-6 },
    { location: 0, concentration: 1 },
    { location: 0, concentration: 30 },
    { location: 0, concentration: 1e4 },
    { location: 0, concentration: 1e8 },
  ],
  roundings: 24,
  kernelOnly: [
    'logDensity',
    'variance',
    'entropy',
    'kl',
    'cdf',
    'survival',
    'logCdf',
    'logSurvival',
    'quantile',
    'upperQuantile',
  ],
  resting: { location: 0, concentration: 1 },
};
