// expects: a recognizer has no observed values; declare them with given(name)
import { directed, elbo, normal, product } from '../../../src/index.js';

const model = directed()
  .latent('z', () => product(normal({ mean: [0], sd: 1 })))
  .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
const recognizer = directed()
  .observed('x', () => product(normal({ mean: [0], sd: 1 })))
  .latent('z', ({ x }) => product(normal({ mean: x, sd: 1 })));
elbo(model, recognizer);
