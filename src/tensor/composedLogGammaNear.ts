import * as tf from '@tensorflow/tfjs';
import { EULER } from '../numeric/constants.js';
import { logGamma1p } from '../numeric/logGamma.js';
import { chebyshevPolynomial, polynomial } from './chebyshev.js';
import { composedLogGamma, when } from './composedMath.js';

// The logarithm of the gamma function near its zeros 1 and 2, where Stirling's series has lost the digits.

let onUnit: readonly number[] | undefined;
let excess: readonly number[] | undefined;

/** log Γ(1 + u) for 0 ≤ u ≤ 1: its two zeros times a polynomial. */
function unit(u: tf.Tensor): tf.Tensor {
  onUnit ??= chebyshevPolynomial((t) => {
    const v = (1 + t) / 2;
    return logGamma1p(v) / (v * (v - 1));
  }, 12);
  return tf.mul(tf.mul(u, tf.sub(u, 1)), polynomial(onUnit, tf.sub(tf.mul(2, u), 1)));
}

/** log Γ(1 + u) for u ≥ 0: to 8 by the recurrence down to u ≤ 1, beyond by Stirling's series. */
export function composedLogGamma1p(u: tf.Tensor): tf.Tensor {
  const steps = 7;
  const low = tf.lessEqual(u, 1 + steps);
  let rest = when(low, u, tf.onesLike(u));
  let product = tf.onesLike(u);
  for (let k = 0; k < steps; k++) {
    const above = tf.greater(rest, 1);
    product = tf.mul(product, when(above, rest, tf.onesLike(u)));
    rest = when(above, tf.sub(rest, 1), rest);
  }
  const high = when(low, tf.fill(u.shape, 1 + steps), u);
  return when(low, tf.add(unit(rest), tf.log(product)), composedLogGamma(tf.add(1, high)));
}

/** log Γ(r) + γ (r − 1) for r > 0, never negative: its double zero at 1 times a polynomial, written out elsewhere. */
export function composedLogGammaExcess(r: tf.Tensor): tf.Tensor {
  excess ??= chebyshevPolynomial((t) => {
    const v = 0.25 + 0.75 * t;
    return (logGamma1p(v) + EULER * v) / (v * v);
  }, 14);
  const lessOne = tf.sub(r, 1);
  const near = tf.lessEqual(tf.abs(tf.sub(lessOne, 0.25)), 0.75);
  const held = when(near, lessOne, tf.zerosLike(r));
  const far = when(near, tf.fill(r.shape, 3), r);
  return when(
    near,
    tf.mul(tf.square(held), polynomial(excess, tf.div(tf.sub(held, 0.25), 0.75))),
    tf.add(tf.sub(composedLogGamma1p(far), tf.log(far)), tf.mul(EULER, tf.sub(far, 1))),
  );
}
