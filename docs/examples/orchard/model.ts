import * as tf from '@tensorflow/tfjs';
import { directed, head, multilayerPerceptron, normal, product, type Stream } from 'leadline';
import type { Dataset } from './dataset.js';

/** The model of the spectra, its recognizer, and their parts by themselves. */
export type SpectrumModel = ReturnType<typeof buildModel>;

const hiddenUnits = 48;

/**
 * Causes z are standard normal; a spectrum x is a network's function of them, in the file's own units, with
 * normal noise whose standard deviation is learned for each band. The recognizer reads a spectrum and answers
 * with a normal distribution over its causes.
 */
export function buildModel({ bands, center, scale }: Dataset, latents: number, stream: Stream) {
  const weights = stream.fork('weights');
  const decoder = multilayerPerceptron(weights, { sizes: [latents, hiddenUnits, hiddenUnits, bands.length] });
  const encoder = multilayerPerceptron(weights, {
    sizes: [bands.length, hiddenUnits, hiddenUnits],
    outputActivation: 'tanh',
  });
  const posterior = head(weights, hiddenUnits, { mean: latents, logVariance: latents });
  const middle = tf.tensor1d([...center]);
  const spread = tf.tensor1d([...scale]);
  // Relative to a band's spread over all rows; a third of it is a guess that training soon corrects.
  const logNoise = tf.variable(tf.fill([bands.length], Math.log(1 / 3)));

  const noise = () => tf.mul(spread, tf.exp(logNoise)) as tf.Tensor1D;
  const spectrum = (z: tf.Tensor) =>
    normal({ mean: tf.add(middle, tf.mul(spread, decoder(z))), sd: noise() });
  const causes = (x: tf.Tensor) => normal(posterior(encoder(tf.div(tf.sub(x, middle), spread))));

  const generative = directed()
    .latent('z', () => product(normal({ mean: tf.zeros([latents]), sd: 1 })))
    .observed('x', ({ z }) => product(spectrum(z)));
  const recognizer = directed()
    .given('x')
    .latent('z', ({ x }) => product(causes(x)));

  return { generative, recognizer, spectrum, causes, noise, latents };
}
