import { HALF_LOG_2PI, SQRT_2PI } from './constants.js';
import { deviance } from './deviance.js';
import { digamma } from './digamma.js';
import { erfcx } from './errorFunction.js';
import { log1pmx } from './log1pmx.js';
import { logGamma1p } from './logGamma.js';
import { stirlingSeries } from './stirlingSeries.js';
import { temme, temmeSlope, temmeSum } from './temme.js';

/** What the last call of `incompleteGamma` computed directly: 0 the lower share P, 1 the upper share Q. */
export let gammaSide: number = 0.0;
/** The logarithm of the share that was computed directly. */
export let gammaLogShare: number = 0.0;
/** That share divided by D: what the logarithm's derivatives need without the exponential. */
export let gammaTail: number = 1.0;
/** log D with D = x^a e^−x / Γ(a + 1). */
export let gammaLogScale: number = 0.0;
/** (∂P/∂a) / D, a number of moderate size, so that no exponential enters a ratio of derivatives. */
export let gammaSlope: number = 0.0;

/** log(x^a e^−x / Γ(a + 1)), by way of the saddle point for larger a, where the parts would cancel. */
export function logGammaScale(a: number, x: number): number {
  if (a < 10.0) return a * Math.log(x) - x - logGamma1p(a);
  return -deviance(a, x) - stirlingSeries(a) - HALF_LOG_2PI - 0.5 * Math.log(a);
}

/**
 * The regularized incomplete gamma functions and their derivative in the shape, in one pass: evaluates the share
 * that is not near 1 and leaves it in the module's variables. For a > 0 and 0 < x < ∞.
 *
 * - a ≥ 60 and x within 30 % of a: Temme's uniform expansion (temme.ts), since both of the others take √a terms.
 * - x ≤ max(a + 1, 1.1): P = D Σ_n t_n, t_n = x^n / ((a+1)…(a+n)), positive terms; ∂P/∂a = D Σ t_n (L − H_n) with
 *   L = log x − ψ(a + 1) and H_n = Σ_{k≤n} 1/(a + k).
 * - of these, a < 1, x ≤ 1.1 and P > ½: Q = a (−expm1(u)/a + e^u V), with u = a log x − log Γ(1 + a) and
 *   V = −Σ_{n≥1} (−x)^n / ((a + n) n!): no difference to 1.
 * - x beyond: Legendre's continued fraction of Q, and its derivative by the chain rule along the fraction.
 *
 * Source: DLMF 8.7.1, 8.7.3, 8.9.2, 8.12.3; the derivative of the series and of the fraction as in Moore (1982),
 * "Algorithm AS 187".
 */
export function incompleteGamma(a: number, x: number, withSlope: boolean): void {
  if (!(a > 0.0 && a < Infinity)) {
    gammaLogShare = NaN;
    gammaTail = NaN;
    gammaLogScale = NaN;
    gammaSlope = NaN;
    return;
  }
  if (a >= 60.0 && Math.abs(x - a) <= 0.3 * a) {
    incompleteGammaNear(a, (x - a) / a);
    return;
  }
  gammaLogScale = logGammaScale(a, x);
  if (x <= Math.max(a + 1.0, 1.1)) series(a, x, withSlope);
  else fraction(a, x, withSlope);
}

/**
 * The same at x = a (1 + μ), for a ≥ 60 and |μ| ≤ 0.3: for very large shapes a law is narrower than the spacing
 * of the numbers x, but not than that of μ.
 */
export function incompleteGammaNear(a: number, mu: number): void {
  const stirlingPart = stirlingSeries(a);
  gammaLogScale = a * log1pmx(mu) - stirlingPart - HALF_LOG_2PI - 0.5 * Math.log(a);
  const size = Math.sqrt(-2.0 * log1pmx(mu));
  const eta = mu < 0.0 ? -size : size;
  const ratio = size === 0.0 ? 1.0 : mu / eta;
  temme(a, eta, ratio);
  const stirling = Math.exp(stirlingPart);
  const bell = 0.5 * SQRT_2PI * Math.sqrt(a) * erfcx(size * Math.sqrt(0.5 * a));
  gammaSide = mu < 0.0 ? 0.0 : 1.0;
  gammaTail = stirling * (mu < 0.0 ? bell - temmeSum : bell + temmeSum);
  gammaLogShare = gammaLogScale + Math.log(gammaTail);
  gammaSlope = -stirling * (ratio - 0.5 * eta + temmeSum * (Math.log1p(mu) - 0.5 / a) + temmeSlope);
}

function series(a: number, x: number, withSlope: boolean): void {
  let n = a;
  let term = 1.0;
  let sum = 1.0;
  let harmonic = 0.0;
  let weighted = 0.0;
  while (term > 1e-17 * sum) {
    n += 1.0;
    const r = 1.0 / n;
    term *= x * r;
    harmonic += r;
    sum += term;
    weighted += term * harmonic;
  }
  if (withSlope) gammaSlope = (Math.log(x) - digamma(a + 1.0)) * sum - weighted;
  gammaSide = 0.0;
  gammaTail = sum;
  gammaLogShare = gammaLogScale + Math.log(sum);
  if (a < 1.0 && x <= 1.1 && gammaLogShare > -0.693) smallShape(a, x);
}

function smallShape(a: number, x: number): void {
  let n = 1.0;
  let power = x;
  let sum = x / (a + 1.0);
  while (Math.abs(power) > 1e-17 * sum) {
    n += 1.0;
    power *= -x / n;
    sum += power / (a + n);
  }
  const u = a * Math.log(x) - logGamma1p(a);
  gammaSide = 1.0;
  gammaLogShare = Math.log(a * (Math.exp(u) * sum - Math.expm1(u) / a));
  gammaTail = Math.exp(gammaLogShare - gammaLogScale);
}

function fraction(a: number, x: number, withSlope: boolean): void {
  // 1 / h = b₀ + a₁/(b₁ + a₂/(b₂ + …)), a_n = −n (n − a), b_n = x + 2n + 1 − a, by the modified Lentz method;
  // the trailing d marks derivatives in a, and `logd` is the derivative of the logarithm of the whole.
  let b = x + 1.0 - a;
  let f = b;
  let upper = b;
  let upperd = -1.0;
  let lower = 0.0;
  let lowerd = 0.0;
  let logd = -1.0 / b;
  for (let n = 1.0; n < 5000.0; n += 1.0) {
    b += 2.0;
    const top = n * (a - n);
    const inner = 1.0 / (b + top * lower);
    lowerd = -inner * inner * (n * lower + top * lowerd - 1.0);
    lower = inner;
    const over = top / upper;
    upperd = n / upper - (over / upper) * upperd - 1.0;
    upper = b + over;
    const factor = upper * lower;
    const factord = upperd / upper + lowerd / lower;
    f *= factor;
    logd += factord;
    if (Math.abs(factor - 1.0) < 4e-16 && Math.abs(factord) <= 4e-16 * Math.abs(logd)) break;
  }
  gammaTail = a / f;
  if (withSlope) gammaSlope = -gammaTail * (Math.log(x) - digamma(a) - logd);
  gammaSide = 1.0;
  gammaLogShare = gammaLogScale + Math.log(gammaTail);
}
