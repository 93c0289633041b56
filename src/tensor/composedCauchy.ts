import * as tf from '@tensorflow/tfjs';
import { composedAbs, composedLog1p, when } from './composedMath.js';

// The standard Cauchy distribution from tensor operations.

/** log(1 + z²), whose square does not overflow. */
export function composedLogSquare(z: tf.Tensor): tf.Tensor {
  const far = tf.greater(tf.abs(z), 1e6);
  const one = tf.onesLike(z);
  return when(
    far,
    tf.mul(2, tf.log(composedAbs(when(far, z, one)))),
    composedLog1p(tf.square(when(far, one, z))),
  );
}

/** atan(z) / π for |z| ≤ 1, from the nearer end of the line elsewhere: the share between zero and z, or beyond z. */
function share(z: tf.Tensor): tf.Tensor {
  return tf.div(tf.atan(z), Math.PI);
}

/** 1/2 + atan(z) / π, accurate in the lower tail. */
export function composedCauchyCdf(z: tf.Tensor): tf.Tensor {
  const low = tf.less(z, -1);
  const far = tf.neg(share(tf.div(1, when(low, z, tf.fill(z.shape, -1)))));
  return when(low, far, tf.add(0.5, share(when(low, tf.zerosLike(z), z))));
}

/** The logarithm of that, by the smaller of the two probabilities. */
export function composedCauchyLogCdf(z: tf.Tensor): tf.Tensor {
  const low = tf.less(z, 0);
  return when(
    low,
    tf.log(composedCauchyCdf(when(low, z, tf.fill(z.shape, -1)))),
    composedLog1p(tf.neg(composedCauchyCdf(when(low, tf.zerosLike(z), tf.neg(z))))),
  );
}

/** tan(angle) for angles up to π/2 in size given by their share of π, or by `rest`, their share of what is missing. */
export function composedTangent(portion: tf.Tensor, rest: tf.Tensor): tf.Tensor {
  const near = tf.lessEqual(tf.abs(portion), 0.25);
  const quarter = tf.fill(portion.shape, 0.25);
  return when(
    near,
    tf.tan(tf.mul(Math.PI, when(near, portion, quarter))),
    tf.div(1, tf.tan(tf.mul(Math.PI, when(near, quarter, rest)))),
  );
}
