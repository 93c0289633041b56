// The beta distribution with shapes a = alpha and b = beta in double precision. The incomplete beta function and the
// draw's implicit derivatives stand in files of their own.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 25.
import { betaDrawDerivativeA, betaDrawDerivativeB, betaLogDrawSlope, betaLogOddsSlope } from '../betaDraw.js';
import { digammaMinusLog } from '../digamma.js';
import { digammaDifference } from '../digammaDifference.js';
import {
  betaI,
  betaI_a,
  betaI_b,
  betaI_x,
  betaIComplement,
  logBetaI,
  logBetaI_a,
  logBetaI_b,
  logBetaI_x,
  logBetaIComplement,
  logBetaIComplement_a,
  logBetaIComplement_b,
  logBetaIComplement_x,
} from '../incompleteBeta.js';
import { balance, logBetaScale, logQuotient } from '../incompleteBetaCore.js';
import {
  betaIInverse,
  betaIInverse_a,
  betaIInverse_b,
  betaIInverse_p,
  betaIInverseComplement,
} from '../incompleteBetaInverse.js';
import { logBeta } from '../logBeta.js';
import { lostBits } from '../lostBits.js';
import { outside } from '../outside.js';
import { betaKl, betaKl_alpha, betaKl_beta } from './betaKl.js';

/**
 * Log density, (a − 1) log x + (b − 1) log(1 − x) − log B(a, b) on (0, 1); where both shapes are 10 or more by way of
 * the saddle point. Source of the form: Loader (2000), "Fast and accurate computation of binomial probabilities".
 * @kernel
 */
export function betaLogDensity(x: number, alpha: number, beta: number): number {
  if (!(x > 0.0 && x < 1.0)) {
    if (x === 0.0) return atEnd(alpha, beta);
    return x === 1.0 ? atEnd(beta, alpha) : outside(x);
  }
  const logX = Math.log(x);
  const logY = Math.log1p(-x);
  if (Math.min(alpha, beta) < 10.0) return (alpha - 1.0) * logX + (beta - 1.0) * logY - logBeta(alpha, beta);
  return logBetaScale(alpha, beta, logX, logY, balance(alpha, beta, x, 1.0 - x)) - logX - logY;
}
export function betaLogDensity_x(x: number, alpha: number, beta: number): number {
  if (!(x >= 0.0 && x <= 1.0)) return 0.0;
  if (x === 0.0) return alpha === 1.0 ? 1.0 - beta : (alpha - 1.0) * Infinity;
  if (x === 1.0) return beta === 1.0 ? alpha - 1.0 : (1.0 - beta) * Infinity;
  // (a − 1)(1 − x) − (b − 1) x: exact terms for float32 numbers, summed with what their roundings lose.
  const p = -alpha * x;
  const q = -beta * x;
  const s1 = alpha - 1.0;
  const s2 = s1 + p;
  const s3 = s2 + q;
  const s4 = s3 + 2.0 * x;
  const lost =
    lostBits(alpha, -1.0, s1) + lostBits(s1, p, s2) + lostBits(s2, q, s3) + lostBits(s3, 2.0 * x, s4);
  return (s4 + lost) / x / (1.0 - x);
}
export function betaLogDensity_alpha(x: number, alpha: number, beta: number): number {
  if (!(x > 0.0 && x <= 1.0)) return x === 0.0 ? -Infinity : 0.0;
  if (x === 1.0) return digammaDifference(alpha, beta);
  if (Math.min(alpha, beta) < 10.0) return Math.log(x) + digammaDifference(alpha, beta);
  const n = alpha + beta;
  const near = logQuotient(alpha, n * x, -balance(alpha, beta, x, 1.0 - x));
  return near + digammaMinusLog(n) - digammaMinusLog(alpha);
}
export function betaLogDensity_beta(x: number, alpha: number, beta: number): number {
  if (!(x >= 0.0 && x < 1.0)) return x === 1.0 ? -Infinity : 0.0;
  if (x === 0.0) return digammaDifference(beta, alpha);
  if (Math.min(alpha, beta) < 10.0) return Math.log1p(-x) + digammaDifference(beta, alpha);
  const n = alpha + beta;
  const y = 1.0 - x;
  const near = logQuotient(beta, n * y, balance(alpha, beta, x, y));
  return near + digammaMinusLog(n) - digammaMinusLog(beta);
}

/** The log density at 0: a pole, a step of height b, or zero. */
function atEnd(alpha: number, beta: number): number {
  return alpha < 1.0 ? Infinity : alpha === 1.0 ? Math.log(beta) : -Infinity;
}

