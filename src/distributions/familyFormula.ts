import type * as tf from '@tensorflow/tfjs';
import { GradientError, ParameterError } from '../errors.js';
import { describe } from '../tensor/checks.js';
import type { Formula } from '../tensor/formula.js';

type Scalar = (...values: number[]) => number;

/** A formula of double-precision numbers, with one partial derivative per argument. */
export interface NumberFormula {
  readonly value: Scalar;
  /** `undefined` where there is no derivative; asking for it throws. */
  readonly partials: readonly (Scalar | undefined)[];
  /** The same from tensor operations, for `composed` and for accelerators. */
  composed?(...values: tf.Tensor[]): tf.Tensor;
}

/**
 * A formula in a family's definition: plain numbers with partial derivatives (double precision, one
 * rounding), or tensor operations (every backend, any derivative). Its arguments are the point, where it has
 * one, then the parameters in the order of the definition.
 */
export type FamilyFormula = NumberFormula | ((...values: tf.Tensor[]) => tf.Tensor);

/** The formula as the evaluation reads it; refuses one whose derivatives do not match its arguments. */
export function formulaFrom(where: string, argument: readonly string[], given: unknown): Formula {
  if (typeof given === 'function') {
    return { name: where, parameters: argument, composed: given as NonNullable<NumberFormula['composed']> };
  }
  const { value, partials, composed } = (given ?? {}) as Partial<NumberFormula>;
  if (typeof value !== 'function' || !Array.isArray(partials) || partials.length !== argument.length) {
    throw new ParameterError(
      `${where}: it must be a function of tensors, or have a value and ${argument.length} partials, one for each of ${argument.join(', ')}; got ${describe(given)}${Array.isArray(partials) ? ` with ${partials.length} partials` : ''}; pass undefined for a partial that does not exist`,
    );
  }
  return {
    name: where,
    parameters: argument,
    value,
    partials,
    composed: composed ?? numbersAlone(where),
  };
}

/** The composed form of a formula that was given as numbers alone: it says so when it is asked for. */
export function numbersAlone(where: string): () => tf.Tensor {
  return () => {
    throw new GradientError(
      `${where}: the formula must have a composed form here; got numbers alone; add composed to the definition`,
    );
  };
}
