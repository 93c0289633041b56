import { type LogLogisticOptions, logLogistic } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { logarithm, scale, scaleAndShape, within } from './parameters.js';

const shape = within(4.5, 12);
const logShape = within(1.5, 2.48);

export const entry: FamilyEntry = {
  factory: logLogistic as (options: LogLogisticOptions) => ReturnType<typeof logLogistic>,
  ...scaleAndShape(0.7, { scale, logScale: logarithm }, { shape, logShape }),
  divergence: false,
  members: { scale: [1, 0.3, 8], shape: [1.5, 0.7, 12] },
  seed: 8126,
  cdf: formulas.logLogisticCdf.value,
  survival: formulas.logLogisticSurvival.value,
  quantile: formulas.logLogisticQuantile.value,
  extremes: [
    { scale: 1, shape: 0.1 },
    { scale: 1e-20, shape: 2 },
    { scale: 1e20, shape: 1000 },
    { scale: 3, shape: 1e6 },
  ],
  heavyTailed: true,
  roundings: 16,
};
