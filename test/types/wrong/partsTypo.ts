// expects: Property 'q' does not exist on type
import { directed, elbo, normal, product, stream } from '../../../src/index.js';

const model = directed()
  .latent('z', () => product(normal({ mean: [0], sd: 1 })))
  .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
const recognizer = directed()
  .given('x')
  .latent('z', ({ x }) => product(normal({ mean: x, sd: 1 })));
const { parts } = elbo(model, recognizer).estimate({ x: [[1]] }, stream(1));
parts.divergence.z.arraySync();
parts.divergence.q.arraySync();
