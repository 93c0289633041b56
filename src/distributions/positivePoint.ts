import * as tf from '@tensorflow/tfjs';
import { choose, when } from '../tensor/composedMath.js';
import { detach } from '../tensor/detach.js';

// Composed forms of families on the positive half line, whose logarithms must not see what lies outside.

/** f(z) where z is positive, `outside` elsewhere, with no gradient there. */
export function onPositive(z: tf.Tensor, f: (z: tf.Tensor) => tf.Tensor, outside: number): tf.Tensor {
  const inside = tf.greater(z, 0);
  return choose(inside, f(when(inside, z, tf.onesLike(z))), outside);
}

/** The same from zero on. */
export function fromZeroOn(z: tf.Tensor, f: (z: tf.Tensor) => tf.Tensor, outside: number): tf.Tensor {
  const inside = tf.greaterEqual(z, 0);
  return choose(inside, f(when(inside, z, tf.zerosLike(z))), outside);
}

/** The smaller of z and a limit, beyond which there is no gradient. */
export function atMost(z: tf.Tensor, limit: number): tf.Tensor {
  return when(tf.less(z, limit), z, tf.fill(z.shape, limit));
}

/** What a log density that goes as (shape − 1) log z does at zero: +∞ below shape 1, −∞ above, `value` at 1. */
export function withLimitAtZero(
  z: tf.Tensor,
  shape: tf.Tensor,
  logDensity: tf.Tensor,
  value: number,
): tf.Tensor {
  const limit = detach(
    tf.where(
      tf.equal(shape, 1),
      tf.fill(shape.shape, value),
      tf.mul(tf.sign(tf.sub(1, shape)), Number.POSITIVE_INFINITY),
    ),
  );
  const none = tf.zerosLike(logDensity);
  return when(tf.equal(tf.add(z, none), 0), tf.add(limit, none), logDensity);
}
