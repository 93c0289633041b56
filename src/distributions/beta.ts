import * as tf from '@tensorflow/tfjs';
import { betaDraws, logBetaDraws, logOddsBetaDraws } from '../random/noise.js';
import type { Stream } from '../random/stream.js';
import { unitInterval } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { composedExcess, composedStirlingError } from '../tensor/composedGamma.js';
import { choose, composedLog1p, when } from '../tensor/composedMath.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import { exponentiated } from '../tensor/transforms.js';
import type { Distribution, HasLogDraw, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { kernelTails } from './gammaForms.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, insideUnit, logarithmic, runaway } from './parameters.js';
import { implicitRoute } from './routes.js';

/** Parameters of {@link beta}: two shapes or their logarithms, or a mean and a concentration. */
export type BetaOptions =
  | (OneOf<'alpha' | 'logAlpha'> &
      OneOf<'beta' | 'logBeta'> & { readonly mean?: undefined; readonly concentration?: undefined })
  | ({ readonly mean: ParameterValue; readonly concentration: ParameterValue } & {
      readonly [Other in 'alpha' | 'logAlpha' | 'beta' | 'logBeta']?: undefined;
    });

/** An array of beta distributions. */
export interface Beta
  extends Distribution<'beta', 'pathwise'>,
    HasMoments,
    HasTails,
    HasQuantiles,
    HasLogDraw {
  /** The log odds of what `draw` gives for the same stream, with their own gradient: exact at both ends. */
  drawLogOdds(stream: Stream, count?: number): tf.Tensor;
  /** A parameter as the formulas read it, differentiable; `mean` and `concentration` where they were given. */
  parameter(name: 'alpha' | 'beta' | 'mean' | 'concentration'): tf.Tensor;
}

/** In saddle-point form: what Γ leaves of Stirling's formula, and the two deviances of the point from the mean. */
function composedLogDensity(x: tf.Tensor, a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const inside = tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1));
  const held = when(inside, x, tf.fill(x.shape, 0.5));
  const n = tf.add(a, b);
  const full = tf.zerosLike(tf.add(held, n));
  const y = tf.sub(1, held);
  const deviances = tf.add(
    composedExcess(tf.add(tf.mul(n, held), full), tf.add(a, full)),
    composedExcess(tf.add(tf.mul(n, y), full), tf.add(b, full)),
  );
  const shapes = tf.sub(tf.sub(composedStirlingError(n), composedStirlingError(a)), composedStirlingError(b));
  const width = tf.mul(0.5, tf.add(tf.log(a), tf.sub(tf.log(b), tf.log(n))));
  const front = tf.add(shapes, tf.sub(width, 0.5 * Math.log(2 * Math.PI)));
  const value = tf.sub(tf.sub(front, deviances), tf.add(tf.log(held), composedLog1p(tf.neg(held))));
  return choose(inside, value, Number.NEGATIVE_INFINITY);
}

function composedVariance(a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const n = tf.add(a, b);
  return tf.div(tf.mul(tf.div(a, n), tf.div(b, n)), tf.add(n, 1));
}

function composedMode(a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const full = tf.zerosLike(tf.add(a, b));
  const [alpha, beta] = [tf.add(a, full), tf.add(b, full)];
  const inner = tf.logicalAnd(tf.greater(alpha, 1), tf.greater(beta, 1));
  const two = tf.fill(full.shape, 2);
  const [p, q] = [tf.sub(when(inner, alpha, two), 1), tf.sub(when(inner, beta, two), 1)];
  const upper = tf.logicalAnd(
    tf.greater(alpha, beta),
    tf.logicalAnd(tf.greaterEqual(alpha, 1), tf.lessEqual(beta, 1)),
  );
  const lower = tf.logicalAnd(
    tf.less(alpha, beta),
    tf.logicalAnd(tf.lessEqual(alpha, 1), tf.greaterEqual(beta, 1)),
  );
  const end = when(upper, tf.fill(full.shape, 1), when(lower, full, tf.fill(full.shape, Number.NaN)));
  return when(inner, tf.div(p, tf.add(p, q)), end);
}

const fix = (name: string): string => `pass ${name} if your network can produce negative values`;

const make = implicitRoute({
  family: 'beta',
  support: unitInterval,
  parameters: {
    alpha: {
      alpha: { domain: aboveZero, fix: fix('logAlpha') },
      logAlpha: { domain: logarithmic, transform: exponentiated, fix: runaway },
    },
    beta: {
      beta: { domain: aboveZero, fix: fix('logBeta') },
      logBeta: { domain: logarithmic, transform: exponentiated, fix: runaway },
    },
  },
  joints: [
    {
      kernels: 'betaMeanConcentration',
      parameters: {
        mean: { mean: { domain: insideUnit } },
        concentration: { concentration: { domain: aboveZero } },
      },
      gives: {
        alpha: (mean, concentration) => tf.mul(mean!, concentration!),
        beta: (mean, concentration) => tf.mul(tf.sub(1, mean!), concentration!),
      },
    },
  ],
  logDensity: (x, a, b) => composedLogDensity(x!, a!, b!),
  sampler: (stream, { alpha, beta }) => betaDraws(stream, alpha!, beta!),
  logSampler: (stream, { alpha, beta }) => logBetaDraws(stream, alpha!, beta!),
  logOddsSampler: (stream, { alpha, beta }) => logOddsBetaDraws(stream, alpha!, beta!),
  forms: {
    mean: (a, b) => tf.div(1, tf.add(1, tf.div(b!, a!))),
    variance: (a, b) => composedVariance(a!, b!),
    mode: (a, b) => composedMode(a!, b!),
    entropy: noComposedForm('beta.entropy'),
    ...kernelTails('beta'),
  },
});

/**
 * The beta distribution: proportions and probabilities, the conjugate prior of a Bernoulli's.
 *
 * Log density: (alpha − 1) log x + (beta − 1) log(1 − x) − log B(alpha, beta) for 0 < x < 1, −∞ outside [0, 1], in
 * nats. By mean and concentration: alpha = mean · concentration, beta = (1 − mean) · concentration. The mode is NaN
 * where no point is the only one.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, an exact sampler with implicit derivatives; `drawLog` and `drawLogOdds` draw functions of
 * the draw that keep their digits where it rounds to an end.
 *
 * @param options - one of `alpha`, `logAlpha` and one of `beta`, `logBeta`; or `mean` and `concentration`
 * @throws ParameterError when a parameter is missing, given twice, not positive and finite, the mean not between 0 and
 *   1, or a logarithm beyond ±700.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { beta } from 'leadline';
 * const d = beta({ alpha: 2, beta: 3 });
 * console.log(d.cdf(tf.tensor1d([0.25, 0.5])).arraySync());
 * // [ 0.26171875, 0.6875 ]
 * console.log(beta({ mean: 0.25, concentration: 8 }).variance().arraySync());
 * // 0.02083333395421505
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 25; gradient:
 * Figurnov, Mohamed and Mnih, arXiv 1805.08498 (2018).
 */
export function beta(options: BetaOptions): Beta {
  return make(options) as unknown as Beta;
}
