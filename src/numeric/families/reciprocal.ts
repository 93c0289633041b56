// The reciprocal (log-uniform) distribution between `lower` and `upper` in double precision: the logarithm of a
// point is uniform. L stands for log(upper / lower).
// Source: Hamming (1970), "On the distribution of numbers", Bell System Technical Journal 49, section 2.
import { logRatio } from '../deviance.js';
import { log1pmx } from '../log1pmx.js';
import { outside } from '../outside.js';
import { sigmoid } from '../sigmoid.js';

/** e to 29 bits, so that its product with a float32 is exact, and the rest. */
const E_HEAD = 2.718281827867031;
const E_TAIL = 5.920141379481781e-10;

/** log L; from upper − e · lower where L is next to one. */
function logWidth(lower: number, upper: number): number {
  const gap = upper - lower * E_HEAD - lower * E_TAIL;
  const t = gap / (lower * 2.718281828459045);
  return Math.abs(t) < 0.01 ? Math.log1p(Math.log1p(t)) : Math.log(logRatio(upper, lower));
}

/** Log density, −log x − log L on the closed interval, −∞ outside. @kernel */
export function reciprocalLogDensity(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? -Math.log(x) - logWidth(lower, upper) : outside(x);
}
export function reciprocalLogDensity_x(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? -1.0 / x : 0.0;
}
export function reciprocalLogDensity_lower(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? 1.0 / (lower * logRatio(upper, lower)) : 0.0;
}
export function reciprocalLogDensity_upper(x: number, lower: number, upper: number): number {
  return x >= lower && x <= upper ? -1.0 / (upper * logRatio(upper, lower)) : 0.0;
}

/** Distribution function, log(x / lower) / L held to [0, 1]. @kernel */
export function reciprocalCdf(x: number, lower: number, upper: number): number {
  if (x <= lower) return 0.0;
  return x >= upper ? 1.0 : logRatio(x, lower) / logRatio(upper, lower);
}
export function reciprocalCdf_x(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? 1.0 / (x * logRatio(upper, lower)) : 0.0;
}
export function reciprocalCdf_lower(x: number, lower: number, upper: number): number {
  return -reciprocalSurvival_lower(x, lower, upper);
}
export function reciprocalCdf_upper(x: number, lower: number, upper: number): number {
  return -reciprocalSurvival_upper(x, lower, upper);
}

/** Survival function, log(upper / x) / L held to [0, 1]. @kernel */
export function reciprocalSurvival(x: number, lower: number, upper: number): number {
  if (x <= lower) return 1.0;
  return x >= upper ? 0.0 : logRatio(upper, x) / logRatio(upper, lower);
}
export function reciprocalSurvival_x(x: number, lower: number, upper: number): number {
  return -reciprocalCdf_x(x, lower, upper);
}
export function reciprocalSurvival_lower(x: number, lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  return x > lower && x < upper ? logRatio(upper, x) / (l * l * lower) : 0.0;
}
export function reciprocalSurvival_upper(x: number, lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  return x > lower && x < upper ? logRatio(x, lower) / (l * l * upper) : 0.0;
}

/** Log distribution function, by the smaller of the two probabilities. @kernel */
export function reciprocalLogCdf(x: number, lower: number, upper: number): number {
  const p = reciprocalCdf(x, lower, upper);
  return p < 0.5 ? Math.log(p) : Math.log1p(-reciprocalSurvival(x, lower, upper));
}
export function reciprocalLogCdf_x(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? 1.0 / (x * logRatio(x, lower)) : 0.0;
}
export function reciprocalLogCdf_lower(x: number, lower: number, upper: number): number {
  if (!(x > lower && x < upper)) return 0.0;
  return -logRatio(upper, x) / (logRatio(upper, lower) * logRatio(x, lower) * lower);
}
export function reciprocalLogCdf_upper(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? -1.0 / (upper * logRatio(upper, lower)) : 0.0;
}

