import * as tf from '@tensorflow/tfjs';
import { composedLogGamma, when } from './composedMath.js';
import { composedLog1pmx } from './composedRemainders.js';

// What gamma and beta densities, entropies and divergences need of the gamma function, from tensor operations: the
// parts that are left when the large ones have cancelled. The series take a shift of eight steps where they are
// short of terms. Source: DLMF 5.5.1, 5.5.2, 5.11.1, 5.11.2.

const steps = 8;
const shifts = Array.from({ length: steps }, (_, j) => j);

/** x below eight, and x from eight on; each filled up with a harmless value where the other applies. */
function parted(x: tf.Tensor): { low: tf.Tensor; small: tf.Tensor; large: tf.Tensor } {
  const low = tf.less(x, steps);
  return { low, small: when(low, x, tf.onesLike(x)), large: when(low, tf.add(x, steps), x) };
}

function series(x: tf.Tensor, coefficients: readonly number[]): tf.Tensor {
  const square = tf.square(tf.div(1, x));
  return coefficients.reduceRight<tf.Tensor>(
    (sum, c) => tf.add(c, tf.mul(square, sum)),
    tf.zerosLike(square),
  );
}

const stirling = (x: tf.Tensor): tf.Tensor => tf.div(series(x, [1 / 12, -1 / 360, 1 / 1260, -1 / 1680]), x);

/** The error of Stirling's formula, log Γ(x) − (x − ½) log x + x − ½ log 2π. */
export function composedStirlingError(x: tf.Tensor): tf.Tensor {
  const { low, small, large } = parted(x);
  const direct = tf.add(
    tf.sub(composedLogGamma(small), tf.mul(tf.sub(small, 0.5), tf.log(small))),
    tf.sub(small, 0.5 * Math.log(2 * Math.PI)),
  );
  return when(low, direct, stirling(large));
}

/** ψ(x) − log x. */
export function composedDigammaMinusLog(x: tf.Tensor): tf.Tensor {
  const { low, small, large } = parted(x);
  const far = tf.neg(
    tf.add(
      tf.div(0.5, large),
      tf.div(series(large, [1 / 12, -1 / 120, 1 / 252, -1 / 240]), tf.square(large)),
    ),
  );
  const down = shifts.map((j) => tf.div(1, tf.add(small, j))).reduce((a, b) => tf.add(a, b));
  return when(low, tf.sub(tf.add(far, tf.sub(tf.log(large), tf.log(small))), down), far);
}

/** ψ(x). */
export function composedDigamma(x: tf.Tensor): tf.Tensor {
  return tf.add(composedDigammaMinusLog(x), tf.log(x));
}

/** b − a − a log(b / a), from a and b. */
export function composedExcess(b: tf.Tensor, a: tf.Tensor): tf.Tensor {
  const d = tf.sub(b, a);
  const near = tf.lessEqual(tf.abs(d), tf.mul(0.5, a));
  const u = when(near, tf.div(d, a), tf.zerosLike(d));
  const far = tf.sub(d, tf.mul(a, tf.sub(tf.log(b), tf.log(a))));
  return when(near, tf.neg(tf.mul(a, composedLog1pmx(u))), far);
}

/**
 * log Γ(b) − log Γ(a) − (b − a) ψ(a) − (b log(b / a) + a − b): the divergence of two gamma distributions of equal
 * means, as the double-precision formula.
 */
export function composedGammaRemainder(a: tf.Tensor, b: tf.Tensor): tf.Tensor {
  const high = tf.greaterEqual(tf.minimum(a, b), steps);
  const over = (x: tf.Tensor, y: tf.Tensor): tf.Tensor => {
    const d = tf.sub(y, x);
    const [r, s] = [tf.div(1, x), tf.div(1, y)];
    const [rr, rs, ss] = [tf.square(r), tf.mul(r, s), tf.square(s)];
    const third = tf.add(tf.mul(3, rr), tf.add(tf.mul(2, rs), ss));
    const fifth = tf.add(
      tf.add(tf.mul(5, tf.square(rr)), tf.mul(4, tf.mul(rr, rs))),
      tf.add(tf.mul(3, tf.square(rs)), tf.add(tf.mul(2, tf.mul(rs, ss)), tf.square(ss))),
    );
    const rest = tf.add(1 / 12, tf.add(tf.mul(third, -1 / 360), tf.mul(fifth, 1 / 1260)));
    const square = tf.mul(tf.square(tf.mul(d, r)), s);
    return tf.add(tf.mul(0.5, tf.div(composedExcess(y, x), x)), tf.mul(square, rest));
  };
  const [a1, b1] = [when(high, tf.fill(a.shape, 1), a), when(high, tf.fill(b.shape, 1), b)];
  const [a8, b8] = [when(high, a, tf.add(a, steps)), when(high, b, tf.add(b, steps))];
  const upper = over(a8, b8);
  const low = shifts
    .map((j) => {
      const x = tf.add(a1, j);
      return tf.div(composedExcess(tf.add(b1, j), x), x);
    })
    .reduce((sum, t) => tf.add(sum, t));
  // b log(b / a) + a − b is the excess of a over b.
  const shifted = tf.sub(composedExcess(tf.add(a1, steps), tf.add(b1, steps)), composedExcess(a1, b1));
  return when(high, upper, tf.add(tf.add(upper, low), shifted));
}
