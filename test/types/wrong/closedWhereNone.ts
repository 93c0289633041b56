// expects: no closed-form divergence for the latent 'z'; use 'sampled', or registerKl
import { directed, elbo, logistic, normal, product } from '../../../src/index.js';

const model = directed()
  .latent('z', () => product(logistic({ location: [0], scale: 1 })))
  .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
const recognizer = directed()
  .given('x')
  .latent('z', ({ x }) => product(normal({ mean: x, sd: 1 })));
elbo(model, recognizer, { divergence: 'closed' });
