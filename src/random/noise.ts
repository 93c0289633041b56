import { ParameterError, ShapeError } from '../errors.js';
import { checkCount } from './checks.js';
import { fill } from './fill.js';
import { type Stream, wordsOf } from './stream.js';

export * from './draws.js';

/** The standard laws that come without parameters. */
export type NoiseKind = 'uniform' | 'normal' | 'exponential' | 'laplace' | 'logistic' | 'gumbel' | 'cauchy';

const fills = {
  uniform: 'fillUniform',
  normal: 'fillNormal',
  exponential: 'fillExponential',
  laplace: 'fillLaplace',
  logistic: 'fillLogistic',
  gumbel: 'fillGumbel',
  cauchy: 'fillCauchy',
} as const;

/** The largest rate whose counts a double still tells apart with room to spare. */
const mostRate = 1e15;

/** `count` draws from a standard law: computed in double precision, rounded once. */
export function noise(stream: Stream, kind: NoiseKind, count: number): Float32Array {
  const words = wordsOf('noise', stream);
  checkCount('noise', 'count', count);
  const out = new Float32Array(count);
  fill(words, fills[kind], out);
  return out;
}

/** One Poisson draw per rate. Counts above 2^24 are rounded to the nearest float32. */
export function poissonDraws(stream: Stream, rates: Float32Array): Float32Array {
  const words = wordsOf('poissonDraws', stream);
  for (let i = 0; i < rates.length; i++) {
    if (!(rates[i]! >= 0 && rates[i]! <= mostRate)) {
      throw new ParameterError(
        `poissonDraws: rate must lie in [0, ${mostRate}]; got ${rates[i]} at element ${i}; check what computes the rate`,
      );
    }
  }
  const out = new Float32Array(rates.length);
  fill(words, 'fillPoisson', out, { parameters: [rates] });
  return out;
}

/** The index of one category per row of `k` logits. A logit of −∞ is never drawn. */
export function categoricalDraws(stream: Stream, logits: Float32Array, k: number): Int32Array {
  const words = wordsOf('categoricalDraws', stream);
  if (!(Number.isInteger(k) && k >= 1 && logits.length % k === 0)) {
    throw new ShapeError(
      `categoricalDraws: logits must hold whole rows of k ≥ 1; got ${logits.length} logits and k ${k}; pass a row-major [rows, k] array`,
    );
  }
  for (let row = 0; row < logits.length; row += k) {
    let most = Number.NEGATIVE_INFINITY;
    for (let j = row; j < row + k; j++) {
      // Negated, so that NaN is caught: a later maximum would hide it.
      if (!(logits[j]! < Number.POSITIVE_INFINITY)) {
        throw new ParameterError(
          `categoricalDraws: logits must be below +∞ and not NaN; got ${logits[j]} at row ${row / k}, category ${j - row}; check what computes the logits`,
        );
      }
      if (logits[j]! > most) most = logits[j]!;
    }
    if (most === Number.NEGATIVE_INFINITY) {
      throw new ParameterError(
        `categoricalDraws: logits must leave at least one category possible; got −∞ throughout row ${row / k}; give one category a finite logit`,
      );
    }
  }
  const out = new Int32Array(logits.length / k);
  fill(words, 'fillCategorical', out, { parameters: [logits], width: k, values: [k], scratchBytes: 8 * k });
  return out;
}
