import type * as tf from '@tensorflow/tfjs';
import type { NestedNumbers } from '../tensor/checks.js';
import type { Masked } from './masked.js';

/** What data for one node may be given as, rows first. */
export type DataValue = tf.Tensor | NestedNumbers | Float32Array | Masked;
