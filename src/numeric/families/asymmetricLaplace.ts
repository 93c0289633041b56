// The standard asymmetric Laplace distribution in double precision: exponential tails that fall like exp(−κ z) above
// zero and exp(z / κ) below, with κ the asymmetry. The share above zero is w = 1 / (1 + κ²).
// Source: Kotz, Kozubowski and Podgórski, The Laplace Distribution and Generalizations (2001), section 3.1; their
// scale is √2 times the one here, so that κ = 1 gives the Laplace distribution with the same scale.
import { logDistance } from '../logDistance.js';
import { lostBits } from '../lostBits.js';

// log(κ + 1 / κ), and its derivative times κ.
function logWidth(k: number): number {
  return k > 1.0 ? Math.log(k) + Math.log1p(1.0 / (k * k)) : Math.log1p(k * k) - Math.log(k);
}
export function widthSlope(k: number): number {
  return ((k - 1.0) * (k + 1.0)) / (k * k + 1.0);
}

/** Log density, −κ z above zero and z / κ below, less log(κ + 1 / κ). @kernel located density */
export function asymmetricLaplaceLogDensity(z: number, asymmetry: number): number {
  return (z < 0.0 ? z / asymmetry : -z * asymmetry) - logWidth(asymmetry);
}
export function asymmetricLaplaceLogDensity_z(z: number, asymmetry: number): number {
  return z < 0.0 ? 1.0 / asymmetry : z > 0.0 ? -asymmetry : 0.0;
}
export function asymmetricLaplaceLogDensity_asymmetry(z: number, asymmetry: number): number {
  const k = asymmetry;
  return (z < 0.0 ? -z / k / k : -z) - widthSlope(k) / k;
}

/** Distribution function, κ² w exp(z / κ) below zero and 1 − w exp(−κ z) above. @kernel located probability */
export function asymmetricLaplaceCdf(z: number, asymmetry: number): number {
  const square = asymmetry * asymmetry;
  if (z < 0.0) return (square / (1.0 + square)) * Math.exp(z / asymmetry);
  return (square - Math.expm1(-asymmetry * z)) / (1.0 + square);
}
export function asymmetricLaplaceCdf_z(z: number, asymmetry: number): number {
  const e = Math.exp(z < 0.0 ? z / asymmetry : -asymmetry * z);
  return (asymmetry * e) / (1.0 + asymmetry * asymmetry);
}
export function asymmetricLaplaceCdf_asymmetry(z: number, asymmetry: number): number {
  const l = z < 0.0 ? z / asymmetry : -asymmetry * z;
  // Nothing is left of it there, and z may be infinite.
  if (l < -800.0) return 0.0;
  const w = 1.0 / (1.0 + asymmetry * asymmetry);
  return Math.exp(l) * w * (Math.abs(z) + 2.0 * asymmetry * w);
}

/** Survival function, w exp(−κ z) above zero and 1 − κ² w exp(z / κ) below. @kernel located probability */
export function asymmetricLaplaceSurvival(z: number, asymmetry: number): number {
  const square = asymmetry * asymmetry;
  if (z >= 0.0) return Math.exp(-asymmetry * z) / (1.0 + square);
  return (1.0 - square * Math.expm1(z / asymmetry)) / (1.0 + square);
}
export function asymmetricLaplaceSurvival_z(z: number, asymmetry: number): number {
  return -asymmetricLaplaceCdf_z(z, asymmetry);
}
export function asymmetricLaplaceSurvival_asymmetry(z: number, asymmetry: number): number {
  return -asymmetricLaplaceCdf_asymmetry(z, asymmetry);
}

/** Log distribution function, by the smaller of the two probabilities. @kernel located probability */
export function asymmetricLaplaceLogCdf(z: number, asymmetry: number): number {
  if (z < 0.0) return z / asymmetry - Math.log1p(1.0 / (asymmetry * asymmetry));
  const rest = asymmetricLaplaceSurvival(z, asymmetry);
  return rest < 0.5 ? Math.log1p(-rest) : Math.log(asymmetricLaplaceCdf(z, asymmetry));
}
export function asymmetricLaplaceLogCdf_z(z: number, asymmetry: number): number {
  if (z < 0.0) return 1.0 / asymmetry;
  return asymmetricLaplaceCdf_z(z, asymmetry) / asymmetricLaplaceCdf(z, asymmetry);
}
export function asymmetricLaplaceLogCdf_asymmetry(z: number, asymmetry: number): number {
  const k = asymmetry;
  if (z < 0.0) return (-z / k + 2.0 / (1.0 + k * k)) / k;
  return asymmetricLaplaceCdf_asymmetry(z, k) / asymmetricLaplaceCdf(z, k);
}

