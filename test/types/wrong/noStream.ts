// expects: Expected 1-2 arguments, but got 0
import { normal } from '../../../src/index.js';

normal({ mean: 0, sd: 1 }).draw();
