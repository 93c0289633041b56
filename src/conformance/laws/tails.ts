import * as tf from '@tensorflow/tfjs';
import { requireClose, Violation } from '../lawError.js';
import { numbers, type Subject, sortedDraws } from '../subject.js';

type Name = 'cdf' | 'survival' | 'logCdf' | 'logSurvival' | 'quantile' | 'upperQuantile';

// Distribution functions round once each: a few units of 2^-24, with room for families of a user's own.
const unit = 2 ** -21;

function at(subject: Subject, name: Name, x: ArrayLike<number>): Float64Array {
  return numbers(() => subject.d[name]!(tf.tensor1d(Float32Array.from(x))));
}

/** The survival function is what the distribution function leaves, at points where the draws lie. */
export function survivalComplements(subject: Subject): void {
  const x = sortedDraws(subject, 'tails', 200);
  const [below, above] = [at(subject, 'cdf', x), at(subject, 'survival', x)];
  x.forEach((point, k) => {
    requireClose(
      above[k]!,
      1 - below[k]!,
      unit,
      `the survival function at ${point} must be one less the distribution function`,
      'survival, where the cdf is the integral of the density',
    );
  });
}

/** A log distribution function is the logarithm of the distribution function, wherever that is a float32. */
export function logarithmOf(log: 'logCdf' | 'logSurvival', plain: 'cdf' | 'survival') {
  return (subject: Subject): void => {
    const x = sortedDraws(subject, 'tails', 200);
    const [given, probability] = [at(subject, log, x), at(subject, plain, x)];
    x.forEach((point, k) => {
      const exact = Math.log(probability[k]!);
      // Near one a probability keeps the logarithm only as far as it is rounded itself.
      requireClose(
        given[k]!,
        exact,
        unit * (1 + Math.abs(exact)),
        `${log} at ${point} must be the logarithm of ${plain}`,
        `${log}, or ${plain}`,
      );
    });
  };
}

const probabilities = Float32Array.of(1e-20, 1e-4, 0.01, 0.1, 0.25, 0.5, 0.75, 0.9, 0.99);

/**
 * The upper quantile inverts the survival function, small probabilities included: p lies between its values a few
 * float32 steps to either side, 1e-4 of itself allowed.
 */
export function upperQuantileInverts(subject: Subject): void {
  const x = at(subject, 'upperQuantile', probabilities);
  const [before, after] = [-1, 1].map((side) =>
    at(
      subject,
      'survival',
      x.map((v) => v + side * (Math.abs(v) * 2 ** -21 + 2 ** -149)),
    ),
  );
  probabilities.forEach((p, k) => {
    if (before![k]! >= p * (1 - 1e-4) && after![k]! <= p * (1 + 1e-4)) return;
    throw new Violation(
      `the probability above upperQuantile(${p}) = ${x[k]} must be ${p}`,
      `${before![k]} just below it and ${after![k]} just above`,
      `${p} between the two`,
      'upperQuantile, or survival',
    );
  });
}
