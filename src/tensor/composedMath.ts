import * as tf from '@tensorflow/tfjs';

// Special functions from differentiable tensor operations, for `composed` and for accelerators. tfjs's own
// softplus and erf are not accurate enough to build on.

/** log(1 + exp(x)) = max(x, 0) + log1p(exp(−|x|)). */
export function composedSoftplus(x: tf.Tensor): tf.Tensor {
  return tf.add(tf.relu(x), tf.log1p(tf.exp(tf.neg(tf.abs(x)))));
}

/** log Γ(x) for x > 0: Stirling's series eight steps up, then the recurrence down (DLMF 5.11.1, 5.5.1). */
export function composedLogGamma(x: tf.Tensor): tf.Tensor {
  const steps = 8;
  const z = tf.add(x, steps);
  let product: tf.Tensor = x;
  for (let k = 1; k < steps; k++) product = tf.mul(product, tf.add(x, k));
  const inverse = tf.div(1, z);
  const square = tf.square(inverse);
  const series = tf.mul(inverse, tf.add(1 / 12, tf.mul(square, tf.add(-1 / 360, tf.mul(square, 1 / 1260)))));
  const stirling = tf.add(
    tf.sub(tf.mul(tf.sub(z, 0.5), tf.log(z)), z),
    tf.add(series, 0.5 * Math.log(2 * Math.PI)),
  );
  return tf.sub(stirling, tf.log(product));
}

/** Φ(x) through erfc's rational-exponential form of Numerical Recipes' Chebyshev fit, relative error 1.2e-7. */
export function composedNormalCdf(x: tf.Tensor): tf.Tensor {
  // Coefficients: Press et al., Numerical Recipes, 2nd edition (1992), section 6.2, erfcc.
  const coefficients = [
    -1.26551223, 1.00002368, 0.37409196, 0.09678418, -0.18628806, 0.27886807, -1.13520398, 1.48851587,
    -0.82215223, 0.17087277,
  ];
  const z = tf.div(tf.abs(x), Math.SQRT2);
  const t = tf.div(1, tf.add(1, tf.mul(z, 0.5)));
  let polynomial: tf.Tensor = tf.fill(x.shape, coefficients[coefficients.length - 1]!);
  for (let k = coefficients.length - 2; k >= 0; k--)
    polynomial = tf.add(coefficients[k]!, tf.mul(polynomial, t));
  const upper = tf.mul(tf.mul(0.5, t), tf.exp(tf.sub(polynomial, tf.square(z))));
  return tf.where(tf.less(x, 0), upper, tf.sub(1, upper));
}

/** Where `inside` holds, `value`; elsewhere `otherwise`. Gradients are zero where it does not hold. */
export function choose(inside: tf.Tensor, value: tf.Tensor, otherwise: number): tf.Tensor {
  const shape = tf.broadcastTo(inside, broadcast(inside.shape, value.shape));
  return tf.where(shape, tf.broadcastTo(value, shape.shape), tf.fill(shape.shape, otherwise));
}

function broadcast(a: readonly number[], b: readonly number[]): number[] {
  const rank = Math.max(a.length, b.length);
  return Array.from({ length: rank }, (_, i) =>
    Math.max(a[a.length - rank + i] ?? 1, b[b.length - rank + i] ?? 1),
  );
}
