// The logit-normal distribution on (0, 1) in double precision: the log odds of a point are normal with mean
// `location` and deviation `scale`; z stands for (log odds − location) / scale.
// Source: Atchison and Shen (1980), "Logistic-normal distributions", Biometrika 67, section 2.
import { HALF_LOG_2PI } from '../constants.js';
import { logOddsDistance } from '../logOddsDistance.js';
import {
  logNormalCdf,
  logNormalCdfDerivative,
  normalCdf,
  normalDensity,
  scaledNormalDensity,
} from '../normalCdf.js';
import { normalQuantile, normalQuantile_x } from '../normalQuantile.js';
import { outside } from '../outside.js';
import { sigmoid } from '../sigmoid.js';

function isInside(x: number): boolean {
  return x > 0.0 && x < 1.0;
}
function standard(x: number, location: number, scale: number): number {
  return logOddsDistance(x, location) / scale;
}

/** Log density, −½ z² − log x − log(1 − x) − log scale − ½ log 2π; −∞ at and beyond 0 and 1. @kernel */
export function logitNormalLogDensity(x: number, location: number, scale: number): number {
  if (!isInside(x)) return outside(x);
  const z = standard(x, location, scale);
  return -0.5 * z * z - Math.log(x) - Math.log1p(-x) - Math.log(scale) - HALF_LOG_2PI;
}
export function logitNormalLogDensity_x(x: number, location: number, scale: number): number {
  if (!isInside(x)) return 0.0;
  return -(standard(x, location, scale) / scale + (1.0 - 2.0 * x)) / (x * (1.0 - x));
}
export function logitNormalLogDensity_location(x: number, location: number, scale: number): number {
  return isInside(x) ? standard(x, location, scale) / scale : 0.0;
}
export function logitNormalLogDensity_scale(x: number, location: number, scale: number): number {
  if (!isInside(x)) return 0.0;
  const z = standard(x, location, scale);
  return ((z - 1.0) * (z + 1.0)) / scale;
}

/** Distribution function, Φ(z). @kernel */
export function logitNormalCdf(x: number, location: number, scale: number): number {
  if (x <= 0.0) return 0.0;
  return x >= 1.0 ? 1.0 : normalCdf(standard(x, location, scale));
}
export function logitNormalCdf_x(x: number, location: number, scale: number): number {
  return isInside(x) ? normalDensity(standard(x, location, scale)) / scale / (x * (1.0 - x)) : 0.0;
}
export function logitNormalCdf_location(x: number, location: number, scale: number): number {
  return isInside(x) ? -normalDensity(standard(x, location, scale)) / scale : 0.0;
}
export function logitNormalCdf_scale(x: number, location: number, scale: number): number {
  return isInside(x) ? -scaledNormalDensity(standard(x, location, scale)) / scale : 0.0;
}

/** Survival function, Φ(−z). @kernel */
export function logitNormalSurvival(x: number, location: number, scale: number): number {
  if (x <= 0.0) return 1.0;
  return x >= 1.0 ? 0.0 : normalCdf(-standard(x, location, scale));
}
export function logitNormalSurvival_x(x: number, location: number, scale: number): number {
  return -logitNormalCdf_x(x, location, scale);
}
export function logitNormalSurvival_location(x: number, location: number, scale: number): number {
  return -logitNormalCdf_location(x, location, scale);
}
export function logitNormalSurvival_scale(x: number, location: number, scale: number): number {
  return -logitNormalCdf_scale(x, location, scale);
}

/** Log distribution function, log Φ(z). @kernel */
export function logitNormalLogCdf(x: number, location: number, scale: number): number {
  if (x <= 0.0) return -Infinity;
  return x >= 1.0 ? 0.0 : logNormalCdf(standard(x, location, scale));
}
// z times the derivative of log Φ there; zero where nothing is left of it.
function turned(z: number): number {
  return z > 40.0 ? 0.0 : z * logNormalCdfDerivative(z);
}
export function logitNormalLogCdf_x(x: number, location: number, scale: number): number {
  if (!isInside(x)) return 0.0;
  return logNormalCdfDerivative(standard(x, location, scale)) / scale / (x * (1.0 - x));
}
export function logitNormalLogCdf_location(x: number, location: number, scale: number): number {
  return isInside(x) ? -logNormalCdfDerivative(standard(x, location, scale)) / scale : 0.0;
}
export function logitNormalLogCdf_scale(x: number, location: number, scale: number): number {
  return isInside(x) ? -turned(standard(x, location, scale)) / scale : 0.0;
}

/** Log survival function, log Φ(−z). @kernel */
export function logitNormalLogSurvival(x: number, location: number, scale: number): number {
  if (x <= 0.0) return 0.0;
  return x >= 1.0 ? -Infinity : logNormalCdf(-standard(x, location, scale));
}
export function logitNormalLogSurvival_x(x: number, location: number, scale: number): number {
  if (!isInside(x)) return 0.0;
  return -logNormalCdfDerivative(-standard(x, location, scale)) / scale / (x * (1.0 - x));
}
export function logitNormalLogSurvival_location(x: number, location: number, scale: number): number {
  return isInside(x) ? logNormalCdfDerivative(-standard(x, location, scale)) / scale : 0.0;
}
export function logitNormalLogSurvival_scale(x: number, location: number, scale: number): number {
  return isInside(x) ? -turned(-standard(x, location, scale)) / scale : 0.0;
}

// The derivative of 1 / (1 + exp(−v)).
function slope(v: number): number {
  return sigmoid(v) * sigmoid(-v);
}

/** Quantile, 1 / (1 + exp(−location − scale Φ⁻¹(p))). @kernel */
export function logitNormalQuantile(p: number, location: number, scale: number): number {
  return sigmoid(location + scale * normalQuantile(p));
}
export function logitNormalQuantile_p(p: number, location: number, scale: number): number {
  return slope(location + scale * normalQuantile(p)) * scale * normalQuantile_x(p);
}
export function logitNormalQuantile_location(p: number, location: number, scale: number): number {
  return slope(location + scale * normalQuantile(p));
}
export function logitNormalQuantile_scale(p: number, location: number, scale: number): number {
  const q = normalQuantile(p);
  return q * slope(location + scale * q);
}

/** Upper quantile, 1 / (1 + exp(−location + scale Φ⁻¹(p))). @kernel */
export function logitNormalUpperQuantile(p: number, location: number, scale: number): number {
  return sigmoid(location - scale * normalQuantile(p));
}
export function logitNormalUpperQuantile_p(p: number, location: number, scale: number): number {
  return -slope(location - scale * normalQuantile(p)) * scale * normalQuantile_x(p);
}
export function logitNormalUpperQuantile_location(p: number, location: number, scale: number): number {
  return slope(location - scale * normalQuantile(p));
}
export function logitNormalUpperQuantile_scale(p: number, location: number, scale: number): number {
  const q = normalQuantile(p);
  return -q * slope(location - scale * q);
}

/** Draw, 1 / (1 + exp(−location − scale · noise)), held inside the open interval. @kernel */
export function logitNormalDraw(noise: number, location: number, scale: number): number {
  const x = sigmoid(location + scale * noise);
  return Math.min(Math.max(x, 1.401298464324817e-45), 1.0 - 5.9604644775390625e-8);
}
export function logitNormalDraw_location(noise: number, location: number, scale: number): number {
  return slope(location + scale * noise);
}
export function logitNormalDraw_scale(noise: number, location: number, scale: number): number {
  return noise * slope(location + scale * noise);
}
