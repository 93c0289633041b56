import * as tf from '@tensorflow/tfjs';
import { parameterGradients } from '../gradients.js';
import { Violation } from '../lawError.js';
import { requireSlopes } from '../slopes.js';
import { type Member, memberFrom, numbers, parameterTensors, type Subject, scoped } from '../subject.js';

/**
 * Holds the gradient of `compute` in every coordinate of every parameter to differences. `compute` gives a
 * scalar for a member without array axes and one number per member otherwise. Coordinates that cannot move
 * alone, such as probabilities that sum to one, move against their neighbor.
 */
export function requireParameterSlopes(
  subject: Subject,
  compute: (d: Member) => tf.Tensor,
  must: string,
  look: string,
): void {
  const gradients = scoped(() => parameterGradients(subject, compute));
  Object.entries(subject.parameters).forEach(([name, { data, shape }], k) => {
    data.forEach((center, own) => {
      const neighbor = (own + 1) % data.length;
      const along = (against: number): boolean =>
        requireSlopes(
          (offsets) => {
            const moved = offsets.flatMap((offset) =>
              Array.from(data, (v, i) => v + (i === own ? offset : i === neighbor ? against * offset : 0)),
            );
            const values = numbers(() => {
              const tensors = parameterTensors(subject);
              tensors[k] = tf.tensor(moved, [offsets.length, ...shape]);
              return compute(memberFrom(subject, tensors));
            });
            const nodes = offsets.map((_, i) => Math.fround(moved[i * data.length + own]!));
            return { nodes: [nodes], values: [values] };
          },
          [gradients[k]![own]! + (against === 0 ? 0 : against * gradients[k]![neighbor]!)],
          [center],
          () =>
            `the derivative of ${must} in ${name}${shape.length === 0 ? '' : `[${own}]`}${against === 0 ? '' : ` against [${neighbor}]`} must equal its central difference`,
          look,
        );
      if (along(0) || (data.length > 1 && along(-1))) return;
      throw new Violation(
        `${must} must have difference quotients in ${name}`,
        'none',
        'finite values on both sides',
        'whether a value nearby is refused, infinite or NaN',
      );
    });
  });
}
