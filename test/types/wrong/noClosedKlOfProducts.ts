// expects: no closed-form divergence for this pair: use sampledKl(q, p, stream), or registerKl(…) one
import { kl, laplace, normal, product } from '../../../src/index.js';

kl(product(normal({ mean: [0], sd: 1 })), product(laplace({ location: [0], scale: 1 })));
