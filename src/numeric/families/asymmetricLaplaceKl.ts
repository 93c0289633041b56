// The divergence of asymmetric Laplace distributions in double precision.
import { logRatio } from '../deviance.js';
import { exponentialRemainder } from '../exponentialRemainder.js';
import { log1pmx } from '../log1pmx.js';
import { softplus } from '../softplus.js';
import { widthSlope } from './asymmetricLaplace.js';

// ρ − 1 − log ρ from ρ − 1 and log ρ, from ρ − 1 alone where ρ is not small.
function excess(lessOne: number, log: number): number {
  return lessOne < -0.5 ? lessOne - log : -log1pmx(lessOne);
}

// What the divergence is made of, for the other location at d ≥ 0 scales above this one: y = κ d, the relative
// excess of p's falling rates over q's above and below, and functions of y.
let k: number = 1.0;
let j: number = 1.0;
let w: number = 0.5;
let y: number = 0.0;
let above: number = 0.0;
let below: number = 0.0;
let rho: number = 1.0;
let sigma: number = 1.0;
let kSlope: number = 0.0;
let jSlope: number = 0.0;
let close: boolean = true;
let mirrored: boolean = false;
let gone: number = 0.0;
let bend: number = 0.0;
let turn: number = 0.0;

// s b / (t a) − 1, exactly cancelling where it is near zero; held where it leaves the doubles.
function relativeExcess(s: number, t: number, b: number, a: number): number {
  const ratio = Math.min(s / t, 1.0e250) * (b / a);
  return ratio > 0.5 && ratio < 2.0 ? (s * b - t * a) / (t * a) : ratio - 1.0;
}

function read(l: number, s: number, a: number, m: number, t: number, b: number): void {
  mirrored = m < l;
  k = mirrored ? 1.0 / a : a;
  j = mirrored ? 1.0 / b : b;
  w = 1.0 / (1.0 + k * k);
  y = k * (Math.abs(m - l) / s);
  const up = relativeExcess(s, t, b, a);
  const down = relativeExcess(s, t, a, b);
  above = mirrored ? down : up;
  below = mirrored ? up : down;
  // Not 1 + above and 1 + below: they may be far below what that can tell from zero.
  sigma = Math.min(s / t, 1.0e250) * (k / j);
  rho = Math.min(s / t, 1.0e250) * (j / k);
  kSlope = mirrored ? -widthSlope(a) : widthSlope(a);
  jSlope = mirrored ? -widthSlope(b) : widthSlope(b);
  close = y < 1.0 && Math.abs(above) < 0.5 && Math.abs(below) < 0.5;
  gone = Math.expm1(-y);
  bend = exponentialRemainder(-y);
  // exp(−y) (1 + y) − 1.
  turn = y > 40.0 ? -1.0 : bend + y * gone;
}

/**
 * Divergence from q = (location, scale, asymmetry) to p = (other…). A member is a choice of side and an exponential
 * beyond it. For p's location d ≥ 0 scales above q's, with y = κ d, ρ and σ the ratios of p's rates to q's above and
 * below, K(r) = r − 1 − log r and R = exp(−y) − 1 + y, it is
 * KL(sides) + κ² w K(σ) + w K(ρ exp(−y)) + w ((σ − 1) y + σ R / κ²), every part of second order where the two are
 * close. By direct integration; the mirrored case has 1 / κ for κ.
 * @kernel
 */
export function asymmetricLaplaceKl(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  const scales = logRatio(scale, otherScale);
  const tilt = logRatio(j, k);
  const square = k * k;
  // The sides as two Bernoulli distributions, by the less likely of q's.
  const p = k >= 1.0 ? w : square * w;
  const delta = k >= 1.0 ? -2.0 * tilt : 2.0 * tilt;
  const logit = -2.0 * Math.abs(Math.log(k));
  const sides =
    Math.abs(delta) < 1.0
      ? log1pmx(p * Math.expm1(delta)) + p * exponentialRemainder(delta)
      : softplus(logit + delta) - softplus(logit) - p * delta;
  const moved = above * (1.0 + gone) + gone;
  // Far apart the linear terms in y, which may be huge, are taken together.
  const far = moved < -0.5 ? moved - scales - tilt + sigma * y : below * y - log1pmx(moved);
  return sides + square * w * excess(below, scales - tilt) + w * (far + (sigma * bend) / square);
}

function slopeInLocation(s: number, t: number): number {
  const square = k * k;
  const sign = mirrored ? -k * w : k * w;
  // σ − ρ exp(−y) − σ (exp(−y) − 1) / κ²; the part of ρ that y takes is written apart where y is small.
  if (close) return (sign * (below - above - rho * gone - (sigma * gone) / square)) / s;
  const up = j / k;
  const down = k / j;
  const apart = y > 1.0 ? down - up * Math.exp(-y) : down - up - up * gone;
  return (sign * (apart - (down * gone) / square)) / t;
}
export function asymmetricLaplaceKl_location(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  return -slopeInLocation(scale, otherScale);
}
export function asymmetricLaplaceKl_otherLocation(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  return slopeInLocation(scale, otherScale);
}
export function asymmetricLaplaceKl_scale(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  const square = k * k;
  return (w * (above * (1.0 + turn) + turn + square * below + (sigma * turn) / square)) / scale;
}
export function asymmetricLaplaceKl_otherScale(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  const square = k * k;
  const rest = (y > 1.0 ? gone + sigma * y : bend + below * y) + (sigma * bend) / square;
  return (-w * (above * (1.0 + gone) + square * below + rest)) / otherScale;
}
export function asymmetricLaplaceKl_asymmetry(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  const square = k * k;
  const half = 2.0 * square * w;
  const shift = turn + half * gone;
  let slope = 0.0;
  if (close) {
    slope =
      below * square * w * (1.0 + 2.0 * w) -
      w * (above * (1.0 + turn + half * (1.0 + gone)) + shift) -
      (w / square) * sigma * shift;
  } else {
    // Term by term: with rates far from q's what is left of the others is the slope of log(κ + 1 / κ).
    const sides = sigma * square * (1.0 + 2.0 * w);
    const apart =
      y > 1.0
        ? sides - rho * Math.exp(-y) * (1.0 + half + y)
        : sides - rho * (1.0 + half) - rho * (gone * (1.0 + half + y) + y);
    slope = w * (apart - (sigma * shift) / square) - kSlope;
  }
  return (mirrored ? -slope : slope) / asymmetry;
}
export function asymmetricLaplaceKl_otherAsymmetry(
  location: number,
  scale: number,
  asymmetry: number,
  otherLocation: number,
  otherScale: number,
  otherAsymmetry: number,
): number {
  read(location, scale, asymmetry, otherLocation, otherScale, otherAsymmetry);
  const square = k * k;
  const taken = sigma * (y + bend / square);
  let slope = 0.0;
  if (close) {
    const difference = mirrored
      ? (2.0 * (asymmetry - otherAsymmetry) * (asymmetry + otherAsymmetry)) /
        (asymmetry * asymmetry * otherAsymmetry * otherAsymmetry)
      : 2.0 * (j - k) * (j + k);
    slope = (w * difference) / (1.0 + j * j) + w * (above - square * below + rho * gone - taken);
  } else {
    const apart = y > 1.0 ? rho * Math.exp(-y) - square * sigma : rho - square * sigma + rho * gone;
    slope = w * (apart - taken) + jSlope;
  }
  return (mirrored ? -slope : slope) / otherAsymmetry;
}
