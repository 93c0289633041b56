import * as tf from '@tensorflow/tfjs';
import { composedDigammaMinusLog, composedExcess, composedStirlingError } from '../tensor/composedGamma.js';
import { choose, when } from '../tensor/composedMath.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import { exponentialReciprocal, exponentiated, reciprocal } from '../tensor/transforms.js';
import { aboveZero, logarithmic, runaway } from './parameters.js';
import type { OwnForms, OwnImplicit } from './routes.js';

// What the gamma distribution and its relatives share.

const shapeFix = 'pass logShape if your network can produce negative values';
const scaleFix = 'pass logScale if your network can produce negative values';
const rateFix = 'pass logRate if your network can produce negative values';

/** The ways to give a shape. */
export const shapeForms = {
  shape: { domain: aboveZero, fix: shapeFix },
  logShape: { domain: logarithmic, transform: exponentiated, fix: runaway },
};

/** The ways to give a scale. */
export const scaleForms = {
  scale: { domain: aboveZero, fix: scaleFix },
  rate: { domain: aboveZero, transform: reciprocal, fix: rateFix },
  logScale: { domain: logarithmic, transform: exponentiated, fix: runaway },
  logRate: { domain: logarithmic, transform: exponentialReciprocal, fix: runaway },
};

const halfLog2Pi = 0.5 * Math.log(2 * Math.PI);

/** The log density in saddle-point form, as the double-precision formula. */
function composedGammaLogDensity(x: tf.Tensor, shape: tf.Tensor, scale: tf.Tensor): tf.Tensor {
  const inside = tf.greater(x, 0);
  const held = when(inside, x, tf.onesLike(x));
  const mean = tf.mul(shape, scale);
  const full = tf.zerosLike(tf.add(held, mean));
  // shape · (u − log(1 + u)) with u = (x − mean) / mean.
  const distance = tf.div(composedExcess(tf.add(held, full), tf.add(mean, full)), scale);
  const value = tf.sub(
    tf.sub(tf.mul(0.5, tf.log(shape)), tf.add(halfLog2Pi, composedStirlingError(shape))),
    tf.add(distance, tf.log(held)),
  );
  return choose(inside, value, Number.NEGATIVE_INFINITY);
}

/** The entropy by the parts that are left of Stirling's formulas. */
function composedGammaEntropy(shape: tf.Tensor, scale: tf.Tensor): tf.Tensor {
  return tf.add(composedGammaStandardEntropy(shape), tf.log(scale));
}

function composedGammaStandardEntropy(shape: tf.Tensor): tf.Tensor {
  const bend = tf.mul(tf.sub(1, shape), composedDigammaMinusLog(shape));
  return tf.add(tf.add(tf.mul(0.5, tf.log(shape)), halfLog2Pi), tf.add(composedStirlingError(shape), bend));
}

/** The composed forms of the gamma distribution itself. */
export const gammaForms: Pick<OwnImplicit<'gamma'>, 'logDensity' | 'forms'> = {
  logDensity: (x, shape, scale) => composedGammaLogDensity(x!, shape!, scale!),
  forms: {
    mean: (shape, scale) => tf.mul(shape!, scale!),
    variance: (shape, scale) => tf.mul(shape!, tf.square(scale!)),
    mode: (shape, scale) => tf.mul(tf.relu(tf.sub(shape!, 1)), scale!),
    entropy: (shape, scale) => composedGammaEntropy(shape!, scale!),
    ...kernelTails('gamma'),
  },
};

/** Tails and quantiles, which the kernels of that family alone have. */
export function kernelTails(family: string): OwnForms {
  const names = ['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile'] as const;
  return Object.fromEntries(names.map((name) => [name, noComposedForm(`${family}.${name}`)]));
}
