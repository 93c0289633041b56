import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { DivergenceError, ParameterError, ShapeError } from '../errors.js';
import { sameShape } from '../kernels/layout.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount, shapeText } from '../tensor/checks.js';
import { closedKl } from './closedForms.js';
import type { HasClosedKl } from './registry.js';

/** What the compiler shows for a pair without a closed form. */
export interface NoClosedKl<Q extends string, P extends string> {
  readonly 'no closed-form divergence for this pair: use sampledKl(q, p, stream), or registerKl(…) one': `${Q}|${P}`;
}

/** The second argument of `kl`: a distribution where the pair has a closed form, an error message otherwise. */
export type ClosedPartner<Q extends Distribution, P extends Distribution> =
  HasClosedKl<Q['family'], P['family']> extends true ? P : NoClosedKl<Q['family'], P['family']>;

function requireDistribution(where: string, name: string, d: unknown): asserts d is Distribution {
  if (typeof d !== 'object' || d === null || typeof (d as Distribution).logDensity !== 'function') {
    throw new ParameterError(
      `${where}: ${name} must be a distribution; got ${describe(d)}; pass for example normal({ mean, sd })`,
    );
  }
}

function requireSamePoints(where: string, q: Distribution, p: Distribution): void {
  if (!sameShape(q.pointShape, p.pointShape)) {
    throw new ShapeError(
      `${where}: q and p must have points of one shape; got ${shapeText(q.pointShape)} for ${q.family} and ${shapeText(p.pointShape)} for ${p.family}; fold the same axes with product(d, axes)`,
    );
  }
}

/**
 * The Kullback–Leibler divergence in closed form: how many nats are lost, on average over q, by taking p for
 * q. A pair without a closed form does not compile.
 *
 * Formula: KL(q ‖ p) = E_q[log q(x) − log p(x)], arranged for each pair so that it stays accurate where the
 * two are close. Shapes: the two `arrayShape`s broadcast; the result has that shape. Gradient route: the
 * closed form's own derivatives in both sides' parameters.
 *
 * @param q - the distribution that the average is over
 * @param p - the distribution it is compared with
 * @throws DivergenceError when the pair has no closed form; ShapeError when the points differ in shape.
 * @example
 * ```ts
 * import { kl, normal } from 'leadline';
 * const q = normal({ mean: [0, 1], sd: 1 });
 * console.log(kl(q, normal({ mean: 0, sd: 1 })).arraySync());
 * // [ 0, 0.5 ]
 * ```
 * Source: Kullback and Leibler, Ann. Math. Stat. 22 (1951) 79–86.
 */
export function kl<Q extends Distribution, P extends Distribution>(
  q: Q,
  p: P & ClosedPartner<Q, P>,
): tf.Tensor {
  requireDistribution('kl', 'q', q);
  const other: Distribution = p;
  requireDistribution('kl', 'p', other);
  requireSamePoints('kl', q, other);
  const formula = closedKl(q, other);
  if (!formula) {
    throw new DivergenceError(
      `kl: the pair must have a closed form; got (${q.family}, ${other.family}); use sampledKl(q, p, stream), or registerKl('${q.family}', '${other.family}', …)`,
    );
  }
  return formula(q, other, 0);
}

/**
 * The Kullback–Leibler divergence estimated from draws, for pairs without a closed form.
 *
 * Formula: the mean over draws x from q of log q(x) − log p(x); unbiased. Shapes: as `kl`. Gradient route:
 * pathwise through the draws where q's route is pathwise; where it is `'none'` the gradient in q's
 * parameters misses the dependence of the draws on them.
 *
 * @param q - the distribution that is drawn from
 * @param p - the distribution it is compared with
 * @param stream - the source of randomness
 * @param draws - how many draws to average; 1 unless given
 * @throws ParameterError when an argument is of the wrong type; ShapeError when the points differ in shape.
 * @example
 * ```ts
 * import { logistic, sampledKl, stream } from 'leadline';
 * const q = logistic({ location: 0, scale: 1 });
 * const p = logistic({ location: 1, scale: 1 });
 * const estimate = sampledKl(q, p, stream(7), 100_000).arraySync() as number;
 * console.log(Math.abs(estimate - 0.164) < 0.01);
 * // true
 * ```
 */
export function sampledKl(q: Distribution, p: Distribution, stream: Stream, draws = 1): tf.Tensor {
  requireDistribution('sampledKl', 'q', q);
  requireDistribution('sampledKl', 'p', p);
  requireStream('sampledKl', stream);
  requireCount('sampledKl', 'draws', draws, 1);
  requireSamePoints('sampledKl', q, p);
  return tf.tidy(() => {
    const { value, logDensity } = q.drawScored(stream, draws);
    return tf.mean(tf.sub(logDensity, p.logDensity(value)), 0);
  });
}
