// expects: no closed-form divergence for this pair: use sampledKl(q, p, stream), or registerKl(…) one
import { kl, logistic } from '../../../src/index.js';

const d = logistic({ location: 0, scale: 1 });
kl(d, d);
