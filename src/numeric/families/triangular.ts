// The triangular distribution on [lower, upper] with its highest density at `peak`, in double precision. W is the
// width upper − lower, U = peak − lower and V = upper − peak, of which one may be zero.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), section 26.9.
import { outside } from '../outside.js';
import { sigmoid } from '../sigmoid.js';

const log2 = 0.69314718055994530942;

/**
 * Log density: log 2 + log(x − lower) − log W − log U before the peak, log 2 + log(upper − x) − log W − log V after
 * it, log 2 − log W at it; −∞ at and beyond the ends that are not the peak.
 * @kernel
 */
export function triangularLogDensity(x: number, lower: number, peak: number, upper: number): number {
  const w = upper - lower;
  if (x === peak) return log2 - Math.log(w);
  if (!(x > lower && x < upper)) return outside(x);
  if (x < peak) return log2 + Math.log((x - lower) / (peak - lower)) - Math.log(w);
  return log2 + Math.log((upper - x) / (upper - peak)) - Math.log(w);
}
// At the peak the density has a kink; its derivatives in the point and the peak are taken to be zero.
export function triangularLogDensity_x(x: number, lower: number, peak: number, upper: number): number {
  if (!(x > lower && x < upper) || x === peak) return 0.0;
  return x < peak ? 1.0 / (x - lower) : -1.0 / (upper - x);
}
export function triangularLogDensity_lower(x: number, lower: number, peak: number, upper: number): number {
  if (x === peak || (x > peak && x < upper)) return 1.0 / (upper - lower);
  if (!(x > lower && x < peak)) return 0.0;
  return 1.0 / (upper - lower) - (peak - x) / ((x - lower) * (peak - lower));
}
export function triangularLogDensity_peak(x: number, lower: number, peak: number, upper: number): number {
  if (!(x > lower && x < upper) || x === peak) return 0.0;
  return x < peak ? -1.0 / (peak - lower) : 1.0 / (upper - peak);
}
export function triangularLogDensity_upper(x: number, lower: number, peak: number, upper: number): number {
  if (x === peak || (x < peak && x > lower)) return -1.0 / (upper - lower);
  if (!(x > peak && x < upper)) return 0.0;
  return (x - peak) / ((upper - x) * (upper - peak)) - 1.0 / (upper - lower);
}

/**
 * Distribution function: (x − lower)² / (W U) up to the peak; beyond it 1 − (upper − x)² / (W V), multiplied out so
 * that nothing cancels.
 * @kernel
 */
export function triangularCdf(x: number, lower: number, peak: number, upper: number): number {
  if (x <= lower) return 0.0;
  if (x >= upper) return 1.0;
  const w = upper - lower;
  if (x < peak) return ((x - lower) / w) * ((x - lower) / (peak - lower));
  return ((upper - x) * (x - peak + (x - lower)) + (x - lower) * (x - peak)) / (w * (upper - peak));
}
export function triangularCdf_x(x: number, lower: number, peak: number, upper: number): number {
  if (!(x > lower && x < upper)) return 0.0;
  const w = upper - lower;
  return x < peak ? (2.0 * (x - lower)) / (w * (peak - lower)) : (2.0 * (upper - x)) / (w * (upper - peak));
}
export function triangularCdf_lower(x: number, lower: number, peak: number, upper: number): number {
  if (!(x > lower && x < upper)) return 0.0;
  const w = upper - lower;
  const u = peak - lower;
  if (x < peak) return (-(x - lower) / (w * u)) * ((upper - x) / w + (peak - x) / u);
  return (-(upper - x) / w) * ((upper - x) / (w * (upper - peak)));
}
export function triangularCdf_peak(x: number, lower: number, peak: number, upper: number): number {
  if (!(x > lower && x < upper)) return 0.0;
  const w = upper - lower;
  const t = x < peak ? (x - lower) / (peak - lower) : (upper - x) / (upper - peak);
  return (-t * t) / w;
}
export function triangularCdf_upper(x: number, lower: number, peak: number, upper: number): number {
  if (!(x > lower && x < upper)) return 0.0;
  const w = upper - lower;
  const v = upper - peak;
  if (x < peak) return (-(x - lower) / w) * ((x - lower) / (w * (peak - lower)));
  return (-(upper - x) / (w * v)) * ((x - lower) / w + (x - peak) / v);
}

