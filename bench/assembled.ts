import * as tf from '@tensorflow/tfjs';
import { bernoulli, directed, elbo, multilayerPerceptron, normal, product, stream } from '../src/index.js';
import type { Sizes, Trainable } from './network.js';

/** The model made of the library's parts, as its documentation would write it. */
export function assembled(sizes: Sizes, x: tf.Tensor2D, draws = 1): Trainable {
  const { data, hidden, latent } = sizes;
  const start = stream('bench').fork('start');
  const encoder = multilayerPerceptron(start, { sizes: [data, hidden, 2 * latent] });
  const decoder = multilayerPerceptron(start, { sizes: [latent, hidden, data] });
  const model = directed()
    .latent('z', () => product(normal({ mean: tf.zeros([latent]), sd: 1 })))
    .observed('x', ({ z }) => product(bernoulli({ logit: decoder(z) })));
  const recognizer = directed()
    .given('x')
    .latent('z', (values) => {
      const [mean, logVariance] = tf.split(encoder(values.x), 2, 1) as [tf.Tensor, tf.Tensor];
      return product(normal({ mean, logVariance }));
    });
  const bound = elbo(model, recognizer, { draws });
  const noise = stream('bench').fork('noise');

  const optimizer = tf.train.adam(1e-3);
  const variables = [...encoder.variables, ...decoder.variables];
  return {
    step: () => {
      optimizer.minimize(() => bound.loss({ x }, noise), false, variables);
    },
    loss: () => tf.tidy(() => bound.loss({ x }, noise).dataSync()[0]!),
    dispose: () => {
      tf.dispose(variables);
      optimizer.dispose();
    },
  };
}
