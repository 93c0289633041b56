import type * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { sizeOf } from '../kernels/layout.js';
import type { Stream } from '../random/stream.js';
import type { Support } from '../support/support.js';
import { requireCount, shapeText } from '../tensor/checks.js';

/** How a draw depends on the parameters: it carries their gradient, or it does not. */
export type Route = 'pathwise' | 'none';

/**
 * An array of independent members of a family: an immutable value that can be drawn from and scored. It owns
 * no variables and keeps no state.
 */
export interface Distribution<Family extends string = string, R extends Route = Route> {
  /** The family's name, by which divergences are found. */
  readonly family: Family;
  /** Whether draws carry the parameters' gradient. */
  readonly route: R;
  /** The set that points lie in. */
  readonly support: Support;
  /** Shape of the array of members: what the parameters broadcast to. */
  readonly arrayShape: readonly number[];
  /** Shape of one point; `[]` for scalars. */
  readonly pointShape: readonly number[];
  /** A draw of shape `[...arrayShape, ...pointShape]`, with `count` in front where it is given. */
  draw(stream: Stream, count?: number): tf.Tensor;
  /** A draw and its log density, in one pass where that is cheaper. */
  drawScored(stream: Stream, count?: number): { value: tf.Tensor; logDensity: tf.Tensor };
  /** Log density (log mass for discrete families) in nats; −∞ outside the support, NaN only where x is NaN. */
  logDensity(x: tf.Tensor): tf.Tensor;
  /** The same distribution with its parameters cut from the gradient. */
  detached(): this;
}

/** A family whose mean has a closed form. */
export interface HasMean {
  /** The mean, of shape `[...arrayShape, ...pointShape]`. */
  mean(): tf.Tensor;
}
/** A family whose variance has a closed form. */
export interface HasVariance {
  /** The variance of each coordinate, of shape `[...arrayShape, ...pointShape]`. */
  variance(): tf.Tensor;
}
/** A family whose mode has a closed form. */
export interface HasMode {
  /** The most probable point, of shape `[...arrayShape, ...pointShape]`. */
  mode(): tf.Tensor;
}
/** A family whose entropy has a closed form. */
export interface HasEntropy {
  /** The entropy in nats, of shape `arrayShape`. */
  entropy(): tf.Tensor;
}
/** A family whose distribution function has a closed form. */
export interface HasCdf {
  /** The probability of a point at most `x`; broadcasts like `logDensity`. */
  cdf(x: tf.Tensor): tf.Tensor;
}
/** A family whose survival function has a closed form. */
export interface HasSurvival {
  /** The probability of a point above `x`, accurate where it is small; broadcasts like `logDensity`. */
  survival(x: tf.Tensor): tf.Tensor;
}
/** A family whose log distribution function has a closed form. */
export interface HasLogCdf {
  /** The logarithm of the probability of a point at most `x`, where that underflows too. */
  logCdf(x: tf.Tensor): tf.Tensor;
}
/** A family whose log survival function has a closed form. */
export interface HasLogSurvival {
  /** The logarithm of the probability of a point above `x`, where that underflows too. */
  logSurvival(x: tf.Tensor): tf.Tensor;
}
/** A family whose upper quantile function has a closed form. */
export interface HasUpperQuantile {
  /** The point above which a member lies with probability `p` in (0, 1), accurate for small `p`. */
  upperQuantile(p: tf.Tensor): tf.Tensor;
}
/** A family whose quantile function has a closed form. */
export interface HasQuantile {
  /** The point below which a member lies with probability `p` in (0, 1); broadcasts like `logDensity`. */
  quantile(p: tf.Tensor): tf.Tensor;
}

/** A family with all the closed forms that a continuous scalar family can have. */
export interface HasContinuousForms extends HasMean, HasVariance, HasMode, HasEntropy, HasCdf, HasQuantile {}

/** The distribution function, its complement and the logarithms of both. */
export interface HasTails extends HasCdf, HasSurvival, HasLogCdf, HasLogSurvival {}

/** The quantile function, from either end. */
export interface HasQuantiles extends HasQuantile, HasUpperQuantile {}

/** A family with mean, variance, mode and entropy. */
export interface HasMoments extends HasMean, HasVariance, HasMode, HasEntropy {}

/** A family whose draws often underflow, and which draws their logarithm too. */
export interface HasLogDraw {
  /** The logarithm of what `draw` gives for the same stream, with its own gradient; never −∞. */
  drawLog(stream: Stream, count?: number): tf.Tensor;
}

/** The most numbers that one call draws: a float32 array of them still fits every engine. */
const mostNumbers = 2 ** 30;

/** `count` in front of a shape, where it is given; refuses what is no count, or too much to draw at once. */
export function drawShape(
  where: string,
  count: number | undefined,
  shape: readonly number[],
  numbersPerElement = 1,
): number[] {
  if (count === undefined) return [...shape];
  requireCount(where, 'count', count);
  const most = Math.floor(mostNumbers / Math.max(1, sizeOf(shape) * numbersPerElement));
  if (count > most) {
    throw new ParameterError(
      `${where}: count must be at most ${most} for arrayShape ${shapeText(shape)}; got ${count}; draw in several calls`,
    );
  }
  return [count, ...shape];
}

/** A draw and its log density, one after the other: `drawScored` for a family that has no cheaper way. */
export function drawThenScore(
  draw: Distribution['draw'],
  logDensity: Distribution['logDensity'],
): Distribution['drawScored'] {
  return (stream, count) => {
    const value = draw(stream, count);
    return { value, logDensity: logDensity(value) };
  };
}
