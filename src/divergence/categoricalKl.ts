import * as tf from '@tensorflow/tfjs';
import type { Categorical } from '../distributions/categorical.js';
import {
  type CategoricalRows,
  categoricalRows,
  logDifference,
  totalSlope,
} from '../distributions/categoricalRows.js';
import { sumTrailing } from '../distributions/fold.js';
import { ShapeError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast, sizeOf } from '../kernels/layout.js';
import { exponentialRemainder } from '../numeric/exponentialRemainder.js';
import { usesComposedForm } from '../tensor/composed.js';
import { composedExp } from '../tensor/composedMath.js';
import type { Operand } from '../tensor/operand.js';
import { runOperandOperation } from '../tensor/operandOperation.js';
import { addKl } from './registry.js';

type Inside = Categorical & { readonly operand: Operand };

/** Registers the closed form. Source: Kullback and Leibler, Ann. Math. Stat. 22 (1951), equation 2.4. */
export function registerCategoricalKl(): void {
  addKl('categorical|categorical', (q, p, fold) =>
    tf.tidy(() => sumTrailing(categoricalKl(q as Inside, p as Inside), fold)),
  );
}

function categoricalKl(q: Inside, p: Inside): tf.Tensor {
  const k = q.categories;
  if (p.categories !== k) {
    throw new ShapeError(
      `kl: both categorical distributions must have equally many categories; got ${k} and ${p.categories}; pad the logits`,
    );
  }
  if (usesComposedForm()) {
    const [a, b] = [q.logProbabilities(), p.logProbabilities()];
    return tf.sum(tf.mul(composedExp(a), tf.sub(a, b)), -1);
  }
  const shape = broadcastShapes('kl', [q.arrayShape, p.arrayShape], 'the arrayShapes of q and p');
  const strides = [broadcastStrides(q.arrayShape, shape), broadcastStrides(p.arrayShape, shape)];
  const operands = [q.operand, p.operand];
  const rows = (data: readonly Float32Array[]) =>
    operands.map((o, i) => categoricalRows(o, data[i]!, k)) as [CategoricalRows, CategoricalRows];

  return runOperandOperation({
    where: 'kl',
    operands,
    outShape: shape,
    forward: (data) => {
      const [a, b] = rows(data);
      const out = new Float32Array(sizeOf(shape));
      forEachBroadcast(shape, strides, (index, [i, j]) => {
        out[index] = divergence(a, i! * k, b, j! * k);
      });
      return out;
    },
    gradient: (target, data, upstream) => {
      const [a, b] = rows(data);
      const gradient = new Float64Array((target === 0 ? a : b).raw.length);
      forEachBroadcast(shape, strides, (index, [i, j]) => {
        const dy = upstream[index]!;
        if (dy === 0) return;
        const whole = target === 0 ? divergence(a, i! * k, b, j! * k) : 0;
        for (let c = 0; c < k; c++) {
          const [own, other] = [i! * k + c, j! * k + c];
          const possible = a.logs[own]! > Number.NEGATIVE_INFINITY;
          if (target === 1) {
            gradient[other]! += dy * secondSlope(a, own, b, other);
          } else if (possible) {
            // An impossible category stays out of the gradient, where that of q log q would be infinite.
            gradient[own]! += dy * totalSlope(a, own) * excess(a, own, b, other, whole);
          }
        }
      });
      return Float32Array.from(gradient);
    },
  });
}

/**
 * log q − log p at one category less the divergence, its mean. For a category that is most of q the two nearly
 * agree, and it is log q − log p times the others' share, less the others' part of the mean.
 */
function excess(a: CategoricalRows, own: number, b: CategoricalRows, other: number, whole: number): number {
  const delta = logDifference(a, own, b, other);
  if (a.logs[own]! < -0.7) return delta - whole;
  let sum = -delta * Math.expm1(a.logs[own]!);
  const [start, offset] = [own - (own % a.k), other - own];
  for (let i = start; i < start + a.k; i++) {
    const q = Math.exp(a.logs[i]!);
    if (i !== own && q > 0) sum -= q * logDifference(a, i, b, i + offset);
  }
  return sum;
}

/** The derivative in the second side's raw number: p − q, or (1 − q / p) / Σ. */
function secondSlope(a: CategoricalRows, own: number, b: CategoricalRows, other: number): number {
  if (a.logs[own] === Number.NEGATIVE_INFINITY) return totalSlope(b, other);
  const delta = logDifference(a, own, b, other);
  // Far apart the ratio may overflow where the difference is all right.
  if (delta > 1 && !b.probabilities) return Math.exp(b.logs[other]!) - Math.exp(a.logs[own]!);
  return -totalSlope(b, other) * Math.expm1(delta);
}

/**
 * Σ q log(q / p), each term with p − q added: q (exp(−δ) − 1 + δ) for δ = log q − log p. The additions sum
 * to nothing and make every term positive, so that nothing cancels where the two are close.
 */
function divergence(a: CategoricalRows, i: number, b: CategoricalRows, j: number): number {
  let sum = 0;
  for (let c = 0; c < a.k; c++) {
    const [q, p] = [Math.exp(a.logs[i + c]!), Math.exp(b.logs[j + c]!)];
    if (q === 0) {
      sum += p;
      continue;
    }
    const delta = logDifference(a, i + c, b, j + c);
    sum += Math.abs(delta) < 1 ? q * exponentialRemainder(-delta) : q * delta + p - q;
  }
  return sum;
}
