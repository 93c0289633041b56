import * as tf from '@tensorflow/tfjs';
import { exponentialRemainder } from '../numeric/exponentialRemainder.js';
import { log1pmx } from '../numeric/log1pmx.js';
import { chebyshevPolynomial, polynomial } from './chebyshev.js';
import { composedExp, composedLog1p, when, withSlope } from './composedMath.js';

// What is left of a function after the first terms of its Taylor series, from tensor operations: divergences are
// made of these, and the differences written out would leave nothing of a divergence below 1e-6.

/** x² times a polynomial for |x| ≤ edge, made when it is first needed. */
function square(rest: (x: number) => number, edge: number, terms: number): (x: tf.Tensor) => tf.Tensor {
  let coefficients: readonly number[] | undefined;
  return (x) => {
    coefficients ??= chebyshevPolynomial((t) => rest(edge * t) / (edge * t) ** 2, terms);
    const held = tf.clipByValue(x, -edge, edge);
    return tf.mul(tf.square(held), polynomial(coefficients, tf.div(held, edge)));
  };
}

// Even counts of Chebyshev points leave zero out, where the quotient is not a number.
const nearLog = square(log1pmx, 0.4, 14);
const nearExponential = square(exponentialRemainder, 1, 10);

/** log(1 + x) − x, with every derivative. */
export function composedLog1pmx(x: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor =>
    tf.where(tf.lessEqual(tf.abs(v), 0.4), nearLog(v), tf.sub(composedLog1p(v), v));
  return withSlope(x, value, (v) => tf.neg(tf.div(v, tf.add(1, v))));
}

/** exp(x) − 1, with every derivative. */
export function composedExpm1(x: tf.Tensor): tf.Tensor {
  return withSlope(x, tf.expm1, composedExp);
}

/** exp(x) − 1 − x, with every derivative. */
export function composedExponentialRemainder(x: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor =>
    tf.where(tf.lessEqual(tf.abs(v), 1), nearExponential(v), tf.sub(tf.expm1(v), v));
  return withSlope(x, value, composedExpm1);
}

/** exp(−|x|) − 1 + |x|, smooth at zero, with the derivatives it has there. */
export function composedEvenRemainder(x: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor => composedExponentialRemainder(tf.neg(tf.abs(v)));
  const slope = (v: tf.Tensor): tf.Tensor =>
    withSlope(v, (u) => tf.neg(tf.mul(tf.sign(u), tf.expm1(tf.neg(tf.abs(u))))), twoSidedExponential);
  return withSlope(x, value, slope);
}

function twoSidedExponential(x: tf.Tensor): tf.Tensor {
  return withSlope(
    x,
    (v) => tf.exp(tf.neg(tf.abs(v))),
    (v) => tf.neg(tf.mul(tf.sign(v), twoSidedExponential(v))),
  );
}

/** log(1 − exp(x)) for x < 0, by the smaller of the two. */
export function composedLog1mexp(x: tf.Tensor): tf.Tensor {
  const near = tf.greater(x, -Math.LN2);
  const [close, far] = [when(near, x, tf.fill(x.shape, -1)), when(near, tf.fill(x.shape, -1), x)];
  return when(near, tf.log(tf.neg(composedExpm1(close))), composedLog1p(tf.neg(composedExp(far))));
}