/** Distribution function, I_x(a, b). @kernel */
export function betaCdf(x: number, alpha: number, beta: number): number {
  return x > 0.0 ? (x < 1.0 ? betaI(alpha, beta, x) : 1.0) : isNaN(x) ? NaN : 0.0;
}
export function betaCdf_x(x: number, alpha: number, beta: number): number {
  return x >= 0.0 && x <= 1.0 ? betaI_x(alpha, beta, x) : 0.0;
}
export function betaCdf_alpha(x: number, alpha: number, beta: number): number {
  return x > 0.0 && x < 1.0 ? betaI_a(alpha, beta, x) : 0.0;
}
export function betaCdf_beta(x: number, alpha: number, beta: number): number {
  return x > 0.0 && x < 1.0 ? betaI_b(alpha, beta, x) : 0.0;
}

/** Survival function, 1 − I_x(a, b). @kernel */
export function betaSurvival(x: number, alpha: number, beta: number): number {
  return x > 0.0 ? (x < 1.0 ? betaIComplement(alpha, beta, x) : 0.0) : isNaN(x) ? NaN : 1.0;
}
export function betaSurvival_x(x: number, alpha: number, beta: number): number {
  return -betaCdf_x(x, alpha, beta);
}
export function betaSurvival_alpha(x: number, alpha: number, beta: number): number {
  return -betaCdf_alpha(x, alpha, beta);
}
export function betaSurvival_beta(x: number, alpha: number, beta: number): number {
  return -betaCdf_beta(x, alpha, beta);
}

/** Log distribution function. @kernel */
export function betaLogCdf(x: number, alpha: number, beta: number): number {
  return x > 0.0 ? (x < 1.0 ? logBetaI(alpha, beta, x) : 0.0) : isNaN(x) ? NaN : -Infinity;
}
export function betaLogCdf_x(x: number, alpha: number, beta: number): number {
  return x >= 0.0 && x <= 1.0 ? logBetaI_x(alpha, beta, x) : 0.0;
}
export function betaLogCdf_alpha(x: number, alpha: number, beta: number): number {
  return x >= 0.0 && x < 1.0 ? logBetaI_a(alpha, beta, x) : 0.0;
}
export function betaLogCdf_beta(x: number, alpha: number, beta: number): number {
  return x > 0.0 && x < 1.0 ? logBetaI_b(alpha, beta, x) : 0.0;
}

/** Log survival function. @kernel */
export function betaLogSurvival(x: number, alpha: number, beta: number): number {
  return x > 0.0 ? (x < 1.0 ? logBetaIComplement(alpha, beta, x) : -Infinity) : isNaN(x) ? NaN : 0.0;
}
export function betaLogSurvival_x(x: number, alpha: number, beta: number): number {
  if (!(x > 0.0 && x < 1.0)) return x === 0.0 ? -betaI_x(alpha, beta, x) : x === 1.0 ? -Infinity : 0.0;
  return logBetaIComplement_x(alpha, beta, x);
}
export function betaLogSurvival_alpha(x: number, alpha: number, beta: number): number {
  return x > 0.0 && x < 1.0 ? logBetaIComplement_a(alpha, beta, x) : 0.0;
}
export function betaLogSurvival_beta(x: number, alpha: number, beta: number): number {
  return x > 0.0 && x < 1.0 ? logBetaIComplement_b(alpha, beta, x) : x === 1.0 ? -Infinity : 0.0;
}

/** Quantile. @kernel */
export function betaQuantile(p: number, alpha: number, beta: number): number {
  return betaIInverse(alpha, beta, p);
}
export function betaQuantile_p(p: number, alpha: number, beta: number): number {
  return betaIInverse_p(alpha, beta, p);
}
export function betaQuantile_alpha(p: number, alpha: number, beta: number): number {
  return betaIInverse_a(alpha, beta, p);
}
export function betaQuantile_beta(p: number, alpha: number, beta: number): number {
  return betaIInverse_b(alpha, beta, p);
}

/** Upper quantile: one minus the quantile of 1 − x, which has the shapes exchanged. @kernel */
export function betaUpperQuantile(p: number, alpha: number, beta: number): number {
  return betaIInverseComplement(beta, alpha, p);
}
export function betaUpperQuantile_p(p: number, alpha: number, beta: number): number {
  return -betaIInverse_p(beta, alpha, p);
}
export function betaUpperQuantile_alpha(p: number, alpha: number, beta: number): number {
  return -betaIInverse_b(beta, alpha, p);
}
export function betaUpperQuantile_beta(p: number, alpha: number, beta: number): number {
  return -betaIInverse_a(beta, alpha, p);
}

