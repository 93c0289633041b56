import { deviance } from './deviance.js';
import { log1pmx } from './log1pmx.js';
import { stirlingError, stirlingError_n } from './stirlingError.js';

/**
 * log Γ(b) − log Γ(a) − (b − a) ψ(a) − (b log(b / a) + a − b) for a, b > 0: the divergence between two gamma
 * distributions of equal means and shapes a and b. Not negative, with a double zero at b = a, where its relative
 * accuracy is kept.
 *
 * With δ the error of Stirling's formula and h = (b − a) / a it is ½ (h − log(1 + h)) + δ(b) − δ(a) − (b − a) δ′(a).
 * Within a factor of about two of each other, and both from 8 on, the last three are Stirling's series with each
 * power x^−n replaced by its second divided difference times (b − a)². Below 8 the recurrence of Γ moves both up, at
 * the cost of d/(a + j) − log(1 + d/(a + j)) a step. Source: DLMF 5.5.1, 5.11.1.
 */
export function gammaRemainder(a: number, b: number): number {
  return gammaRemainderOf(a, b, b - a);
}

/** The same with d = b − a given, where the two are rounded sums. */
export function gammaRemainderOf(a: number, b: number, d: number): number {
  // Outside the domain the recurrence would climb for ever.
  if (!(a > 0.0 && b > 0.0)) return NaN;
  const h = d / a;
  if (!(Math.abs(h) <= 0.5)) {
    const half = h < -0.5 ? h - (Math.log(b) - Math.log(a)) : 0.0 - log1pmx(h);
    return 0.5 * half + (stirlingError(b) - stirlingError(a) - d * stirlingError_n(a));
  }
  let sum = 0.0;
  let x = a;
  let y = b;
  while (x < 8.0 || y < 8.0) {
    sum -= log1pmx(d / x);
    x += 1.0;
    y += 1.0;
  }
  const upper = d * d * seriesRemainder(x, y) - 0.5 * log1pmx(d / x);
  return x === a ? upper : sum + (upper + deviance(y, x) - deviance(b, a));
}

/** The second divided difference at x, x, y of Stirling's series, for x, y ≥ 8. */
function seriesRemainder(x: number, y: number): number {
  const r = 1.0 / x;
  const s = 1.0 / y;
  // Of x^−n it is r² s Σ_i (n − i) r^(n−1−i) s^i, n odd; from n to n + 2 by two steps of this recurrence.
  let power = 1.0;
  let sum = 1.0;
  let weighted = 1.0;
  let total = weighted / 12.0;
  for (let k = 0; k < 14; k++) {
    // sum = Σ r^(n−1−i) s^i and weighted = Σ (n − i) r^(n−1−i) s^i, one power higher.
    power *= s;
    sum = r * sum + power;
    weighted = r * weighted + sum;
    if (k === 1) total -= weighted / 360.0;
    else if (k === 3) total += weighted / 1260.0;
    else if (k === 5) total -= weighted / 1680.0;
    else if (k === 7) total += weighted / 1188.0;
    else if (k === 9) total -= (weighted * 691.0) / 360360.0;
    else if (k === 11) total += weighted / 156.0;
    else if (k === 13) total -= (weighted * 3617.0) / 122400.0;
  }
  return r * r * s * total;
}
