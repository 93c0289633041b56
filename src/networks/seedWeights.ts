import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe } from '../tensor/checks.js';
import { floatsOf } from '../tensor/engine.js';
import { glorotUniform } from './initialWeights.js';

/**
 * Draws the starting weights of a `tf.layers` model anew from a stream, so that it starts the same way every
 * time; the seeds that its own initializers take are not honored reliably.
 *
 * Formula: each weight that starts at random is drawn from Glorot and Bengio's uniform law for its shape (a
 * convolution's window counts as inputs); weights that start at a constant, such as biases, keep it.
 * Each layer's weights come from a fork of their own, so adding a layer does not change the others.
 *
 * @param model - a built `tf.layers` model
 * @param stream - the source of randomness; only its forks are used
 * @throws ParameterError when the model is not a built `tf.layers` model.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { seedWeights, stream } from 'leadline';
 * const start = () => {
 *   const model = tf.sequential({ layers: [tf.layers.dense({ units: 2, inputShape: [3] })] });
 *   seedWeights(model, stream(5));
 *   return model.getWeights()[0]!.dataSync()[0];
 * };
 * console.log(start() === start());
 * // true
 * ```
 * Source: Glorot and Bengio, AISTATS 2010, equation 16.
 */
export function seedWeights(model: tf.LayersModel, stream: Stream): void {
  requireStream('seedWeights', stream);
  if (
    typeof model !== 'object' ||
    model === null ||
    !Array.isArray(model.layers) ||
    !model.layers.every((layer) => layer.built)
  ) {
    throw new ParameterError(
      `seedWeights: model must be a built tf.layers model; got ${describe(model)}; give its first layer an inputShape`,
    );
  }
  model.layers.forEach((layer, at) => {
    const fork = stream.fork(`layer ${at}`);
    tf.tidy(() => {
      const weights = layer.getWeights();
      layer.setWeights(weights.map((weight) => (isConstant(weight) ? weight : redraw(weight, fork))));
    });
  });
}

function isConstant(weight: tf.Tensor): boolean {
  const data = floatsOf(weight);
  return data.every((v) => v === data[0]) || weight.shape.length < 2;
}

function redraw(weight: tf.Tensor, stream: Stream): tf.Tensor {
  return tf.tensor(glorotUniform(stream, weight.shape), weight.shape);
}
