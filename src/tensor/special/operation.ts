import type * as tf from '@tensorflow/tfjs';
import { applyFormula } from '../apply.js';
import { type ParameterValue, requireTensor } from '../checks.js';
import { type KernelName, kernel } from '../formula.js';
import { noComposedForm } from '../noComposedForm.js';
import { operandFrom } from '../operand.js';

type Composed = (...values: tf.Tensor[]) => tf.Tensor;

/** A one-argument kernel as an operation on tensors. */
export function elementwise(name: KernelName, composed: Composed = noComposedForm(name)) {
  const formula = kernel(name, composed);
  return (x: tf.Tensor): tf.Tensor => {
    requireTensor(name, 'x', x);
    return applyFormula(name, formula, [
      { shape: x.shape, source: x, transform: undefined, constant: false },
    ]);
  };
}

/** A kernel of several arguments as an operation that broadcasts them; each may be a tensor or plain numbers. */
export function broadcasting(name: KernelName, composed: Composed = noComposedForm(name)) {
  const formula = kernel(name, composed);
  return (...values: ParameterValue[]): tf.Tensor =>
    applyFormula(
      name,
      formula,
      values.map((value, k) => operandFrom(name, formula.parameters[k]!, value)),
    );
}
