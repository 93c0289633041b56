// expects: Property 'x' does not exist on type
import { bernoulli, directed, product } from '../../../src/index.js';
import * as tf from '@tensorflow/tfjs';

directed()
  .latent('z', ({ x }) => product(bernoulli({ logit: tf.add(x, 1) })))
  .observed('x', () => product(bernoulli({ logit: [0] })));
