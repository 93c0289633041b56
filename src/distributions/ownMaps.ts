import * as tf from '@tensorflow/tfjs';
import { composedExp, composedLogOdds, composedSigmoid, composedSoftplus } from '../tensor/composedMath.js';
import type { OwnMap } from './routes.js';

/** Onto the positive numbers. */
export const throughExp: OwnMap = {
  apply: composedExp,
  invert: (x) => tf.log(x),
  logVolume: (z) => z,
  inside: (x) => tf.logicalAnd(tf.greater(x, 0), tf.isFinite(x)),
  above: (x) => tf.greater(x, 0),
  somewhere: 1,
};

/** Onto the unit interval. */
export const throughSigmoid: OwnMap = {
  apply: composedSigmoid,
  invert: composedLogOdds,
  logVolume: (z) => tf.neg(tf.add(composedSoftplus(z), composedSoftplus(tf.neg(z)))),
  inside: (x) => tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1)),
  above: (x) => tf.greaterEqual(x, 1),
  somewhere: 0.5,
};
