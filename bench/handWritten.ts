import * as tf from '@tensorflow/tfjs';
import type { Sizes, Trainable } from './network.js';

/**
 * The peer: the same model, bound and optimizer written directly on tfjs operations. The stable log-likelihood
 * takes the fewest operations that tfjs offers, x l − softplus(l), and so does the closed divergence.
 */
export function handWritten(sizes: Sizes, x: tf.Tensor2D, draws = 1): Trainable {
  const { data, hidden, latent, batch } = sizes;
  const layer = (inputs: number, outputs: number) => {
    const limit = Math.sqrt(6 / (inputs + outputs));
    return tf.tidy(() => ({
      weights: tf.variable(tf.randomUniform([inputs, outputs], -limit, limit)) as tf.Variable<tf.Rank.R2>,
      bias: tf.variable(tf.zeros([outputs])) as tf.Variable<tf.Rank.R1>,
    }));
  };
  const layers = [
    layer(data, hidden),
    layer(hidden, 2 * latent),
    layer(latent, hidden),
    layer(hidden, data),
  ] as const;
  const affine = (features: tf.Tensor2D, { weights, bias }: (typeof layers)[number]) =>
    tf.add(tf.matMul(features, weights), bias) as tf.Tensor2D;

  const loss = () =>
    tf.tidy(() => {
      const features = tf.tanh(affine(x, layers[0]));
      const [mean, logVariance] = tf.split(affine(features, layers[1]), 2, 1) as [tf.Tensor2D, tf.Tensor2D];
      const sd = tf.exp(tf.mul(logVariance, 0.5)) as tf.Tensor2D;
      const repeated = (t: tf.Tensor2D) => (draws === 1 ? t : (tf.tile(t, [draws, 1]) as tf.Tensor2D));
      const noise = tf.randomNormal([draws * batch, latent]);
      const z = tf.add(repeated(mean), tf.mul(repeated(sd), noise)) as tf.Tensor2D;
      const logits = affine(tf.tanh(affine(z, layers[2])), layers[3]);
      const logLikelihood = tf.sum(tf.sub(tf.mul(repeated(x), logits), tf.softplus(logits)));
      // Σ (mean² + sd² − 1 − log variance) / 2
      const divergence = tf.mul(
        0.5,
        tf.sum(tf.sub(tf.add(tf.square(mean), tf.square(sd)), tf.add(logVariance, 1))),
      );
      return tf.div(tf.sub(divergence, tf.div(logLikelihood, draws)), batch) as tf.Scalar;
    });

  const optimizer = tf.train.adam(1e-3);
  const variables = layers.flatMap(({ weights, bias }) => [weights, bias] as tf.Variable[]);
  return {
    step: () => {
      optimizer.minimize(loss, false, variables);
    },
    loss: () => tf.tidy(() => loss().dataSync()[0]!),
    dispose: () => {
      tf.dispose(variables);
      optimizer.dispose();
    },
  };
}
