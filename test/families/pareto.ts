import * as fc from 'fast-check';
import { type ParetoOptions, pareto } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { scaleAndShape, within } from './parameters.js';

// The density's differences are taken over steps of the spread: a heavier tail would make them too wide.
const shape = within(12, 30);
const logShape = within(2.5, 3.4);
const scale = within(0.5, 2);
const logScale = within(-0.7, 0.7);

export const entry: FamilyEntry = {
  factory: pareto as (options: ParetoOptions) => ReturnType<typeof pareto>,
  ...scaleAndShape(0.4, { scale, logScale }, { shape, logShape }),
  divergence: true,
  others: fc.record({ scale: within(0.02, 0.09), shape: within(0.5, 6) }),
  members: { scale: [1, 0.3, 8], shape: [1.5, 0.7, 12] },
  seed: 8125,
  cdf: formulas.paretoCdf.value,
  survival: formulas.paretoSurvival.value,
  quantile: formulas.paretoQuantile.value,
  extremes: [
    { scale: 1, shape: 0.05 },
    { scale: 1e-20, shape: 2 },
    { scale: 1e20, shape: 1000 },
    { scale: 3, shape: 1e6 },
  ],
  heavyTailed: true,
  roundings: 24,
  resting: { scale: 1, shape: 1 },
};
