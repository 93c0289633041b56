// The standard half-Cauchy distribution in double precision: the size of a standard Cauchy number.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), chapter 16.
import { logRatio } from '../deviance.js';
import { heldPositive } from '../heldPositive.js';
import { outside } from '../outside.js';
import {
  cauchyKl,
  cauchyKl_otherScale,
  cauchyKl_scale,
  cauchyLogSquare,
  cauchyLogSquare_d,
  cauchySpread,
} from './cauchy.js';

const halfPi = 1.57079632679489661923;
const logTwoOverPi = -0.45158270528945486473;

/** Log density, log(2 / π) − log scale − log(1 + z²) with z = x / scale ≥ 0. @kernel */
export function halfCauchyLogDensity(x: number, scale: number): number {
  return x >= 0.0 ? logTwoOverPi - cauchyLogSquare(x, scale) - Math.log(scale) : outside(x);
}
export function halfCauchyLogDensity_x(x: number, scale: number): number {
  return x >= 0.0 ? -cauchyLogSquare_d(x, scale) : 0.0;
}
export function halfCauchyLogDensity_scale(x: number, scale: number): number {
  return x >= 0.0 ? -cauchySpread(x / scale) / scale : 0.0;
}

/** Distribution function, 2 atan(z) / π. @kernel scaled probability */
export function halfCauchyCdf(z: number): number {
  return z <= 0.0 ? 0.0 : Math.atan(z) / halfPi;
}
export function halfCauchyCdf_z(z: number): number {
  return z >= 0.0 ? 1.0 / (halfPi * (1.0 + z * z)) : 0.0;
}

/** Survival function, 2 atan(1 / z) / π. @kernel scaled probability */
export function halfCauchySurvival(z: number): number {
  return z <= 0.0 ? 1.0 : Math.atan(1.0 / z) / halfPi;
}
export function halfCauchySurvival_z(z: number): number {
  return -halfCauchyCdf_z(z);
}

/** Log distribution function, from the smaller of the two probabilities; near 0 it is log(2z / π). @kernel */
export function halfCauchyLogCdf(x: number, scale: number): number {
  if (x <= 0.0) return -Infinity;
  const z = x / scale;
  if (z < 1.0e-9) return logRatio(x, scale) + logTwoOverPi;
  return z < 1.0 ? Math.log(halfCauchyCdf(z)) : Math.log1p(-halfCauchySurvival(z));
}
export function halfCauchyLogCdf_x(x: number, scale: number): number {
  return x > 0.0 ? logSlope(x / scale) / x : 0.0;
}
export function halfCauchyLogCdf_scale(x: number, scale: number): number {
  return x > 0.0 ? -logSlope(x / scale) / scale : 0.0;
}
// The derivative of the log distribution function in log z; of the log survival function it is −logSlope(1 / z).
function logSlope(z: number): number {
  if (z < 1.0e-9) return 1.0;
  return z > 1.0e9 ? 1.0 / (halfPi * z) : z / (1.0 + z * z) / Math.atan(z);
}

/** Log survival function, from the smaller of the two probabilities; far out it is −log(π z / 2). @kernel */
export function halfCauchyLogSurvival(x: number, scale: number): number {
  if (x <= 0.0) return 0.0;
  const z = x / scale;
  if (z > 1.0e9) return logTwoOverPi - logRatio(x, scale);
  return z < 1.0 ? Math.log1p(-halfCauchyCdf(z)) : Math.log(halfCauchySurvival(z));
}
export function halfCauchyLogSurvival_x(x: number, scale: number): number {
  // Near zero minus the density, also where z underflows.
  if (x < 1.0e-13 * scale) return x >= 0.0 ? -1.0 / (halfPi * scale) : 0.0;
  return x >= 0.0 ? -logSlope(scale / x) / x : 0.0;
}
export function halfCauchyLogSurvival_scale(x: number, scale: number): number {
  return x > 0.0 ? logSlope(scale / x) / scale : 0.0;
}

/** Quantile, tan(π p / 2), or the cotangent of the angle to the far end. @kernel scaled point */
export function halfCauchyQuantile(p: number): number {
  return p <= 0.5 ? Math.tan(halfPi * p) : 1.0 / Math.tan(halfPi * (1.0 - p));
}
export function halfCauchyQuantile_p(p: number): number {
  const q = halfCauchyQuantile(p);
  return halfPi * (1.0 + q * q);
}

/** Upper quantile, cot(π p / 2), or the tangent of the angle to the near end. @kernel scaled point */
export function halfCauchyUpperQuantile(p: number): number {
  return p <= 0.5 ? 1.0 / Math.tan(halfPi * p) : Math.tan(halfPi * (1.0 - p));
}
export function halfCauchyUpperQuantile_p(p: number): number {
  const q = halfCauchyUpperQuantile(p);
  return -halfPi * (1.0 + q * q);
}

/** Draw, scale · |noise| of standard Cauchy noise, kept finite. @kernel */
export function halfCauchyDraw(noise: number, scale: number): number {
  return heldPositive(scale * Math.abs(noise));
}
export function halfCauchyDraw_scale(noise: number, _scale: number): number {
  return Math.abs(noise);
}

/** Mode, 0. @kernel scaled center */
export function halfCauchyMode(): number {
  return 0.0;
}

/** Entropy, log 2π. @kernel scaled entropy */
export function halfCauchyEntropy(): number {
  return 1.8378770664093454836;
}

/**
 * Divergence, that of Cauchy distributions about one location, as the sign says nothing of the scale:
 * log((scale + otherScale)² / (4 scale otherScale)). Source: see cauchyKl. @kernel
 */
export function halfCauchyKl(scale: number, otherScale: number): number {
  return cauchyKl(0.0, scale, 0.0, otherScale);
}
export function halfCauchyKl_scale(scale: number, otherScale: number): number {
  return cauchyKl_scale(0.0, scale, 0.0, otherScale);
}
export function halfCauchyKl_otherScale(scale: number, otherScale: number): number {
  return cauchyKl_otherScale(0.0, scale, 0.0, otherScale);
}
