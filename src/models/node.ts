import type * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { ModelError, ShapeError } from '../errors.js';
import { describe, shapeText } from '../tensor/checks.js';

/** The values that a conditional may read, by name. */
export type Values = Readonly<Record<string, tf.Tensor>>;

/** A conditional distribution: from the values declared before it. */
export type Conditional = (values: Values) => Distribution;

/** One node of a directed model. */
export interface ModelNode {
  readonly name: string;
  readonly kind: 'given' | 'latent' | 'observed';
  /** Absent for given values. */
  readonly conditional?: Conditional;
  /** Names declared before this one. */
  readonly before: readonly string[];
}

/** Checks what a conditional returned: a distribution, one member per row or one for all. */
export function requireRows(where: string, node: ModelNode, d: unknown, rows: number): Distribution {
  if (typeof d !== 'object' || d === null || typeof (d as Distribution).logDensity !== 'function') {
    throw new ModelError(
      `${where}: the conditional of '${node.name}' must return a distribution; got ${describe(d)}; return for example product(normal({ mean, logVariance }))`,
    );
  }
  const distribution = d as Distribution;
  const shape = distribution.arrayShape;
  if (shape.length === 0 || (shape.length === 1 && (shape[0] === rows || shape[0] === 1)))
    return distribution;
  const fix =
    shape.length > 1
      ? `fold the axes after the rows into the point with product(d${shape.length > 2 ? `, ${shape.length - 1}` : ''})`
      : 'keep the leading axis of the values it read, or fold the array into one point with product(d)';
  throw new ShapeError(
    `${where}: the conditional of '${node.name}' must have arrayShape [${rows}], one member per row, or []; got ${shapeText(shape)} for ${distribution.family}; ${fix}`,
  );
}
