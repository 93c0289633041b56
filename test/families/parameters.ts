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
