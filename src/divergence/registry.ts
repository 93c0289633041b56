import type * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { sumTrailing } from '../distributions/fold.js';
import { isProduct } from '../distributions/product.js';

/**
 * The pairs of families whose divergence has a closed form, as `q|p` keys. A program adds its own by
 * declaration merging beside `registerKl`:
 *
 * ```ts no-run
 * declare module 'leadline' {
 *   interface ClosedKlPairs { 'mine|normal': true }
 * }
 * ```
 */
export interface ClosedKlPairs {
  'normal|normal': true;
  'logNormal|logNormal': true;
  'laplace|laplace': true;
  'uniform|uniform': true;
  'exponential|exponential': true;
  'exponential|gamma': true;
  'gamma|exponential': true;
  'beta|beta': true;
  'gamma|gamma': true;
  'uniform|beta': true;
  'chiSquared|chiSquared': true;
  'chiSquared|gamma': true;
  'gamma|chiSquared': true;
  'chiSquared|exponential': true;
  'exponential|chiSquared': true;
  'inverseGamma|inverseGamma': true;
  'bernoulli|bernoulli': true;
  'asymmetricLaplace|asymmetricLaplace': true;
  'continuousBernoulli|continuousBernoulli': true;
  'logitNormal|logitNormal': true;
  'reciprocal|reciprocal': true;
  'categorical|categorical': true;
  'poisson|poisson': true;
  'gumbel|gumbel': true;
  'weibull|weibull': true;
  'rayleigh|rayleigh': true;
  'halfNormal|halfNormal': true;
  'cauchy|cauchy': true;
  'halfCauchy|halfCauchy': true;
  'pareto|pareto': true;
  'exponential|weibull': true;
  'weibull|exponential': true;
  'rayleigh|weibull': true;
  'weibull|rayleigh': true;
  'halfNormal|exponential': true;
  'exponential|halfNormal': true;
  'pareto|exponential': true;
  'inverseGaussian|inverseGaussian': true;
  'vonMises|vonMises': true;
  'multivariateNormal|multivariateNormal': true;
  'multivariateNormal|product<normal>': true;
  'product<normal>|multivariateNormal': true;
}

/** Whether a pair of family names has a closed divergence: registered, or products of a pair that has. */
export type HasClosedKl<Q extends string, P extends string> = `${Q}|${P}` extends keyof ClosedKlPairs
  ? true
  : Q extends `product<${infer A}>`
    ? P extends `product<${infer B}>`
      ? HasClosedKl<A, B>
      : false
    : false;

/** A closed form: `fold` trailing array axes are to be summed, in the same pass where that is possible. */
export type KlFormula = (q: Distribution, p: Distribution, fold: number) => tf.Tensor;

const formulas = new Map<string, KlFormula>();

/** Adds one of the library's own closed forms, which fold by themselves. */
export function addKl(pair: keyof ClosedKlPairs, formula: KlFormula): void {
  formulas.set(pair, formula);
}

/** Adds a closed form of a user's, whose result is folded afterwards; false where the pair is taken. */
export function addUnfoldedKl(
  pair: string,
  formula: (q: Distribution, p: Distribution) => tf.Tensor,
): boolean {
  if (formulas.has(pair)) return false;
  formulas.set(pair, (q, p, fold) => sumTrailing(formula(q, p), fold));
  return true;
}

/** The closed form for a pair of distributions, or `undefined`. Products use their coordinates' form. */
export function findKl(q: Distribution, p: Distribution): KlFormula | undefined {
  const direct = formulas.get(`${q.family}|${p.family}`);
  if (direct) return direct;
  if (isProduct(q) && isProduct(p) && q.axes === p.axes) {
    const base = findKl(q.base, p.base);
    const axes = q.axes;
    return base && ((a, b, fold) => base((a as typeof q).base, (b as typeof p).base, axes + fold));
  }
  return undefined;
}

/** Whether a pair of family names is registered, directly or through the coordinates of products. */
export function isRegistered(q: string, p: string): boolean {
  if (formulas.has(`${q}|${p}`)) return true;
  const inner = (name: string) => /^product<(.*)>$/.exec(name)?.[1];
  const [a, b] = [inner(q), inner(p)];
  return a !== undefined && b !== undefined && isRegistered(a, b);
}