/** Log survival function, by the smaller of the two probabilities. @kernel located probability */
export function asymmetricLaplaceLogSurvival(z: number, asymmetry: number): number {
  if (z >= 0.0) return -asymmetry * z - Math.log1p(asymmetry * asymmetry);
  const rest = asymmetricLaplaceCdf(z, asymmetry);
  return rest < 0.5 ? Math.log1p(-rest) : Math.log(asymmetricLaplaceSurvival(z, asymmetry));
}
export function asymmetricLaplaceLogSurvival_z(z: number, asymmetry: number): number {
  if (z >= 0.0) return -asymmetry;
  return -asymmetricLaplaceCdf_z(z, asymmetry) / asymmetricLaplaceSurvival(z, asymmetry);
}
export function asymmetricLaplaceLogSurvival_asymmetry(z: number, asymmetry: number): number {
  const k = asymmetry;
  if (z >= 0.0) return -z - (2.0 * k) / (1.0 + k * k);
  return -asymmetricLaplaceCdf_asymmetry(z, k) / asymmetricLaplaceSurvival(z, k);
}

/** The 24 leading bits of a number, by Dekker's splitting (Numer. Math. 18, 1971). */
function leading(v: number): number {
  const c = v * 536870913.0;
  return c - (c - v);
}

// below − κ² above, which has the sign of the quantile. Where it nearly vanishes the three parts of
// below − κ² + κ² below are added with the rounding of each sum kept.
function lead(below: number, above: number, k: number): number {
  const square = k * k;
  const direct = below - square * above;
  if (Math.abs(direct) > 0.01 * below || above > 0.9999) return direct;
  const head = leading(square);
  const first = below - square;
  const second = first + head * below;
  const lost = lostBits(below, -square, first) + lostBits(first, head * below, second);
  return second + (lost + (square - head) * below);
}
function pointAt(below: number, above: number, k: number): number {
  const d = lead(below, above, k);
  const width = 1.0 + k * k;
  return d < 0.0 ? -k * Math.log1p(-d / below / width) : Math.log1p(d / above / width) / k;
}
function slopeInShare(below: number, above: number, k: number): number {
  return lead(below, above, k) < 0.0 ? k / below : 1.0 / (k * above);
}
function slopeInAsymmetry(z: number, k: number): number {
  return -Math.abs(z) / k - 2.0 / (1.0 + k * k);
}

/** Quantile, κ log(p (1 + κ⁻²)) below zero and −log((1 − p) (1 + κ²)) / κ above. @kernel located point */
export function asymmetricLaplaceQuantile(p: number, asymmetry: number): number {
  return pointAt(p, 1.0 - p, asymmetry);
}
export function asymmetricLaplaceQuantile_p(p: number, asymmetry: number): number {
  return slopeInShare(p, 1.0 - p, asymmetry);
}
export function asymmetricLaplaceQuantile_asymmetry(p: number, asymmetry: number): number {
  return slopeInAsymmetry(pointAt(p, 1.0 - p, asymmetry), asymmetry);
}

/** Upper quantile: minus the quantile of the mirrored distribution, whose asymmetry is 1 / κ. @kernel located point */
export function asymmetricLaplaceUpperQuantile(p: number, asymmetry: number): number {
  return pointAt(1.0 - p, p, asymmetry);
}
export function asymmetricLaplaceUpperQuantile_p(p: number, asymmetry: number): number {
  return -slopeInShare(1.0 - p, p, asymmetry);
}
export function asymmetricLaplaceUpperQuantile_asymmetry(p: number, asymmetry: number): number {
  return slopeInAsymmetry(pointAt(1.0 - p, p, asymmetry), asymmetry);
}

/**
 * Draw from standard logistic noise, the log odds of a share below. With v = noise − 2 log κ, which is zero where the
 * draw is, it is −κ log1p(w (exp(−v) − 1)) below zero and log1p(κ² w (exp(v) − 1)) / κ above. @kernel located point
 */
export function asymmetricLaplaceDraw(noise: number, asymmetry: number): number {
  const v = -2.0 * logDistance(asymmetry, 0.5 * noise);
  const square = asymmetry * asymmetry;
  if (v < 0.0) return -asymmetry * Math.log1p(Math.expm1(-v) / (1.0 + square));
  return Math.log1p(Math.expm1(v) * (square / (1.0 + square))) / asymmetry;
}
export function asymmetricLaplaceDraw_asymmetry(noise: number, asymmetry: number): number {
  return slopeInAsymmetry(asymmetricLaplaceDraw(noise, asymmetry), asymmetry);
}

/** Mean, 1 / κ − κ. @kernel located center */
export function asymmetricLaplaceMean(asymmetry: number): number {
  return ((1.0 - asymmetry) * (1.0 + asymmetry)) / asymmetry;
}
export function asymmetricLaplaceMean_asymmetry(asymmetry: number): number {
  return -1.0 - 1.0 / (asymmetry * asymmetry);
}

/** Variance, κ² + 1 / κ². @kernel located spread */
export function asymmetricLaplaceVariance(asymmetry: number): number {
  return asymmetry * asymmetry + 1.0 / (asymmetry * asymmetry);
}
export function asymmetricLaplaceVariance_asymmetry(asymmetry: number): number {
  const k = asymmetry;
  return (2.0 * (k - 1.0) * (k + 1.0) * (1.0 + k * k)) / (k * k * k);
}

/** Entropy, 1 + log(κ + 1 / κ). @kernel located entropy */
export function asymmetricLaplaceEntropy(asymmetry: number): number {
  return 1.0 + logWidth(asymmetry);
}
export function asymmetricLaplaceEntropy_asymmetry(asymmetry: number): number {
  return widthSlope(asymmetry) / asymmetry;
}
