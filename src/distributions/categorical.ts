import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast, sizeOf } from '../kernels/layout.js';
import { outside } from '../numeric/outside.js';
import { categoricalDraws } from '../random/noise.js';
import { requireStream, type Stream } from '../random/stream.js';
import { categories } from '../support/support.js';
import { valuesAreChecked } from '../tensor/backend.js';
import { positionText, requireTensor, shapeText } from '../tensor/checks.js';
import { usesComposedForm } from '../tensor/composed.js';
import { composedExp, composedLogSoftmax, when } from '../tensor/composedMath.js';
import { detach } from '../tensor/detach.js';
import { floatsOf, tensorOf } from '../tensor/engine.js';
import { composedTensor, detachedOperand, type Operand, operandData, rawTensor } from '../tensor/operand.js';
import { runOperandOperation } from '../tensor/operandOperation.js';
import { logarithm } from '../tensor/transforms.js';
import { type CategoricalRows, categoricalRows, ownSlope, totalSlope } from './categoricalRows.js';
import {
  type Distribution,
  drawShape,
  drawThenScore,
  type HasEntropy,
  type HasMode,
} from './distribution.js';
import type { OneOf } from './oneOf.js';
import { type Form, finite, readParameters, unitClosed } from './parameters.js';

/** Parameters of {@link categorical}: exactly one, the categories along its last axis. */
export type CategoricalOptions = OneOf<'logits' | 'probabilities'>;

/** An array of categorical distributions. */
export interface Categorical extends Distribution<'categorical', 'none'>, HasMode, HasEntropy {
  /** How many categories there are. */
  readonly categories: number;
  /** The normalized log probabilities, `[...arrayShape, categories]`, differentiable. */
  logProbabilities(): tf.Tensor;
}

const forms: Record<string, Record<string, Form>> = {
  logits: {
    logits: { domain: finite, example: '[0, 1]', fix: 'pass probabilities if a category is impossible' },
    probabilities: { domain: unitClosed, example: '[0.2, 0.8]', transform: logarithm },
  },
};

/**
 * The categorical distribution: one of several labels.
 *
 * Log mass: logits[x] − logSumExp(logits) at whole numbers from 0 below the number of categories, −∞
 * elsewhere, in nats. Shapes: the parameter is `[...arrayShape, categories]`; points are scalars, int32 when
 * drawn. Gradient route: none.
 *
 * @param options - one of `logits` (any finite numbers) and `probabilities` (each in [0, 1], summing to one)
 * @throws ParameterError when neither or both are given, a number is outside its domain or a row of
 *   probabilities does not sum to one; ShapeError when the parameter has no last axis.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { categorical } from 'leadline';
 * const d = categorical({ probabilities: [0.5, 0.25, 0.25] });
 * console.log(d.logDensity(tf.tensor1d([0, 2, 3])).arraySync());
 * // [ -0.6931471824645996, -1.3862943649291992, -Infinity ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Discrete Multivariate Distributions (1997), chapter 35.
 */
export function categorical(options: CategoricalOptions): Categorical {
  const operand = readParameters('categorical', forms, options).logits!;
  const k = operand.shape[operand.shape.length - 1];
  if (k === undefined || k === 0) {
    throw new ShapeError(
      `categorical: the parameter must have a last axis of categories; got shape ${shapeText(operand.shape)}; pass for example logits: [0, 0, 0]`,
    );
  }
  if (operand.transform) requireUnitSums(operand, k);
  return member(operand, k);
}

function requireUnitSums(operand: Operand, k: number): void {
  if (operand.source instanceof tf.Tensor && !valuesAreChecked()) return;
  const data = operandData(operand);
  for (let row = 0; row < data.length / k; row++) {
    let sum = 0;
    for (let i = 0; i < k; i++) sum += data[row * k + i]!;
    if (!(Math.abs(sum - 1) <= 1e-5 * Math.max(1, Math.sqrt(k)))) {
      const leading = operand.shape.slice(0, -1);
      const at = leading.length === 0 ? '' : ` at ${positionText(row, leading)}`;
      throw new ParameterError(
        `categorical: probabilities must sum to 1 along the last axis; got ${sum}${at}; divide by the sum, or pass logits`,
      );
    }
  }
}