/** Mean, a / (a + b). @kernel */
export function betaMean(alpha: number, beta: number): number {
  return alpha / (alpha + beta);
}
export function betaMean_alpha(alpha: number, beta: number): number {
  return beta / (alpha + beta) / (alpha + beta);
}
export function betaMean_beta(alpha: number, beta: number): number {
  return -alpha / (alpha + beta) / (alpha + beta);
}

/** Variance, a b / ((a + b)² (a + b + 1)). @kernel */
export function betaVariance(alpha: number, beta: number): number {
  const n = alpha + beta;
  return ((alpha / n) * (beta / n)) / (n + 1.0);
}
export function betaVariance_alpha(alpha: number, beta: number): number {
  return varianceSlope(alpha, beta);
}
export function betaVariance_beta(alpha: number, beta: number): number {
  return varianceSlope(beta, alpha);
}

// b (b − a + (b − 2 a) n) / (n³ (n + 1)²).
function varianceSlope(a: number, b: number): number {
  const n = a + b;
  return (b / n) * ((b - a + (b - 2.0 * a) * n) / n / n / (n + 1.0) / (n + 1.0));
}

/** Mode, (a − 1) / (a + b − 2) inside; an end where the density has one pole; NaN where no point is the only mode. @kernel */
export function betaMode(alpha: number, beta: number): number {
  if (alpha > 1.0 && beta > 1.0) return (alpha - 1.0) / (alpha - 1.0 + (beta - 1.0));
  if (alpha >= 1.0 && beta <= 1.0 && alpha > beta) return 1.0;
  return alpha <= 1.0 && beta >= 1.0 && alpha < beta ? 0.0 : NaN;
}
export function betaMode_alpha(alpha: number, beta: number): number {
  if (!(alpha > 1.0 && beta > 1.0)) return 0.0;
  const n = alpha - 1.0 + (beta - 1.0);
  return (beta - 1.0) / n / n;
}
export function betaMode_beta(alpha: number, beta: number): number {
  return -betaMode_alpha(beta, alpha);
}

/** Entropy: minus the divergence from the uniform distribution, with its accuracy near that. @kernel */
export function betaEntropy(alpha: number, beta: number): number {
  return 0.0 - betaKl(alpha, beta, 1.0, 1.0);
}
export function betaEntropy_alpha(alpha: number, beta: number): number {
  return 0.0 - betaKl_alpha(alpha, beta, 1.0, 1.0);
}
export function betaEntropy_beta(alpha: number, beta: number): number {
  return 0.0 - betaKl_beta(alpha, beta, 1.0, 1.0);
}

/** A draw, which moves with the parameters at a fixed uniform. @kernel */
export function betaDraw(x: number, _alpha: number, _beta: number): number {
  return x;
}
export function betaDraw_x(_x: number, _alpha: number, _beta: number): number {
  return 1.0;
}
export function betaDraw_alpha(x: number, alpha: number, beta: number): number {
  return betaDrawDerivativeA(x, alpha, beta);
}
export function betaDraw_beta(x: number, alpha: number, beta: number): number {
  return betaDrawDerivativeB(x, alpha, beta);
}

/** The logarithm x of a draw. @kernel */
export function betaLogDraw(x: number, _alpha: number, _beta: number): number {
  return x;
}
export function betaLogDraw_x(_x: number, _alpha: number, _beta: number): number {
  return 1.0;
}
export function betaLogDraw_alpha(x: number, alpha: number, beta: number): number {
  return betaLogDrawSlope(x, alpha, beta, true);
}
export function betaLogDraw_beta(x: number, alpha: number, beta: number): number {
  return betaLogDrawSlope(x, alpha, beta, false);
}

/** The log odds x of a draw. @kernel */
export function betaLogOddsDraw(x: number, _alpha: number, _beta: number): number {
  return x;
}
export function betaLogOddsDraw_x(_x: number, _alpha: number, _beta: number): number {
  return 1.0;
}
export function betaLogOddsDraw_alpha(x: number, alpha: number, beta: number): number {
  return betaLogOddsSlope(x, alpha, beta, true);
}
export function betaLogOddsDraw_beta(x: number, alpha: number, beta: number): number {
  return betaLogOddsSlope(x, alpha, beta, false);
}
