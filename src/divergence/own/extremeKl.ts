import * as tf from '@tensorflow/tfjs';
import { composedLogGamma1p, composedLogGammaExcess } from '../../tensor/composedLogGammaNear.js';
import { composedExponentialRemainder } from '../../tensor/composedRemainders.js';
import { kernel } from '../../tensor/formula.js';
import { addScalarKl } from '../addScalarKl.js';

// Divergences of extreme-value families: of Gumbel distributions, and of those whose logarithm follows one,
// in the two variables of the double-precision formulas, where the sources stand.

const logTwoHalved = Math.LN2 / 2;

/** exp(y) − 1 − y with y = log Γ(1 + r) − d, and log Γ(r) + γ (r − 1). */
function composedExtremeKl(r: tf.Tensor, d: tf.Tensor): tf.Tensor {
  const y = tf.sub(composedLogGamma1p(r), d);
  return tf.add(composedExponentialRemainder(y), composedLogGammaExcess(r));
}

/** Of Weibull distributions, by the logarithms of their scales. */
function composedWeibullKl(
  logScale: tf.Tensor,
  k: tf.Tensor,
  otherLogScale: tf.Tensor,
  j: tf.Tensor,
): tf.Tensor {
  return composedExtremeKl(tf.div(j, k), tf.mul(j, tf.sub(otherLogScale, logScale)));
}

/** Registers them. */
export function registerExtremeKl(): void {
  addScalarKl(
    'gumbel|gumbel',
    kernel('gumbelKl', (l, s, m, t) => composedExtremeKl(tf.div(s!, t!), tf.div(tf.sub(l!, m!), t!))),
  );
  addScalarKl(
    'weibull|weibull',
    kernel('weibullKl', (l, k, m, j) => composedWeibullKl(tf.log(l!), k!, tf.log(m!), j!)),
  );
  addScalarKl(
    'exponential|weibull',
    kernel('exponentialWeibullKl', (r, m, j) =>
      composedWeibullKl(tf.neg(tf.log(r!)), tf.onesLike(r!), tf.log(m!), j!),
    ),
  );
  addScalarKl(
    'weibull|exponential',
    kernel('weibullExponentialKl', (l, k, r) =>
      composedWeibullKl(tf.log(l!), k!, tf.neg(tf.log(r!)), tf.onesLike(r!)),
    ),
  );
  addScalarKl(
    'rayleigh|weibull',
    kernel('rayleighWeibullKl', (s, m, j) =>
      composedWeibullKl(tf.add(tf.log(s!), logTwoHalved), tf.fill(s!.shape, 2), tf.log(m!), j!),
    ),
  );
  addScalarKl(
    'weibull|rayleigh',
    kernel('weibullRayleighKl', (l, k, t) =>
      composedWeibullKl(tf.log(l!), k!, tf.add(tf.log(t!), logTwoHalved), tf.fill(t!.shape, 2)),
    ),
  );
}
