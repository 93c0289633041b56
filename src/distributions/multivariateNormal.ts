import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast, sizeOf } from '../kernels/layout.js';
import { noise } from '../random/noise.js';
import { requireStream, type Stream } from '../random/stream.js';
import { realVector } from '../support/support.js';
import { valuesAreChecked } from '../tensor/backend.js';
import { type ParameterValue, positionText, shapeText } from '../tensor/checks.js';
import { usesComposedForm } from '../tensor/composed.js';
import { composedSolveLower } from '../tensor/composedTriangular.js';
import { tensorOf } from '../tensor/engine.js';
import { composedTensor, detachedOperand, type Operand, operandData } from '../tensor/operand.js';
import { runOperandOperation } from '../tensor/operandOperation.js';
import { solveLower, solveLowerTransposed } from '../tensor/triangular.js';
import type { Distribution, HasEntropy, HasMean, HasMode, HasVariance } from './distribution.js';
import { drawShape, drawThenScore } from './distribution.js';
import { requirePoints, sumTrailing } from './fold.js';
import { finite, readParameters, requireParameterName } from './parameters.js';

/** Parameters of {@link multivariateNormal}. */
export interface MultivariateNormalOptions {
  /** The mean, `[..., d]`. */
  readonly mean: ParameterValue;
  /** The lower-triangular factor L of the covariance L Lᵀ, `[..., d, d]`; what stands above the diagonal is not read. */
  readonly covarianceFactor: ParameterValue;
}

/** An array of multivariate normal distributions. */
export interface MultivariateNormal
  extends Distribution<'multivariateNormal', 'pathwise'>,
    HasMean,
    HasVariance,
    HasMode,
    HasEntropy {
  /** A parameter, differentiable; the factor with zeros above its diagonal. */
  parameter(name: 'mean' | 'covarianceFactor'): tf.Tensor;
}

const halfLogTwoPi = 0.5 * Math.log(2 * Math.PI);

/**
 * The multivariate normal distribution by the Cholesky factor of its covariance: correlated real vectors.
 *
 * Log density: −½ |L⁻¹ (x − mean)|² − Σ log Lᵢᵢ − (d/2) log 2π, in nats, in double precision inside.
 * Shapes: mean `[..., d]` and factor `[..., d, d]` broadcast in their leading axes to `arrayShape`; points
 * are vectors `[d]`. Gradient route: pathwise, draw = mean + L · noise.
 *
 * @param options - `mean` and `covarianceFactor`
 * @throws ParameterError when a parameter is missing, not finite, or a diagonal element of the factor is not
 *   positive; ShapeError when sizes do not match.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { multivariateNormal } from 'leadline';
 * const d = multivariateNormal({ mean: [0, 0], covarianceFactor: [[1, 0], [0.5, 1]] });
 * console.log(d.logDensity(tf.tensor2d([[0, 0], [1, 1]])).arraySync());
 * // [ -1.8378770351409912, -2.462877035140991 ]
 * ```
 * Source: Anderson, An Introduction to Multivariate Statistical Analysis, 3rd edition (2003), chapter 2.
 */
export function multivariateNormal(options: MultivariateNormalOptions): MultivariateNormal {
  const where = 'multivariateNormal';
  const { mean, covarianceFactor: factor } = readParameters(
    where,
    {
      mean: { mean: { domain: finite, example: '[0, 0]' } },
      covarianceFactor: { covarianceFactor: { domain: finite, example: '[[1, 0], [0.5, 1]]' } },
    },
    options,
  ) as { mean: Operand; covarianceFactor: Operand };
  const d = mean.shape[mean.shape.length - 1] ?? 0;
  const [rows, columns] = factor.shape.slice(-2);
  if (d < 1 || factor.shape.length < 2 || rows !== d || columns !== d) {
    throw new ShapeError(
      `${where}: mean must be [..., d] and covarianceFactor [..., d, d]; got ${shapeText(mean.shape)} and ${shapeText(factor.shape)}; give both the same d of at least 1`,
    );
  }
  requirePositiveDiagonal(factor, d);
  return member(mean, factor, d);
}

function requirePositiveDiagonal(factor: Operand, d: number): void {
  if (factor.source instanceof tf.Tensor && !valuesAreChecked()) return;
  const data = operandData(factor);
  for (let at = 0; at < data.length; at += d * d) {
    for (let i = 0; i < d; i++) {
      const pivot = data[at + i * d + i]!;
      if (pivot > 0) continue;
      const batch = factor.shape.slice(0, -2);
      const which = batch.length === 0 ? '' : ` of matrix ${positionText(at / (d * d), batch)}`;
      throw new ParameterError(
        `multivariateNormal: covarianceFactor must have a positive diagonal; got ${pivot} at row ${i}${which}; take the exponential or softplus of the diagonal`,
      );
    }
  }
}

