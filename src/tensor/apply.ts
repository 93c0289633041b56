import * as tf from '@tensorflow/tfjs';
import { GradientError } from '../errors.js';
import { type ArrayOperand, evaluateCompiled, type Upstream } from '../kernels/evaluate.js';
import { broadcastShapes, broadcastStrides, sameShape, sizeOf } from '../kernels/layout.js';
import { insideComposed, usesComposedForm } from './composed.js';
import { copiesOnWrite } from './engine.js';
import { evaluateScalar } from './evaluateScalar.js';
import type { Formula } from './formula.js';
import { isRefusal } from './noComposedForm.js';
import { composedTensor, type Operand } from './operand.js';
import { runOperandOperation } from './operandOperation.js';

/** How a formula is spread over arrays. */
export interface Spread {
  /** Broadcast at least to this shape, also where no operand has it. */
  readonly shape?: readonly number[];
  /** Sum over this many trailing axes, in the same pass. */
  readonly fold?: number;
}

/**
 * Applies a scalar formula to broadcast operands, optionally summing trailing axes, as one differentiable
 * tensor operation: one pass in double precision, one rounding. The gradient of each operand is computed
 * only when it is asked for, and summed over broadcast axes in double precision too.
 */
export function applyFormula(
  where: string,
  formula: Formula,
  operands: readonly Operand[],
  spread: Spread = {},
) {
  const shapes = operands.map((o) => o.shape);
  const shape = broadcastShapes(where, spread.shape ? [...shapes, spread.shape] : shapes);
  const fold = spread.fold ?? 0;
  const hasKernel = formula.compiled !== undefined || formula.value !== undefined;
  // On an accelerator a kernel costs a read-back, which is better than no value where there is no other form.
  const byTensors = usesComposedForm() && !formula.kernelAlone;
  const kernelOnly = hasKernel && !insideComposed() && isRefusal(formula.composed);
  return (byTensors && !kernelOnly) || !hasKernel
    ? applyComposed(formula, operands, shape, fold)
    : applyKernel(where, formula, operands, shape, fold);
}

function applyComposed(
  formula: Formula,
  operands: readonly Operand[],
  shape: number[],
  fold: number,
): tf.Tensor {
  return tf.tidy(() => {
    const value = formula.composed(...operands.map(composedTensor));
    const full = sameShape(value.shape, shape) ? value : tf.broadcastTo(value, shape);
    if (fold === 0) return full;
    return tf.sum(
      full,
      Array.from({ length: fold }, (_, i) => shape.length - fold + i),
    );
  });
}

function applyKernel(
  where: string,
  formula: Formula,
  operands: readonly Operand[],
  shape: number[],
  fold: number,
): tf.Tensor {
  const outShape = shape.slice(0, shape.length - fold);
  const outStrides = [...broadcastStrides(outShape, outShape), ...new Array<number>(fold).fill(0)];
  const owner = {};

  return runOperandOperation({
    where,
    operands,
    outShape,
    forward: (data) => {
      const pass: Pass = { owner, operands: data, shape, outStrides, outSize: sizeOf(outShape) };
      return evaluate(formula, operands, pass, -1);
    },
    gradient: (k, data, upstream, backward) => {
      requirePartial(where, formula, k);
      const pass: Pass = {
        owner,
        operands: data,
        shape,
        outStrides: broadcastStrides(operands[k]!.shape, shape),
        outSize: sizeOf(operands[k]!.shape),
        upstream: { data: upstream, strides: outStrides, owner: backward },
      };
      return evaluate(formula, operands, pass, k);
    },
  });
}

interface Pass {
  readonly owner: object;
  readonly operands: readonly Float32Array[];
  readonly shape: readonly number[];
  readonly outStrides: readonly number[];
  readonly outSize: number;
  readonly upstream?: Upstream;
}

/** One pass over the data: the value (`partial` −1), or the gradient of operand `partial`. */
function evaluate(formula: Formula, operands: readonly Operand[], pass: Pass, partial: number): Float32Array {
  const compiled = formula.compiled;
  if (!compiled || operands.some((o) => o.transform && !o.transform.compiled)) {
    return evaluateScalar(formula, operands, keptPass(pass), partial);
  }
  const arrays: ArrayOperand[] = operands.map((o, k) => ({
    data: pass.operands[k]!,
    shape: o.shape,
    transform: o.transform?.compiled?.index ?? -1,
  }));
  const own = partial < 0 ? undefined : operands[partial]!.transform?.compiled;
  const result = evaluateCompiled({
    owner: pass.owner,
    formula: partial < 0 ? compiled.index : compiled.partials[partial]!,
    operands: arrays,
    shape: pass.shape,
    outStrides: pass.outStrides,
    outSize: pass.outSize,
    ...(pass.upstream ? { upstream: pass.upstream } : {}),
    ...(own ? { chain: { derivative: own.derivative, operand: partial } } : {}),
  });
  return copiesOnWrite() ? result : result.slice();
}

/** Copies what a pass borrows: a formula given as a plain function may do anything, tensor operations included. */
function keptPass(pass: Pass): Pass {
  const { operands, upstream } = pass;
  return {
    ...pass,
    operands: operands.map((data) => data.slice()),
    ...(upstream ? { upstream: { ...upstream, data: upstream.data.slice() } } : {}),
  };
}

function requirePartial(where: string, formula: Formula, k: number): void {
  const missing = formula.compiled
    ? formula.compiled.partials[k] === -1
    : formula.partials?.[k] === undefined;
  if (missing) {
    const name = formula.parameters[k];
    throw new GradientError(
      `${where}: the derivative must exist; got one in ${name}, where the formula has none; cut that argument with detach(…)`,
    );
  }
}
