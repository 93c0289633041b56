import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import { describe } from '../tensor/checks.js';
import { floatsOf } from '../tensor/engine.js';
import type { Formula } from '../tensor/formula.js';
import { type FamilyFactory, readDefinition } from './familyDefinition.js';
import { numbersAlone } from './familyFormula.js';
import { affineFormula } from './locationScale.js';
import { placedKinds, placedNumbers } from './placed.js';
import { scalarFamily } from './scalarFamily.js';

/** A function of one number with its derivative. */
export interface StandardFormula {
  /** The function itself. */
  value(z: number): number;
  /** Its derivative. */
  derivative(z: number): number;
  /** The same from tensor operations, for `composed` and for accelerators. */
  composed?(z: tf.Tensor): tf.Tensor;
}

/** A family defined by its standard member, with location 0 and scale 1. */
export interface LocationScaleDefinition<Family extends string> {
  /** A name of its own, by which divergences are found. */
  readonly family: Family;
  /** The standard member's log density in nats. */
  readonly logDensity: StandardFormula;
  /** Standard draws of a shape. */
  draw(stream: Stream, shape: readonly number[]): tf.Tensor;
  /** The standard member's distribution function. */
  readonly cdf?: StandardFormula;
  /** Its complement, accurate where it is small. */
  readonly survival?: StandardFormula;
  /** The logarithm of the distribution function. */
  readonly logCdf?: StandardFormula;
  /** The logarithm of the survival function. */
  readonly logSurvival?: StandardFormula;
  /** The inverse of the distribution function. */
  readonly quantile?: StandardFormula;
  /** The inverse of the survival function. */
  readonly upperQuantile?: StandardFormula;
  /** The standard member's mean. */
  readonly mean?: number;
  /** The standard member's variance. */
  readonly variance?: number;
  /** The standard member's mode. */
  readonly mode?: number;
  /** The standard member's entropy in nats. */
  readonly entropy?: number;
}

/**
 * Makes a family with a location and a scale from its standard member: the density, its derivatives, draws
 * with their gradient and the closed forms all follow.
 *
 * Formula: log density f(z) − log scale with z = (x − location) / scale and f the standard one; draws
 * location + scale · z. Shapes: `location` and `scale` broadcast from the right to `arrayShape`; points are
 * scalars. Gradient route: pathwise; the standard draws themselves carry none.
 *
 * @param definition - name, the standard log density with its derivative, standard draws, closed forms
 * @throws ParameterError when the definition is incomplete.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { locationScaleFamily, stream } from 'leadline';
 * // The hyperbolic secant distribution: density sech(π z / 2) / 2.
 * const secant = locationScaleFamily({
 *   family: 'secant',
 *   logDensity: {
 *     value: (z) => -Math.log(2 * Math.cosh((Math.PI * z) / 2)),
 *     derivative: (z) => (-Math.PI / 2) * Math.tanh((Math.PI * z) / 2),
 *   },
 *   draw: (stream, shape) => tf.mul(tf.log(tf.tan(tf.mul(stream.uniform(shape), Math.PI / 2))), 2 / Math.PI),
 *   mean: 0,
 *   variance: 1,
 * });
 * const d = secant({ location: 1, scale: [1, 2] });
 * console.log(d.variance().arraySync(), d.draw(stream(2), 3).shape);
 * // [ 1, 4 ] [ 3, 2 ]
 * console.log(d.logDensity(tf.scalar(1)).arraySync());
 * // [ -0.6931471824645996, -1.3862943649291992 ]
 * ```
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1 (1994), section 12.1.
 */
export function locationScaleFamily<
  const Family extends string,
  const Definition extends LocationScaleDefinition<Family>,
>(
  definition: Definition & LocationScaleDefinition<Family>,
): FamilyFactory<Family, 'pathwise', 'location' | 'scale', Definition> {
  const where = 'locationScaleFamily';
  const { support, parameters } = readDefinition(
    where,
    { ...definition, parameters: { location: 'real', scale: 'positive' } },
    ['logDensity', 'draw'],
  );
  const { family } = definition;
  const density = standard(`${family}.logDensity`, definition.logDensity);
  if (typeof definition.draw !== 'function') {
    throw new ParameterError(
      `${where}: draw of ${family} must be a function of a stream and a shape; got ${describe(definition.draw)}; pass (stream, shape) => … returning standard draws`,
    );
  }
  const constant = (name: 'mean' | 'variance' | 'mode' | 'entropy', value: number): Formula => {
    if (typeof value !== 'number' || !Number.isFinite(value)) {
      throw new ParameterError(
        `${where}: ${name} of ${family} must be a finite number, the standard member's; got ${describe(value)}; leave it out where there is none`,
      );
    }
    const numbers = { value: () => value, derivative: () => 0 };
    return placedNumbers(`${family}.${name}`, placedKinds[name]!, numbers, () => value);
  };
  const member = (
    name: 'cdf' | 'survival' | 'logCdf' | 'logSurvival' | 'quantile' | 'upperQuantile',
    given: StandardFormula,
  ): Formula => {
    const f = standard(`${family}.${name}`, given);
    return placedNumbers(`${family}.${name}`, placedKinds[name]!, f, f.composed);
  };
  const pick = <Key extends keyof LocationScaleDefinition<Family>>(
    names: readonly Key[],
    formula: (name: Key, given: never) => Formula,
  ): Record<string, Formula> =>
    Object.fromEntries(
      names.flatMap((name) => {
        const given = definition[name];
        return given === undefined ? [] : [[name, formula(name, given as never)]];
      }),
    );
  return scalarFamily({
    family,
    route: 'pathwise',
    support,
    parameters,
    logDensity: placedNumbers(`${family}.logDensity`, 'density', density, density.composed),
    draw: {
      sampler: (stream, values) => {
        const shape = [values.location!.length];
        return tf.tidy(() => floatsOf(definition.draw(stream, shape)).slice());
      },
      formula: affineFormula,
    },
    summaries: pick(['mean', 'mode', 'variance', 'entropy'], constant),
    functions: pick(['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile'], member),
  }) as never;
}

type Complete = Required<StandardFormula>;

function standard(where: string, given: StandardFormula): Complete {
  if (typeof given?.value !== 'function' || typeof given.derivative !== 'function') {
    throw new ParameterError(
      `${where}: it must have a value and a derivative, both functions of z; got ${describe(given)}; pass { value: (z) => …, derivative: (z) => … }`,
    );
  }
  return {
    value: given.value,
    derivative: given.derivative,
    composed: given.composed ?? numbersAlone(where),
  };
}
