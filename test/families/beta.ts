import * as fc from 'fast-check';
import { type BetaOptions, beta } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { within } from './parameters.js';

// Where quadratures in float32 points can be trusted: not piled up at 1.
const shape = within(0.8, 10);

export const entry: FamilyEntry = {
  factory: beta as (options: BetaOptions) => ReturnType<typeof beta>,
  parametrizations: [
    { alpha: 2.5, beta: 1.7 },
    { alpha: 2.5, logBeta: 0.5 },
    { logAlpha: 0.9, beta: 1.7 },
    { mean: 0.4, concentration: 3.5 },
  ],
  arbitraries: [
    fc.record({ alpha: shape, beta: shape }),
    fc.record({ logAlpha: within(0, 2), logBeta: within(0, 2) }),
    fc.record({ mean: within(0.2, 0.8), concentration: within(5, 30) }),
  ],
  invalid: [
    { alpha: 0, beta: 1 },
    { alpha: 1, beta: -1 },
    { alpha: 1 },
    { mean: 1, concentration: 1 },
    { mean: 0.5, concentration: 0 },
  ],
  divergence: true,
  members: { alpha: [1.5, 0.4, 20], beta: [1, 0.7, 8] },
  seed: 8185,
  cdf: formulas.betaCdf.value,
  survival: formulas.betaSurvival.value,
  quantile: formulas.betaQuantile.value,
  extremes: [
    { alpha: 1e-3, beta: 1e-3 },
    { alpha: 1e-3, beta: 1 },
    { alpha: 0.1, beta: 0.01 },
    { alpha: 1e3, beta: 0.5 },
    { alpha: 1e6, beta: 1e6 },
    { alpha: 30, beta: 1e6 },
  ],
  roundings: 128,
  kernelOnly: ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile', 'entropy', 'kl'],
  resting: { alpha: 1, beta: 1 },
};
