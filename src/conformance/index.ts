// The entry point leadline/conformance: explicit named exports, nothing else.

export type { Law, LawOptions } from './law.js';
export { LawError } from './lawError.js';
export { type DistributionLawOptions, lawsOfDistribution } from './lawsOfDistribution.js';
export { type KlSide, lawsOfKl } from './lawsOfKl.js';
export { lawsOfMap, type MapLawOptions } from './lawsOfMap.js';
