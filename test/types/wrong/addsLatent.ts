// expects: the recognizer must have only latents of the model; it adds
import { directed, elbo, normal, product } from '../../../src/index.js';

const model = directed()
  .latent('z', () => product(normal({ mean: [0], sd: 1 })))
  .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
const recognizer = directed()
  .given('x')
  .latent('z', ({ x }) => product(normal({ mean: x, sd: 1 })))
  .latent('w', ({ x }) => product(normal({ mean: x, sd: 1 })));
elbo(model, recognizer);
