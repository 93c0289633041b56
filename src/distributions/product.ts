import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import type { Support } from '../support/support.js';
import { describe, requireCount, shapeText } from '../tensor/checks.js';
import {
  type Distribution,
  drawThenScore,
  type HasEntropy,
  type HasMean,
  type HasMode,
  type HasVariance,
} from './distribution.js';
import { foldLogDensity, requirePoints, sumTrailing } from './fold.js';

/** A joint distribution of independent coordinates, with the closed forms that its coordinates have. */
export type Product<D extends Distribution> = ProductBase<D> &
  (D extends HasMean ? HasMean : unknown) &
  (D extends HasVariance ? HasVariance : unknown) &
  (D extends HasMode ? HasMode : unknown) &
  (D extends HasEntropy ? HasEntropy : unknown);

/** What every product has, whatever its coordinates. */
export interface ProductBase<D extends Distribution>
  extends Distribution<`product<${D['family']}>`, D['route']> {
  /** The distribution whose array axes were folded. */
  readonly base: D;
  /** How many of them. */
  readonly axes: number;
}

/** Whether a distribution is a product. */
export function isProduct(d: Distribution): d is ProductBase<Distribution> {
  return d.family.startsWith('product<') && 'base' in d;
}

/**
 * Folds the last axes of a distribution's array into the point: a joint of independent coordinates. In a
 * directed model it turns a `[rows, d]` array of scalars into `[rows]` members whose points are vectors.
 *
 * Log density: the sum of the coordinates' log densities, in nats, in one pass where the family can.
 * Shapes: `arrayShape` loses its last `axes` axes and `pointShape` gains them in front; points must match
 * `pointShape` exactly. Gradient route: the coordinates' own.
 *
 * @param d - the distribution of the coordinates
 * @param axes - how many array axes to fold; 1 unless given
 * @throws ParameterError when `d` is no distribution; ShapeError when it has fewer than `axes` array axes.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { normal, product } from 'leadline';
 * const d = product(normal({ mean: tf.zeros([5, 3]), sd: 1 }));
 * console.log(d.family, d.arrayShape, d.pointShape);
 * // product<normal> [ 5 ] [ 3 ]
 * console.log(d.logDensity(tf.zeros([5, 3])).shape);
 * // [ 5 ]
 * ```
 */
export function product<D extends Distribution>(d: D, axes = 1): Product<D> {
  if (typeof d !== 'object' || d === null || typeof d.logDensity !== 'function') {
    throw new ParameterError(
      `product: d must be a distribution; got ${describe(d)}; pass for example normal({ mean, sd })`,
    );
  }
  requireCount('product', 'axes', axes, 1);
  const rank = d.arrayShape.length - axes;
  if (rank < 0) {
    throw new ShapeError(
      `product: axes must be at most the number of array axes, ${d.arrayShape.length}; got ${axes} for arrayShape ${shapeText(d.arrayShape)}; give a parameter the missing axes, for example mean: tf.zeros([8])`,
    );
  }
  const arrayShape = Object.freeze(d.arrayShape.slice(0, rank));
  const pointShape = Object.freeze([...d.arrayShape.slice(rank), ...d.pointShape]);
  const support: Support = { ...d.support, pointRank: pointShape.length };
  const family = `product<${d.family}>`;
  const score = (x: tf.Tensor, fold: number): tf.Tensor => {
    requirePoints(`${family}.logDensity`, x, pointShape);
    return foldLogDensity(d, x, axes + fold);
  };
  const closed = d as Partial<HasMean & HasVariance & HasMode & HasEntropy>;
  const draw = (stream: Stream, count?: number): tf.Tensor => d.draw(stream, count);
  return Object.freeze({
    family,
    route: d.route,
    support,
    arrayShape,
    pointShape,
    base: d,
    axes,
    draw,
    drawScored: drawThenScore(draw, (x) => score(x, 0)),
    logDensity: (x: tf.Tensor) => score(x, 0),
    foldedLogDensity: score,
    detached: () => product(d.detached(), axes),
    ...(closed.mean ? { mean: () => closed.mean!() } : {}),
    ...(closed.variance ? { variance: () => closed.variance!() } : {}),
    ...(closed.mode ? { mode: () => closed.mode!() } : {}),
    ...(closed.entropy ? { entropy: () => tf.tidy(() => sumTrailing(closed.entropy!(), axes)) } : {}),
  }) as unknown as Product<D>;
}
