// expects: the elbo needs draws that carry a gradient; these latents have route none
import { bernoulli, directed, elbo, normal, product } from '../../../src/index.js';

const model = directed()
  .latent('z', () => product(bernoulli({ logit: [0] })))
  .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
const recognizer = directed()
  .given('x')
  .latent('z', ({ x }) => product(bernoulli({ logit: x })));
elbo(model, recognizer);
