// expects: Property 'cdf' does not exist on type
import * as tf from '@tensorflow/tfjs';
import { normal, product } from '../../../src/index.js';

product(normal({ mean: [0], sd: 1 })).cdf(tf.zeros([1]));
