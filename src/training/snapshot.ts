import * as tf from '@tensorflow/tfjs';
import { requireCount } from '../tensor/checks.js';
import { findVariables, type VariableSource } from './variables.js';

/**
 * A copy of variables that can be taken anew and put back. Being a `VariableSource` itself, it can be written
 * into a checkpoint beside the variables it copies.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { type Snapshot, snapshot } from 'leadline';
 * const copy: Snapshot = snapshot({ weight: tf.variable(tf.scalar(1)) });
 * console.log(copy.step, copy.variables.length);
 * // 0 2
 * ```
 */
export class Snapshot {
  /** The step of the copy, then the copies: what a checkpoint keeps. */
  readonly variables: readonly tf.Variable[];
  readonly #sources: readonly tf.Variable[];

  constructor(source: VariableSource) {
    this.#sources = findVariables('snapshot', source).map(({ variable }) => variable);
    const copies = tf.tidy(() => this.#sources.map((variable) => tf.variable(tf.clone(variable), false)));
    this.variables = [tf.tidy(() => tf.variable(tf.scalar(0, 'int32'), false)), ...copies];
  }

  /** The training step after which the copy was taken; 0 for the one made at the beginning. */
  get step(): number {
    return this.variables[0]!.dataSync()[0]!;
  }

  /** Copies the variables' present values. Nothing is moved: copy and variable share the data until either changes. */
  take(step: number): void {
    requireCount('Snapshot.take', 'step', step);
    tf.tidy(() => {
      this.variables[0]!.assign(tf.scalar(step, 'int32'));
      for (const [i, source] of this.#sources.entries()) this.variables[i + 1]!.assign(tf.clone(source));
    });
  }

  /** Puts the copied values back into the variables. */
  restore(): void {
    tf.tidy(() => {
      for (const [i, source] of this.#sources.entries()) source.assign(tf.clone(this.variables[i + 1]!));
    });
  }

  /** Disposes the copies; the variables stay. */
  dispose(): void {
    for (const variable of this.variables) variable.dispose();
  }
}

/**
 * Keeps a copy of variables, to go back to: the best weights that a training run has seen (hand it to
 * `train` as `heldOut.best`), or those before an experiment. Takes the values at once; `take(step)` renews
 * them, `restore()` puts them back, `dispose()` lets go of them.
 *
 * Throws a `TrainingError` for what holds no variables.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { snapshot } from 'leadline';
 * const weight = tf.variable(tf.scalar(1));
 * const best = snapshot({ weight });
 * weight.assign(tf.scalar(5));
 * best.restore();
 * console.log(weight.arraySync());
 * // 1
 * ```
 */
export function snapshot(variables: VariableSource): Snapshot {
  return new Snapshot(variables);
}
