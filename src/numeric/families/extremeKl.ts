// The divergence of Gumbel distributions, in the variables that the Weibull's share: r, the ratio of the
// scales of q and p, and d, the distance of the locations in units of p's scale. Its classical form is
// exp(−d) Γ(1 + r) − 1 + d − log r + γ (r − 1).
import { EULER } from '../constants.js';
import { digamma } from '../digamma.js';
import { digammaDifference } from '../digammaDifference.js';
import { exponentialRemainder } from '../exponentialRemainder.js';
import { log1pmx } from '../log1pmx.js';
import { logGamma, logGamma1p, logGammaNear2, logGammaNear2Tail } from '../logGamma.js';

// log Γ(1 + r) with the relative accuracy of r − 1.
function logGammaAbove(r: number, lessOne: number): number {
  if (Math.abs(lessOne) <= 0.5) return logGammaNear2(lessOne);
  return r < 0.5 ? logGamma1p(r) : logGamma(1.0 + r);
}

/** y = log Γ(1 + r) − d, what exp(−d) Γ(1 + r) is the exponential of. */
function exponent(r: number, lessOne: number, d: number): number {
  return logGammaAbove(r, lessOne) - d;
}

/**
 * The divergence, as the sum of two parts that are never negative and vanish together only where the two members
 * are the same: exp(y) − 1 − y, and log Γ(r) + γ (r − 1), each of which is a remainder of second order. `logR` is log r,
 * for where r underflows. Where Γ(1 + r) passes 1e17 and d makes up for it, y has the rounding of its large terms,
 * which the exponential multiplies.
 */
export function extremeKl(r: number, lessOne: number, d: number, logR: number): number {
  if (r > 1.0e300) return Infinity;
  const y = exponent(r, lessOne, d);
  if (y > 710.0) return Infinity;
  let spread = r < 1.0e-290 ? -logR - EULER : 0.0;
  if (r >= 1.0e-290) {
    spread =
      Math.abs(lessOne) <= 0.5
        ? logGammaNear2Tail(lessOne) - log1pmx(lessOne)
        : logGamma(r) + EULER * lessOne;
  }
  return exponentialRemainder(y) + spread;
}

/** Its derivative in d, 1 − exp(y). */
export function extremeKlDistance(r: number, lessOne: number, d: number): number {
  return r > 1.0e300 ? -Infinity : -Math.expm1(exponent(r, lessOne, d));
}

/** Its derivative in log r, r ((exp(y) − 1) ψ(1 + r) + (ψ(r) + γ)). */
export function extremeKlRatio(r: number, lessOne: number, d: number): number {
  if (r > 1.0e300) return Infinity;
  return Math.expm1(exponent(r, lessOne, d)) * (r * digamma(1.0 + r)) + rise(r, lessOne);
}

/** Minus its derivative in the logarithm of the unit that r and d are measured in: r ∂r + d ∂d. */
export function extremeKlUnit(r: number, lessOne: number, d: number): number {
  if (r > 1.0e300) return Infinity;
  return Math.expm1(exponent(r, lessOne, d)) * (r * digamma(1.0 + r) - d) + rise(r, lessOne);
}

// r (ψ(r) + γ).
function rise(r: number, lessOne: number): number {
  if (r < 1.0e-14) return -1.0;
  return r * (lessOne < 0.0 ? -digammaDifference(r, -lessOne) : digammaDifference(1.0, lessOne));
}
