import * as tf from '@tensorflow/tfjs';

const accelerators = new Set(['webgl', 'webgpu']);

/** Whether the current backend keeps tensors on a device, where reading them back costs a round trip. */
export function onAccelerator(): boolean {
  return accelerators.has(tf.getBackend());
}

let checkOnAccelerators = false;

/**
 * Turns the checking of parameter values on or off for accelerator backends. On the cpu and wasm backends
 * values are always checked, since looking at them is free; on webgl and webgpu it would force a read from
 * the device, so there it is off until asked for.
 *
 * @param enabled - whether distributions check their parameters' values on an accelerator too
 * @example
 * ```ts
 * import { checkValues } from 'leadline';
 * checkValues(true);
 * console.log('parameters are checked on every backend');
 * // parameters are checked on every backend
 * ```
 */
export function checkValues(enabled: boolean): void {
  checkOnAccelerators = enabled;
}

/** Whether parameter values may be read now. */
export function valuesAreChecked(): boolean {
  return checkOnAccelerators || !onAccelerator();
}
