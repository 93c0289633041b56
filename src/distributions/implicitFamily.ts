import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import { describe } from '../tensor/checks.js';
import { detach } from '../tensor/detach.js';
import { floatsOf, tensorOf } from '../tensor/engine.js';
import type { Formula } from '../tensor/formula.js';
import {
  type ClosedFormulas,
  closedFormulas,
  type FamilyDefinition,
  type FamilyFactory,
  readDefinition,
} from './familyDefinition.js';
import { formulaFrom, type NumberFormula } from './familyFormula.js';
import { scalarFamily } from './scalarFamily.js';

/** A family defined by its density, its distribution function and an exact sampler. */
export interface ImplicitDefinition<Family extends string, Names extends string>
  extends FamilyDefinition<Family, Names>,
    ClosedFormulas {
  /** The log density in nats, from the point and the parameters; −∞ outside the support. */
  readonly logDensity: NumberFormula;
  /** The distribution function, with its partial derivatives in the parameters. */
  readonly cdf: NumberFormula;
  /** An exact draw for each number of the broadcast parameters, 1-D tensors of one length. */
  draw(stream: Stream, parameters: { readonly [Name in Names]: tf.Tensor1D }): tf.Tensor;
}

/**
 * Makes a family whose distribution function cannot be inverted cheaply. Draws come from any exact sampler,
 * rejection included; their gradient from differentiating F(z; θ) = u at a fixed u.
 *
 * Formula: dz/dθ = −(∂F/∂θ)(z; θ) / p(z; θ). Shapes: the parameters broadcast from the right to `arrayShape`;
 * points are scalars. Gradient route: pathwise, by the formula, at the draw as rounded to float32.
 *
 * @param definition - name, parameters, `logDensity`, `cdf` with its partials, and an exact `draw`
 * @throws ParameterError when the definition is incomplete or a formula's partials do not match its arguments.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { implicitFamily, stream } from 'leadline';
 * // The exponential distribution, as if its quantile were not known.
 * const waiting = implicitFamily({
 *   family: 'waiting',
 *   support: 'positive',
 *   parameters: { rate: 'positive' },
 *   logDensity: {
 *     value: (x, r) => (x >= 0 ? Math.log(r) - r * x : -Infinity),
 *     partials: [(_x, r) => -r, (x, r) => 1 / r - x],
 *   },
 *   cdf: { value: (x, r) => -Math.expm1(-r * x), partials: [(x, r) => r * Math.exp(-r * x), (x, r) => x * Math.exp(-r * x)] },
 *   draw: (stream, { rate }) => tf.div(stream.exponential(rate.shape), rate),
 * });
 * // The draw is e / rate, so its derivative in the rate at 2 is −e / 4 = −draw / 2.
 * const slope = tf.grad((rate) => waiting({ rate }).draw(stream(1)))(tf.scalar(2)).dataSync()[0]!;
 * const draw = waiting({ rate: 2 }).draw(stream(1)).dataSync()[0]!;
 * console.log(Math.abs(slope + draw / 2) < 1e-6);
 * // true
 * ```
 * Source: Figurnov, Mohamed and Mnih, arXiv 1805.08498 (2018), equation 5.
 */
export function implicitFamily<
  const Family extends string,
  const Names extends string,
  const Definition extends ImplicitDefinition<Family, Names>,
>(
  definition: Definition & ImplicitDefinition<Family, Names>,
): FamilyFactory<Family, 'pathwise', Names, Definition> {
  const where = 'implicitFamily';
  const { support, names, parameters } = readDefinition(where, definition, ['logDensity', 'draw']);
  const { family } = definition;
  if (typeof definition.draw !== 'function') {
    throw new ParameterError(
      `${where}: draw of ${family} must be a function of a stream and the parameters; got ${describe(definition.draw)}; pass (stream, { ${names.join(', ')} }) => … returning exact draws`,
    );
  }
  const logDensity = formulaFrom(`${family}.logDensity`, ['x', ...names], definition.logDensity);
  const cdf = formulaFrom(`${family}.cdf`, ['x', ...names], definition.cdf);
  const { summaries, functions } = closedFormulas(family, names, definition);
  return scalarFamily({
    family,
    route: 'pathwise',
    support,
    parameters,
    logDensity,
    draw: {
      sampler: (stream, values) =>
        tf.tidy(() => {
          const tensors = Object.fromEntries(
            names.map((name) => [name, tensorOf(values[name]!.slice(), [values[name]!.length])]),
          );
          return floatsOf(definition.draw(stream, tensors as never)).slice();
        }),
      formula: throughCdf(family, names, logDensity, cdf),
    },
    summaries,
    functions,
  }) as unknown as FamilyFactory<Family, 'pathwise', Names, Definition>;
}

/** The draw itself, with its derivative in each parameter by implicit differentiation. */
function throughCdf(family: string, names: readonly string[], logDensity: Formula, cdf: Formula): Formula {
  const partials = names.map((_, k) => {
    const slope = cdf.partials?.[k + 1];
    return (
      slope &&
      ((...values: number[]) => {
        const rise = slope(...values);
        // A distribution function that is flat there has no say, whatever the density underflows to.
        return rise === 0 ? 0 : -rise / Math.exp(logDensity.value!(...values));
      })
    );
  });
  return {
    name: `${family}.draw`,
    parameters: ['draw', ...names],
    value: (draw) => draw!,
    partials: [undefined, ...partials],
    composed: (draw, ...parameters) => implicitTensor(draw!, parameters, logDensity, cdf),
  };
}

/** z − (F(z; θ) − [F(z; θ)]) / [p(z)] with the brackets held constant: the value z, and the implicit slope. */
function implicitTensor(
  draw: tf.Tensor,
  parameters: tf.Tensor[],
  logDensity: Formula,
  cdf: Formula,
): tf.Tensor {
  const f = cdf.composed(draw, ...parameters);
  const density = detach(tf.exp(logDensity.composed(draw, ...parameters)));
  return tf.sub(draw, tf.div(tf.sub(f, detach(f)), density));
}
