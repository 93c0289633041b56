import * as tf from '@tensorflow/tfjs';
import { EULER } from '../numeric/constants.js';
import { scaledExponentialIntegral } from '../numeric/scaledExponentialIntegral.js';
import { chebyshevPolynomial, polynomial } from './chebyshev.js';
import { composedExp, when } from './composedMath.js';

let far: readonly number[] | undefined;

/** Coefficients of x − x²/4 + x³/18 − …, what E₁(x) + log x + γ is (DLMF 6.6.2). */
const near: readonly number[] = (() => {
  const found = [0];
  let factorial = 1;
  for (let k = 1; k <= 11; k++) {
    factorial *= k;
    found.push((k % 2 === 1 ? 1 : -1) / (k * factorial));
  }
  return found;
})();

/** e^x E₁(x) for x > 0: by its series up to 1, as a polynomial in (x − 3) / (x + 3), over x, above. */
export function composedScaledExponentialIntegral(x: tf.Tensor): tf.Tensor {
  far ??= chebyshevPolynomial((t) => {
    // t runs over [−1/2, 1].
    const s = (1 + 3 * t) / 4;
    const v = (3 * (1 + s)) / (1 - s);
    return v * scaledExponentialIntegral(v);
  }, 14);
  const low = tf.lessEqual(x, 1);
  const one = tf.onesLike(x);
  const small = when(low, x, one);
  const large = when(low, one, x);
  const series = tf.sub(polynomial(near, small), tf.add(tf.log(small), EULER));
  const s = tf.sub(1, tf.div(6, tf.add(large, 3)));
  const t = tf.div(tf.sub(tf.mul(4, s), 1), 3);
  return when(low, tf.mul(composedExp(small), series), tf.div(polynomial(far, t), large));
}
