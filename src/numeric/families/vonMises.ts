// The von Mises distribution on the circle in double precision. Angles are compared by their distance from the
// location modulo 2π; its distribution function about 0 stands in ../vonMises.ts.
// Source: Mardia and Jupp, Directional Statistics (2000), section 3.5.4.
import { besselRatio, besselRatio_x, besselRatioComplement, logBesselI0e } from '../bessel.js';
import { NODES, WEIGHTS } from '../gaussLegendre.js';
import { lostBits } from '../lostBits.js';
import { outside } from '../outside.js';
import {
  vonMisesQuantile as angleOf,
  vonMisesQuantile_concentration as angleOf_concentration,
  vonMisesQuantile_p as angleOf_p,
  vonMisesLogCdf as logShareBelow,
  vonMisesLogCdf_concentration as logShareBelow_concentration,
  vonMisesLogCdf_x as logShareBelow_x,
  vonMisesCdf as shareBelow,
  vonMisesCdf_concentration as shareBelow_concentration,
  vonMisesCdf_x as shareBelow_x,
  vonMisesDrawDerivative,
} from '../vonMises.js';

const PI: number = 3.141592653589793;
const LOG_2PI: number = 1.8378770664093453;

/** sin((x − l) / 2), with relative accuracy near each of its zeros. */
function sinHalf(x: number, l: number): number {
  const d = x - l;
  const h = 0.5 * d;
  const e = 0.5 * lostBits(x, -l, d);
  return e === 0.0 ? Math.sin(h) : Math.sin(h) * Math.cos(e) + Math.cos(h) * Math.sin(e);
}

/** sin(x − l). */
function sinDistance(x: number, l: number): number {
  const d = x - l;
  const e = lostBits(x, -l, d);
  return e === 0.0 ? Math.sin(d) : Math.sin(d) * Math.cos(e) + Math.cos(d) * Math.sin(e);
}

/** x − l, or the angle in (−π, π] that differs from it by whole turns. */
function distance(x: number, l: number): number {
  const d = x - l;
  if (d >= -PI && d <= PI) return d;
  const half = sinHalf(x, l);
  return Math.atan2(sinDistance(x, l), 1.0 - 2.0 * half * half);
}

/** Log density, κ cos(x − location) − log(2π I₀(κ)), at any angle: it has period 2π. @kernel */
export function vonMisesLogDensity(x: number, location: number, concentration: number): number {
  if (!(Math.abs(x) < Infinity)) return outside(x);
  const s = sinHalf(x, location);
  return -2.0 * concentration * s * s - LOG_2PI - logBesselI0e(concentration);
}
export function vonMisesLogDensity_x(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? -concentration * sinDistance(x, location) : 0.0;
}
export function vonMisesLogDensity_location(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? concentration * sinDistance(x, location) : 0.0;
}
export function vonMisesLogDensity_concentration(x: number, location: number, concentration: number): number {
  if (!(Math.abs(x) < Infinity)) return 0.0;
  const s = sinHalf(x, location);
  return besselRatioComplement(concentration) - 2.0 * s * s;
}

/** The share of the arc from location − π forward to x. @kernel */
export function vonMisesCdf(x: number, location: number, concentration: number): number {
  if (!(Math.abs(x) < Infinity)) return x > 0.0 ? 1.0 : x < 0.0 ? 0.0 : NaN;
  return shareBelow(distance(x, location), concentration);
}
export function vonMisesCdf_x(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? shareBelow_x(distance(x, location), concentration) : 0.0;
}
export function vonMisesCdf_location(x: number, location: number, concentration: number): number {
  return -vonMisesCdf_x(x, location, concentration);
}
export function vonMisesCdf_concentration(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? shareBelow_concentration(distance(x, location), concentration) : 0.0;
}

