import * as tf from '@tensorflow/tfjs';

/**
 * Coefficients, lowest power first, of the polynomial of degree n − 1 that meets `f` at the n Chebyshev points
 * of [−1, 1]. Source: Mason and Handscomb, Chebyshev Polynomials (2003), section 6.3.
 */
export function chebyshevPolynomial(f: (t: number) => number, n: number): number[] {
  const points = Array.from({ length: n }, (_, j) => (Math.PI * (j + 0.5)) / n);
  const values = points.map((angle) => f(Math.cos(angle)));
  const sum = new Array<number>(n).fill(0);
  // T₀ and T₁ in powers of t, then T_{k+1} = 2t T_k − T_{k−1}.
  let [older, newer] = [
    [1, 0],
    [0, 1],
  ] as [number[], number[]];
  for (let k = 0; k < n; k++) {
    const weight = (k === 0 ? 1 : 2) / n;
    const share = weight * points.reduce((s, angle, j) => s + values[j]! * Math.cos(k * angle), 0);
    older.forEach((c, power) => {
      if (c !== 0) sum[power]! += share * c;
    });
    const next = [0, ...newer].map((c, power) => 2 * c - (older[power] ?? 0));
    [older, newer] = [newer, next];
  }
  return sum;
}

/** A polynomial at a tensor, by Horner's rule. */
export function polynomial(coefficients: readonly number[], t: tf.Tensor): tf.Tensor {
  const last = coefficients[coefficients.length - 1]!;
  let value: tf.Tensor = tf.fill(t.shape, last);
  for (let k = coefficients.length - 2; k >= 0; k--) value = tf.add(coefficients[k]!, tf.mul(value, t));
  return value;
}
