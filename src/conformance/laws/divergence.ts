import * as tf from '@tensorflow/tfjs';
import { closedKl } from '../../divergence/closedForms.js';
import { requireClose, Violation } from '../lawError.js';
import { type Member, numbers, type Subject, scoped, streamFor } from '../subject.js';
import { requireParameterSlopes } from './parameterSlopes.js';

const count = 20_000;
const limit = 5.33; // |z| of a standard normal: P = 1.0e-7, two-sided

/** The closed form's value; refuses one that leaves more than its result behind where `counted`. */
export function closedKlOf(q: Member, p: Member, counted = false): number {
  const before = tf.memory().numTensors;
  const result = closedKl(q, p)!(q, p, 0);
  const left = tf.memory().numTensors - before;
  if (counted && left !== 1)
    throw new Violation(
      'kl must leave exactly its result alive',
      `${left} tensors`,
      '1',
      'the closed form: wrap its work in tf.tidy(() => …)',
    );
  if (result.shape.length > 0)
    throw new Violation(
      'kl of two members must be one number',
      `shape [${result.shape}]`,
      'shape []',
      'the axes that the closed form sums',
    );
  const value = result.dataSync()[0]!;
  result.dispose();
  return value;
}

/** Gibbs's inequality, up to a float32 rounding of terms that cancel. */
export function klIsNonNegative(q: Subject, p: Subject): void {
  const value = closedKlOf(q.d, p.d);
  if (value >= -1e-6) return;
  throw new Violation(
    'kl must not be negative',
    value,
    'at least 0',
    'the signs and constants of the closed form',
  );
}

/** Zero for the same distribution twice. */
export function klOfEquals(q: Subject): void {
  const value = closedKlOf(q.d, q.d);
  requireClose(value, 0, 1e-6, 'kl(q, q) must be zero', 'the constants of the closed form');
}

/** The mean of log q(x) − log p(x) over draws from q. */
export function klIsSampled(q: Subject, p: Subject): void {
  const exact = closedKlOf(q.d, p.d);
  const [a, b] = scoped(() => {
    const x = q.d.draw(streamFor(q, 'kl'), count);
    return [numbers(() => q.d.logDensity(x)), numbers(() => p.d.logDensity(x))] as const;
  });
  const ratios = a.map((v, i) => v - b[i]!);
  const mean = ratios.reduce((sum, v) => sum + v, 0) / count;
  if (mean === exact) return;
  const error = Math.sqrt(ratios.reduce((sum, v) => sum + (v - mean) ** 2, 0) / count / (count - 1));
  // Densities are float32: log ratios are off by that of their terms even where they do not vary.
  const rounding = 2 ** -22 * a.reduce((most, v) => Math.max(most, Math.abs(v)), 1);
  if (Math.abs(mean - exact) <= limit * error + rounding) return;
  throw new Violation(
    'kl must be the mean of log q(x) − log p(x) over draws from q',
    exact,
    `${mean.toPrecision(5)} ± ${error.toPrecision(2)} over ${count} draws`,
    'the closed form, and which of the two sides it averages over',
  );
}

/** The derivatives in the parameters of both sides are those of the values. */
export function klSlopes(q: Subject, p: Subject): void {
  const formula = closedKl(q.d, p.d)!;
  // An infinite divergence stays infinite nearby: there is nothing to differentiate.
  if (numbers(() => formula(q.d, p.d, 0))[0] === Number.POSITIVE_INFINITY) return;
  const look = (side: string) => `the gradient of the closed form in ${side}'s parameters`;
  requireParameterSlopes(q, (d) => formula(d, p.d, 0), 'kl(q, p), q side,', look('q'));
  requireParameterSlopes(p, (d) => formula(q.d, d, 0), 'kl(q, p), p side,', look('p'));
}
