import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast, sizeOf } from '../kernels/layout.js';
import { categoricalDraws } from '../random/noise.js';
import { requireStream, type Stream } from '../random/stream.js';
import { categories } from '../support/support.js';
import { valuesAreChecked } from '../tensor/backend.js';
import { positionText, requireCount, requireTensor, shapeText } from '../tensor/checks.js';
import { usesComposedForm } from '../tensor/composed.js';
import { floatsOf, tensorOf } from '../tensor/engine.js';
import { runHostOperation } from '../tensor/hostOperation.js';
import { rowLogSums } from '../tensor/logSumExp.js';
import { composedTensor, detachedOperand, type Operand, operandData } from '../tensor/operand.js';
import { logarithm } from '../tensor/transforms.js';
import { type Distribution, drawShape, type HasEntropy, type HasMode } from './distribution.js';
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
    logits: { domain: finite, fix: 'pass probabilities if a category is impossible' },
    probabilities: { domain: unitClosed, transform: logarithm },
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
  const arrayShape = operand.shape.slice(0, -1);

  const logDensity = (x: tf.Tensor): tf.Tensor => {
    requireTensor('categorical.logDensity', 'x', x);
    const shape = broadcastShapes('categorical.logDensity', [x.shape, arrayShape]);
    if (usesComposedForm()) return composedLogDensity(x, operand, k, shape);
    const points = floatsOf(x);
    const strides = [broadcastStrides(x.shape, shape), broadcastStrides(arrayShape, shape)];
    return logitOperation(
      'categorical.logDensity',
      operand,
      shape,
      (raw) => {
        const logits = transformed(operand, raw);
        const sums = rowLogSums(logits, k);
        const out = new Float32Array(sizeOf(shape));
        forEachBroadcast(shape, strides, (i, [at, row]) => {
          const label = points[at!]!;
          const legal = Number.isInteger(label) && label >= 0 && label < k;
          out[i] = legal ? logits[row! * k + label]! - sums[row!]! : Number.NEGATIVE_INFINITY;
        });
        return out;
      },
      (raw, upstream) => {
        const logits = transformed(operand, raw);
        const sums = rowLogSums(logits, k);
        const gradient = new Float64Array(raw.length);
        forEachBroadcast(shape, strides, (i, [at, row]) => {
          const label = points[at!]!;
          const dy = upstream[i]!;
          if (dy === 0 || !(Number.isInteger(label) && label >= 0 && label < k)) return;
          for (let j = 0; j < k; j++) {
            const share = Math.exp(logits[row! * k + j]! - sums[row!]!);
            gradient[row! * k + j]! += dy * ((j === label ? 1 : 0) - share);
          }
        });
        return chained(operand, raw, gradient);
      },
    );
  };

  const draw = (stream: Stream, count?: number): tf.Tensor => {
    requireStream('categorical.draw', stream);
    if (count !== undefined) requireCount('categorical.draw', 'count', count);
    const shape = drawShape(count, arrayShape);
    const logits = Float32Array.from(transformed(operand, operandData(operand)));
    const repeated = new Float32Array(sizeOf(shape) * k);
    for (let start = 0; start < repeated.length; start += logits.length) repeated.set(logits, start);
    return tensorOf(categoricalDraws(stream, repeated, k), shape);
  };

  const logProbabilities = (): tf.Tensor =>
    tf.tidy(() => {
      const logits = composedTensor(operand);
      return tf.logSoftmax(logits, -1);
    });

  return Object.freeze({
    family: 'categorical' as const,
    route: 'none' as const,
    support: categories,
    arrayShape,
    pointShape: [],
    categories: k,
    operand,
    draw,
    drawScored: (stream: Stream, count?: number) => {
      const value = draw(stream, count);
      return { value, logDensity: logDensity(value) };
    },
    logDensity,
    logProbabilities,
    mode: () =>
      tf.argMax(
        tf.tidy(() => composedTensor(operand)),
        -1,
      ),
    entropy: () =>
      logitOperation(
        'categorical.entropy',
        operand,
        arrayShape,
        (raw) => rowEntropies(transformed(operand, raw), k),
        (raw, upstream) => {
          const logits = transformed(operand, raw);
          const sums = rowLogSums(logits, k);
          const entropies = rowEntropies(logits, k);
          const gradient = Float64Array.from(logits, (v, i) => {
            const row = Math.floor(i / k);
            const logP = v - sums[row]!;
            const p = Math.exp(logP);
            return p === 0 ? 0 : -upstream[row]! * p * (logP + entropies[row]!);
          });
          return chained(operand, raw, gradient);
        },
      ),
    detached: () => member(detachedOperand(operand), k),
  }) as unknown as Categorical;
}

/** The logits that a raw parameter stands for, in double precision. */
export function transformed(operand: Operand, raw: Float32Array): Float64Array {
  const transform = operand.transform;
  return Float64Array.from(raw, (v) => (transform ? transform.value(v) : v));
}

/** A gradient in the logits carried back through the transform; a zero stays zero whatever the transform. */
export function chained(operand: Operand, raw: Float32Array, gradient: Float64Array): Float32Array {
  const transform = operand.transform;
  return Float32Array.from(gradient, (g, i) =>
    transform && g !== 0 ? g * transform.derivative(raw[i]!) : g,
  );
}

function rowEntropies(logits: Float64Array, k: number): Float32Array {
  const sums = rowLogSums(logits, k);
  const out = new Float64Array(sums.length);
  logits.forEach((v, i) => {
    const row = Math.floor(i / k);
    const logP = v - sums[row]!;
    const p = Math.exp(logP);
    if (p > 0) out[row]! -= p * logP;
  });
  return Float32Array.from(out);
}

function logitOperation(
  where: string,
  operand: Operand,
  outShape: readonly number[],
  forward: (raw: Float32Array) => Float32Array,
  gradient: (raw: Float32Array, upstream: Float32Array) => Float32Array,
): tf.Tensor {
  const tracked = !operand.constant && operand.source instanceof tf.Tensor;
  return runHostOperation({
    where,
    inputs: tracked ? [operand.source as tf.Tensor] : [],
    outShape,
    forward: ([raw]) => forward(raw ?? operandData(operand)),
    gradient: (_k, [raw], upstream) => gradient(raw!, upstream),
  });
}

function composedLogDensity(x: tf.Tensor, operand: Operand, k: number, shape: number[]): tf.Tensor {
  return tf.tidy(() => {
    const logP = tf.logSoftmax(composedTensor(operand), -1);
    const full = tf.broadcastTo(logP, [...shape, k]);
    const points = tf.broadcastTo(x, shape);
    const hot = tf.equal(tf.expandDims(points, -1), tf.range(0, k));
    const picked = tf.sum(tf.where(hot, full, tf.zerosLike(full)), -1);
    return tf.where(tf.any(hot, -1), picked, tf.fill(shape, Number.NEGATIVE_INFINITY));
  });
}
