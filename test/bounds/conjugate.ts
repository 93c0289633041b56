import * as tf from '@tensorflow/tfjs';
import { directed, multivariateNormal, normal, product } from '../../src/index.js';
import { cholesky, normalLogDensityByFactor } from './linearAlgebra.js';

// A linear Gaussian model with two latents and three observed coordinates, worked out in double precision:
// z ~ N(0, I), x | z ~ N(z W + b, s² I).
export const w = [
  [0.5, -1, 0.25],
  [1.5, 0.75, -0.5],
];
export const b = [0.1, -0.2, 0.3];
export const s = 0.7;
export const xs = [
  [0.3, -1.2, 0.8],
  [2.1, 0.4, -0.9],
  [-1.5, 0.2, 0.1],
  [0, 0, 0],
];

/** log N(x; b, WᵀW + s² I) per row. */
export function logEvidence(rows: number[][] = xs): number[] {
  const covariance = b.map((_, j) =>
    Float64Array.from(b, (_, k) => w.reduce((sum, row) => sum + row[j]! * row[k]!, j === k ? s * s : 0)),
  );
  const factor = cholesky(covariance);
  return rows.map((row) =>
    normalLogDensityByFactor(
      factor,
      Float64Array.from(row, (v, j) => v - b[j]!),
    ),
  );
}

/** The exact posterior: covariance (I + W Wᵀ / s²)⁻¹ and mean covariance · W (x − b) / s². */
export function posterior() {
  const a = w.map((row, i) =>
    w.map((other, j) => row.reduce((sum, v, k) => sum + (v * other[k]!) / (s * s), i === j ? 1 : 0)),
  );
  const det = a[0]![0]! * a[1]![1]! - a[0]![1]! * a[1]![0]!;
  const covariance = [
    Float64Array.of(a[1]![1]! / det, -a[0]![1]! / det),
    Float64Array.of(-a[1]![0]! / det, a[0]![0]! / det),
  ];
  const factor = cholesky(covariance).map((row) => [...row]);
  // mean = (x − b) M with M = Wᵀ covariance / s², three by two.
  const m = b.map((_, k) =>
    [0, 1].map((i) => w.reduce((sum, row, j) => sum + (row[k]! * covariance[j]![i]!) / (s * s), 0)),
  );
  return { factor, m };
}

export const prior = () => product(normal({ mean: [0, 0], sd: 1 }));

export const gaussianModel = () =>
  directed()
    .latent('z', prior)
    .observed('x', ({ z }) =>
      product(normal({ mean: tf.add(tf.matMul(z as tf.Tensor2D, tf.tensor2d(w)), b), sd: s })),
    );

export const exactRecognizer = () => {
  const { factor, m } = posterior();
  return directed()
    .given('x')
    .latent('z', ({ x }) =>
      multivariateNormal({
        mean: tf.matMul(tf.sub(x, b) as tf.Tensor2D, tf.tensor2d(m)),
        covarianceFactor: factor,
      }),
    );
};
