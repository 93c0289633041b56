import * as tf from '@tensorflow/tfjs';
import { type Categorical, chained, transformed } from '../distributions/categorical.js';
import { sumTrailing } from '../distributions/fold.js';
import { ShapeError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast, sizeOf } from '../kernels/layout.js';
import { exponentialRemainder } from '../numeric/exponentialRemainder.js';
import { usesComposedForm } from '../tensor/composed.js';
import { runHostOperation } from '../tensor/hostOperation.js';
import { rowLogSums } from '../tensor/logSumExp.js';
import { type Operand, operandData } from '../tensor/operand.js';
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
    return tf.sum(tf.mul(tf.exp(a), tf.sub(a, b)), -1);
  }
  const shape = broadcastShapes('kl', [q.arrayShape, p.arrayShape]);
  const strides = [broadcastStrides(q.arrayShape, shape), broadcastStrides(p.arrayShape, shape)];
  const operands = [q.operand, p.operand];
  const tracked = operands.flatMap((o, i) => (!o.constant && o.source instanceof tf.Tensor ? [i] : []));
  const gather = (data: readonly Float32Array[]) =>
    operands.map((o, i) => (tracked.includes(i) ? data[tracked.indexOf(i)]! : operandData(o)));
  const rows = (data: readonly Float32Array[]) =>
    gather(data).map((raw, i) => {
      const logits = transformed(operands[i]!, raw);
      const sums = rowLogSums(logits, k);
      return logits.map((v, at) => v - sums[Math.floor(at / k)]!);
    });

  return runHostOperation({
    where: 'kl',
    inputs: tracked.map((i) => operands[i]!.source as tf.Tensor),
    outShape: shape,
    forward: (data) => {
      const [a, b] = rows(data) as [Float64Array, Float64Array];
      const out = new Float32Array(sizeOf(shape));
      forEachBroadcast(shape, strides, (index, [i, j]) => {
        out[index] = divergence(a, i! * k, b, j! * k, k);
      });
      return out;
    },
    gradient: (at, data, upstream) => {
      const [a, b] = rows(data) as [Float64Array, Float64Array];
      const target = tracked[at]!;
      const gradient = new Float64Array((target === 0 ? a : b).length);
      forEachBroadcast(shape, strides, (index, [i, j]) => {
        const dy = upstream[index]!;
        const whole = divergence(a, i! * k, b, j! * k, k);
        for (let c = 0; c < k; c++) {
          const [logQ, logP] = [a[i! * k + c]!, b[j! * k + c]!];
          const probability = Math.exp(logQ);
          if (target === 0) {
            if (probability > 0) gradient[i! * k + c]! += dy * probability * (logQ - logP - whole);
          } else {
            gradient[j! * k + c]! += dy * (Math.exp(logP) - probability);
          }
        }
      });
      return chained(operands[target]!, gather(data)[target]!, gradient);
    },
  });
}

/**
 * Σ q log(q / p), each term with p − q added: q (exp(−δ) − 1 + δ) for δ = log q − log p. The additions sum
 * to nothing and make every term positive, so that nothing cancels where the two are close.
 */
function divergence(a: Float64Array, i: number, b: Float64Array, j: number, k: number): number {
  let sum = 0;
  for (let c = 0; c < k; c++) {
    const [logQ, logP] = [a[i + c]!, b[j + c]!];
    const q = Math.exp(logQ);
    if (q === 0) {
      sum += Math.exp(logP);
      continue;
    }
    const delta = logQ - logP;
    sum += Math.abs(delta) < 1 ? q * exponentialRemainder(-delta) : q * delta + Math.exp(logP) - q;
  }
  return sum;
}
