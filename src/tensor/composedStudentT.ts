import * as tf from '@tensorflow/tfjs';
import { studentTEntropy, studentTLogDensity } from '../numeric/families/studentT.js';
import { chebyshevPolynomial, polynomial } from './chebyshev.js';
import { composedLog1p, when } from './composedMath.js';
import { composedLog1pmx } from './composedRemainders.js';

// Student's t log density and entropy from tensor operations. What is left of the functions of ν alone after their
// behaviour at zero is smooth in ν / (ν + 1); the polynomials are made when they are first needed.

const terms = 14;

function smooth(f: (nu: number) => number): (t: tf.Tensor) => tf.Tensor {
  let coefficients: readonly number[] | undefined;
  return (t) => {
    coefficients ??= chebyshevPolynomial((u) => f((1 + u) / (1 - u)), terms);
    return polynomial(coefficients, tf.sub(tf.mul(2, t), 1));
  };
}

const normRest = smooth((nu) => studentTLogDensity(0, nu) - 0.5 * Math.log(nu / (nu + 1)));
const entropyRest = smooth((nu) => studentTEntropy(nu) - 1 / nu + 0.5 * Math.log(nu / (nu + 1)));

/** The log density at z; for z² well below ν in the difference from the normal's, whose parts do not cancel. */
export function composedStudentTLogDensity(z: tf.Tensor, nu: tf.Tensor): tf.Tensor {
  const t = tf.div(nu, tf.add(nu, 1));
  const norm = tf.add(normRest(t), tf.mul(0.5, tf.log(t)));
  const square = tf.square(z);
  const q = tf.div(square, nu);
  const low = tf.less(q, 0.4);
  const power = tf.mul(0.5, tf.add(nu, 1));
  const small = when(low, q, tf.zerosLike(q));
  const close = tf.add(
    tf.mul(0.5, tf.add(when(low, square, tf.zerosLike(q)), small)),
    tf.mul(power, composedLog1pmx(small)),
  );
  const large = when(low, tf.onesLike(q), q);
  const far = tf.mul(power, tf.add(tf.log(large), composedLog1p(tf.div(1, large))));
  return tf.sub(norm, when(low, close, far));
}

/** The entropy of scale 1. */
export function composedStudentTEntropy(nu: tf.Tensor): tf.Tensor {
  const t = tf.div(nu, tf.add(nu, 1));
  return tf.sub(tf.add(entropyRest(t), tf.div(1, nu)), tf.mul(0.5, tf.log(t)));
}
