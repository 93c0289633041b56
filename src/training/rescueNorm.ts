import * as tf from '@tensorflow/tfjs';
import { TrainingError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import { blameParts, findFlaw } from './diagnose.js';
import { listParts, type Parts, type Trainable } from './trainable.js';
import type { NamedVariable } from './variables.js';

/** A step some statistic of which is not finite. */
export interface DoubtfulStep<Data> {
  readonly bound: Trainable<Data>;
  readonly step: number;
  readonly data: Data;
  readonly rows: Int32Array;
  readonly draws: () => Stream;
  readonly clip: number;
  readonly loss: tf.Tensor;
  readonly value: tf.Tensor;
  readonly parts: Parts<tf.Tensor>;
  readonly gradients: readonly tf.Tensor[];
  readonly variables: readonly NamedVariable[];
}

/**
 * The norm of finite gradients whose squares overflow a float32, if they are to be clipped. Every other step is
 * refused, with the nodes, rows and variables at fault.
 */
export async function rescueNorm<Data>(doubtful: DoubtfulStep<Data>): Promise<number> {
  const { step, gradients, clip } = doubtful;
  const faults = await findFaults(doubtful);
  if (faults.length > 0) {
    throw new TrainingError(
      `train: step ${step} must be finite; got ${faults.join(', ')}; no variable was changed: check those rows, lower the learning rate, or clip the gradient`,
    );
  }
  const largest = tf.tidy(() => tf.stack(gradients.map((gradient) => tf.max(tf.abs(gradient)))));
  const scale = Math.max(...(await largest.data()));
  largest.dispose();
  if (clip === Number.POSITIVE_INFINITY) {
    throw new TrainingError(
      `train: step ${step} must have a gradient whose square a float32 can hold; got elements up to ${scale}; no variable was changed: pass clip, or scale the data`,
    );
  }
  const scaled = tf.tidy(() =>
    tf.stack(gradients.map((gradient) => tf.sum(tf.square(tf.div(gradient, scale))))),
  );
  const squares = await scaled.data();
  scaled.dispose();
  let sum = 0;
  for (const square of squares) sum += square;
  return scale * Math.sqrt(sum);
}

async function findFaults<Data>(doubtful: DoubtfulStep<Data>): Promise<string[]> {
  const { bound, data, rows, draws, loss, value, parts, gradients, variables } = doubtful;
  const faults: string[] = [];
  for (const { label, term } of [...listParts(parts), { label: 'the bound', term: value }]) {
    const flaw = await findFlaw(term);
    if (flaw) faults.push(`${label} = ${flaw.value} at row ${rows[flaw.index] ?? flaw.index}`);
  }
  if (faults.length === 0 && (await findFlaw(loss))) faults.push('a surrogate that is not finite');
  const spoiled: string[] = [];
  for (const [i, gradient] of gradients.entries()) {
    const flaw = await findFlaw(gradient);
    if (flaw) spoiled.push(`gradient of ${variables[i]!.name} with ${flaw.value}`);
  }
  if (faults.length === 0 && spoiled.length > 0) {
    const blamed = await blameParts(bound, data, draws, variables, parts);
    if (blamed.length > 0) faults.push(`a gradient that is not finite from the ${blamed.join(' and the ')}`);
  }
  return [...faults, ...spoiled];
}
