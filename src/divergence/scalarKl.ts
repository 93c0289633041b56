import * as tf from '@tensorflow/tfjs';
import { broadcastShapes } from '../kernels/layout.js';
import { composedAbs, composedExp, composedSigmoid, composedSoftplus, when } from '../tensor/composedMath.js';
import {
  composedEvenRemainder,
  composedExpm1,
  composedExponentialRemainder,
  composedLog1pmx,
} from '../tensor/composedRemainders.js';
import { detach } from '../tensor/detach.js';
import { kernel } from '../tensor/formula.js';
import { addScalarKl } from './addScalarKl.js';

// Closed divergences of scalar families. Each formula reads q's parameters, then p's, in the families' order.
// Sources: the normal, exponential and Poisson forms in Kullback, Information Theory and Statistics (1959),
// chapters 2 and 9; the Laplace, uniform and Bernoulli ones by direct integration. The accurate arrangements
// of each stand beside the double-precision formulas.

/** log(s / t), whose ratio may leave float32 where the logarithms do not. */
function logRatio(s: tf.Tensor, t: tf.Tensor): tf.Tensor {
  return tf.sub(tf.log(s), tf.log(t));
}

/** r − 1 − log r, from r − 1 and log r; from r − 1 alone where r is not small, as then the two nearly agree. */
function excess(lessOne: tf.Tensor, log: tf.Tensor): tf.Tensor {
  const small = tf.less(lessOne, -0.5);
  const rest = tf.neg(composedLog1pmx(when(small, tf.zerosLike(lessOne), lessOne)));
  return when(small, tf.sub(lessOne, log), rest);
}

function relativeExcess(s: tf.Tensor, t: tf.Tensor): tf.Tensor {
  return excess(tf.div(tf.sub(s, t), t), logRatio(s, t));
}

/** With d = |l − m| / s: in two smooth parts where d is small, written out where they would cancel each other. */
function composedLaplaceKl(l: tf.Tensor, s: tf.Tensor, m: tf.Tensor, t: tf.Tensor): tf.Tensor {
  const [gap, ratio] = [tf.sub(l, m), tf.div(s, t)];
  const u = tf.div(gap, s);
  const near = tf.less(tf.abs(u), 1);
  const shift = tf.mul(ratio, composedEvenRemainder(when(near, u, tf.zerosLike(u))));
  const far = tf.add(tf.div(composedAbs(gap), t), tf.mul(ratio, composedExp(tf.neg(composedAbs(u)))));
  return when(near, tf.add(relativeExcess(s, t), shift), tf.sub(far, tf.add(1, logRatio(s, t))));
}

/** r log(r / s) − r + s, written out where the two rates are far apart. */
function composedPoissonKl(r: tf.Tensor, s: tf.Tensor): tf.Tensor {
  const near = tf.less(tf.abs(tf.div(tf.sub(s, r), r)), 0.5);
  const close = tf.mul(r, relativeExcess(when(near, s, r), r));
  return when(near, close, tf.add(tf.mul(r, logRatio(r, s)), tf.sub(s, r)));
}

const normalKl = kernel('normalKl', (m, s, n, t) => {
  const ratio = tf.div(tf.sub(s!, t!), t!);
  const spread = excess(tf.mul(ratio, tf.add(2, ratio)), tf.mul(2, logRatio(s!, t!)));
  return tf.mul(0.5, tf.add(spread, tf.square(tf.div(tf.sub(m!, n!), t!))));
});

/** By the less likely outcome of the first, as the double-precision formula: see bernoulliKl there. */
function composedBernoulliKl(logit: tf.Tensor, otherLogit: tf.Tensor): tf.Tensor {
  const side = detach(tf.sub(1, tf.mul(2, tf.cast(tf.greater(logit, 0), 'float32'))));
  const [a, b] = [tf.mul(logit, side), tf.mul(otherLogit, side)];
  const p = composedSigmoid(a);
  const delta = tf.sub(b, a);
  const near = tf.less(tf.abs(delta), 1);
  const held = when(near, delta, tf.zerosLike(delta));
  const close = tf.add(
    composedLog1pmx(tf.mul(p, composedExpm1(held))),
    tf.mul(p, composedExponentialRemainder(held)),
  );
  return when(near, close, tf.sub(tf.sub(composedSoftplus(b), composedSoftplus(a)), tf.mul(p, delta)));
}

/** Registers the closed forms. */
export function registerScalarKl(): void {
  addScalarKl('normal|normal', normalKl);
  // The divergence does not change under the exponential map.
  addScalarKl('logNormal|logNormal', normalKl);
  // Nor under the logistic one.
  addScalarKl('logitNormal|logitNormal', normalKl);
  addScalarKl(
    'laplace|laplace',
    kernel('laplaceKl', (l, s, m, t) => composedLaplaceKl(l!, s!, m!, t!)),
  );
  addScalarKl(
    'uniform|uniform',
    kernel('uniformKl', (a, b, c, d) =>
      when(
        tf.logicalAnd(tf.greaterEqual(a!, c!), tf.lessEqual(b!, d!)),
        tf.sub(tf.log(tf.sub(d!, c!)), tf.log(tf.sub(b!, a!))),
        tf.fill(broadcastShapes('kl', [a!.shape, b!.shape, c!.shape, d!.shape]), Number.POSITIVE_INFINITY),
      ),
    ),
  );
  addScalarKl(
    'exponential|exponential',
    kernel('exponentialKl', (r, s) => relativeExcess(s!, r!)),
  );
  addScalarKl(
    'bernoulli|bernoulli',
    kernel('bernoulliKl', (a, b) => composedBernoulliKl(a!, b!)),
  );
  addScalarKl(
    'poisson|poisson',
    kernel('poissonKl', (r, s) => composedPoissonKl(r!, s!)),
  );
}
