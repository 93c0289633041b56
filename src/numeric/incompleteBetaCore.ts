import { betaQuadrature, quadratureA, quadratureB, quadratureSum } from './betaQuadrature.js';
import { HALF_LOG_2PI } from './constants.js';
import { digamma, digammaMinusLog } from './digamma.js';
import { digammaDifference } from './digammaDifference.js';
import { log1pmx } from './log1pmx.js';
import { logBeta } from './logBeta.js';
import { logGamma1p } from './logGamma.js';
import { logGammaDifference } from './logGammaDifference.js';
import { stirlingSeries } from './stirlingSeries.js';

/** What the last call of `incompleteBeta` computed directly: 0 the share I below x, 1 the share above. */
export let betaSide: number = 0.0;
/** The logarithm of the share that was computed directly. */
export let betaLogShare: number = 0.0;
/** log D with D = x^a (1 − x)^b / B(a, b), which is x (1 − x) times the density. */
export let betaLogScale: number = 0.0;
/** The share divided by D. */
export let betaTail: number = 0.0;
/** (∂I/∂a) / D and (∂I/∂b) / D, without exponentials. */
export let betaSlopeA: number = 0.0;
export let betaSlopeB: number = 0.0;

// The same of one orientation, before a swap of the sides.
let logShare: number = 0.0;
let tail: number = 0.0;
let slopeA: number = 0.0;
let slopeB: number = 0.0;
let complement: boolean = false;

/**
 * The regularized incomplete beta function and its derivatives in both shapes, in one pass: evaluates the share
 * that is not near 1 and leaves it in the module's variables. x and y = 1 − x are both given with their
 * logarithms, so that each end of (0, 1) keeps its relative accuracy.
 *
 * - min(a, b) ≥ 30: quadrature of the tail (betaQuadrature.ts), on the side of the mean where it is the smaller.
 * - a < 1, b x ≤ 1.1, x ≤ 0.7 (or the same with the sides exchanged): the power series in x, which also gives the
 *   complement without a difference to 1.
 * - else a continued fraction whose terms hold a y − b x, so that nothing cancels near either end.
 *
 * Source: DLMF 8.17.7, 8.17.22; the division of the plane and the fraction: Didonato and Morris (1992),
 * "Algorithm 708", equations 9 and 10; the derivatives by the chain rule along series and fraction, as Boik and
 * Robison-Cox (1998) do.
 */
export function incompleteBeta(a: number, b: number, x: number, y: number, logX: number, logY: number): void {
  if (!(Math.min(a, b) > 0.0 && Math.max(a, b) < Infinity)) {
    betaLogShare = NaN;
    betaLogScale = NaN;
    betaTail = NaN;
    betaSlopeA = NaN;
    betaSlopeB = NaN;
    return;
  }
  const lambda = balance(a, b, x, y);
  betaLogScale = logBetaScale(a, b, logX, logY, lambda);
  const least = Math.min(a, b);
  let swap = lambda < 0.0;
  let useSeries = false;
  if (least < 30.0) {
    if (a < 1.0 && b * x <= 1.1 && x <= 0.7) {
      swap = false;
      useSeries = true;
    } else if (b < 1.0 && a * y <= 1.1 && y <= 0.7) {
      swap = true;
      useSeries = true;
    }
  }
  const p = swap ? b : a;
  const q = swap ? a : b;
  const s = swap ? y : x;
  const t = swap ? x : y;
  const logS = swap ? logY : logX;
  const logT = swap ? logX : logY;
  complement = false;
  if (useSeries) series(p, q, s, logS, logT);
  else if (least < 30.0) fraction(p, q, s, t, logS, logT, swap ? -lambda : lambda);
  else quadrature(p, q, s, t, swap ? -lambda : lambda);
  betaSide = swap !== complement ? 1.0 : 0.0;
  betaLogShare = logShare;
  betaTail = tail;
  betaSlopeA = swap ? -slopeB : slopeA;
  betaSlopeB = swap ? -slopeA : slopeB;
}

/**
 * a y − b x. Where x is not small it is a − a x − b x with the rounding of the first difference put back: for
 * float32 arguments both products are exact.
 */
export function balance(a: number, b: number, x: number, y: number): number {
  if (x < 1e-8 || y < 1e-8 || y !== 1.0 - x) return a * y - b * x;
  const ax = a * x;
  const difference = a - ax;
  const back = a - (difference + ax);
  return difference - b * x + back;
}

/** log(x^a y^b / B(a, b)), by way of the saddle point where both shapes are large. */
export function logBetaScale(a: number, b: number, logX: number, logY: number, lambda: number): number {
  if (Math.min(a, b) < 10.0) return a * logX + b * logY - logBeta(a, b);
  const n = a + b;
  return (
    stirlingSeries(n) -
    stirlingSeries(a) -
    stirlingSeries(b) +
    0.5 * (Math.log(a) + Math.log(b / n)) -
    HALF_LOG_2PI +
    saddle(a, logX, n, -lambda) +
    saddle(b, logY, n, lambda)
  );
}

/** a log(n x / a) − d with d = n x − a given: minus a deviance. */
function saddle(a: number, logX: number, n: number, d: number): number {
  if (Math.abs(d) <= 0.5 * a) return a * log1pmx(d / a);
  return a * (logX + Math.log(n / a)) - d;
}

