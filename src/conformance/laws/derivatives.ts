import * as tf from '@tensorflow/tfjs';
import { Violation } from '../lawError.js';
import { requireSlopes } from '../slopes.js';
import { numbers, type Subject, sortedDraws } from '../subject.js';
import { requireParameterSlopes } from './parameterSlopes.js';

/** A few points spread over where the mass lies. */
function points(subject: Subject): number[] {
  const draws = sortedDraws(subject, 'points', 63);
  return [2, 15, 31, 47, 60].map((k) => Math.fround(draws[k]!));
}

/** The derivative of the log density in its argument is that of its values. */
export function argumentDerivative(subject: Subject): void {
  const at = points(subject);
  const score = (x: tf.Tensor) => subject.d.logDensity(x);
  const slopes = numbers(() => tf.grad((x: tf.Tensor) => tf.sum(score(x)))(tf.tensor1d(at)));
  const compared = requireSlopes(
    (offsets) => {
      const nodes = at.map((x) => offsets.map((offset) => Math.fround(x + offset)));
      const flat = numbers(() => score(tf.tensor1d(nodes.flat())));
      return { nodes, values: at.map((_, i) => flat.subarray(i * offsets.length, (i + 1) * offsets.length)) };
    },
    slopes,
    at,
    (i) => `the derivative of logDensity in x at ${at[i]} must equal its central difference`,
    'the partial in x of logDensity',
  );
  if (!compared)
    throw new Violation(
      'logDensity must have difference quotients in x at its draws',
      'none',
      'finite values nearby',
      'logDensity near its draws, and draw',
    );
}

/** The derivatives of the log density in the parameters are those of its values. */
export function parameterDerivatives(subject: Subject): void {
  for (const x of points(subject)) {
    requireParameterSlopes(
      subject,
      (d) => d.logDensity(tf.scalar(x)),
      `logDensity at ${x}`,
      'the partials in the parameters of logDensity',
    );
  }
}

/** The derivatives in the parameters of the mean, variance and entropy are those of their values. */
export function closedFormDerivatives(subject: Subject): void {
  for (const name of ['mean', 'variance', 'entropy'] as const) {
    if (!subject.d[name]) continue;
    requireParameterSlopes(subject, (d) => d[name]!(), name, `the partials of ${name}`);
  }
}
