// expects: Property 'entropy' does not exist on type 'Poisson'
import { poisson } from '../../../src/index.js';

poisson({ rate: 1 }).entropy();