/** Log survival function, by the smaller of the two probabilities. @kernel */
export function reciprocalLogSurvival(x: number, lower: number, upper: number): number {
  const p = reciprocalSurvival(x, lower, upper);
  return p < 0.5 ? Math.log(p) : Math.log1p(-reciprocalCdf(x, lower, upper));
}
export function reciprocalLogSurvival_x(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? -1.0 / (x * logRatio(upper, x)) : 0.0;
}
export function reciprocalLogSurvival_lower(x: number, lower: number, upper: number): number {
  return x > lower && x < upper ? 1.0 / (lower * logRatio(upper, lower)) : 0.0;
}
export function reciprocalLogSurvival_upper(x: number, lower: number, upper: number): number {
  if (!(x > lower && x < upper)) return 0.0;
  return logRatio(x, lower) / (logRatio(upper, lower) * logRatio(upper, x) * upper);
}

// The point with the shares `below` and `above` on its sides, from the nearer end.
function pointAt(below: number, above: number, lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  return below < 0.5 ? lower * Math.exp(below * l) : upper * Math.exp(-above * l);
}

/** Quantile, lower (upper / lower)^p. @kernel */
export function reciprocalQuantile(p: number, lower: number, upper: number): number {
  return pointAt(p, 1.0 - p, lower, upper);
}
export function reciprocalQuantile_p(p: number, lower: number, upper: number): number {
  return pointAt(p, 1.0 - p, lower, upper) * logRatio(upper, lower);
}
export function reciprocalQuantile_lower(p: number, lower: number, upper: number): number {
  return pointAt(p, 1.0 - p, lower, upper) * ((1.0 - p) / lower);
}
export function reciprocalQuantile_upper(p: number, lower: number, upper: number): number {
  return pointAt(p, 1.0 - p, lower, upper) * (p / upper);
}

/** Upper quantile, upper (lower / upper)^p. @kernel */
export function reciprocalUpperQuantile(p: number, lower: number, upper: number): number {
  return pointAt(1.0 - p, p, lower, upper);
}
export function reciprocalUpperQuantile_p(p: number, lower: number, upper: number): number {
  return -pointAt(1.0 - p, p, lower, upper) * logRatio(upper, lower);
}
export function reciprocalUpperQuantile_lower(p: number, lower: number, upper: number): number {
  return pointAt(1.0 - p, p, lower, upper) * (p / lower);
}
export function reciprocalUpperQuantile_upper(p: number, lower: number, upper: number): number {
  return pointAt(1.0 - p, p, lower, upper) * ((1.0 - p) / upper);
}

/** Draw from standard logistic noise, whose distribution function is the share below: fine at either end. @kernel */
export function reciprocalDraw(noise: number, lower: number, upper: number): number {
  return pointAt(sigmoid(noise), sigmoid(-noise), lower, upper);
}
export function reciprocalDraw_lower(noise: number, lower: number, upper: number): number {
  return pointAt(sigmoid(noise), sigmoid(-noise), lower, upper) * (sigmoid(-noise) / lower);
}
export function reciprocalDraw_upper(noise: number, lower: number, upper: number): number {
  return pointAt(sigmoid(noise), sigmoid(-noise), lower, upper) * (sigmoid(noise) / upper);
}

/** Mean, (upper − lower) / L. @kernel */
export function reciprocalMean(lower: number, upper: number): number {
  return (upper - lower) / logRatio(upper, lower);
}
export function reciprocalMean_lower(lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  return -log1pmx((upper - lower) / lower) / (l * l);
}
export function reciprocalMean_upper(lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  const s = (upper - lower) / upper;
  return (s < 0.3 ? -log1pmx(-s) : l - s) / (l * l);
}

