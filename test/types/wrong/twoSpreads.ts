// expects: Argument of type '{ mean: number; sd: number; variance: number; }' is not assignable to parameter of type 'NormalOptions'
import { normal } from '../../../src/index.js';

normal({ mean: 0, sd: 1, variance: 1 });
