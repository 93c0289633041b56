import * as tf from '@tensorflow/tfjs';
import { when } from '../tensor/composedMath.js';

type Form<Rest extends readonly tf.Tensor[]> = (x: tf.Tensor, ...parameters: Rest) => tf.Tensor;

/**
 * A composed function inside an open interval, with what it is below and above. Its first parameter is the lower bound
 * and its last the upper one; outside, `instead` stands for the point and the parameters, so that no gradient is lost
 * to a number that is not one.
 */
export function between<const Rest extends readonly tf.Tensor[]>(
  inside: Form<Rest>,
  instead: readonly number[],
  below: number,
  above: number,
): (...given: tf.Tensor[]) => tf.Tensor {
  return (...given) => {
    const zero = tf.zerosLike(given.reduce((sum, t) => tf.add(sum, t)));
    const all = given.map((t) => tf.add(t, zero));
    const [x, lower, upper] = [all[0]!, all[1]!, all.at(-1)!];
    const within = tf.logicalAnd(tf.greater(x, lower), tf.less(x, upper));
    const [point, ...parameters] = all.map((t, k) => when(within, t, tf.add(zero, instead[k]!)));
    const value = inside(point!, ...(parameters as unknown as Rest));
    return when(within, value, when(tf.lessEqual(x, lower), tf.add(zero, below), tf.add(zero, above)));
  };
}
