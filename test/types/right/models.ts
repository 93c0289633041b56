import * as tf from '@tensorflow/tfjs';
import {
  type Bound,
  directed,
  elbo,
  kl,
  type ModelData,
  multivariateNormal,
  normal,
  product,
  stream,
} from '../../../src/index.js';

const model = directed()
  .given('c')
  .latent('w', ({ c }) => product(normal({ mean: c, sd: 1 })))
  .latent('z', ({ w }) => product(normal({ mean: w, sd: 1 })))
  .observed('x', ({ z, c }) => product(normal({ mean: tf.add(z, c), sd: 1 })))
  .observed('y', ({ z }) => product(normal({ mean: z, sd: 1 })));
const recognizer = directed()
  .given('x')
  .given('c')
  .latent('z', ({ x }) => product(normal({ mean: x, sd: 1 })))
  .latent('w', ({ z, c }) => product(normal({ mean: tf.add(z, c), sd: 1 })));
const bound: Bound<ModelData<'c' | 'x' | 'y'>> = elbo(model, recognizer, {
  divergence: { w: 'sampled' },
  freeNats: { z: 0.5 },
});
const parts = bound.estimate(
  { c: tf.zeros([3, 1]), x: [[1], [2], [3]], y: [[1], [2], [3]] },
  stream(1),
).parts;
export const names: string[] = Object.keys(parts.logLikelihood);
export const drawn: tf.Tensor = model.simulate(stream(1), 3, { c: [[0], [0], [0]] }).w;

const q = product(normal({ mean: [0, 0], sd: 1 }));
kl(
  q,
  multivariateNormal({
    mean: [0, 0],
    covarianceFactor: [
      [1, 0],
      [0, 1],
    ],
  }),
);
export const route: 'pathwise' = q.route;
export const moments: tf.Tensor[] = [q.mean(), q.variance(), q.entropy()];
