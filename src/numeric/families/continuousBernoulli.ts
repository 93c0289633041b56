// The continuous Bernoulli distribution on [0, 1] in double precision, by its log odds l: density proportional to
// exp(l x), an exponential one cut off at both ends.
// Source: Loaiza-Ganem and Cunningham (2019), "The continuous Bernoulli: fixing a pervasive error in variational
// autoencoders", arXiv 1907.06845, section 3, written in the log odds.

import { logRatio } from '../deviance.js';
import { log1mexp } from '../log1mexp.js';
import { log1pmx } from '../log1pmx.js';
import { outside } from '../outside.js';
import { sigmoid } from '../sigmoid.js';
import { softplus } from '../softplus.js';

// log(sinh(l / 2) / (l / 2)) = Σ cₙ l²ⁿ with cₙ = B₂ₙ / (2n (2n)!); by mpmath at 40 digits.
const TERMS: number[] = [
  0.041666666666666664, -0.00034722222222222224, 5.5114638447971785e-6, -1.033399470899471e-7,
  2.08767569878681e-9, -4.403491782239578e-11, 9.55895466477477e-13, -2.1185501852016142e-14,
  4.770034475709914e-16, -1.087434349279031e-17,
];
const COUNT = 10;

// The normalizer's logarithm over its part at ½, for |l| ≤ 1; its first three derivatives and the entropy likewise.
function evenLog(l: number): number {
  let sum = 0.0;
  for (let n = COUNT - 1; n >= 0; n--) sum = (sum + TERMS[n]!) * (l * l);
  return sum;
}
function evenMean(l: number): number {
  let sum = 0.0;
  let power = 20.0;
  for (let n = COUNT - 1; n >= 0; n--) {
    sum = sum * (l * l) + power * TERMS[n]!;
    power -= 2.0;
  }
  return sum * l;
}
function evenVariance(l: number): number {
  let sum = 0.0;
  let power = 20.0;
  for (let n = COUNT - 1; n >= 0; n--) {
    sum = sum * (l * l) + power * (power - 1.0) * TERMS[n]!;
    power -= 2.0;
  }
  return sum;
}
function evenSkew(l: number): number {
  let sum = 0.0;
  let power = 20.0;
  for (let n = COUNT - 1; n >= 1; n--) {
    sum = sum * (l * l) + power * (power - 1.0) * (power - 2.0) * TERMS[n]!;
    power -= 2.0;
  }
  return sum * l;
}

// The mean for l ≤ 0.
function lowerMean(l: number): number {
  return l < -1.0 ? -1.0 / l - 1.0 / Math.expm1(-l) : 0.5 + evenMean(l);
}

/** Log density, l x − log((exp(l) − 1) / l) on the closed interval, −∞ outside. @kernel */
export function continuousBernoulliLogDensity(x: number, logit: number): number {
  if (!(x >= 0.0 && x <= 1.0)) return outside(x);
  if (logit > 1.0) return Math.log(logit) - log1mexp(-logit) - logit * (1.0 - x);
  if (logit < -1.0) return logit * x + Math.log(-logit) - log1mexp(logit);
  return logit * (x - 0.5) - evenLog(logit);
}
export function continuousBernoulliLogDensity_x(x: number, logit: number): number {
  return x >= 0.0 && x <= 1.0 ? logit : 0.0;
}
export function continuousBernoulliLogDensity_logit(x: number, logit: number): number {
  if (!(x >= 0.0 && x <= 1.0)) return 0.0;
  if (logit > 1.0) return lowerMean(-logit) - (1.0 - x);
  if (logit < -1.0) return x - lowerMean(logit);
  return x - 0.5 - evenMean(logit);
}

/** Mean, 1 / (1 − exp(−l)) − 1 / l. @kernel */
export function continuousBernoulliMean(logit: number): number {
  return logit > 0.0 ? 1.0 - lowerMean(-logit) : lowerMean(logit);
}
export function continuousBernoulliMean_logit(logit: number): number {
  return continuousBernoulliVariance(logit);
}

