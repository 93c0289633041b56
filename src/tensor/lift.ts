import type * as tf from '@tensorflow/tfjs';
import { GradientError, ParameterError } from '../errors.js';
import { applyFormula } from './apply.js';
import { describe, type ParameterValue } from './checks.js';
import type { Formula } from './formula.js';
import { refusal } from './noComposedForm.js';
import { operandFrom } from './operand.js';

type Scalar = (...values: number[]) => number;

/** A scalar formula in double precision with its first partial derivatives. */
export interface ScalarFormula {
  /** Names the formula in error messages. */
  readonly name: string;
  /** The value, from one number per argument. */
  readonly value: Scalar;
  /** One partial derivative per argument; `undefined` where there is none. */
  readonly partials: readonly (Scalar | undefined)[];
  /** The same formula from tensor operations, for `composed` and for accelerators. */
  composed?(...values: tf.Tensor[]): tf.Tensor;
}

/**
 * Turns a scalar formula in double precision into a differentiable tensor operation: one pass over the
 * data, one rounding to float32. Use it where composing 32-bit operations loses accuracy, or where tfjs has
 * no operation at all.
 *
 * Shapes: the arguments broadcast from the right; the result has the shape they broadcast to. Gradient
 * route: the given partial derivatives, once; a second derivative needs `composed(() => …)` and the
 * formula's `composed` form.
 *
 * @param formula - the value and its partial derivatives as plain functions of numbers
 * @throws ParameterError when the formula is incomplete.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { lift } from 'leadline';
 * const cube = lift({ name: 'cube', value: (x) => x ** 3, partials: [(x) => 3 * x * x] });
 * console.log(cube([1, 2]).arraySync());
 * // [ 1, 8 ]
 * console.log(tf.grad((x) => cube(x).sum())(tf.tensor1d([1, 2])).arraySync());
 * // [ 3, 12 ]
 * ```
 */
export function lift(formula: ScalarFormula): (...values: ParameterValue[]) => tf.Tensor {
  const { name, value, partials } = formula ?? {};
  const complete =
    typeof name === 'string' &&
    name !== '' &&
    typeof value === 'function' &&
    Array.isArray(partials) &&
    partials.every((partial) => partial === undefined || typeof partial === 'function');
  if (!complete) {
    throw new ParameterError(
      `lift: formula must have a name, a value function and an array of partials, each a function or undefined; got ${describe(formula)}; pass { name, value, partials }`,
    );
  }
  const composed = formula.composed;
  const whole: Formula = {
    name,
    parameters: partials.map((_, k) => `argument ${k}`),
    value,
    partials,
    composed: composed
      ? (...values) => composed(...values)
      : refusal(() => {
          throw new GradientError(
            `${name}: the formula must have a composed form here; got none; give lift a composed function over tensors`,
          );
        }),
  };
  return (...values) => {
    if (values.length !== partials.length) {
      throw new ParameterError(
        `${name}: it must be called with ${partials.length} arguments; got ${values.length}; pass one per partial`,
      );
    }
    return applyFormula(
      name,
      whole,
      values.map((v, k) => operandFrom(name, `argument ${k}`, v)),
    );
  };
}
