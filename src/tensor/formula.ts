import type * as tf from '@tensorflow/tfjs';
import { catalogue } from '../kernels/generated/catalogue.js';

/** The name of a compiled kernel. */
export type KernelName = keyof typeof catalogue;

type Scalar = (...values: number[]) => number;

/**
 * A scalar formula that can be applied to tensors: compiled, or as plain functions of double-precision
 * numbers with their partial derivatives, or neither; and the same from ordinary tensor operations, which are
 * all there is to a formula that has no kernel.
 */
export interface Formula {
  readonly name: string;
  readonly parameters: readonly string[];
  /** Table indices in the compiled module: the value, and per parameter its partial (−1: none). */
  readonly compiled?: { readonly index: number; readonly partials: readonly number[] };
  /** The value as a plain function, where there is no compiled one. */
  readonly value?: Scalar;
  readonly partials?: readonly (Scalar | undefined)[];
  composed(...values: tf.Tensor[]): tf.Tensor;
  /** Whether the kernel runs even where tensor operations are asked for: a draw's implicit derivative has no other. */
  readonly kernelAlone?: boolean;
}

/** A change of parametrisation of one parameter, such as a log variance to a standard deviation. */
export interface Transform {
  readonly name: string;
  readonly compiled?: { readonly index: number; readonly derivative: number };
  value(v: number): number;
  derivative(v: number): number;
  composed(v: tf.Tensor): tf.Tensor;
}

/** Whether there is a compiled kernel of that name. */
export function isKernel(name: string): name is KernelName {
  return Object.hasOwn(catalogue, name);
}

/** A compiled kernel as a formula, with its composed form beside it. */
export function kernel(name: KernelName, composed: (...values: tf.Tensor[]) => tf.Tensor): Formula {
  const { index, parameters, partials } = catalogue[name];
  return { name, parameters, compiled: { index, partials }, composed };
}