/** Variance, 1 / l² − 1 / (4 sinh²(l / 2)). @kernel */
export function continuousBernoulliVariance(logit: number): number {
  const l = Math.abs(logit);
  if (l <= 1.0) return evenVariance(l);
  const e = Math.exp(-l);
  return 1.0 / (l * l) - e / ((1.0 - e) * (1.0 - e));
}
export function continuousBernoulliVariance_logit(logit: number): number {
  const l = Math.abs(logit);
  if (l <= 1.0) return evenSkew(logit);
  const e = Math.exp(-l);
  const slope = (e * (1.0 + e)) / ((1.0 - e) * (1.0 - e) * (1.0 - e)) - 2.0 / (l * l * l);
  return logit < 0.0 ? -slope : slope;
}

/** Mode: the end that the log odds point to; ½ where all points are alike. @kernel */
export function continuousBernoulliMode(logit: number): number {
  return logit > 0.0 ? 1.0 : logit < 0.0 ? 0.0 : 0.5;
}
export function continuousBernoulliMode_logit(_logit: number): number {
  return 0.0;
}

/** Entropy, log((exp(l) − 1) / l) − l · mean: even in l, zero at 0 and negative elsewhere. @kernel */
export function continuousBernoulliEntropy(logit: number): number {
  const l = Math.abs(logit);
  if (l > 1.0) return 1.0 + log1mexp(-l) - Math.log(l) - (l > 800.0 ? 0.0 : l / Math.expm1(l));
  let sum = 0.0;
  let power = 20.0;
  for (let n = COUNT - 1; n >= 0; n--) {
    sum = (sum + (1.0 - power) * TERMS[n]!) * (l * l);
    power -= 2.0;
  }
  return sum;
}
export function continuousBernoulliEntropy_logit(logit: number): number {
  return -logit * continuousBernoulliVariance(logit);
}

// The share below x for log odds l ≤ 0, and its logarithm for l > 0.
function lowerShare(x: number, l: number): number {
  return l === 0.0 ? x : Math.expm1(l * x) / Math.expm1(l);
}
function share(x: number, rest: number, l: number): number {
  return l > 0.0 ? Math.exp(-l * rest) * lowerShare(x, -l) : lowerShare(x, l);
}

/** Distribution function, (exp(l x) − 1) / (exp(l) − 1), held to [0, 1]. @kernel */
export function continuousBernoulliCdf(x: number, logit: number): number {
  if (x <= 0.0) return 0.0;
  return x >= 1.0 ? 1.0 : share(x, 1.0 - x, logit);
}
export function continuousBernoulliCdf_x(x: number, logit: number): number {
  if (!(x > 0.0 && x < 1.0)) return 0.0;
  if (logit === 0.0) return 1.0;
  if (logit < 0.0) return Math.exp(logit * x) * (logit / Math.expm1(logit));
  return Math.exp(-logit * (1.0 - x)) * (-logit / Math.expm1(-logit));
}

/**
 * The derivative in l of the log of the share below x, for l ≥ 0 and rest = 1 − x:
 * x / (1 − exp(−l x)) − 1 / (1 − exp(−l)), negative. For small l by the series, whose differences 1 − x²ⁿ have the
 * factor 1 − x written out; else with the parts brought together over it.
 */
function slope(x: number, rest: number, l: number): number {
  if (l > 1.0) {
    const up = -1.0 / Math.expm1(-l);
    const between = (x * Math.exp(-l * x) * Math.expm1(-l * rest)) / Math.expm1(-l * x);
    return up * (between - rest);
  }
  // 1 + x² + … + x²ⁿ⁻², from the first term on.
  let geometric = 1.0;
  let power = l;
  let n2 = 2.0;
  let sum = 0.0;
  for (let n = 0; n < COUNT; n++) {
    sum += n2 * TERMS[n]! * power * geometric;
    geometric = 1.0 + x * x * geometric;
    power *= l * l;
    n2 += 2.0;
  }
  return -rest * (0.5 + (1.0 + x) * sum);
}
export function continuousBernoulliCdf_logit(x: number, logit: number): number {
  if (!(x > 0.0 && x < 1.0)) return 0.0;
  const rest = 1.0 - x;
  return logit < 0.0
    ? share(rest, x, -logit) * slope(rest, x, -logit)
    : share(x, rest, logit) * slope(x, rest, logit);
}

