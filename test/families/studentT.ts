import * as fc from 'fast-check';
import { type StudentTOptions, studentT } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, real, scale, within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: studentT as (options: StudentTOptions) => ReturnType<typeof studentT>,
  parametrizations: [
    { location: 0.5, scale: 0.7, degreesOfFreedom: 4 },
    { location: 0.5, logScale: -0.3, degreesOfFreedom: 4 },
    { location: 0.5, scale: 0.7, logDegreesOfFreedom: 1.5 },
    { location: 0.5, logScale: -0.3, logDegreesOfFreedom: 1.5 },
  ],
  // With fewer degrees of freedom the variance lies too far out to be found by quadrature.
  arbitraries: [
    fc.record({ location: real, scale, degreesOfFreedom: within(8, 60) }),
    fc.record({ location: real, logScale: logarithm, degreesOfFreedom: within(8, 60) }),
    fc.record({ location: real, scale, logDegreesOfFreedom: within(2.1, 4) }),
    fc.record({ location: real, logScale: logarithm, logDegreesOfFreedom: within(2.1, 4) }),
  ],
  invalid: [
    { location: 0, scale: 0, degreesOfFreedom: 3 },
    { location: 0, scale: 1, degreesOfFreedom: -1 },
    { location: 0, scale: 1, logDegreesOfFreedom: 90 },
    { location: 0, scale: 1 },
  ],
  divergence: false,
  members: { location: [0, -1.5, 2], scale: [1, 0.3, 0.8], degreesOfFreedom: [1, 3, 40] },
  seed: 8211,
  cdf: formulas.studentTCdf.value,
  survival: formulas.studentTSurvival.value,
  quantile: formulas.studentTQuantile.value,
  extremes: [
    { location: 0, scale: 1, degreesOfFreedom: 0.05 },
    { location: 0, scale: 1, degreesOfFreedom: 0.3 },
    { location: 0, scale: 1e-20, degreesOfFreedom: 2 },
    { location: 0, scale: 1, degreesOfFreedom: 100 },
    { location: 0, scale: 1, degreesOfFreedom: 1e6 },
  ],
  roundings: 24,
  kernelOnly: ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile'],
  resting: { location: 0, scale: 1, degreesOfFreedom: 5 },
};
