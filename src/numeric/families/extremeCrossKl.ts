// Divergences between Weibull distributions and the members of its family that have names of their own: an exponential
// is a Weibull of shape 1 and scale 1 / rate, a Rayleigh one of shape 2 and scale √2 · scale.
// Source: the divergence of Weibull distributions, see weibullKl.
import { logRatio } from '../deviance.js';
import { logProduct } from '../logProduct.js';
import { extremeKl, extremeKlDistance, extremeKlRatio, extremeKlUnit } from './extremeKl.js';

const ROOT_2 = 1.4142135623730951;

/** Of an exponential from a Weibull. @kernel */
export function exponentialWeibullKl(rate: number, otherScale: number, otherShape: number): number {
  const d = otherShape * logProduct(rate, otherScale);
  return extremeKl(otherShape, otherShape - 1.0, d, Math.log(otherShape));
}
export function exponentialWeibullKl_rate(rate: number, otherScale: number, otherShape: number): number {
  const d = otherShape * logProduct(rate, otherScale);
  return (otherShape * extremeKlDistance(otherShape, otherShape - 1.0, d)) / rate;
}
export function exponentialWeibullKl_otherScale(
  rate: number,
  otherScale: number,
  otherShape: number,
): number {
  const d = otherShape * logProduct(rate, otherScale);
  return (otherShape * extremeKlDistance(otherShape, otherShape - 1.0, d)) / otherScale;
}
export function exponentialWeibullKl_otherShape(
  rate: number,
  otherScale: number,
  otherShape: number,
): number {
  const d = otherShape * logProduct(rate, otherScale);
  return extremeKlUnit(otherShape, otherShape - 1.0, d) / otherShape;
}

/** Of a Weibull from an exponential. @kernel */
export function weibullExponentialKl(scale: number, shape: number, otherRate: number): number {
  const d = -logProduct(scale, otherRate);
  return extremeKl(1.0 / shape, (1.0 - shape) / shape, d, -Math.log(shape));
}
export function weibullExponentialKl_scale(scale: number, shape: number, otherRate: number): number {
  const d = -logProduct(scale, otherRate);
  return -extremeKlDistance(1.0 / shape, (1.0 - shape) / shape, d) / scale;
}
export function weibullExponentialKl_shape(scale: number, shape: number, otherRate: number): number {
  const d = -logProduct(scale, otherRate);
  return -extremeKlRatio(1.0 / shape, (1.0 - shape) / shape, d) / shape;
}
export function weibullExponentialKl_otherRate(scale: number, shape: number, otherRate: number): number {
  const d = -logProduct(scale, otherRate);
  return -extremeKlDistance(1.0 / shape, (1.0 - shape) / shape, d) / otherRate;
}

/** Of a Rayleigh from a Weibull. @kernel */
export function rayleighWeibullKl(scale: number, otherScale: number, otherShape: number): number {
  const d = -otherShape * logRatio(ROOT_2 * scale, otherScale);
  return extremeKl(0.5 * otherShape, 0.5 * (otherShape - 2.0), d, Math.log(0.5 * otherShape));
}
export function rayleighWeibullKl_scale(scale: number, otherScale: number, otherShape: number): number {
  const d = -otherShape * logRatio(ROOT_2 * scale, otherScale);
  return (-otherShape * extremeKlDistance(0.5 * otherShape, 0.5 * (otherShape - 2.0), d)) / scale;
}
export function rayleighWeibullKl_otherScale(scale: number, otherScale: number, otherShape: number): number {
  const d = -otherShape * logRatio(ROOT_2 * scale, otherScale);
  return (otherShape * extremeKlDistance(0.5 * otherShape, 0.5 * (otherShape - 2.0), d)) / otherScale;
}
export function rayleighWeibullKl_otherShape(scale: number, otherScale: number, otherShape: number): number {
  const d = -otherShape * logRatio(ROOT_2 * scale, otherScale);
  return extremeKlUnit(0.5 * otherShape, 0.5 * (otherShape - 2.0), d) / otherShape;
}

/** Of a Weibull from a Rayleigh. @kernel */
export function weibullRayleighKl(scale: number, shape: number, otherScale: number): number {
  const d = -2.0 * logRatio(scale, ROOT_2 * otherScale);
  return extremeKl(2.0 / shape, (2.0 - shape) / shape, d, -Math.log(0.5 * shape));
}
export function weibullRayleighKl_scale(scale: number, shape: number, otherScale: number): number {
  const d = -2.0 * logRatio(scale, ROOT_2 * otherScale);
  return (-2.0 * extremeKlDistance(2.0 / shape, (2.0 - shape) / shape, d)) / scale;
}
export function weibullRayleighKl_shape(scale: number, shape: number, otherScale: number): number {
  const d = -2.0 * logRatio(scale, ROOT_2 * otherScale);
  return -extremeKlRatio(2.0 / shape, (2.0 - shape) / shape, d) / shape;
}
export function weibullRayleighKl_otherScale(scale: number, shape: number, otherScale: number): number {
  const d = -2.0 * logRatio(scale, ROOT_2 * otherScale);
  return (2.0 * extremeKlDistance(2.0 / shape, (2.0 - shape) / shape, d)) / otherScale;
}