function quadrature(a: number, b: number, x: number, y: number, lambda: number): void {
  betaQuadrature(a, b, x, y, lambda);
  const n = a + b;
  tail = quadratureSum;
  logShare = betaLogScale + Math.log(tail);
  // log x + ψ(n) − ψ(a) and log y + ψ(n) − ψ(b), from the logarithms' small quotients.
  const shift = digammaMinusLog(n);
  const bracketA = logQuotient(a, n * x, -lambda) + shift - digammaMinusLog(a);
  const bracketB = logQuotient(b, n * y, lambda) + shift - digammaMinusLog(b);
  slopeA = bracketA * quadratureSum + quadratureA;
  slopeB = bracketB * quadratureSum + quadratureB;
}

/** log(m / a) with d = m − a given. */
export function logQuotient(a: number, m: number, d: number): number {
  return Math.abs(d) <= 0.5 * a ? Math.log1p(d / a) : Math.log(m / a);
}

/**
 * I = x^a / (a B(a, b)) · G, G = 1 + a Σ_{n≥1} c_n x^n / (a + n), c_n = (1 − b)_n / n!. With
 * u = a log x − log(a B), of the order of a, 1 − I = −expm1(u) − e^u (G − 1).
 */
function series(a: number, b: number, x: number, logX: number, logY: number): void {
  let n = 0.0;
  let c = 1.0;
  let cB = 0.0;
  let sum = 0.0;
  let sumA = 0.0;
  let sumB = 0.0;
  let size = 1.0;
  while (size > 1e-17 && n < 500.0) {
    n += 1.0;
    cB = (x * (cB * (n - b) - c)) / n;
    c *= (x * (n - b)) / n;
    const r = 1.0 / (a + n);
    sum += c * r;
    sumA += c * n * r * r;
    sumB += cB * r;
    size = Math.abs(c) + Math.abs(cB);
  }
  const g = 1.0 + a * sum;
  const u = a * logX + logGammaDifference(b, a) - logGamma1p(a);
  // D = x^a y^b / B, so that the share is D y^−b G / a.
  const scale = Math.exp(-b * logY) / a;
  // ψ(1 + a) − ψ(a + b): either sign, but only its sum with log x matters.
  slopeA = scale * (g * (logX + digamma(a + b) - digamma(1.0 + a)) + sumA);
  slopeB = scale * (g * digammaDifference(b, a) + a * sumB);
  tail = scale * g;
  logShare = u + Math.log(g);
  if (logShare > -0.693) {
    const above = -Math.expm1(u) - Math.exp(u) * a * sum;
    complement = true;
    logShare = Math.log(above);
    tail = Math.exp(logShare - betaLogScale);
  }
}

function fraction(
  a: number,
  b: number,
  x: number,
  y: number,
  logX: number,
  logY: number,
  lambda: number,
): void {
  // I = D / (β₀ + α₁/(β₁ + α₂/(β₂ + …))) by the modified Lentz method; names ending in A and B are derivatives.
  let beta = (a * (lambda + 1.0)) / (a + 1.0);
  let betaA = (lambda + 1.0) / ((a + 1.0) * (a + 1.0)) + (a * y) / (a + 1.0);
  let betaB = (-a * x) / (a + 1.0);
  let f = beta;
  let upper = beta;
  let upperA = betaA;
  let upperB = betaB;
  let lower = 0.0;
  let lowerA = 0.0;
  let lowerB = 0.0;
  let logA = betaA / beta;
  let logB = betaB / beta;
  for (let n = 1.0; n < 5000.0; n += 1.0) {
    const e = a + 2.0 * n - 1.0;
    const w = (n * x) / e;
    const common = ((a + n - 1.0) * (a + b + n - 1.0) * w * x) / e;
    const alpha = common * (b - n);
    const alphaA = alpha * (1.0 / (a + n - 1.0) + 1.0 / (a + b + n - 1.0) - 2.0 / e);
    const alphaB = common * ((b - n) / (a + b + n - 1.0) + 1.0);
    const next = 1.0 / (e + 2.0);
    const share = (a + n) * next;
    const bracket = lambda + 1.0 + n * (1.0 + y);
    beta = n + w * (b - n) + share * bracket;
    betaA = (-w * (b - n)) / e + (n + 1.0) * next * next * bracket + share * y;
    betaB = w - share * x;
    const inner = 1.0 / (beta + alpha * lower);
    const scale = -inner * inner;
    lowerA = scale * (betaA + alphaA * lower + alpha * lowerA);
    lowerB = scale * (betaB + alphaB * lower + alpha * lowerB);
    lower = inner;
    const over = 1.0 / upper;
    upperA = betaA + (alphaA - alpha * over * upperA) * over;
    upperB = betaB + (alphaB - alpha * over * upperB) * over;
    upper = beta + alpha * over;
    const factor = upper * lower;
    const factorA = upperA / upper + lowerA / lower;
    const factorB = upperB / upper + lowerB / lower;
    f *= factor;
    logA += factorA;
    logB += factorB;
    if (
      Math.abs(factor - 1.0) < 4e-16 &&
      Math.abs(factorA) <= 1e-15 * Math.abs(logA) &&
      Math.abs(factorB) <= 1e-15 * Math.abs(logB)
    )
      break;
  }
  tail = 1.0 / f;
  logShare = betaLogScale + Math.log(tail);
  slopeA = tail * (logX + digammaDifference(a, b) - logA);
  slopeB = tail * (logY + digammaDifference(b, a) - logB);
}
