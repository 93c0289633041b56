import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { positive, real, type Support, unitInterval } from '../support/support.js';
import { applyFormula } from '../tensor/apply.js';
import { describe, requireTensor } from '../tensor/checks.js';
import { composedExp, composedLogOdds, composedSigmoid, composedSoftplus } from '../tensor/composedMath.js';
import { type KernelName, kernel } from '../tensor/formula.js';
import type { SmoothMap } from './smoothMap.js';

type Step = (v: tf.Tensor) => tf.Tensor;

/** A one-argument kernel as a step of a map. */
function step(where: string, letter: string, name: KernelName, composed: (v: tf.Tensor) => tf.Tensor): Step {
  const formula = kernel(name, (v) => composed(v!));
  return (v) => {
    requireTensor(where, letter, v);
    const operand = { shape: v.shape, source: v, transform: undefined, constant: false };
    return applyFormula(where, formula, [operand]);
  };
}

function map<Name extends string>(
  name: Name,
  onto: Support,
  apply: readonly [KernelName, Step],
  invert: readonly [KernelName, Step],
  logVolume: Step,
): SmoothMap<Name> {
  return Object.freeze({
    name,
    from: real,
    onto,
    rising: true,
    apply: step(`${name}.apply`, 'z', ...apply),
    invert: step(`${name}.invert`, 'x', ...invert),
    logVolume,
  });
}

const exponential = map(
  'expMap',
  positive,
  ['exponential', (z) => composedExp(z)],
  ['logarithm', (x) => tf.log(x)],
  (z) => {
    requireTensor('expMap.logVolume', 'z', z);
    return z.clone();
  },
);

/**
 * The exponential map, from the real numbers onto the positive ones.
 *
 * Formula: x = exp(z), log volume z. Shapes: elementwise. Gradient route: every derivative.
 *
 * @throws ParameterError when a step is given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { expMap } from 'leadline';
 * const map = expMap();
 * console.log(map.apply(tf.scalar(0)).arraySync(), map.logVolume(tf.scalar(2)).arraySync());
 * // 1 2
 * ```
 * Source: common practice.
 */
export function expMap(): SmoothMap<'expMap'> {
  return exponential;
}

const logSigmoid = step('sigmoidMap.logVolume', 'z', 'logSigmoid', (z) =>
  tf.neg(composedSoftplus(tf.neg(z))),
);

const sigmoidal = map(
  'sigmoidMap',
  unitInterval,
  ['sigmoid', (z) => composedSigmoid(z)],
  ['logOdds', (x) => composedLogOdds(x)],
  (z) => tf.tidy(() => tf.add(logSigmoid(z), logSigmoid(tf.neg(z)))),
);

/**
 * The logistic map, from the real numbers onto the unit interval.
 *
 * Formula: x = 1 / (1 + exp(−z)), log volume log x + log(1 − x). Shapes: elementwise. Gradient route: once by the
 * kernels, every derivative inside `composed`.
 *
 * @throws ParameterError when a step is given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { sigmoidMap } from 'leadline';
 * console.log(sigmoidMap().invert(tf.scalar(0.5)).arraySync());
 * // 0
 * ```
 * Source: common practice.
 */
export function sigmoidMap(): SmoothMap<'sigmoidMap'> {
  return sigmoidal;
}

const softplusLike = map(
  'softplusMap',
  positive,
  ['softplus', (z) => composedSoftplus(z)],
  ['softplusInverse', (x) => tf.add(x, tf.log(tf.neg(tf.expm1(tf.neg(x)))))],
  step('softplusMap.logVolume', 'z', 'logSigmoid', (z) => tf.neg(composedSoftplus(tf.neg(z)))),
);

/**
 * The softplus map, from the real numbers onto the positive ones; grows like its argument, where exp runs away.
 *
 * Formula: x = log(1 + exp(z)), log volume log sigmoid(z). Shapes: elementwise. Gradient route: once by the
 * kernels, every derivative inside `composed`.
 *
 * @throws ParameterError when a step is given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { softplusMap } from 'leadline';
 * const map = softplusMap();
 * console.log(Math.abs(map.invert(map.apply(tf.scalar(-3))).dataSync()[0]! + 3) < 1e-6);
 * // true
 * ```
 * Source: common practice.
 */
export function softplusMap(): SmoothMap<'softplusMap'> {
  return softplusLike;
}

/**
 * A shift and a stretch by two plain numbers, from the real numbers onto themselves.
 *
 * Formula: x = shift + stretch · z, log volume log |stretch|. Shapes: elementwise. Gradient route: every
 * derivative in z; the two numbers are constants.
 *
 * @param options - `shift`, any finite number, and `stretch`, a finite number that is not zero
 * @throws ParameterError when a number is missing or unfit, or a step is given something other than a tensor.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { affineMap } from 'leadline';
 * console.log(affineMap({ shift: 1, stretch: -2 }).apply(tf.tensor1d([0, 3])).arraySync());
 * // [ 1, -5 ]
 * ```
 * Source: common practice.
 */
export function affineMap(options: { readonly shift: number; readonly stretch: number }): SmoothMap {
  const { shift, stretch } = options ?? {};
  if (!Number.isFinite(shift)) {
    throw new ParameterError(
      `affineMap: shift must be a finite number; got ${describe(shift)}; pass for example shift: 0`,
    );
  }
  if (!Number.isFinite(stretch) || stretch === 0) {
    throw new ParameterError(
      `affineMap: stretch must be a finite number other than 0; got ${describe(stretch)}; pass for example stretch: 1`,
    );
  }
  const given = (name: string, letter: string, v: tf.Tensor): tf.Tensor => {
    requireTensor(`affineMap.${name}`, letter, v);
    return v;
  };
  return Object.freeze({
    name: `affineMap ${shift} ${stretch}`,
    from: real,
    onto: real,
    rising: stretch > 0,
    apply: (z: tf.Tensor) => tf.tidy(() => tf.add(shift, tf.mul(stretch, given('apply', 'z', z)))),
    invert: (x: tf.Tensor) => tf.tidy(() => tf.div(tf.sub(given('invert', 'x', x), shift), stretch)),
    logVolume: (z: tf.Tensor) =>
      tf.tidy(() => tf.add(tf.zerosLike(given('logVolume', 'z', z)), Math.log(Math.abs(stretch)))),
  });
}
