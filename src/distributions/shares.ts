import * as tf from '@tensorflow/tfjs';
import { composedLog1p, when } from '../tensor/composedMath.js';

/** log p for p > 0, and 0 elsewhere without a gradient. */
export function safeLog(p: tf.Tensor): tf.Tensor {
  return tf.log(when(tf.greater(p, 0), p, tf.onesLike(p)));
}

/** log p of two shares p and `rest` that make one, by the smaller of the two. */
export function logShare(p: tf.Tensor, rest: tf.Tensor): tf.Tensor {
  const small = tf.less(p, 0.5);
  const near = composedLog1p(tf.neg(when(small, tf.zerosLike(p), rest)));
  return when(small, tf.log(when(small, p, tf.onesLike(p))), near);
}
