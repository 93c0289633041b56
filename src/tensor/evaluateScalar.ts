import { GradientError } from '../errors.js';
import { broadcastStrides, forEachBroadcast, mergeAxes, sizeOf } from '../kernels/layout.js';
import type { Formula } from './formula.js';
import type { Operand } from './operand.js';

interface ScalarPass {
  readonly operands: readonly Float32Array[];
  readonly shape: readonly number[];
  readonly outStrides: readonly number[];
  readonly outSize: number;
  readonly upstream?: { readonly data: Float32Array; readonly strides: readonly number[] };
}

/**
 * The loop for formulas given as plain functions: the same meaning as the compiled one, in double precision,
 * slower because each call boxes its numbers.
 */
export function evaluateScalar(
  formula: Formula,
  operands: readonly Operand[],
  pass: ScalarPass,
  partial: number,
): Float32Array {
  const f = partial < 0 ? formula.value : formula.partials?.[partial];
  if (!f) {
    throw new GradientError(
      `${formula.name}: the formula must be given as a plain function here; got a compiled one with a transform that is not; give the transform a compiled form`,
    );
  }
  const sums = new Float64Array(pass.outSize);
  if (sizeOf(pass.shape) === 0) return new Float32Array(pass.outSize);
  const { upstream } = pass;
  const loops = mergeAxes(pass.shape, [
    pass.outStrides,
    upstream?.strides ?? pass.shape.map(() => 0),
    ...operands.map((o) => broadcastStrides(o.shape, pass.shape)),
  ]);
  const chain = partial < 0 ? undefined : operands[partial]!.transform;
  const values: number[] = new Array(operands.length).fill(0);
  forEachBroadcast(loops.sizes, loops.strides, (_index, offsets) => {
    const dy = upstream ? upstream.data[offsets[1]!]! : 1;
    if (dy === 0) return;
    let factor = dy;
    for (let k = 0; k < operands.length; k++) {
      const raw = pass.operands[k]![offsets[k + 2]!]!;
      const transform = operands[k]!.transform;
      values[k] = transform ? transform.value(raw) : raw;
      if (k === partial && chain) factor *= chain.derivative(raw);
    }
    sums[offsets[0]!]! += f(...values) * factor;
  });
  return Float32Array.from(sums);
}