function member(operand: Operand, k: number): Categorical {
  const arrayShape = Object.freeze(operand.shape.slice(0, -1));

  const logDensity = (x: tf.Tensor): tf.Tensor => {
    requireTensor('categorical.logDensity', 'x', x);
    const shape = broadcastShapes('categorical.logDensity', [x.shape, arrayShape], 'x and the arrayShape');
    if (usesComposedForm()) return composedLogDensity(x, operand, k, shape);
    const points = floatsOf(x);
    const strides = [broadcastStrides(x.shape, shape), broadcastStrides(arrayShape, shape)];
    const legal = (label: number): boolean => Number.isInteger(label) && label >= 0 && label < k;
    return rowOperation('categorical.logDensity', operand, k, shape, {
      forward: ({ logs }) => {
        const out = new Float32Array(sizeOf(shape));
        forEachBroadcast(shape, strides, (i, [at, row]) => {
          const label = points[at!]!;
          out[i] = legal(label) ? logs[row! * k + label]! : outside(label);
        });
        return out;
      },
      gradient: (rows, upstream) => {
        const gradient = new Float64Array(rows.raw.length);
        forEachBroadcast(shape, strides, (i, [at, row]) => {
          const label = points[at!]!;
          const dy = upstream[i]!;
          if (dy === 0 || !legal(label)) return;
          for (let j = 0; j < k; j++) {
            const own = row! * k + j;
            gradient[own]! += dy * (j === label ? ownSlope(rows, own) : -totalSlope(rows, own));
          }
        });
        return gradient;
      },
    });
  };

  const draw = (stream: Stream, count?: number): tf.Tensor => {
    requireStream('categorical.draw', stream);
    const shape = drawShape('categorical.draw', count, arrayShape, k);
    const logits = Float32Array.from(categoricalRows(operand, operandData(operand), k).logs);
    const repeated = new Float32Array(sizeOf(shape) * k);
    for (let start = 0; start < repeated.length; start += logits.length) repeated.set(logits, start);
    return tensorOf(categoricalDraws(stream, repeated, k), shape);
  };

  const logProbabilities = (): tf.Tensor => {
    if (usesComposedForm()) return tf.tidy(() => composedLogSoftmax(composedTensor(operand)));
    return rowOperation('categorical.logProbabilities', operand, k, operand.shape, {
      forward: ({ logs }) => Float32Array.from(logs),
      gradient: (rows, upstream) =>
        Float64Array.from(rows.raw, (_, i) => {
          const start = i - (i % k);
          let sum = upstream[i] === 0 ? 0 : upstream[i]! * ownSlope(rows, i);
          for (let j = start; j < start + k; j++) if (j !== i) sum -= upstream[j]! * totalSlope(rows, i);
          return sum;
        }),
    });
  };

  return Object.freeze({
    family: 'categorical' as const,
    route: 'none' as const,
    support: categories,
    arrayShape,
    pointShape: Object.freeze([]),
    categories: k,
    operand,
    draw,
    drawScored: drawThenScore(draw, logDensity),
    logDensity,
    logProbabilities,
    // Logarithms keep the order, so that the raw parameter will do.
    mode: () => tf.tidy(() => tf.argMax(rawTensor(operand), -1)),
    entropy: () => {
      if (usesComposedForm()) {
        return tf.tidy(() => {
          const logs = logProbabilities();
          return tf.neg(
            tf.sum(when(tf.less(logs, -200), tf.zerosLike(logs), tf.mul(composedExp(logs), logs)), -1),
          );
        });
      }
      return rowOperation('categorical.entropy', operand, k, arrayShape, {
        forward: (rows) => Float32Array.from(rowEntropies(rows)),
        gradient: (rows, upstream) => {
          const entropies = rowEntropies(rows);
          return rows.logs.map((log, i) => {
            const row = Math.floor(i / k);
            // An impossible category stays out of the gradient, where that of p log p would be infinite.
            if (log === Number.NEGATIVE_INFINITY) return 0;
            return -upstream[row]! * totalSlope(rows, i) * (log + entropies[row]!);
          });
        },
      });
    },
    detached: () => member(detachedOperand(operand), k),
  }) as unknown as Categorical;
}

function rowEntropies({ logs, k }: CategoricalRows): Float64Array {
  const out = new Float64Array(logs.length / k);
  logs.forEach((log, i) => {
    const p = Math.exp(log);
    if (p > 0) out[Math.floor(i / k)]! -= p * log;
  });
  return out;
}

interface RowOperation {
  forward(rows: CategoricalRows): Float32Array;
  /** The gradient in the raw numbers. */
  gradient(rows: CategoricalRows, upstream: Float32Array): Float64Array;
}

function rowOperation(
  where: string,
  operand: Operand,
  k: number,
  outShape: readonly number[],
  { forward, gradient }: RowOperation,
): tf.Tensor {
  return runOperandOperation({
    where,
    operands: [operand],
    outShape,
    forward: ([raw]) => forward(categoricalRows(operand, raw!, k)),
    gradient: (_k, [raw], upstream) =>
      Float32Array.from(gradient(categoricalRows(operand, raw!, k), upstream)),
  });
}

function composedLogDensity(x: tf.Tensor, operand: Operand, k: number, shape: number[]): tf.Tensor {
  return tf.tidy(() => {
    const logP = composedLogSoftmax(composedTensor(operand));
    const full = tf.broadcastTo(logP, [...shape, k]);
    const points = tf.broadcastTo(detach(x), shape);
    const hot = tf.equal(tf.expandDims(points, -1), tf.range(0, k));
    const picked = tf.sum(tf.where(hot, full, tf.zerosLike(full)), -1);
    return tf.where(tf.any(hot, -1), picked, tf.fill(shape, Number.NEGATIVE_INFINITY));
  });
}
