import * as tf from '@tensorflow/tfjs';
import { requireClose } from '../lawError.js';
import { logDensityAt, numbers, type Subject, sortedDraws } from '../subject.js';

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

/** The upper quantile inverts the survival function, small probabilities included. */
export function upperQuantileInverts(subject: Subject): void {
  const x = at(subject, 'upperQuantile', probabilities);
  // At an end the density may be zero, but not beside it, where the point was before it was rounded.
  const around = [1 - 2 ** -22, 1, 1 + 2 ** -22].map((step) =>
    logDensityAt(
      subject.d,
      x.map((v) => v * step),
    ).map(Math.exp),
  );
  const density = x.map((_, k) => Math.max(...around.map((values) => values[k]!)));
  const back = at(subject, 'survival', x);
  probabilities.forEach((p, k) => {
    const effect = Math.abs(x[k]! * density[k]!);
    requireClose(
      back[k]!,
      p,
      unit * (p + (Number.isFinite(effect) ? effect : 0)),
      `the probability above upperQuantile(${p}) = ${x[k]} must be ${p}`,
      'upperQuantile, or survival',
    );
  });
}
