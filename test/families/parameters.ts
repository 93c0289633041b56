import * as fc from 'fast-check';
import type { FamilyEntry } from './entry.js';

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

type Numbers = fc.Arbitrary<number>;

/** The four ways to give a scale and a shape, and what must be refused; 0.5 is a point at this scale. */
export function scaleAndShape(
  at: number,
  scales: { readonly scale: Numbers; readonly logScale: Numbers },
  shapes: { readonly shape: Numbers; readonly logShape: Numbers },
): Pick<FamilyEntry, 'parametrizations' | 'arbitraries' | 'invalid'> {
  const { scale, logScale } = scales;
  const { shape, logShape } = shapes;
  return {
    parametrizations: [
      { scale: at, shape: 2.5 },
      { logScale: -1, shape: 2.5 },
      { scale: at, logShape: 1.1 },
      { logScale: -1, logShape: 1.1 },
    ],
    arbitraries: [
      fc.record({ scale, shape }),
      fc.record({ logScale, shape }),
      fc.record({ scale, logShape }),
      fc.record({ logScale, logShape }),
    ],
    invalid: [
      { scale: 1, shape: 0 },
      { scale: -1, shape: 2 },
      { scale: 1 },
      { scale: 1, shape: Number.NaN },
      { scale: 1, shape: 1, logShape: 0 },
    ],
  };
}