/** Survival function: the distribution function of the mirrored triangle. @kernel */
export function triangularSurvival(x: number, lower: number, peak: number, upper: number): number {
  return triangularCdf(-x, -upper, -peak, -lower);
}
export function triangularSurvival_x(x: number, lower: number, peak: number, upper: number): number {
  return -triangularCdf_x(x, lower, peak, upper);
}
export function triangularSurvival_lower(x: number, lower: number, peak: number, upper: number): number {
  return -triangularCdf_lower(x, lower, peak, upper);
}
export function triangularSurvival_peak(x: number, lower: number, peak: number, upper: number): number {
  return -triangularCdf_peak(x, lower, peak, upper);
}
export function triangularSurvival_upper(x: number, lower: number, peak: number, upper: number): number {
  return -triangularCdf_upper(x, lower, peak, upper);
}

/** Log distribution function, by the smaller of the two probabilities. @kernel */
export function triangularLogCdf(x: number, lower: number, peak: number, upper: number): number {
  const p = triangularCdf(x, lower, peak, upper);
  return p < 0.5 ? Math.log(p) : Math.log1p(-triangularSurvival(x, lower, peak, upper));
}
// A slope over its probability; zero where there is no probability.
function over(slope: number, p: number): number {
  return slope === 0.0 ? slope : slope / p;
}
export function triangularLogCdf_x(x: number, lower: number, peak: number, upper: number): number {
  return over(triangularCdf_x(x, lower, peak, upper), triangularCdf(x, lower, peak, upper));
}
export function triangularLogCdf_lower(x: number, lower: number, peak: number, upper: number): number {
  return over(triangularCdf_lower(x, lower, peak, upper), triangularCdf(x, lower, peak, upper));
}
export function triangularLogCdf_peak(x: number, lower: number, peak: number, upper: number): number {
  return over(triangularCdf_peak(x, lower, peak, upper), triangularCdf(x, lower, peak, upper));
}
export function triangularLogCdf_upper(x: number, lower: number, peak: number, upper: number): number {
  return over(triangularCdf_upper(x, lower, peak, upper), triangularCdf(x, lower, peak, upper));
}

/** Log survival function: the log distribution function of the mirrored triangle. @kernel */
export function triangularLogSurvival(x: number, lower: number, peak: number, upper: number): number {
  return triangularLogCdf(-x, -upper, -peak, -lower);
}
export function triangularLogSurvival_x(x: number, lower: number, peak: number, upper: number): number {
  return -triangularLogCdf_x(-x, -upper, -peak, -lower);
}
export function triangularLogSurvival_lower(x: number, lower: number, peak: number, upper: number): number {
  return -triangularLogCdf_upper(-x, -upper, -peak, -lower);
}
export function triangularLogSurvival_peak(x: number, lower: number, peak: number, upper: number): number {
  return -triangularLogCdf_peak(-x, -upper, -peak, -lower);
}
export function triangularLogSurvival_upper(x: number, lower: number, peak: number, upper: number): number {
  return -triangularLogCdf_lower(-x, -upper, -peak, -lower);
}

/**
 * (x − lower) / W at the point with the shares `below` and `above`, and (upper − x) / W left in `rest`. Each is the
 * root of a share where the side holds the point, and one less the root of the other otherwise, whose complement
 * is written out: 1 − √(1 − r) = r / (1 + √(1 − r)).
 */
let rest: number = 0.0;
// Whether the point lies before the peak, told by the smaller share, whichever way round the triangle is read.
function isBefore(below: number, above: number, u: number, v: number, w: number): boolean {
  return below < above ? below * w <= u : above * w > v;
}
function place(below: number, above: number, u: number, v: number, w: number): number {
  if (isBefore(below, above, u, v, w)) {
    const t = Math.sqrt(below * (u / w));
    rest = (above + below * (v / w)) / (1.0 + t);
    return t;
  }
  rest = Math.sqrt(above * (v / w));
  return (below + above * (u / w)) / (1.0 + rest);
}
function pointAt(below: number, above: number, lower: number, peak: number, upper: number): number {
  const w = upper - lower;
  const t = place(below, above, peak - lower, upper - peak, w);
  return t < 0.5 ? lower + w * t : upper - w * rest;
}
function slopeInShare(below: number, above: number, lower: number, peak: number, upper: number): number {
  const w = upper - lower;
  const u = peak - lower;
  const v = upper - peak;
  const t = place(below, above, u, v, w);
  return isBefore(below, above, u, v, w) ? (0.5 * u) / t : (0.5 * v) / rest;
}
function slopeInLower(below: number, above: number, lower: number, peak: number, upper: number): number {
  const w = upper - lower;
  const u = peak - lower;
  const v = upper - peak;
  const t = place(below, above, u, v, w);
  if (!isBefore(below, above, u, v, w)) return 0.5 * rest;
  return 0.5 * ((t < 0.5 ? u - w * t : w * rest - v) / u + rest);
}
function slopeInPeak(below: number, above: number, lower: number, peak: number, upper: number): number {
  const w = upper - lower;
  const u = peak - lower;
  const v = upper - peak;
  const t = place(below, above, u, v, w);
  return isBefore(below, above, u, v, w) ? (0.5 * t * w) / u : (0.5 * rest * w) / v;
}

