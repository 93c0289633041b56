import { LeadlineError } from '../errors.js';

/**
 * A law does not hold. The message gives the law, both numbers, what to look at, the parameters after
 * shrinking, and the seed and path that replay them.
 *
 * @example
 * ```ts
 * import * as fc from 'fast-check';
 * import { normal } from 'leadline';
 * import { LawError, lawsOfDistribution } from 'leadline/conformance';
 * const mean = fc.integer({ min: -2, max: 2 });
 * const laws = lawsOfDistribution(normal, fc.record({ mean, sd: fc.constant(1) }), { invalid: [{ mean: 0, sd: 1 }] });
 * try {
 *   for (const { name, check } of laws) if (name.includes('invalid')) await check();
 * } catch (error) {
 *   if (error instanceof LawError) console.log(error.message);
 *   // normal: invalid parameters must throw a LeadlineError; got a distribution, expected an error for {"mean":0,"sd":1}; look at the factory's checks; seed 20260
 * }
 * ```
 */
export class LawError extends LeadlineError {
  constructor(message: string, options?: { cause?: unknown }) {
    super('law', message, options);
  }
}

/** What a law finds wrong, before it is known for which parameters it is told. */
export class Violation extends Error {
  constructor(
    readonly must: string,
    readonly got: string | number,
    readonly expected: string | number,
    readonly look: string,
  ) {
    super(`${must}; got ${got}, expected ${expected}; look at ${look}`);
  }
}

/** Throws unless `got` is within `tolerance` of `expected`; a NaN never is. */
export function requireClose(
  got: number,
  expected: number,
  tolerance: number,
  must: string,
  look: string,
): void {
  if (got === expected || Math.abs(got - expected) <= tolerance) return;
  throw new Violation(must, got, `${expected} ± ${tolerance.toPrecision(2)}`, look);
}
