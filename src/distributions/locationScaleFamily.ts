import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import { describe } from '../tensor/checks.js';
import { floatsOf } from '../tensor/engine.js';
import type { Formula } from '../tensor/formula.js';
import { type FamilyFactory, readDefinition } from './familyDefinition.js';
import { numbersAlone } from './familyFormula.js';
import { affineFormula } from './locationScale.js';
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
  /** Its inverse. */
  readonly quantile?: StandardFormula;
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
  const summary = (name: string, value: number, power: number): Formula => {
    if (typeof value !== 'number' || !Number.isFinite(value)) {
      throw new ParameterError(
        `${where}: ${name} of ${family} must be a finite number, the standard member's; got ${describe(value)}; leave it out where there is none`,
      );
    }
    return power === 2
      ? {
          name: `${family}.${name}`,
          parameters: ['scale'],
          value: (s) => value * s! * s!,
          partials: [(s) => 2 * value * s!],
          composed: (s) => tf.mul(value, tf.square(s!)),
        }
      : {
          name: `${family}.${name}`,
          parameters: ['location', 'scale'],
          value: (l, s) => l! + s! * value,
          partials: [() => 1, () => value],
          composed: (l, s) => tf.add(l!, tf.mul(s!, value)),
        };
  };
  const { mean, variance, mode, entropy, cdf, quantile } = definition;
  return scalarFamily({
    family,
    route: 'pathwise',
    support,
    parameters,
    logDensity: {
      name: `${family}.logDensity`,
      parameters: ['x', 'location', 'scale'],
      value: (x, l, s) => density.value((x! - l!) / s!) - Math.log(s!),
      partials: [
        (x, l, s) => density.derivative((x! - l!) / s!) / s!,
        (x, l, s) => -density.derivative((x! - l!) / s!) / s!,
        (x, l, s) => {
          const z = (x! - l!) / s!;
          return -(z * density.derivative(z) + 1) / s!;
        },
      ],
      composed: (x, l, s) => tf.sub(density.composed(tf.div(tf.sub(x!, l!), s!)), tf.log(s!)),
    },
    draw: {
      sampler: (stream, values) => {
        const shape = [values.location!.length];
        return tf.tidy(() => floatsOf(definition.draw(stream, shape)).slice());
      },
      formula: affineFormula,
    },
    summaries: {
      ...(mean === undefined ? {} : { mean: summary('mean', mean, 1) }),
      ...(mode === undefined ? {} : { mode: summary('mode', mode, 1) }),
      ...(variance === undefined ? {} : { variance: summary('variance', variance, 2) }),
      ...(entropy === undefined ? {} : { entropy: entropyFormula(family, entropy) }),
    },
    functions: {
      ...(cdf === undefined ? {} : { cdf: cdfFormula(family, standard(`${family}.cdf`, cdf)) }),
      ...(quantile === undefined
        ? {}
        : { quantile: quantileFormula(family, standard(`${family}.quantile`, quantile)) }),
    },
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

function entropyFormula(family: string, entropy: number): Formula {
  return {
    name: `${family}.entropy`,
    parameters: ['scale'],
    value: (s) => entropy + Math.log(s!),
    partials: [(s) => 1 / s!],
    composed: (s) => tf.add(entropy, tf.log(s!)),
  };
}

function cdfFormula(family: string, cdf: Complete): Formula {
  return {
    name: `${family}.cdf`,
    parameters: ['x', 'location', 'scale'],
    value: (x, l, s) => cdf.value((x! - l!) / s!),
    partials: [
      (x, l, s) => cdf.derivative((x! - l!) / s!) / s!,
      (x, l, s) => -cdf.derivative((x! - l!) / s!) / s!,
      (x, l, s) => (-((x! - l!) / s!) * cdf.derivative((x! - l!) / s!)) / s!,
    ],
    composed: (x, l, s) => cdf.composed(tf.div(tf.sub(x!, l!), s!)),
  };
}

function quantileFormula(family: string, quantile: Complete): Formula {
  return {
    name: `${family}.quantile`,
    parameters: ['p', 'location', 'scale'],
    value: (p, l, s) => l! + s! * quantile.value(p!),
    partials: [(p, _l, s) => s! * quantile.derivative(p!), () => 1, (p) => quantile.value(p!)],
    composed: (p, l, s) => tf.add(l!, tf.mul(s!, quantile.composed(p!))),
  };
}
