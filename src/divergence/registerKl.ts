import type * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { DivergenceError, ParameterError } from '../errors.js';
import { describe } from '../tensor/checks.js';
import { ensureClosedForms } from './closedForms.js';
import { addUnfoldedKl, isRegistered } from './registry.js';

/**
 * Registers a closed-form divergence between two families, so that `kl(q, p)` and the bounds use it.
 *
 * Shapes: `formula(q, p)` must return one value per member, of the shape that the two `arrayShape`s
 * broadcast to, in nats. Gradient route: whatever the formula's operations carry.
 * To make `kl(q, p)` compile for the pair, declare it in `ClosedKlPairs` too.
 *
 * @param q - family name of the first argument
 * @param p - family name of the second
 * @param formula - computes KL(q ‖ p)
 * @throws ParameterError when a name is empty or the formula is not a function; DivergenceError when the
 *   pair is already registered.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { hasClosedKl, logistic, normal, registerKl } from 'leadline';
 * registerKl('degenerate', 'normal', (_q, p) => tf.neg(p.logDensity(tf.scalar(0))));
 * console.log(hasClosedKl('degenerate', 'normal'), hasClosedKl('logistic', 'normal'));
 * // true false
 * ```
 */
export function registerKl<Q extends Distribution, P extends Distribution>(
  q: Q['family'],
  p: P['family'],
  formula: (q: Q, p: P) => tf.Tensor,
): void {
  requireNames('registerKl', q, p);
  if (typeof formula !== 'function') {
    throw new ParameterError(
      `registerKl: formula must be a function; got ${describe(formula)}; pass (q, p) => …`,
    );
  }
  const pair = `${q}|${p}`;
  ensureClosedForms();
  if (!addUnfoldedKl(pair, (a, b) => formula(a as Q, b as P))) {
    throw new DivergenceError(
      `registerKl: the pair must be new; got (${q}, ${p}), which is registered; give your family a name of its own`,
    );
  }
}

/**
 * Whether a pair of families has a closed-form divergence.
 *
 * @param q - family name of the first argument, for example `'normal'` or `'product<normal>'`
 * @param p - family name of the second
 * @throws ParameterError when a name is not a text or empty.
 * @example
 * ```ts
 * import { hasClosedKl } from 'leadline';
 * console.log(hasClosedKl('product<normal>', 'product<normal>'));
 * // true
 * ```
 */
export function hasClosedKl(q: string, p: string): boolean {
  requireNames('hasClosedKl', q, p);
  ensureClosedForms();
  return isRegistered(q, p);
}

function requireNames(where: string, q: unknown, p: unknown): void {
  if (typeof q === 'string' && typeof p === 'string' && q !== '' && p !== '') return;
  throw new ParameterError(
    `${where}: q and p must be family names; got ${describe(q)} and ${describe(p)}; pass for example 'normal', 'laplace'`,
  );
}