/** Survival function: the distribution function of 1 − x, whose log odds are −l. @kernel */
export function continuousBernoulliSurvival(x: number, logit: number): number {
  if (x <= 0.0) return 1.0;
  return x >= 1.0 ? 0.0 : share(1.0 - x, x, -logit);
}
export function continuousBernoulliSurvival_x(x: number, logit: number): number {
  return -continuousBernoulliCdf_x(x, logit);
}
export function continuousBernoulliSurvival_logit(x: number, logit: number): number {
  return -continuousBernoulliCdf_logit(x, logit);
}

// The logarithm of a share, from the other where that is the smaller.
function logShare(x: number, rest: number, l: number): number {
  const other = share(rest, x, -l);
  if (other < 0.5) return Math.log1p(-other);
  return l > 0.0 ? Math.log(lowerShare(x, -l)) - l * rest : Math.log(lowerShare(x, l));
}
// Its derivative in x, where rest = 1 − x.
function logSlope(x: number, l: number): number {
  return l === 0.0 ? 1.0 / x : -l / Math.expm1(-l * x);
}
// And in l.
function logSlopeInLogit(x: number, rest: number, l: number): number {
  if (l >= 0.0) return slope(x, rest, l);
  return (share(rest, x, -l) / share(x, rest, l)) * slope(rest, x, -l);
}

/** Log distribution function. @kernel */
export function continuousBernoulliLogCdf(x: number, logit: number): number {
  if (x <= 0.0) return -Infinity;
  return x >= 1.0 ? 0.0 : logShare(x, 1.0 - x, logit);
}
export function continuousBernoulliLogCdf_x(x: number, logit: number): number {
  return x > 0.0 && x < 1.0 ? logSlope(x, logit) : 0.0;
}
export function continuousBernoulliLogCdf_logit(x: number, logit: number): number {
  return x > 0.0 && x < 1.0 ? logSlopeInLogit(x, 1.0 - x, logit) : 0.0;
}

/** Log survival function. @kernel */
export function continuousBernoulliLogSurvival(x: number, logit: number): number {
  if (x <= 0.0) return 0.0;
  return x >= 1.0 ? -Infinity : logShare(1.0 - x, x, -logit);
}
export function continuousBernoulliLogSurvival_x(x: number, logit: number): number {
  return x > 0.0 && x < 1.0 ? -logSlope(1.0 - x, -logit) : 0.0;
}
export function continuousBernoulliLogSurvival_logit(x: number, logit: number): number {
  return x > 0.0 && x < 1.0 ? -logSlopeInLogit(1.0 - x, x, -logit) : 0.0;
}

/** The point with the shares `below` and `above` on its sides. */
function pointAt(below: number, above: number, l: number): number {
  if (l > 1.0) {
    const log = below < 0.5 ? Math.log(below) : Math.log1p(-above);
    return softplus(l + log + log1mexp(-l)) / l;
  }
  if (l === 0.0) return below;
  const lost = -below * Math.expm1(l);
  return (lost > 0.5 ? Math.log(above + below * Math.exp(l)) : Math.log1p(-lost)) / l;
}
function slopeInShare(below: number, above: number, l: number): number {
  if (l === 0.0) return 1.0;
  const e = Math.exp(-Math.abs(l));
  const height = l < 0.0 ? above + below * e : below + above * e;
  return -Math.expm1(-Math.abs(l)) / (Math.abs(l) * height);
}
// Minus the derivative of the share below in l, over the density.
function slopeInLogit(below: number, above: number, l: number): number {
  const x = pointAt(below, above, l);
  const rest = pointAt(above, below, -l);
  if (l === 0.0) return 0.5 * x * rest;
  if (l < 0.0) return -slope(rest, x, -l) * (Math.expm1(l * rest) / l);
  return slope(x, rest, l) * (Math.expm1(-l * x) / l);
}

/** Quantile, log(1 + p (exp(l) − 1)) / l. @kernel */
export function continuousBernoulliQuantile(p: number, logit: number): number {
  return pointAt(p, 1.0 - p, logit);
}
export function continuousBernoulliQuantile_p(p: number, logit: number): number {
  return slopeInShare(p, 1.0 - p, logit);
}
export function continuousBernoulliQuantile_logit(p: number, logit: number): number {
  return slopeInLogit(p, 1.0 - p, logit);
}

