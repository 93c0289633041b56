// expects: the name 'z' is already declared in the model; choose another
import { directed, normal, product } from '../../../src/index.js';

directed()
  .latent('z', () => product(normal({ mean: [0], sd: 1 })))
  .latent('z', () => product(normal({ mean: [0], sd: 1 })));
