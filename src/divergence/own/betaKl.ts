import * as tf from '@tensorflow/tfjs';
import { broadcastShapes } from '../../kernels/layout.js';
import { composedLogGamma, when } from '../../tensor/composedMath.js';
import { kernel } from '../../tensor/formula.js';
import { noComposedForm } from '../../tensor/noComposedForm.js';
import { addScalarKl } from '../addScalarKl.js';

// Divergences from the beta distribution. Source: by its moments E log x and E log(1 − x), Johnson, Kotz and
// Balakrishnan, Continuous Univariate Distributions 2 (1995), section 25.2; the uniform's by direct integration.

const xLogX = (x: tf.Tensor): tf.Tensor => {
  const zero = tf.lessEqual(x, 0);
  return when(zero, tf.zerosLike(x), tf.mul(x, tf.log(when(zero, tf.onesLike(x), x))));
};

const meanLog = (l: tf.Tensor, u: tf.Tensor): tf.Tensor =>
  tf.sub(tf.div(tf.sub(xLogX(u), xLogX(l)), tf.sub(u, l)), 1);

function composedUniformBetaKl(l: tf.Tensor, u: tf.Tensor, a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const inside = tf.logicalAnd(tf.greaterEqual(l, 0), tf.lessEqual(u, 1));
  const [low, high] = [when(inside, l, tf.zerosLike(l)), when(inside, u, tf.onesLike(u))];
  const logBeta = tf.sub(tf.add(composedLogGamma(a), composedLogGamma(b)), composedLogGamma(tf.add(a, b)));
  const x = tf.mul(tf.sub(a, 1), meanLog(low, high));
  const y = tf.mul(tf.sub(b, 1), meanLog(tf.sub(1, high), tf.sub(1, low)));
  const value = tf.sub(tf.sub(logBeta, tf.log(tf.sub(high, low))), tf.add(x, y));
  const shape = broadcastShapes('kl', [l.shape, u.shape, a.shape, b.shape]);
  return when(inside, value, tf.fill(shape, Number.POSITIVE_INFINITY));
}

/** Registers the closed forms. */
export function registerBetaKl(): void {
  addScalarKl(
    'beta|beta',
    // From float32 operations nothing would be left of it where one shape is far below the other.
    kernel('betaKl', noComposedForm('the divergence of beta distributions')),
  );
  addScalarKl(
    'uniform|beta',
    kernel('uniformBetaKl', (l, u, a, b) => composedUniformBetaKl(l!, u!, a!, b!)),
  );
}
