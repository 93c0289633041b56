import * as tf from '@tensorflow/tfjs';
import { chebyshevPolynomial, polynomial } from '../tensor/chebyshev.js';
import { when } from '../tensor/composedMath.js';

// Functions of log odds that are differences of large terms near zero but smooth there.

const edge = 4;

/** A polynomial in l² for |l| ≤ 4 that meets an even function, made when it is first needed. */
export function evenPolynomial(f: (l: number) => number): (l: tf.Tensor) => tf.Tensor {
  let coefficients: readonly number[] | undefined;
  return (l) => {
    coefficients ??= chebyshevPolynomial((t) => f(edge * Math.sqrt((1 + t) / 2)), 12);
    return polynomial(coefficients, tf.sub(tf.mul(2 / edge ** 2, tf.square(l)), 1));
  };
}

/** One formula for |l| ≤ 4 and another, which is given |l| too, beyond; each is read only on its own side. */
export function byEven(
  l: tf.Tensor,
  near: (l: tf.Tensor) => tf.Tensor,
  far: (l: tf.Tensor, size: tf.Tensor) => tf.Tensor,
): tf.Tensor {
  const small = tf.lessEqual(tf.abs(l), edge);
  const held = when(small, l, tf.zerosLike(l));
  const outer = when(small, tf.fill(l.shape, edge), l);
  const size = when(tf.less(outer, 0), tf.neg(outer), outer);
  return when(small, near(held), far(outer, size));
}

const ratio = evenPolynomial((l) => Math.log((2 * Math.sinh(l / 2)) / l) / (l * l));

/** log(sinh(l / 2) / (l / 2)) for |l| ≤ 4. */
export const nearLogSinh = (l: tf.Tensor): tf.Tensor => tf.mul(tf.square(l), ratio(l));
