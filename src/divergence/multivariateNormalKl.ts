import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { sumTrailing } from '../distributions/fold.js';
import type { MultivariateNormal } from '../distributions/multivariateNormal.js';
import type { Normal } from '../distributions/normal.js';
import { isProduct } from '../distributions/product.js';
import { ShapeError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast, sizeOf } from '../kernels/layout.js';
import { log1pmx } from '../numeric/log1pmx.js';
import { usesComposedForm } from '../tensor/composed.js';
import { composedSolveLower } from '../tensor/composedTriangular.js';
import { runHostOperation } from '../tensor/hostOperation.js';
import { solveLower, solveLowerTransposed } from '../tensor/triangular.js';
import { addKl } from './registry.js';

/** Registers the closed forms. Source: Kullback, Information Theory and Statistics (1959), section 9.1. */
export function registerMultivariateNormalKl(): void {
  for (const pair of [
    'multivariateNormal|multivariateNormal',
    'multivariateNormal|product<normal>',
    'product<normal>|multivariateNormal',
  ] as const) {
    addKl(pair, (q, p, fold) =>
      tf.tidy(() => {
        const [a, b] = [meanAndFactor(q), meanAndFactor(p)];
        if (a.d !== b.d) {
          throw new ShapeError(
            `kl: both distributions must have points of one size; got [${a.d}] and [${b.d}]; make the sizes equal`,
          );
        }
        return sumTrailing(factorKl(a.mean, a.factor, b.mean, b.factor, a.d), fold);
      }),
    );
  }
}

function meanAndFactor(d: Distribution): { mean: tf.Tensor; factor: tf.Tensor; d: number } {
  if (isProduct(d)) {
    const base = d.base as Normal;
    const [size] = d.pointShape;
    if (d.pointShape.length !== 1 || size === undefined) {
      throw new ShapeError(
        `kl: a product beside a multivariateNormal must have vectors as points; got pointShape [${d.pointShape.join(', ')}]; fold one axis`,
      );
    }
    const sd = tf.broadcastTo(base.parameter('sd'), base.arrayShape as number[]);
    const mean = tf.broadcastTo(base.parameter('mean'), base.arrayShape as number[]);
    return { mean, factor: tf.mul(tf.expandDims(sd, -1), tf.eye(size)), d: size };
  }
  const normal = d as MultivariateNormal;
  return {
    mean: normal.parameter('mean'),
    factor: normal.parameter('covarianceFactor'),
    d: normal.pointShape[0]!,
  };
}

/** Both sides at one element of the result: M − I with M = L₂⁻¹ L₁, and a = L₂⁻¹ (m₁ − m₂). */
interface Pair {
  readonly excess: Float64Array;
  readonly shift: Float64Array;
}

