import * as tf from '@tensorflow/tfjs';
import { TrainingError } from '../errors.js';
import { describe } from '../tensor/checks.js';

/** What tfjs optimizers keep per stepped variable. */
export interface Slot {
  originalName: string;
  variable: tf.Variable;
}

/** An optimizer's memory, as live references into it. */
export interface OptimizerState {
  /** The optimizer's class, such as `Adam`. */
  readonly kind: string;
  readonly iterations: number;
  /** Single variables by field, such as Adam's running powers of its decay rates. */
  readonly singles: ReadonlyMap<string, tf.Variable>;
  /** Lists of slots by field: the i-th slot belongs to the i-th variable ever passed to `applyGradients`. */
  readonly lists: ReadonlyMap<string, readonly Slot[]>;
}

/** Refuses what is not a tfjs optimizer. */
export function requireOptimizer(where: string, optimizer: unknown): asserts optimizer is tf.Optimizer {
  const methods = optimizer as Partial<tf.Optimizer> | null | undefined;
  if (typeof methods?.applyGradients !== 'function' || typeof methods.getClassName !== 'function') {
    throw new TrainingError(
      `${where}: optimizer must be a tfjs optimizer; got ${describe(optimizer)}; make one with for example tf.train.adam(1e-3)`,
    );
  }
}

const isSlot = (item: unknown): item is Slot =>
  typeof item === 'object' &&
  item !== null &&
  typeof (item as Slot).originalName === 'string' &&
  (item as Slot).variable instanceof tf.Variable;

/**
 * Reads the fields themselves. `getWeights` is not enough: Adamax has none, and Adam's `setWeights` computes
 * its running powers anew, which differs in the last bits from the product that an uninterrupted run holds.
 */
export function readOptimizer(optimizer: tf.Optimizer): OptimizerState {
  const singles = new Map<string, tf.Variable>();
  const lists = new Map<string, readonly Slot[]>();
  for (const [field, value] of Object.entries(optimizer)) {
    if (value instanceof tf.Variable) singles.set(field, value);
    else if (Array.isArray(value) && value.every(isSlot)) lists.set(field, value);
  }
  return { kind: optimizer.getClassName(), iterations: optimizer.iterations, singles, lists };
}

/** The name of the variable that a slot belongs to; tfjs appends `/m`, `/v` and the like. */
export function slotOwner(slot: Slot): string {
  return slot.originalName.slice(0, slot.originalName.lastIndexOf('/'));
}

/** The last part of a slot's name, such as `m`. */
export function slotRole(slot: Slot): string {
  return slot.originalName.slice(slot.originalName.lastIndexOf('/') + 1);
}

/** Sets the step counter, which tfjs offers no public setter for. */
export function setIterations(optimizer: tf.Optimizer, iterations: number): void {
  (optimizer as unknown as { iterations_: number }).iterations_ = iterations;
}

/** Replaces a list of slots, disposing those it no longer holds. */
export function setSlots(optimizer: tf.Optimizer, field: string, slots: readonly Slot[]): void {
  const fields = optimizer as unknown as Record<string, Slot[]>;
  const stay = new Set(slots.map((slot) => slot.variable));
  for (const slot of fields[field] ?? []) if (!stay.has(slot.variable)) slot.variable.dispose();
  fields[field] = [...slots];
}

/**
 * tfjs pairs slots with variables by position alone, so that the same variables in another order would step
 * with each other's memory, silently.
 */
export function requireSlotOrder(
  where: string,
  optimizer: tf.Optimizer,
  variables: readonly tf.Variable[],
): void {
  for (const slots of readOptimizer(optimizer).lists.values()) {
    for (const [i, slot] of slots.entries()) {
      if (slotOwner(slot) === variables[i]?.name) continue;
      throw new TrainingError(
        `${where}: optimizer must have stepped the same variables in the same order before; got the memory of ${slotOwner(slot)} where ${variables[i]?.name ?? 'nothing'} is trained; use a new optimizer`,
      );
    }
  }
}
