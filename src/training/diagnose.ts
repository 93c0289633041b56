import * as tf from '@tensorflow/tfjs';
import type { Stream } from '../random/stream.js';
import { listParts, type Parts, type Trainable } from './trainable.js';
import type { NamedVariable } from './variables.js';

/** The first value that is not finite, and its position. */
export interface Flaw {
  readonly index: number;
  readonly value: number;
}

/** The first value of a tensor that is not finite, if any. */
export async function findFlaw(tensor: tf.Tensor): Promise<Flaw | undefined> {
  const values = await tensor.data();
  for (let index = 0; index < values.length; index++) {
    const value = Number(values[index]);
    if (!Number.isFinite(value)) return { index, value };
  }
  return undefined;
}

/**
 * The labels of the parts whose own gradient is not finite, each with the variables it spoils. Every part is
 * finite itself, or there would be no need to ask. Evaluates the bound once more for each part, with the draws
 * of the refused step.
 */
export async function blameParts<Data>(
  bound: Trainable<Data>,
  data: Data,
  draws: () => Stream,
  variables: readonly NamedVariable[],
  parts: Parts<unknown>,
): Promise<string[]> {
  const blamed: string[] = [];
  for (const [i, { label }] of listParts(parts).entries()) {
    let grads: tf.NamedTensorMap;
    try {
      const result = tf.variableGrads(
        () => listParts(bound.estimate(data, draws()).parts)[i]!.term.sum().asScalar(),
        variables.map(({ variable }) => variable),
      );
      result.value.dispose();
      grads = result.grads;
    } catch {
      // A part may depend on none of the variables, which tfjs reports as an error.
      continue;
    }
    const spoiled: string[] = [];
    for (const { name, variable } of variables) {
      const gradient = grads[variable.name];
      if (gradient && (await findFlaw(gradient))) spoiled.push(name);
    }
    tf.dispose(grads);
    if (spoiled.length > 0) blamed.push(`${label} (through ${spoiled.join(', ')})`);
  }
  return blamed;
}
