import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { broadcastShapes, broadcastStrides, forEachBroadcast } from '../kernels/layout.js';
import { valuesAreChecked } from '../tensor/backend.js';
import { positionText } from '../tensor/checks.js';
import { type Operand, operandData } from '../tensor/operand.js';

/** Refuses parameters whose numbers, broadcast against each other, do not pass; `complaint` says what is wrong. */
export function requireTogether(
  family: string,
  operands: readonly Operand[],
  complaint: (values: readonly number[], at: string) => string | undefined,
): void {
  const onDevice = operands.some((o) => o.source instanceof tf.Tensor);
  if (onDevice && !valuesAreChecked()) return;
  const shape = broadcastShapes(
    family,
    operands.map((o) => o.shape),
  );
  const data = operands.map(operandData);
  const strides = operands.map((o) => broadcastStrides(o.shape, shape));
  forEachBroadcast(shape, strides, (i, offsets) => {
    const at = shape.length === 0 ? '' : ` at ${positionText(i, shape)}`;
    const text = complaint(
      data.map((d, k) => d[offsets[k]!]!),
      at,
    );
    if (text !== undefined) throw new ParameterError(text);
  });
}

/** Refuses bounds of which the upper one is not above the lower. */
export function requireOrderedBounds(family: string): (parameters: Record<string, Operand>) => void {
  return ({ lower, upper }) =>
    requireTogether(family, [lower!, upper!], ([a, b], at) =>
      a! < b!
        ? undefined
        : `${family}: upper must be above lower; got lower ${a} and upper ${b}${at}; swap them or widen the interval`,
    );
}
