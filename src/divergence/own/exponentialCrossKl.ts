import * as tf from '@tensorflow/tfjs';
import { choose, when } from '../../tensor/composedMath.js';
import { kernel } from '../../tensor/formula.js';
import { addScalarKl } from '../addScalarKl.js';

// Divergences between an exponential distribution and a half-normal or a Pareto one; sources beside the
// double-precision formulas.

const logTwoOverPi = Math.log(2 / Math.PI);

function composedParetoExponentialKl(m: tf.Tensor, a: tf.Tensor, r: tf.Tensor): tf.Tensor {
  const finite = tf.greater(a, 1);
  const held = when(finite, a, tf.fill(a.shape, 2));
  const mean = tf.div(tf.mul(m, held), tf.sub(held, 1));
  const logs = tf.sub(tf.log(held), tf.add(tf.log(m), tf.log(r)));
  const value = tf.add(tf.sub(logs, tf.add(1, tf.div(1, held))), tf.mul(r, mean));
  return choose(finite, value, Number.POSITIVE_INFINITY);
}

/** Registers them. */
export function registerExponentialCrossKl(): void {
  addScalarKl(
    'halfNormal|exponential',
    kernel('halfNormalExponentialKl', (s, r) =>
      tf.sub(
        tf.mul(Math.sqrt(2 / Math.PI), tf.mul(s!, r!)),
        tf.add(tf.add(tf.log(s!), tf.log(r!)), (1 - logTwoOverPi) / 2),
      ),
    ),
  );
  addScalarKl(
    'exponential|halfNormal',
    kernel('exponentialHalfNormalKl', (r, s) =>
      tf.add(
        tf.div(1, tf.square(tf.mul(s!, r!))),
        tf.sub(tf.add(tf.log(s!), tf.log(r!)), 1 + logTwoOverPi / 2),
      ),
    ),
  );
  addScalarKl(
    'pareto|exponential',
    kernel('paretoExponentialKl', (m, a, r) => composedParetoExponentialKl(m!, a!, r!)),
  );
}