function member(mean: Operand, factor: Operand, d: number): MultivariateNormal {
  const arrayShape = Object.freeze(
    broadcastShapes(
      'multivariateNormal',
      [mean.shape.slice(0, -1), factor.shape.slice(0, -2)],
      'the leading axes of mean and covarianceFactor',
    ),
  );
  const score = (x: tf.Tensor, fold: number): tf.Tensor => {
    requirePoints('multivariateNormal.logDensity', x, [d]);
    return tf.tidy(() =>
      sumTrailing(
        usesComposedForm() ? composedLogDensity(x, mean, factor, d) : logDensity(x, mean, factor, d),
        fold,
      ),
    );
  };
  const lower = (): tf.Tensor => tf.tidy(() => tf.mul(composedTensor(factor), lowerMask(d)));
  const draw = (stream: Stream, count?: number): tf.Tensor => {
    requireStream('multivariateNormal.draw', stream);
    const shape = [...drawShape('multivariateNormal.draw', count, arrayShape, d * d), d];
    const values = noise(stream, 'normal', sizeOf(shape));
    return tf.tidy(() => {
      // Row vectors times Lᵀ, written as a broadcast product so that any leading axes work.
      const e = tf.expandDims(tensorOf(values, shape), -2);
      return tf.add(tf.sum(tf.mul(lower(), e), -1), composedTensor(mean));
    });
  };
  const fillMean = (): tf.Tensor => tf.tidy(() => tf.broadcastTo(composedTensor(mean), [...arrayShape, d]));
  return Object.freeze({
    family: 'multivariateNormal' as const,
    route: 'pathwise' as const,
    support: realVector,
    arrayShape,
    pointShape: Object.freeze([d]),
    operands: { mean, covarianceFactor: factor },
    draw,
    drawScored: drawThenScore(draw, (x) => score(x, 0)),
    logDensity: (x: tf.Tensor) => score(x, 0),
    foldedLogDensity: score,
    parameter: (name: 'mean' | 'covarianceFactor') => {
      requireParameterName('multivariateNormal.parameter', name, ['mean', 'covarianceFactor']);
      return name === 'mean' ? composedTensor(mean) : lower();
    },
    mean: fillMean,
    mode: fillMean,
    variance: () => tf.tidy(() => tf.broadcastTo(tf.sum(tf.square(lower()), -1), [...arrayShape, d])),
    entropy: () =>
      tf.tidy(() => {
        const logs = tf.sum(tf.log(diagonal(composedTensor(factor), d)), -1);
        return tf.broadcastTo(tf.add(logs, d * (halfLogTwoPi + 0.5)), [...arrayShape]);
      }),
    detached: () => member(detachedOperand(mean), detachedOperand(factor), d),
  }) as unknown as MultivariateNormal;
}

function lowerMask(d: number): tf.Tensor2D {
  const mask = new Float32Array(d * d);
  for (let i = 0; i < d; i++) mask.fill(1, i * d, i * d + i + 1);
  return tf.tensor2d(mask, [d, d]);
}

function diagonal(matrix: tf.Tensor, d: number): tf.Tensor {
  return tf.sum(tf.mul(matrix, tf.eye(d)), -1);
}

/** The points, means and factors that meet at one element of the result. */
interface Meeting {
  readonly shape: number[];
  readonly strides: number[][];
}

function meeting(x: readonly number[], mean: readonly number[], factor: readonly number[]): Meeting {
  const batches = [x.slice(0, -1), mean.slice(0, -1), factor.slice(0, -2)];
  const whose = 'the leading axes of x, mean and covarianceFactor';
  const shape = broadcastShapes('multivariateNormal.logDensity', batches, whose);
  return { shape, strides: batches.map((b) => broadcastStrides(b, shape)) };
}

function logDensity(x: tf.Tensor, mean: Operand, factor: Operand, d: number): tf.Tensor {
  const { shape, strides } = meeting(x.shape, mean.shape, factor.shape);
  const residual = (xs: Float32Array, means: Float32Array, i: number, j: number): Float64Array =>
    Float64Array.from({ length: d }, (_, c) => xs[i * d + c]! - means[j * d + c]!);

  const point: Operand = { shape: x.shape, source: x, transform: undefined, constant: false };

  return runOperandOperation({
    where: 'multivariateNormal.logDensity',
    operands: [point, mean, factor],
    outShape: shape,
    forward: (data) => {
      const [xs, means, factors] = data as [Float32Array, Float32Array, Float32Array];
      const out = new Float32Array(sizeOf(shape));
      forEachBroadcast(shape, strides, (index, [i, j, k]) => {
        const at = k! * d * d;
        const y = residual(xs, means, i!, j!);
        solveLower(factors, at, d, y);
        let sum = -d * halfLogTwoPi;
        for (let c = 0; c < d; c++) sum -= 0.5 * y[c]! * y[c]! + Math.log(factors[at + c * d + c]!);
        out[index] = sum;
      });
      return out;
    },
    gradient: (target, data, upstream) => {
      const [xs, means, factors] = data as [Float32Array, Float32Array, Float32Array];
      const gradient = new Float64Array(data[target]!.length);
      forEachBroadcast(shape, strides, (index, [i, j, k]) => {
        const dy = upstream[index]!;
        if (dy === 0) return;
        const at = k! * d * d;
        const y = residual(xs, means, i!, j!);
        solveLower(factors, at, d, y);
        const w = y.slice();
        solveLowerTransposed(factors, at, d, w);
        if (target < 2) {
          const start = (target === 0 ? i! : j!) * d;
          for (let c = 0; c < d; c++) gradient[start + c]! += (target === 0 ? -dy : dy) * w[c]!;
          return;
        }
        // With y = L⁻¹ r and w = L⁻ᵀ y, the derivative in L is the lower part of w yᵀ − diag(1 / Lᵢᵢ).
        for (let r = 0; r < d; r++) {
          for (let c = 0; c <= r; c++) gradient[at + r * d + c]! += dy * w[r]! * y[c]!;
          gradient[at + r * d + r]! -= dy / factors[at + r * d + r]!;
        }
      });
      return Float32Array.from(gradient);
    },
  });
}

function composedLogDensity(x: tf.Tensor, mean: Operand, factor: Operand, d: number): tf.Tensor {
  const l = composedTensor(factor);
  const residual = tf.unstack(tf.sub(x, composedTensor(mean)), -1);
  const y = composedSolveLower(l, residual);
  const squares = y.map((v) => tf.square(v)).reduce((a, b) => tf.add(a, b));
  return tf.sub(tf.mul(-0.5, squares), tf.add(tf.sum(tf.log(diagonal(l, d)), -1), d * halfLogTwoPi));
}
