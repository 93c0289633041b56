import * as tf from '@tensorflow/tfjs';
import { erf, erfcx } from '../numeric/errorFunction.js';
import { chebyshevPolynomial, polynomial } from './chebyshev.js';
import { when, withSlope } from './composedMath.js';

// The normal distribution function and its kin from tensor operations, for `composed` and for accelerators.
// tfjs's erf is an approximation of absolute accuracy 1e-7, with nothing left in either tail or near zero.
// The polynomials are made from the double-precision functions when they are first needed.

let upperCoefficients: readonly number[] | undefined;
let centralCoefficients: readonly number[] | undefined;

/**
 * e^{a²} erfc(a) for a ≥ 0: (1 + 2a) times it is smooth in t = (a − 2.5) / (a + 2.5), where twelve terms reach
 * 1e-8. The form is Shepherd and Laframboise (1981), Math. Comp. 36, 249–253.
 */
function scaledUpper(a: tf.Tensor): tf.Tensor {
  upperCoefficients ??= chebyshevPolynomial((t) => {
    const v = (2.5 * (1 + t)) / (1 - t);
    return (1 + 2 * v) * erfcx(v);
  }, 12);
  // As 1 − 5 / (a + 2.5), so that an infinite a gives 1.
  const t = tf.sub(1, tf.div(5, tf.add(a, 2.5)));
  return tf.div(polynomial(upperCoefficients, t), tf.add(1, tf.mul(2, a)));
}

/** erf(a) for |a| ≤ 1, to relative accuracy: a times a polynomial in a². */
function centralErf(a: tf.Tensor): tf.Tensor {
  centralCoefficients ??= chebyshevPolynomial((t) => {
    const v = Math.sqrt(0.5 * (1 + t));
    return erf(v) / v;
  }, 9);
  return tf.mul(a, polynomial(centralCoefficients, tf.sub(tf.mul(2, tf.square(a)), 1)));
}

/** e^{−x²/2} with the square split, so that its rounding is not multiplied by its size. */
function bell(x: tf.Tensor): tf.Tensor {
  const held = tf.minimum(tf.abs(x), 20);
  const head = tf.div(tf.floor(tf.mul(held, 16)), 16);
  const rest = tf.mul(tf.sub(held, head), tf.add(held, head));
  return tf.mul(tf.exp(tf.mul(-0.5, tf.square(head))), tf.exp(tf.mul(-0.5, rest)));
}

const rootHalf = Math.SQRT1_2;

/** φ(x), the standard normal density, with every derivative. */
export function composedNormalDensity(x: tf.Tensor): tf.Tensor {
  const scale = 1 / Math.sqrt(2 * Math.PI);
  return withSlope(
    x,
    (v) => tf.mul(scale, bell(v)),
    (v) => tf.mul(tf.neg(v), composedNormalDensity(v)),
  );
}

/** Φ(x), accurate far in the lower tail, with every derivative. */
export function composedNormalCdf(x: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor => {
    const upper = tf.mul(tf.mul(0.5, bell(v)), scaledUpper(tf.mul(tf.abs(v), rootHalf)));
    return tf.where(tf.less(v, 0), upper, tf.sub(1, upper));
  };
  return withSlope(x, value, composedNormalDensity);
}

/** erf(x), with relative accuracy near zero and every derivative. */
export function composedErf(x: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor => {
    const a = tf.abs(v);
    const outer = tf.sub(1, tf.mul(bell(tf.mul(v, Math.SQRT2)), scaledUpper(a)));
    return tf.where(tf.lessEqual(a, 1), centralErf(tf.clipByValue(v, -1, 1)), tf.mul(tf.sign(v), outer));
  };
  return withSlope(x, value, (v) => tf.mul(2 * Math.SQRT2, composedNormalDensity(tf.mul(v, Math.SQRT2))));
}

/** e^{x²} erfc(x), with every derivative; the derivatives lose their digits where x is large. */
export function composedErfcx(x: tf.Tensor): tf.Tensor {
  const value = (v: tf.Tensor): tf.Tensor => {
    const upper = scaledUpper(tf.abs(v));
    const reflected = tf.sub(tf.div(2, bell(tf.mul(v, Math.SQRT2))), upper);
    return tf.where(tf.less(v, 0), reflected, upper);
  };
  return withSlope(x, value, (v) => tf.sub(tf.mul(tf.mul(2, v), composedErfcx(v)), 2 / Math.sqrt(Math.PI)));
}

