import * as fc from 'fast-check';
import { type ContinuousBernoulliOptions, continuousBernoulli } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import type { FamilyEntry } from './entry.js';
import { within } from './parameters.js';

export const entry: FamilyEntry = {
  factory: continuousBernoulli as (
    options: ContinuousBernoulliOptions,
  ) => ReturnType<typeof continuousBernoulli>,
  parametrizations: [{ logit: -1.4 }, { probability: 0.3 }],
  arbitraries: [fc.record({ logit: within(-5, 5) }), fc.record({ probability: within(0.02, 0.98) })],
  invalid: [{ probability: 1 }, { probability: -0.5 }, { logit: Number.NaN }, {}],
  divergence: true,
  members: { logit: [0, -3, 1.5] },
  seed: 8155,
  cdf: formulas.continuousBernoulliCdf.value,
  survival: formulas.continuousBernoulliSurvival.value,
  quantile: formulas.continuousBernoulliQuantile.value,
  extremes: [{ logit: 1e-30 }, { logit: -1e30 }, { logit: 1e5 }, { logit: -300 }],
  roundings: 24,
  kernelOnly: ['kl'],
};
