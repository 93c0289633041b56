import * as tf from '@tensorflow/tfjs';
import { composedLog1p, when } from './composedMath.js';

/** log(x / m) for positive x and m, with relative accuracy where the two are close, and every derivative. */
export function composedLogRatio(x: tf.Tensor, m: tf.Tensor): tf.Tensor {
  const d = tf.div(tf.sub(x, m), m);
  const near = tf.lessEqual(tf.abs(d), 0.5);
  return when(
    near,
    composedLog1p(when(near, d, tf.zerosLike(d))),
    tf.sub(tf.log(tf.add(x, tf.zerosLike(d))), tf.log(m)),
  );
}
