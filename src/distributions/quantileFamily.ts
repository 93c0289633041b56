import {
  type ClosedFormulas,
  closedFormulas,
  type FamilyDefinition,
  type FamilyFactory,
  readDefinition,
} from './familyDefinition.js';
import { type FamilyFormula, formulaFrom } from './familyFormula.js';
import { scalarFamily } from './scalarFamily.js';

/** A family defined by its density and its quantile function. */
export interface QuantileDefinition<Family extends string, Names extends string>
  extends FamilyDefinition<Family, Names>,
    ClosedFormulas {
  /** The log density in nats, from the point and the parameters; −∞ outside the support. */
  readonly logDensity: FamilyFormula;
  /** The quantile function, from a probability in (0, 1) and the parameters. */
  readonly quantile: FamilyFormula;
}

/**
 * Makes a family from its density and its quantile function, the inverse of its distribution function. A
 * draw is the quantile of a uniform number, so it carries the parameters' gradient.
 *
 * Formula: x = F⁻¹(u; parameters) with u uniform on (0, 1). Shapes: the parameters broadcast from the right
 * to `arrayShape`; points are scalars. Gradient route: pathwise, the quantile's partial derivatives in the
 * parameters; its partial in p may be left out.
 *
 * @param definition - name, parameters, `logDensity`, `quantile`, and what else has a closed form
 * @throws ParameterError when the definition is incomplete or a formula's partials do not match its arguments.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { quantileFamily, stream } from 'leadline';
 * // Density k x^(k − 1) on (0, 1): the largest of k uniform numbers.
 * const largest = quantileFamily({
 *   family: 'largest',
 *   support: 'unitInterval',
 *   parameters: { k: 'positive' },
 *   logDensity: {
 *     value: (x, k) => (x > 0 && x < 1 ? Math.log(k) + (k - 1) * Math.log(x) : -Infinity),
 *     partials: [(x, k) => (k - 1) / x, (x, k) => 1 / k + Math.log(x)],
 *   },
 *   quantile: { value: (p, k) => p ** (1 / k), partials: [undefined, (p, k) => (-Math.log(p) / k ** 2) * p ** (1 / k)] },
 *   mean: { value: (k) => k / (k + 1), partials: [(k) => 1 / (k + 1) ** 2] },
 * });
 * const d = largest({ k: [1, 3] });
 * console.log(d.route, d.mean().arraySync());
 * // pathwise [ 0.5, 0.75 ]
 * console.log(d.draw(stream(1), 2).shape, d.logDensity(tf.scalar(2)).arraySync());
 * // [ 2, 2 ] [ -Infinity, -Infinity ]
 * ```
 * Source: Devroye, Non-Uniform Random Variate Generation (1986), section II.2.
 */
export function quantileFamily<
  const Family extends string,
  const Names extends string,
  const Definition extends QuantileDefinition<Family, Names>,
>(
  definition: Definition & QuantileDefinition<Family, Names>,
): FamilyFactory<Family, 'pathwise', Names, Definition> {
  const where = 'quantileFamily';
  const { support, names, parameters } = readDefinition(where, definition, ['logDensity']);
  const { family } = definition;
  const { summaries, functions } = closedFormulas(family, names, definition);
  const quantile = formulaFrom(`${family}.quantile`, ['p', ...names], definition.quantile);
  return scalarFamily({
    family,
    route: 'pathwise',
    support,
    parameters,
    logDensity: formulaFrom(`${family}.logDensity`, ['x', ...names], definition.logDensity),
    draw: { noise: 'uniform', formula: quantile },
    summaries,
    functions: { ...functions, quantile },
  }) as unknown as FamilyFactory<Family, 'pathwise', Names, Definition>;
}
