// expects: is not assignable to parameter of type 'NormalOptions'
import { normal } from '../../../src/index.js';

normal({ mean: 0 });
