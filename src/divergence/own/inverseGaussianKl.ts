import * as tf from '@tensorflow/tfjs';
import { relativeDistance, when } from '../../tensor/composedMath.js';
import { composedLog1pmx } from '../../tensor/composedRemainders.js';
import { kernel } from '../../tensor/formula.js';
import { addScalarKl } from '../addScalarKl.js';

/** r − 1 − log r for r = t / s, from r − 1; from the logarithms where r is small. */
function excess(s: tf.Tensor, t: tf.Tensor): tf.Tensor {
  const lessOne = tf.div(tf.sub(t, s), s);
  const small = tf.less(lessOne, -0.5);
  const rest = tf.neg(composedLog1pmx(when(small, tf.zerosLike(lessOne), lessOne)));
  return when(small, tf.sub(lessOne, tf.sub(tf.log(t), tf.log(s))), rest);
}

/**
 * ½ (r − 1 − log r) + otherShape (mean − otherMean)² / (2 mean otherMean²) with r = otherShape / shape: the mean of
 * log q − log p by E[x] = mean and E[1/x] = 1/mean + 1/shape (Johnson, Kotz and Balakrishnan, Continuous Univariate
 * Distributions 1, 1994, chapter 15).
 */
export function registerInverseGaussianKl(): void {
  addScalarKl(
    'inverseGaussian|inverseGaussian',
    kernel('inverseGaussianKl', (m, s, n, t) => {
      const gap = relativeDistance(m!, n!);
      const shift = tf.mul(tf.mul(gap, t!), tf.div(gap, m!));
      return tf.mul(0.5, tf.add(excess(s!, t!), shift));
    }),
  );
}
