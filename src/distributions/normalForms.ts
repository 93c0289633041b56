import * as tf from '@tensorflow/tfjs';
import { composedLogNormalCdf, composedNormalCdf, composedNormalQuantile } from '../tensor/composedNormal.js';

type Three = (a: tf.Tensor, location: tf.Tensor, scale: tf.Tensor) => tf.Tensor;
type Form = (...values: tf.Tensor[]) => tf.Tensor;

const of =
  (f: Three): Form =>
  (a, l, s) =>
    f(a!, l!, s!);
const z: Three = (x, l, s) => tf.div(tf.sub(x, l), s);

export const halfLogTwoPi = 0.5 * Math.log(2 * Math.PI);

/** The normal distribution's composed forms, for itself and for what maps make of it. */
export const normalForms = {
  logDensity: of((x, l, s) => tf.sub(tf.mul(-0.5, tf.square(z(x, l, s))), tf.add(tf.log(s), halfLogTwoPi))),
  draw: of((e, l, s) => tf.add(l, tf.mul(s, e))),
  cdf: of((x, l, s) => composedNormalCdf(z(x, l, s))),
  survival: of((x, l, s) => composedNormalCdf(z(l, x, s))),
  logCdf: of((x, l, s) => composedLogNormalCdf(z(x, l, s))),
  logSurvival: of((x, l, s) => composedLogNormalCdf(z(l, x, s))),
  quantile: of((p, l, s) => tf.add(l, tf.mul(s, composedNormalQuantile(p)))),
  upperQuantile: of((p, l, s) => tf.sub(l, tf.mul(s, composedNormalQuantile(p)))),
};
