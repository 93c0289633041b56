import * as tf from '@tensorflow/tfjs';
import { TrainingError } from '../errors.js';
import { describe } from '../tensor/checks.js';

/** A weight of a `tf.layers` model, which holds its variable inside. */
interface LayerWeight {
  readonly name: string;
  read(): tf.Tensor;
}

/**
 * Where variables are found: a variable, anything with a list of `variables`, a `tf.layers` model, or lists
 * and records of these. Keys and positions on the way make a variable's path, such as `encoder/0`, which names
 * it in checkpoints and messages: unlike a variable's own name it does not depend on what was made before.
 */
export type VariableSource =
  | tf.Variable
  | { readonly variables: readonly tf.Variable[] }
  | { readonly weights: readonly LayerWeight[]; readonly trainableWeights: readonly LayerWeight[] }
  | readonly VariableSource[]
  | { readonly [key: string]: VariableSource };

/** A variable with the path at which it was found. */
export interface FoundVariable {
  readonly path: string;
  readonly variable: tf.Variable;
  readonly trainable: boolean;
}

/** A variable and the name that messages give it. */
export interface NamedVariable {
  readonly name: string;
  readonly variable: tf.Variable;
}

/** Every variable of a source with its path, in the order of keys and positions. */
export function findVariables(where: string, source: VariableSource): FoundVariable[] {
  const found: FoundVariable[] = [];
  const seen = new Map<tf.Variable, string>();
  const add = (variable: unknown, path: string, trainable: boolean): void => {
    if (!(variable instanceof tf.Variable)) {
      throw new TrainingError(
        `${where}: variables must hold tf.Variables; got ${describe(variable)} at ${path || 'the top'}; make one with tf.variable(…)`,
      );
    }
    if (variable.isDisposed) {
      throw new TrainingError(
        `${where}: variables must be alive; got a disposed one at ${path || 'the top'}; dispose a model only after its last use`,
      );
    }
    const other = seen.get(variable);
    if (other !== undefined) {
      throw new TrainingError(
        `${where}: variables must be distinct; got the same one at ${other} and ${path}; name each once`,
      );
    }
    seen.set(variable, path);
    found.push({ path: path || variable.name, variable, trainable: trainable && variable.trainable });
  };
  const walk = (part: unknown, path: string): void => {
    const below = (key: string | number): string => (path ? `${path}/${key}` : `${key}`);
    if (part instanceof tf.Tensor) add(part, path, true);
    else if (Array.isArray(part)) for (const [i, item] of part.entries()) walk(item, below(i));
    else if (isLayersModel(part)) {
      for (const [i, weight] of part.weights.entries()) {
        // tfjs keeps the variable of a layer's weight in a protected field, and offers no other way to it.
        add((weight as unknown as { val: unknown }).val, below(i), part.trainableWeights.includes(weight));
      }
    } else if (hasVariables(part)) walk(part.variables, path);
    else if (typeof part === 'object' && part !== null) {
      for (const [key, item] of Object.entries(part)) walk(item, below(key));
    } else add(part, path, true);
  };
  walk(source, '');
  if (found.length === 0) {
    throw new TrainingError(
      `${where}: variables must hold at least one variable; got none; pass your model's`,
    );
  }
  return found;
}

function isLayersModel(part: unknown): part is { weights: LayerWeight[]; trainableWeights: LayerWeight[] } {
  if (typeof part !== 'object' || part === null) return false;
  const { weights, trainableWeights } = part as Record<string, unknown>;
  return Array.isArray(weights) && Array.isArray(trainableWeights);
}

function hasVariables(part: unknown): part is { variables: readonly unknown[] } {
  if ((typeof part !== 'object' && typeof part !== 'function') || part === null) return false;
  return Array.isArray((part as Record<string, unknown>).variables);
}
