import * as tf from '@tensorflow/tfjs';
import { composedExcess, composedGammaRemainder } from '../../tensor/composedGamma.js';
import { type Formula, kernel } from '../../tensor/formula.js';
import { addScalarKl } from '../addScalarKl.js';

// Divergences of the gamma distribution. Source: by its moments E x and E log x, Johnson, Kotz and Balakrishnan,
// Continuous Univariate Distributions 1 (1994), section 17.8.

/** That at equal means, and what the means add. */
function composedGammaKl(a: tf.Tensor, s: tf.Tensor, b: tf.Tensor, t: tf.Tensor): tf.Tensor {
  const full = tf.zerosLike(tf.add(tf.add(a, s), tf.add(b, t)));
  const [m, n] = [tf.add(tf.mul(a, s), full), tf.add(tf.mul(b, t), full)];
  return tf.add(composedGammaRemainder(tf.add(a, full), tf.add(b, full)), tf.div(composedExcess(m, n), t));
}

const gammaPair = (): Formula => kernel('gammaKl', (a, s, b, t) => composedGammaKl(a!, s!, b!, t!));

/** The family itself, and those whose formulas are its own at a fixed scale. */
const gammas = ['gamma', 'chiSquared'] as const;

/** Registers the closed forms. */
export function registerGammaKl(): void {
  for (const q of gammas) {
    for (const p of gammas) addScalarKl(`${q}|${p}`, gammaPair());
    addScalarKl(
      `exponential|${q}`,
      kernel('exponentialGammaKl', (r, b, t) => composedGammaKl(tf.onesLike(r!), tf.div(1, r!), b!, t!)),
    );
    addScalarKl(
      `${q}|exponential`,
      kernel('gammaExponentialKl', (a, s, r) => composedGammaKl(a!, s!, tf.onesLike(r!), tf.div(1, r!))),
    );
  }
  // Reciprocals of gamma variables of rates s and t.
  addScalarKl(
    'inverseGamma|inverseGamma',
    kernel('inverseGammaKl', (a, s, b, t) => composedGammaKl(a!, t!, b!, s!)),
  );
}
