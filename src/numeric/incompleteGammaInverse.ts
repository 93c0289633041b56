import { gammaDrawDerivative } from './gammaDraw.js';
import {
  gammaLogScale,
  gammaLogShare,
  gammaSide,
  gammaTail,
  incompleteGamma,
  logGammaScale,
} from './incompleteGammaCore.js';
import { log1mexp } from './log1mexp.js';
import { logGamma1p } from './logGamma.js';
import { normalQuantileFromLog } from './normalQuantile.js';

// The inverses of the incomplete gamma functions in x: the quantiles of a gamma variable with rate 1.

/**
 * log x with P(a, x) = e^logP and Q(a, x) = e^logQ; both logarithms are given, so that each tail is known in
 * full.
 *
 * Newton's method in u = log x on the logarithm of one of the two shares. Both are concave in u (the density of
 * log x is log-concave), so that from one side of the root it converges monotonically, and from the other it
 * crosses once. The lower share is used below the median, and wherever x is so small that P ≈ x^a / Γ(a + 1)
 * decides; this power law is also the start there, a bound from the left. Else the start is Wilson and Hilferty's
 * cube of a normal variable for a ≥ 1, and the bound Q ≤ e^−x / Γ(a) from the right for a < 1.
 */
function logGammaQuantile(a: number, logP: number, logQ: number): number {
  const left = (logP + logGamma1p(a)) / a;
  // Below this P = x^a / Γ(a + 1) to double precision, and x may lie beyond the doubles.
  if (left < -40.0) return left;
  const lower = logP < -0.6931471805599453 || (a < 1.0 && left < -1.6);
  let u = left;
  if (a >= 1.0) {
    const z = lower ? normalQuantileFromLog(logP) : -normalQuantileFromLog(logQ);
    const cube = 1.0 - 1.0 / (9.0 * a) + z / (3.0 * Math.sqrt(a));
    if (cube > 0.0) u = Math.max(u, Math.log(a) + 3.0 * Math.log(cube));
  } else if (!lower) {
    u = Math.max(u, Math.log(Math.max(1.0, Math.log(a) - logGamma1p(a) - logQ)));
  }
  const width = Math.sqrt(Math.max(a, 1.0));
  for (let i = 0; i < 100; i++) {
    const x = Math.exp(u);
    incompleteGamma(a, x, false);
    // d(log share)/du = ± x p(x) / share with x p(x) = a D.
    let share = gammaLogShare;
    let rate = a / gammaTail;
    if (lower !== (gammaSide === 0.0)) {
      share = log1mexp(share);
      rate = a * Math.exp(gammaLogScale - share);
    }
    const step = lower ? (logP - share) / rate : (share - logQ) / rate;
    // A start on the crossing side may point far away: the left bound holds on the lower side, 3 anywhere.
    u = Math.max(u + Math.min(Math.max(step, -3.0), 3.0), left);
    if (Math.abs(step) * width < 1e-7) break;
  }
  return u;
}

/** The x with P(a, x) = p. */
export function gammaPInverse(a: number, p: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? 0.0 : p === 1.0 ? Infinity : NaN;
  return Math.exp(logGammaQuantile(a, Math.log(p), Math.log1p(-p)));
}
export function gammaPInverse_p(a: number, p: number): number {
  const x = gammaPInverse(a, p);
  if (x === 0.0 || x === Infinity) return x;
  return Math.exp(Math.log(x) - logGammaScale(a, x)) / a;
}
export function gammaPInverse_a(a: number, p: number): number {
  return gammaDrawDerivative(gammaPInverse(a, p), a);
}

/** The x with Q(a, x) = q. */
export function gammaQInverse(a: number, q: number): number {
  if (!(q > 0.0 && q < 1.0)) return q === 0.0 ? Infinity : q === 1.0 ? 0.0 : NaN;
  return Math.exp(logGammaQuantile(a, Math.log1p(-q), Math.log(q)));
}
export function gammaQInverse_q(a: number, q: number): number {
  const x = gammaQInverse(a, q);
  if (x === 0.0 || x === Infinity) return -x;
  return -Math.exp(Math.log(x) - logGammaScale(a, x)) / a;
}
export function gammaQInverse_a(a: number, q: number): number {
  return gammaDrawDerivative(gammaQInverse(a, q), a);
}

/** log x with log P(a, x) = logP: right also where x or P underflows. */
export function logGammaPInverse(a: number, logP: number): number {
  if (!(logP < 0.0)) return logP === 0.0 ? Infinity : NaN;
  if (logP === -Infinity) return -Infinity;
  return logGammaQuantile(a, logP, log1mexp(logP));
}
