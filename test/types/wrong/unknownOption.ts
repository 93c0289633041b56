// expects: 'deviation' does not exist in type
import { normal } from '../../../src/index.js';

normal({ mean: 0, deviation: 1 });