/** sinh h / h and, left in `excess`, cosh h less that, a sum of positive terms; h ≥ 0. */
let excess: number = 0.0;
function relativeSinh(h: number): number {
  if (h > 1.0) {
    const e = Math.exp(h);
    const s = (e - 1.0 / e) / (2.0 * h);
    excess = 0.5 * (e + 1.0 / e) - s;
    return s;
  }
  // Term k is h^2k / (2k + 1)!, and 2k times as much of the excess.
  let term = 1.0;
  let s = 1.0;
  let c = 0.0;
  for (let k = 2.0; k < 20.0; k += 2.0) {
    term *= (h * h) / (k * (k + 1.0));
    s += term;
    c += k * term;
  }
  excess = c;
  return s;
}

/**
 * Variance, (upper² − lower²) / 2L − mean². With h = L / 2 and s(h) = sinh h / h it is
 * lower · upper · s (cosh h − s), of which nothing cancels in a narrow interval.
 * @kernel
 */
export function reciprocalVariance(lower: number, upper: number): number {
  const s = relativeSinh(0.5 * logRatio(upper, lower));
  return lower * upper * s * excess;
}

// h times the derivative of s (cosh h − s) in h.
function steepness(h: number): number {
  const s = relativeSinh(h);
  return excess * excess - s * excess + h * h * s * s;
}

export function reciprocalVariance_lower(lower: number, upper: number): number {
  const h = 0.5 * logRatio(upper, lower);
  const slope = steepness(h) / h;
  const s = relativeSinh(h);
  return 0.5 * upper * (2.0 * s * excess - slope);
}
export function reciprocalVariance_upper(lower: number, upper: number): number {
  const h = 0.5 * logRatio(upper, lower);
  const slope = steepness(h) / h;
  const s = relativeSinh(h);
  return 0.5 * lower * (2.0 * s * excess + slope);
}

/** Entropy, log L + ½ log(lower · upper). @kernel */
export function reciprocalEntropy(lower: number, upper: number): number {
  return logWidth(lower, upper) + 0.5 * (Math.log(lower) + Math.log(upper));
}
export function reciprocalEntropy_lower(lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  return (0.5 - 1.0 / l) / lower;
}
export function reciprocalEntropy_upper(lower: number, upper: number): number {
  const l = logRatio(upper, lower);
  return (0.5 + 1.0 / l) / upper;
}

/** Divergence, the log of the ratio of the two L where the other interval covers this one, else +∞. @kernel */
export function reciprocalKl(lower: number, upper: number, otherLower: number, otherUpper: number): number {
  if (lower < otherLower || upper > otherUpper) return Infinity;
  // log1p of the excess keeps the accuracy where the intervals nearly agree.
  return Math.log1p((logRatio(lower, otherLower) + logRatio(otherUpper, upper)) / logRatio(upper, lower));
}
function covers(lower: number, upper: number, otherLower: number, otherUpper: number): boolean {
  return lower >= otherLower && upper <= otherUpper;
}
export function reciprocalKl_lower(
  lower: number,
  upper: number,
  otherLower: number,
  otherUpper: number,
): number {
  return covers(lower, upper, otherLower, otherUpper) ? 1.0 / (lower * logRatio(upper, lower)) : 0.0;
}
export function reciprocalKl_upper(
  lower: number,
  upper: number,
  otherLower: number,
  otherUpper: number,
): number {
  return covers(lower, upper, otherLower, otherUpper) ? -1.0 / (upper * logRatio(upper, lower)) : 0.0;
}
export function reciprocalKl_otherLower(
  lower: number,
  upper: number,
  otherLower: number,
  otherUpper: number,
): number {
  if (!covers(lower, upper, otherLower, otherUpper)) return 0.0;
  return -1.0 / (otherLower * logRatio(otherUpper, otherLower));
}
export function reciprocalKl_otherUpper(
  lower: number,
  upper: number,
  otherLower: number,
  otherUpper: number,
): number {
  if (!covers(lower, upper, otherLower, otherUpper)) return 0.0;
  return 1.0 / (otherUpper * logRatio(otherUpper, otherLower));
}
