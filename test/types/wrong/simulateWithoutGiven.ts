// expects: Expected 3 arguments, but got 2
import { directed, normal, product, stream } from '../../../src/index.js';

directed()
  .given('c')
  .latent('z', ({ c }) => product(normal({ mean: c, sd: 1 })))
  .simulate(stream(1), 5);
