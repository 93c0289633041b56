import * as tf from '@tensorflow/tfjs';
import { composedLogRatio } from '../../tensor/composedLogRatio.js';
import { choose, composedLog1p, when } from '../../tensor/composedMath.js';
import { kernel } from '../../tensor/formula.js';
import { addScalarKl } from '../addScalarKl.js';

/** Registers the divergence of two reciprocal distributions, by direct integration: the log ratio of their widths. */
export function registerReciprocalKl(): void {
  addScalarKl(
    'reciprocal|reciprocal',
    kernel('reciprocalKl', (...[a, b, c, d]) => {
      const covered = tf.logicalAnd(tf.greaterEqual(a!, c!), tf.lessEqual(b!, d!));
      const beyond = tf.add(composedLogRatio(a!, c!), composedLogRatio(d!, b!));
      const excess = tf.div(beyond, composedLogRatio(b!, a!));
      const held = when(covered, excess, tf.zerosLike(excess));
      return choose(covered, composedLog1p(held), Number.POSITIVE_INFINITY);
    }),
  );
}
