import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount, requireTensor, shapeText } from '../tensor/checks.js';
import { glorotUniform } from './initialWeights.js';

/** A linear map from features to named parameters. */
export interface Head<Name extends string> {
  (features: tf.Tensor): { readonly [K in Name]: tf.Tensor2D };
  /** The weights and the biases. */
  readonly variables: tf.Variable[];
  /** Frees the variables. */
  dispose(): void;
}

/**
 * A linear layer that turns a network's features into the parameters of a distribution, by name: pass its
 * result straight to a family.
 *
 * Formula: features W + b, split into one piece per name. Shapes: features `[rows, inputs]`; each parameter
 * `[rows, size]`. Gradient route: tfjs's own.
 *
 * @param stream - the source of the starting weights; it is advanced
 * @param inputs - how many features come in
 * @param outputs - the parameters' names and sizes
 * @throws ParameterError for wrong sizes or names; ShapeError, when called, for features of the wrong size.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { head, normal, product, stream } from 'leadline';
 * const posterior = head(stream(1), 32, { mean: 8, logVariance: 8 });
 * const d = product(normal(posterior(tf.zeros([10, 32]))));
 * console.log(d.arrayShape, d.pointShape);
 * // [ 10 ] [ 8 ]
 * ```
 */
export function head<Name extends string>(
  stream: Stream,
  inputs: number,
  outputs: Readonly<Record<Name, number>>,
): Head<Name> {
  requireStream('head', stream);
  requireCount('head', 'inputs', inputs, 1);
  if (typeof outputs !== 'object' || outputs === null || Object.keys(outputs).length === 0) {
    throw new ParameterError(
      `head: outputs must map parameter names to sizes; got ${describe(outputs)}; pass for example { mean: 8, logVariance: 8 }`,
    );
  }
  const names = Object.keys(outputs) as Name[];
  for (const name of names) requireCount('head', `the size of ${name}`, outputs[name], 1);
  const sizes = names.map((name) => outputs[name]);
  const total = sizes.reduce((sum, size) => sum + size, 0);
  const weights = tf.tidy(() =>
    tf.variable(tf.tensor2d(glorotUniform(stream, [inputs, total]), [inputs, total])),
  );
  const bias = tf.tidy(() => tf.variable(tf.zeros([total])));
  const apply = (features: tf.Tensor): { readonly [K in Name]: tf.Tensor2D } => {
    requireTensor('head', 'features', features);
    if (features.shape.length !== 2 || features.shape[1] !== inputs) {
      throw new ShapeError(
        `head: features must be [rows, ${inputs}]; got ${shapeText(features.shape)}; set inputs to the size of the last layer`,
      );
    }
    return tf.tidy(() => {
      const all = tf.add(tf.matMul(features as tf.Tensor2D, weights as tf.Tensor2D), bias);
      const pieces = names.length === 1 ? [all] : tf.split(all, sizes, 1);
      return Object.fromEntries(names.map((name, k) => [name, pieces[k]]));
    }) as { readonly [K in Name]: tf.Tensor2D };
  };
  return Object.freeze(
    Object.assign(apply, {
      variables: [weights, bias] as tf.Variable[],
      dispose: () => {
        weights.dispose();
        bias.dispose();
      },
    }),
  );
}