/** Upper quantile: 1 less the quantile for −l. @kernel */
export function continuousBernoulliUpperQuantile(p: number, logit: number): number {
  return pointAt(1.0 - p, p, logit);
}
export function continuousBernoulliUpperQuantile_p(p: number, logit: number): number {
  return -slopeInShare(1.0 - p, p, logit);
}
export function continuousBernoulliUpperQuantile_logit(p: number, logit: number): number {
  return slopeInLogit(1.0 - p, p, logit);
}

/** Draw from standard logistic noise, the log odds of the share below; held inside the open interval. @kernel */
export function continuousBernoulliDraw(noise: number, logit: number): number {
  const x = pointAt(sigmoid(noise), sigmoid(-noise), logit);
  return Math.min(Math.max(x, 1.401298464324817e-45), 1.0 - 5.9604644775390625e-8);
}
export function continuousBernoulliDraw_logit(noise: number, logit: number): number {
  return slopeInLogit(sigmoid(noise), sigmoid(-noise), logit);
}

// Nodes and weights of the 10-point Gauss–Legendre rule, the positive half; by mpmath at 40 digits.
const NODES: number[] = [
  0.9739065285171717, 0.8650633666889845, 0.6794095682990244, 0.4333953941292472, 0.14887433898163122,
];
const WEIGHTS: number[] = [
  0.06667134430868814, 0.1494513491505806, 0.21908636251598204, 0.26926671930999635, 0.29552422471475287,
];
/** ∫ (1 − t) V(l + d t) dt and, left in `total`, ∫ V(l + d t) dt over (0, 1), with the variance V. */
let total: number = 0.0;
function averages(l: number, d: number): number {
  let sum = 0.0;
  let plain = 0.0;
  for (let i = 0; i < 10; i++) {
    const k = i < 5 ? i : i - 5;
    const t = 0.5 * (i < 5 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    const value = 0.5 * WEIGHTS[k]! * continuousBernoulliVariance(l + d * t);
    sum += (1.0 - t) * value;
    plain += value;
  }
  total = plain;
  return sum;
}
// Whether the variance is smooth enough between two log odds for ten nodes.
function isNear(l: number, d: number): boolean {
  return Math.abs(d) <= Math.max(1.0, 0.4 * Math.abs(l));
}
// log((exp(l) − 1) / l).
function logNormalizer(l: number): number {
  if (Math.abs(l) <= 1.0) return 0.5 * l + evenLog(l);
  return Math.max(l, 0.0) + log1mexp(-Math.abs(l)) - Math.log(Math.abs(l));
}

/**
 * Divergence, A(m) − A(l) − (m − l) A′(l) with A = log((exp(l) − 1) / l): where m is near l, the integral
 * (m − l)² ∫ (1 − t) A″(l + t (m − l)) dt of positive terms.
 * @kernel
 */
export function continuousBernoulliKl(logit: number, otherLogit: number): number {
  const d = otherLogit - logit;
  if (isNear(logit, d)) return d * d * averages(logit, d);
  // Read so that the first log odds are not positive: there the mean is small where the two are far from zero.
  const l = -Math.abs(logit);
  const m = logit > 0.0 ? -otherLogit : otherLogit;
  if (m < -1.0 && l < -1.0) {
    const rest = log1mexp(m) - log1mexp(l) + (m - l) / Math.expm1(-l);
    const ratio = (m - l) / l;
    return (ratio < -0.5 ? ratio - logRatio(-m, -l) : -log1pmx(ratio)) + rest;
  }
  return logNormalizer(m) - logNormalizer(l) - (m - l) * lowerMean(l);
}
export function continuousBernoulliKl_logit(logit: number, otherLogit: number): number {
  return (logit - otherLogit) * continuousBernoulliVariance(logit);
}
export function continuousBernoulliKl_otherLogit(logit: number, otherLogit: number): number {
  const d = otherLogit - logit;
  if (isNear(logit, d)) {
    averages(logit, d);
    return d * total;
  }
  const l = -Math.abs(logit);
  const m = logit > 0.0 ? -otherLogit : otherLogit;
  const rise = continuousBernoulliMean(m) - lowerMean(l);
  return logit > 0.0 ? -rise : rise;
}
