import * as tf from '@tensorflow/tfjs';
import { composedLog1p, when } from '../../tensor/composedMath.js';
import { composedLog1pmx } from '../../tensor/composedRemainders.js';
import { kernel } from '../../tensor/formula.js';
import { addScalarKl } from '../addScalarKl.js';

// Divergences of families with a scale, and perhaps a location or a shape, whose forms are elementary.
// Sources stand beside the double-precision formulas.

/** v − 1 − log v with v = (s / t)². */
function squareExcess(s: tf.Tensor, t: tf.Tensor): tf.Tensor {
  const ratio = tf.div(tf.sub(s, t), t);
  const lessOne = tf.mul(ratio, tf.add(2, ratio));
  const small = tf.less(lessOne, -0.5);
  const rest = tf.neg(composedLog1pmx(when(small, tf.zerosLike(lessOne), lessOne)));
  return when(small, tf.sub(lessOne, tf.mul(2, tf.sub(tf.log(s), tf.log(t)))), rest);
}

/** r − 1 − log r with r = s / t. */
function excess(s: tf.Tensor, t: tf.Tensor): tf.Tensor {
  const lessOne = tf.div(tf.sub(s, t), t);
  const small = tf.less(lessOne, -0.5);
  const rest = tf.neg(composedLog1pmx(when(small, tf.zerosLike(lessOne), lessOne)));
  return when(small, tf.sub(lessOne, tf.sub(tf.log(s), tf.log(t))), rest);
}

function composedCauchyKl(gap: tf.Tensor, s: tf.Tensor, t: tf.Tensor): tf.Tensor {
  const apart = tf.sub(s, t);
  const crossed = tf.add(tf.mul(tf.div(gap, s), tf.div(gap, t)), tf.mul(tf.div(apart, s), tf.div(apart, t)));
  return composedLog1p(tf.mul(0.25, crossed));
}

function composedParetoKl(m: tf.Tensor, a: tf.Tensor, n: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const held = tf.greaterEqual(m, n);
  const ratio = when(held, tf.div(m, n), tf.onesLike(tf.mul(m, n)));
  const finite = tf.add(excess(b, a), tf.mul(b, tf.log(ratio)));
  return when(held, finite, tf.fill(finite.shape, Number.POSITIVE_INFINITY));
}

/** Registers them. */
export function registerScaleKl(): void {
  addScalarKl(
    'rayleigh|rayleigh',
    kernel('rayleighKl', (s, t) => squareExcess(s!, t!)),
  );
  addScalarKl(
    'halfNormal|halfNormal',
    kernel('halfNormalKl', (s, t) => tf.mul(0.5, squareExcess(s!, t!))),
  );
  addScalarKl(
    'cauchy|cauchy',
    kernel('cauchyKl', (l, s, m, t) => composedCauchyKl(tf.sub(l!, m!), s!, t!)),
  );
  addScalarKl(
    'halfCauchy|halfCauchy',
    kernel('halfCauchyKl', (s, t) => composedCauchyKl(tf.zerosLike(s!), s!, t!)),
  );
  addScalarKl(
    'pareto|pareto',
    kernel('paretoKl', (m, a, n, b) => composedParetoKl(m!, a!, n!, b!)),
  );
}