/** The share of the arc from x forward to location + π. @kernel */
export function vonMisesSurvival(x: number, location: number, concentration: number): number {
  if (!(Math.abs(x) < Infinity)) return x > 0.0 ? 0.0 : x < 0.0 ? 1.0 : NaN;
  return shareBelow(-distance(x, location), concentration);
}
export function vonMisesSurvival_x(x: number, location: number, concentration: number): number {
  return -vonMisesCdf_x(x, location, concentration);
}
export function vonMisesSurvival_location(x: number, location: number, concentration: number): number {
  return vonMisesCdf_x(x, location, concentration);
}
export function vonMisesSurvival_concentration(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? shareBelow_concentration(-distance(x, location), concentration) : 0.0;
}

/** Logarithm of the distribution function. @kernel */
export function vonMisesLogCdf(x: number, location: number, concentration: number): number {
  if (!(Math.abs(x) < Infinity)) return x > 0.0 ? 0.0 : x < 0.0 ? -Infinity : NaN;
  return logShareBelow(distance(x, location), concentration);
}
export function vonMisesLogCdf_x(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? logShareBelow_x(distance(x, location), concentration) : 0.0;
}
export function vonMisesLogCdf_location(x: number, location: number, concentration: number): number {
  return -vonMisesLogCdf_x(x, location, concentration);
}
export function vonMisesLogCdf_concentration(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? logShareBelow_concentration(distance(x, location), concentration) : 0.0;
}

/** Logarithm of the survival function. @kernel */
export function vonMisesLogSurvival(x: number, location: number, concentration: number): number {
  if (!(Math.abs(x) < Infinity)) return x > 0.0 ? -Infinity : x < 0.0 ? 0.0 : NaN;
  return logShareBelow(-distance(x, location), concentration);
}
export function vonMisesLogSurvival_x(x: number, location: number, concentration: number): number {
  return Math.abs(x) < Infinity ? -logShareBelow_x(-distance(x, location), concentration) : 0.0;
}
export function vonMisesLogSurvival_location(x: number, location: number, concentration: number): number {
  return -vonMisesLogSurvival_x(x, location, concentration);
}
export function vonMisesLogSurvival_concentration(
  x: number,
  location: number,
  concentration: number,
): number {
  return Math.abs(x) < Infinity ? logShareBelow_concentration(-distance(x, location), concentration) : 0.0;
}

/** Quantile: the angle up to which a share p lies, from location − π at 0 to location + π at 1. @kernel */
export function vonMisesQuantile(p: number, location: number, concentration: number): number {
  return location + angleOf(p, concentration);
}
export function vonMisesQuantile_p(p: number, _location: number, concentration: number): number {
  return angleOf_p(p, concentration);
}
export function vonMisesQuantile_location(_p: number, _location: number, _concentration: number): number {
  return 1.0;
}
export function vonMisesQuantile_concentration(p: number, _location: number, concentration: number): number {
  return angleOf_concentration(p, concentration);
}

/** Upper quantile: the angle from which a share p lies. @kernel */
export function vonMisesUpperQuantile(p: number, location: number, concentration: number): number {
  return location - angleOf(p, concentration);
}
export function vonMisesUpperQuantile_p(p: number, _location: number, concentration: number): number {
  return -angleOf_p(p, concentration);
}
export function vonMisesUpperQuantile_location(
  _p: number,
  _location: number,
  _concentration: number,
): number {
  return 1.0;
}
export function vonMisesUpperQuantile_concentration(
  p: number,
  _location: number,
  concentration: number,
): number {
  return -angleOf_concentration(p, concentration);
}

/** A draw that an exact sampler made; its derivative in κ is at a fixed uniform. @kernel */
export function vonMisesDraw(x: number, _location: number, _concentration: number): number {
  return x;
}
export function vonMisesDraw_x(_x: number, _location: number, _concentration: number): number {
  return 1.0;
}
export function vonMisesDraw_location(_x: number, _location: number, _concentration: number): number {
  return 1.0;
}
export function vonMisesDraw_concentration(x: number, location: number, concentration: number): number {
  return vonMisesDrawDerivative(distance(x, location), concentration);
}

