// The gamma distribution by its mean and dispersion, the squared coefficient of variation: shape 1 / dispersion,
// scale mean · dispersion. Formulas are written out where the ones in shape and scale would cancel.
// Source: McCullagh and Nelder, Generalized Linear Models (1989), chapter 8.
import { gammaAtZero, gammaFixedMeanSlope, gammaLogDensity_x, gammaSaddle } from './gamma.js';

/** Shape, 1 / dispersion. @joint gamma shape */
export function gammaMeanDispersionShape(_mean: number, dispersion: number): number {
  return 1.0 / dispersion;
}
export function gammaMeanDispersionShape_dispersion(_mean: number, dispersion: number): number {
  return -1.0 / dispersion / dispersion;
}

/** Scale, mean · dispersion. @joint gamma scale */
export function gammaMeanDispersionScale(mean: number, dispersion: number): number {
  return mean * dispersion;
}
export function gammaMeanDispersionScale_mean(_mean: number, dispersion: number): number {
  return dispersion;
}
export function gammaMeanDispersionScale_dispersion(mean: number, _dispersion: number): number {
  return mean;
}

/** Log density, from x − mean. */
export function gammaMeanDispersionLogDensity(x: number, mean: number, dispersion: number): number {
  if (!(x > 0.0))
    return x === 0.0 ? gammaAtZero(1.0 / dispersion, Math.log(mean)) : isNaN(x) ? NaN : -Infinity;
  return gammaSaddle(x, 1.0 / dispersion, mean);
}
export function gammaMeanDispersionLogDensity_x(x: number, mean: number, dispersion: number): number {
  if (!(x > 0.0)) return x === 0.0 ? gammaLogDensity_x(x, 1.0 / dispersion, mean * dispersion) : 0.0;
  return (mean - x - mean * dispersion) / x / mean / dispersion;
}
export function gammaMeanDispersionLogDensity_mean(x: number, mean: number, dispersion: number): number {
  return x >= 0.0 ? (x - mean) / mean / mean / dispersion : 0.0;
}
export function gammaMeanDispersionLogDensity_dispersion(
  x: number,
  mean: number,
  dispersion: number,
): number {
  if (!(x > 0.0)) return x === 0.0 ? Infinity : 0.0;
  return -gammaFixedMeanSlope(x, 1.0 / dispersion, mean) / dispersion / dispersion;
}

/** Mean. */
export function gammaMeanDispersionMean(mean: number, _dispersion: number): number {
  return mean;
}
export function gammaMeanDispersionMean_mean(_mean: number, _dispersion: number): number {
  return 1.0;
}
export function gammaMeanDispersionMean_dispersion(_mean: number, _dispersion: number): number {
  return 0.0;
}

/** Mode, mean · (1 − dispersion) for a dispersion below 1. */
export function gammaMeanDispersionMode(mean: number, dispersion: number): number {
  return dispersion < 1.0 ? mean * (1.0 - dispersion) : 0.0;
}
export function gammaMeanDispersionMode_mean(_mean: number, dispersion: number): number {
  return dispersion < 1.0 ? 1.0 - dispersion : 0.0;
}
export function gammaMeanDispersionMode_dispersion(mean: number, dispersion: number): number {
  return dispersion < 1.0 ? -mean : 0.0;
}