/** log Φ(x), accurate in both tails; its slope is φ / Φ, whose own derivative h′ = −h (x + h) gives all others. */
export function composedLogNormalCdf(x: tf.Tensor): tf.Tensor {
  return withSlope(x, logNormalCdfValue, composedInverseMills);
}

function logNormalCdfValue(x: tf.Tensor): tf.Tensor {
  const lower = tf.minimum(x, 0);
  const far = tf.sub(
    tf.log(tf.mul(0.5, scaledUpper(tf.mul(lower, -rootHalf)))),
    tf.mul(0.5, tf.square(lower)),
  );
  const above = tf.maximum(x, 0);
  const near = tf.log1p(tf.mul(tf.mul(-0.5, bell(above)), scaledUpper(tf.mul(above, rootHalf))));
  return tf.where(tf.less(x, 0), far, near);
}

function composedInverseMills(x: tf.Tensor): tf.Tensor {
  return withSlope(x, inverseMillsValue, (v) => {
    const h = composedInverseMills(v);
    return tf.neg(tf.mul(h, when(tf.less(v, -7), farExcess(v), tf.add(v, h))));
  });
}

/** x + φ / Φ far below zero, where the sum cancels: −1/x + 2/x³ − 10/x⁵ + 74/x⁷ − …, from DLMF 7.12.1. */
function farExcess(x: tf.Tensor): tf.Tensor {
  const r = tf.div(1, tf.minimum(x, -7));
  const series = [-1, 2, -10, 74, -706].reduceRight<tf.Tensor>(
    (sum, c) => tf.add(c, tf.mul(tf.square(r), sum)),
    tf.zerosLike(x),
  );
  return tf.mul(r, series);
}

function inverseMillsValue(x: tf.Tensor): tf.Tensor {
  const far = tf.div(Math.sqrt(2 / Math.PI), scaledUpper(tf.mul(tf.minimum(x, 0), -rootHalf)));
  const above = tf.maximum(x, 0);
  const upper = tf.mul(tf.mul(0.5, bell(above)), scaledUpper(tf.mul(above, rootHalf)));
  const near = tf.div(tf.mul(1 / Math.sqrt(2 * Math.PI), bell(above)), tf.sub(1, upper));
  return tf.where(tf.less(x, 0), far, near);
}

/** Φ⁻¹(p), with every derivative. */
export function composedNormalQuantile(p: tf.Tensor): tf.Tensor {
  return withSlope(p, normalQuantileValue, (v) =>
    tf.div(1, composedNormalDensity(composedNormalQuantile(v))),
  );
}

/**
 * Halley's method, on Φ − ½ in the middle, where its zero keeps relative accuracy, and on log Φ in the tails,
 * from the leading terms of each inverse.
 */
function normalQuantileValue(p: tf.Tensor): tf.Tensor {
  const y = tf.clipByValue(tf.sub(p, 0.5), -0.35, 0.35);
  let middle = tf.mul(y, Math.sqrt(2 * Math.PI));
  for (let step = 0; step < 3; step++) {
    const density = tf.mul(1 / Math.sqrt(2 * Math.PI), bell(middle));
    const half = tf.mul(0.5, centralErf(tf.clipByValue(tf.mul(middle, rootHalf), -1, 1)));
    const move = tf.div(tf.sub(half, y), density);
    middle = tf.sub(middle, tf.div(move, tf.add(1, tf.mul(0.5, tf.mul(middle, move)))));
  }
  const share = tf.minimum(tf.minimum(p, tf.sub(1, p)), 0.25);
  const log = tf.log(share);
  const root = tf.sqrt(tf.mul(-2, log));
  let tail = tf.sub(tf.div(tf.log(tf.mul(root, Math.sqrt(2 * Math.PI))), root), root);
  for (let step = 0; step < 2; step++) {
    const h = inverseMillsValue(tail);
    const move = tf.div(tf.sub(logNormalCdfValue(tail), log), h);
    tail = tf.sub(tail, tf.div(move, tf.add(1, tf.mul(tf.mul(0.5, tf.add(tail, h)), move))));
  }
  const central = tf.lessEqual(tf.abs(tf.sub(p, 0.5)), 0.25);
  const outer = tf.where(tf.less(p, 0.5), tail, tf.neg(tail));
  const inner = tf.where(central, middle, outer);
  // At the ends the logarithm is infinite, and so is the quantile.
  const ends = tf.mul(tf.sign(tf.sub(p, 0.5)), Number.POSITIVE_INFINITY);
  return tf.where(tf.logicalOr(tf.equal(p, 0), tf.equal(p, 1)), ends, inner);
}