function factorKl(m1: tf.Tensor, l1: tf.Tensor, m2: tf.Tensor, l2: tf.Tensor, d: number): tf.Tensor {
  if (usesComposedForm()) return composedKl(m1, l1, m2, l2, d);
  const batches = [
    m1.shape.slice(0, -1),
    l1.shape.slice(0, -2),
    m2.shape.slice(0, -1),
    l2.shape.slice(0, -2),
  ];
  const shape = broadcastShapes('kl', batches, 'the leading axes of means and factors');
  const strides = batches.map((b) => broadcastStrides(b, shape));

  // Differencing the factors before the solve keeps M − I accurate where the two distributions are close.
  const compare = (data: readonly Float32Array[], at: readonly number[]): Pair => {
    const [mean1, factor1, mean2, factor2] = data as [Float32Array, Float32Array, Float32Array, Float32Array];
    const [i, j, k, l] = [at[0]! * d, at[1]! * d * d, at[2]! * d, at[3]! * d * d];
    const excess = new Float64Array(d * d);
    for (let c = 0; c < d; c++) {
      const column = new Float64Array(d);
      for (let r = c; r < d; r++) column[r] = factor1[j + r * d + c]! - factor2[l + r * d + c]!;
      solveLower(factor2, l, d, column);
      for (let r = c; r < d; r++) excess[r * d + c] = column[r]!;
    }
    const shift = Float64Array.from({ length: d }, (_, c) => mean1[i + c]! - mean2[k + c]!);
    solveLower(factor2, l, d, shift);
    return { excess, shift };
  };

  return runHostOperation({
    where: 'kl',
    inputs: [m1, l1, m2, l2],
    outShape: shape,
    forward: (data) => {
      const out = new Float32Array(sizeOf(shape));
      forEachBroadcast(shape, strides, (index, at) => {
        const { excess, shift } = compare(data, at);
        let twice = 0;
        for (let r = 0; r < d; r++) {
          for (let c = 0; c < r; c++) twice += excess[r * d + c]! ** 2;
          const t = excess[r * d + r]!;
          const e = t * (2 + t);
          twice += (e < -0.5 ? e - 2 * Math.log(1 + t) : -log1pmx(e)) + shift[r]! ** 2;
        }
        out[index] = 0.5 * twice;
      });
      return out;
    },
    gradient: (which, data, upstream) => {
      const gradient = new Float64Array(data[which]!.length);
      forEachBroadcast(shape, strides, (index, at) => {
        const dy = upstream[index]!;
        if (dy === 0) return;
        const { excess, shift } = compare(data, at);
        addGradient(which, data, at, { excess, shift }, dy, d, gradient);
      });
      return Float32Array.from(gradient);
    },
  });
}

/**
 * With W = L₂⁻ᵀ: in m₁, W a, and minus that in m₂; in L₁, the lower part of W M − diag(1 / L₁); in L₂, minus
 * the lower part of W (M Mᵀ + a aᵀ) − diag(1 / L₂).
 */
function addGradient(
  which: number,
  data: readonly Float32Array[],
  at: readonly number[],
  { excess, shift }: Pair,
  dy: number,
  d: number,
  gradient: Float64Array,
): void {
  const factor2 = data[3]!;
  const l = at[3]! * d * d;
  if (which === 0 || which === 2) {
    const w = shift.slice();
    solveLowerTransposed(factor2, l, d, w);
    for (let c = 0; c < d; c++) gradient[at[which]! * d + c]! += (which === 0 ? dy : -dy) * w[c]!;
    return;
  }
  const m = (r: number, c: number): number => (c > r ? 0 : excess[r * d + c]! + (r === c ? 1 : 0));
  const own = at[which]! * d * d;
  for (let c = 0; c < d; c++) {
    const column = new Float64Array(d);
    for (let r = 0; r < d; r++) {
      if (which === 1) {
        column[r] = m(r, c);
      } else {
        let sum = shift[r]! * shift[c]!;
        for (let s = 0; s <= Math.min(r, c); s++) sum += m(r, s) * m(c, s);
        column[r] = sum;
      }
    }
    solveLowerTransposed(factor2, l, d, column);
    const sign = which === 1 ? dy : -dy;
    for (let r = c; r < d; r++) gradient[own + r * d + c]! += sign * column[r]!;
    gradient[own + c * d + c]! -= sign / data[which]![own + c * d + c]!;
  }
}

function composedKl(m1: tf.Tensor, l1: tf.Tensor, m2: tf.Tensor, l2: tf.Tensor, d: number): tf.Tensor {
  const shift = composedSolveLower(l2, tf.unstack(tf.sub(m1, m2), -1));
  const m = composedSolveLower(l2, tf.unstack(l1, -2), true);
  const diagonal = (x: tf.Tensor): tf.Tensor => tf.sum(tf.mul(x, tf.eye(d)), -1);
  const squares = [...shift.map((v) => tf.square(v)), ...m.map((row) => tf.sum(tf.square(row), -1))];
  const logs = tf.sum(tf.sub(tf.log(diagonal(l2)), tf.log(diagonal(l1))), -1);
  return tf.add(
    tf.mul(
      0.5,
      tf.sub(
        squares.reduce((a, b) => tf.add(a, b)),
        d,
      ),
    ),
    logs,
  );
}
