// expects: Property 'x' does not exist on type

import * as tf from '@tensorflow/tfjs';
import { bernoulli, directed, product } from '../../../src/index.js';

directed()
  .latent('z', ({ x }) => product(bernoulli({ logit: tf.add(x, 1) })))
  .observed('x', () => product(bernoulli({ logit: [0] })));
