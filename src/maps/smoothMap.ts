import type * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import type { Support } from '../support/support.js';
import { describe } from '../tensor/checks.js';

/**
 * An invertible differentiable map with its log volume change, from one set onto another. The maps here act on
 * each number by itself and rise or fall throughout.
 */
export interface SmoothMap<Name extends string = string> {
  /** A name by which two pushforwards are told to go through the same map. */
  readonly name: Name;
  /** The set it maps from. */
  readonly from: Support;
  /** The set it maps onto. */
  readonly onto: Support;
  /** Whether it rises; a map that falls swaps the two tails. */
  readonly rising: boolean;
  /** The image of each point, differentiable. */
  apply(z: tf.Tensor): tf.Tensor;
  /** The point of each image, differentiable. Points outside the image may give anything. */
  invert(x: tf.Tensor): tf.Tensor;
  /** log |d apply / dz| at each point, differentiable. */
  logVolume(z: tf.Tensor): tf.Tensor;
}

/** Refuses what is no map. */
export function requireMap(where: string, map: SmoothMap): void {
  const steps = [map?.apply, map?.invert, map?.logVolume];
  if (steps.every((step) => typeof step === 'function')) return;
  throw new ParameterError(
    `${where}: map must have apply, invert and logVolume; got ${describe(map)}; pass for example expMap()`,
  );
}