/** Quantile, lower + √(p W U) up to the peak and upper − √((1 − p) W V) beyond it. @kernel */
export function triangularQuantile(p: number, lower: number, peak: number, upper: number): number {
  return pointAt(p, 1.0 - p, lower, peak, upper);
}
export function triangularQuantile_p(p: number, lower: number, peak: number, upper: number): number {
  return slopeInShare(p, 1.0 - p, lower, peak, upper);
}
export function triangularQuantile_lower(p: number, lower: number, peak: number, upper: number): number {
  return slopeInLower(p, 1.0 - p, lower, peak, upper);
}
export function triangularQuantile_peak(p: number, lower: number, peak: number, upper: number): number {
  return slopeInPeak(p, 1.0 - p, lower, peak, upper);
}
export function triangularQuantile_upper(p: number, lower: number, peak: number, upper: number): number {
  return slopeInLower(1.0 - p, p, -upper, -peak, -lower);
}

/** Upper quantile: minus the quantile of the mirrored triangle. @kernel */
export function triangularUpperQuantile(p: number, lower: number, peak: number, upper: number): number {
  return pointAt(1.0 - p, p, lower, peak, upper);
}
export function triangularUpperQuantile_p(p: number, lower: number, peak: number, upper: number): number {
  return -slopeInShare(1.0 - p, p, lower, peak, upper);
}
export function triangularUpperQuantile_lower(p: number, lower: number, peak: number, upper: number): number {
  return slopeInLower(1.0 - p, p, lower, peak, upper);
}
export function triangularUpperQuantile_peak(p: number, lower: number, peak: number, upper: number): number {
  return slopeInPeak(1.0 - p, p, lower, peak, upper);
}
export function triangularUpperQuantile_upper(p: number, lower: number, peak: number, upper: number): number {
  return slopeInLower(p, 1.0 - p, -upper, -peak, -lower);
}

/** Draw from standard logistic noise, whose distribution function is the share below: fine at either end. @kernel */
export function triangularDraw(noise: number, lower: number, peak: number, upper: number): number {
  return pointAt(sigmoid(noise), sigmoid(-noise), lower, peak, upper);
}
export function triangularDraw_lower(noise: number, lower: number, peak: number, upper: number): number {
  return slopeInLower(sigmoid(noise), sigmoid(-noise), lower, peak, upper);
}
export function triangularDraw_peak(noise: number, lower: number, peak: number, upper: number): number {
  return slopeInPeak(sigmoid(noise), sigmoid(-noise), lower, peak, upper);
}
export function triangularDraw_upper(noise: number, lower: number, peak: number, upper: number): number {
  return slopeInLower(sigmoid(-noise), sigmoid(noise), -upper, -peak, -lower);
}

/** Mean, (lower + peak + upper) / 3. @kernel */
export function triangularMean(lower: number, peak: number, upper: number): number {
  return (lower + peak + upper) / 3.0;
}
export function triangularMean_lower(_lower: number, _peak: number, _upper: number): number {
  return 1.0 / 3.0;
}
export function triangularMean_peak(_lower: number, _peak: number, _upper: number): number {
  return 1.0 / 3.0;
}
export function triangularMean_upper(_lower: number, _peak: number, _upper: number): number {
  return 1.0 / 3.0;
}

/** Variance, (U² + U V + V²) / 18. @kernel */
export function triangularVariance(lower: number, peak: number, upper: number): number {
  const u = peak - lower;
  const v = upper - peak;
  return (u * u + u * v + v * v) / 18.0;
}
export function triangularVariance_lower(lower: number, peak: number, upper: number): number {
  return -(2.0 * (peak - lower) + (upper - peak)) / 18.0;
}
export function triangularVariance_peak(lower: number, peak: number, upper: number): number {
  return (peak - lower - (upper - peak)) / 18.0;
}
export function triangularVariance_upper(lower: number, peak: number, upper: number): number {
  return (peak - lower + 2.0 * (upper - peak)) / 18.0;
}

/** Entropy, ½ + log(W / 2), whatever the peak. @kernel */
export function triangularEntropy(lower: number, _peak: number, upper: number): number {
  return 0.5 - log2 + Math.log(upper - lower);
}
export function triangularEntropy_lower(lower: number, _peak: number, upper: number): number {
  return -1.0 / (upper - lower);
}
export function triangularEntropy_peak(_lower: number, _peak: number, _upper: number): number {
  return 0.0;
}
export function triangularEntropy_upper(lower: number, _peak: number, upper: number): number {
  return 1.0 / (upper - lower);
}
