import { type WeibullOptions, weibull } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale, scaleAndShape, within } from './parameters.js';

const shape = within(0.6, 5);
const logShape = within(-0.51, 1.61);

export const entry: FamilyEntry = {
  factory: weibull as (options: WeibullOptions) => ReturnType<typeof weibull>,
  ...scaleAndShape(0.7, { scale, logScale: logarithm }, { shape, logShape }),
  divergence: true,
  members: { scale: [1, 0.3, 8], shape: [1.5, 0.7, 12] },
  seed: 8120,
  cdf: formulas.weibullCdf.value,
  survival: formulas.weibullSurvival.value,
  quantile: formulas.weibullQuantile.value,
  extremes: [
    { scale: 1, shape: 0.05 },
    { scale: 1e-20, shape: 2 },
    { scale: 1e20, shape: 1000 },
    { scale: 3, shape: 1e6 },
  ],
  roundings: 16,
};
