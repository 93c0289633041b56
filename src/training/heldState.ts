import * as tf from '@tensorflow/tfjs';
import { readOptimizer, setIterations, setSlots } from './optimizerState.js';

/** A way back: the values that variables and an optimizer had. */
export interface HeldState {
  /** Puts the values back. */
  restore(): void;
  /** Lets go of the values. Call it once, after `restore` or instead of it. */
  dispose(): void;
}

/**
 * Holds the present values of variables and of an optimizer's memory. Nothing is copied: assigning to a
 * variable gives it other data, and the clones made here keep the old data alive.
 */
export function holdState(optimizer: tf.Optimizer, variables: readonly tf.Variable[]): HeldState {
  const state = readOptimizer(optimizer);
  const lists = new Map([...state.lists].map(([field, slots]) => [field, [...slots]]));
  const slotVariables = [...lists.values()].flat().map((slot) => slot.variable);
  const targets = [...variables, ...state.singles.values(), ...slotVariables];
  // Kept, so that an enclosing tf.tidy of the caller does not take them away.
  const values = targets.map((variable) => tf.keep(tf.clone(variable)));
  return {
    restore() {
      for (const [i, target] of targets.entries()) target.assign(values[i]!);
      for (const [field, slots] of lists) setSlots(optimizer, field, slots);
      setIterations(optimizer, state.iterations);
    },
    dispose() {
      tf.dispose(values);
    },
  };
}
