import { expectation } from '../expectation.js';
import { requireClose } from '../lawError.js';
import type { Subject } from '../subject.js';

/**
 * The density integrates, or the mass sums, to one. Within 1e-4: a float32 log density of −100 is off by 4e-6,
 * and so is the density there, relatively; the quadrature leaves 1e-5 at most where the integrand is
 * bounded.
 */
export function normalization(subject: Subject): void {
  requireClose(
    expectation(subject, () => 1),
    1,
    1e-4,
    `the ${subject.d.support.discrete ? 'masses must sum' : 'density must integrate'} to one`,
    'the normalizing terms of logDensity, and its support',
  );
}
