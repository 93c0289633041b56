// Divergences between an exponential distribution and a half-normal or a Pareto one, by direct integration: both
// log densities are linear in x, x² or log x, whose means are known.
import { logProduct } from '../logProduct.js';

const rootTwoOverPi = 0.79788456080286535588;
const logTwoOverPi = -0.45158270528945486473;

/** Of a half-normal from an exponential: √(2/π) u − log u + log(2/π)/2 − 1/2 with u = scale · rate. @kernel */
export function halfNormalExponentialKl(scale: number, otherRate: number): number {
  const u = scale * otherRate;
  return rootTwoOverPi * u - logProduct(scale, otherRate) + 0.5 * (logTwoOverPi - 1.0);
}
export function halfNormalExponentialKl_scale(scale: number, otherRate: number): number {
  return rootTwoOverPi * otherRate - 1.0 / scale;
}
export function halfNormalExponentialKl_otherRate(scale: number, otherRate: number): number {
  return rootTwoOverPi * scale - 1.0 / otherRate;
}

/** Of an exponential from a half-normal: 1 / u² + log u − 1 − log(2/π)/2 with u = scale · rate. @kernel */
export function exponentialHalfNormalKl(rate: number, otherScale: number): number {
  const u = 1.0 / rate / otherScale;
  return u * u + logProduct(rate, otherScale) - (1.0 + 0.5 * logTwoOverPi);
}
export function exponentialHalfNormalKl_rate(rate: number, otherScale: number): number {
  const u = 1.0 / rate / otherScale;
  return (1.0 - 2.0 * u * u) / rate;
}
export function exponentialHalfNormalKl_otherScale(rate: number, otherScale: number): number {
  const u = 1.0 / rate / otherScale;
  return (1.0 - 2.0 * u * u) / otherScale;
}

/**
 * Of a Pareto from an exponential: log shape − log u − 1 − 1/shape + u shape / (shape − 1) with u = scale · rate;
 * infinite up to shape 1, where the mean is. @kernel
 */
export function paretoExponentialKl(scale: number, shape: number, otherRate: number): number {
  if (!(shape > 1.0)) return Infinity;
  const u = scale * otherRate;
  return (u * shape) / (shape - 1.0) + Math.log(shape) - logProduct(scale, otherRate) - 1.0 - 1.0 / shape;
}
export function paretoExponentialKl_scale(scale: number, shape: number, otherRate: number): number {
  return shape > 1.0 ? otherRate * (shape / (shape - 1.0)) - 1.0 / scale : 0.0;
}
export function paretoExponentialKl_shape(scale: number, shape: number, otherRate: number): number {
  if (!(shape > 1.0)) return 0.0;
  const gap = shape - 1.0;
  return (1.0 + 1.0 / shape) / shape - (scale * otherRate) / gap / gap;
}
export function paretoExponentialKl_otherRate(scale: number, shape: number, otherRate: number): number {
  return shape > 1.0 ? scale * (shape / (shape - 1.0)) - 1.0 / otherRate : 0.0;
}