/** Circular variance, 1 − A(κ) with A = I₁ / I₀. @kernel */
export function vonMisesVariance(concentration: number): number {
  return besselRatioComplement(concentration);
}
export function vonMisesVariance_concentration(concentration: number): number {
  return -besselRatio_x(concentration);
}

/** Entropy, log(2π I₀(κ)) − κ A(κ). @kernel */
export function vonMisesEntropy(concentration: number): number {
  return LOG_2PI + logBesselI0e(concentration) + concentration * besselRatioComplement(concentration);
}
export function vonMisesEntropy_concentration(concentration: number): number {
  return -concentration * besselRatio_x(concentration);
}

/** Whether A′ is so smooth between the two that one rule integrates it: within a factor of two, or both below 2. */
function areClose(k: number, l: number): boolean {
  const high = Math.max(k, l);
  return high <= 2.0 || 2.0 * Math.min(k, l) >= high;
}

/** ∫ (l − t) A′(t) dt from k to l. */
function momentBetween(k: number, l: number): number {
  const half = 0.5 * (l - k);
  let sum = 0.0;
  for (let i = 0; i < 24; i++) {
    const j = i < 12 ? i : i - 12;
    const node = i < 12 ? -NODES[j]! : NODES[j]!;
    sum += WEIGHTS[j]! * (1.0 - node) * besselRatio_x(k + half * (1.0 + node));
  }
  return half * half * sum;
}

/** A(l) − A(k). */
function ratioBetween(k: number, l: number): number {
  if (!areClose(k, l)) {
    if (k < 1.0 || l < 1.0) return besselRatio(l) - besselRatio(k);
    return besselRatioComplement(k) - besselRatioComplement(l);
  }
  const half = 0.5 * (l - k);
  let sum = 0.0;
  for (let i = 0; i < 24; i++) {
    const j = i < 12 ? i : i - 12;
    const node = i < 12 ? -NODES[j]! : NODES[j]!;
    sum += WEIGHTS[j]! * besselRatio_x(k + half * (1.0 + node));
  }
  return half * sum;
}

/**
 * Divergence: with κ, λ the concentrations and Δ the distance of the locations, 2 λ A(κ) sin²(Δ/2) plus
 * log I₀(λ) − log I₀(κ) − A(κ) (λ − κ). The latter is the integral of (λ − t) A′(t) from κ to λ, whose integrand has
 * one sign: so it is computed where κ and λ are close. @kernel
 */
export function vonMisesKl(
  location: number,
  concentration: number,
  otherLocation: number,
  otherConcentration: number,
): number {
  const s = sinHalf(location, otherLocation);
  const shift = 2.0 * otherConcentration * besselRatio(concentration) * s * s;
  if (areClose(concentration, otherConcentration)) {
    return shift + momentBetween(concentration, otherConcentration);
  }
  const rise = logBesselI0e(otherConcentration) - logBesselI0e(concentration);
  return shift + rise + besselRatioComplement(concentration) * (otherConcentration - concentration);
}
export function vonMisesKl_location(
  location: number,
  concentration: number,
  otherLocation: number,
  otherConcentration: number,
): number {
  return otherConcentration * besselRatio(concentration) * sinDistance(location, otherLocation);
}
export function vonMisesKl_concentration(
  location: number,
  concentration: number,
  otherLocation: number,
  otherConcentration: number,
): number {
  const s = sinHalf(location, otherLocation);
  const change = concentration - otherConcentration + 2.0 * otherConcentration * s * s;
  return besselRatio_x(concentration) * change;
}
export function vonMisesKl_otherLocation(
  location: number,
  concentration: number,
  otherLocation: number,
  otherConcentration: number,
): number {
  return -vonMisesKl_location(location, concentration, otherLocation, otherConcentration);
}
export function vonMisesKl_otherConcentration(
  location: number,
  concentration: number,
  otherLocation: number,
  otherConcentration: number,
): number {
  const s = sinHalf(location, otherLocation);
  return 2.0 * besselRatio(concentration) * s * s + ratioBetween(concentration, otherConcentration);
}
