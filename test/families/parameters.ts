import * as fc from 'fast-check';

// Random parameters at which quadratures and sample moments can be trusted.

/** A number within bounds. */
export const within = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** A location. */
export const real = within(-5, 5);
/** A scale or a rate. */
export const scale = within(0.1, 6);
/** The logarithm of one. */
export const logarithm = within(-2, 2);

/** What a parameter's errors say: see {@link FamilyEntry.domains}. */
export const positiveDomain = { words: 'positive', outside: 0, fix: 'mend the value' };
/** Of a parameter that any finite number will do for. */
export const finiteDomain = { words: 'finite', fix: '' };
/** Of a logarithm. */
export const logarithmDomain = {
  words: 'between -700 and 700',
  outside: 701,
  fix: 'a network that gives such values has diverged: clip its output, or lower the learning rate',
};
