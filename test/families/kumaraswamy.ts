import * as fc from 'fast-check';
import { type KumaraswamyOptions, kumaraswamy } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { positiveDomain, within } from './parameters.js';

// Below 1 the density is infinite at an end, more than a quadrature can follow.
const shape = within(1.1, 6);

export const entry: FamilyEntry = {
  factory: kumaraswamy as (options: KumaraswamyOptions) => ReturnType<typeof kumaraswamy>,
  parametrizations: [{ alpha: 1.5, beta: 2.5 }],
  arbitraries: [fc.record({ alpha: shape, beta: shape })],
  invalid: [{ alpha: 0, beta: 1 }, { alpha: 1, beta: -1 }, { alpha: Number.NaN, beta: 1 }, { alpha: 1 }],
  divergence: false,
  members: { alpha: [0.5, 2, 5], beta: [0.5, 3, 0.8] },
  seed: 8152,
  cdf: formulas.kumaraswamyCdf.value,
  survival: formulas.kumaraswamySurvival.value,
  quantile: formulas.kumaraswamyQuantile.value,
  extremes: [
    { alpha: 1e-3, beta: 1 },
    { alpha: 0.01, beta: 0.01 },
    { alpha: 1e6, beta: 1e6 },
    { alpha: 1e-6, beta: 1e6 },
    { alpha: 1, beta: 1e-2 },
  ],
  roundings: 24,
  kernelOnly: ['mean', 'variance', 'entropy'],
  domains: { alpha: positiveDomain, beta: positiveDomain },
};
