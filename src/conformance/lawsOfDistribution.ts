import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import type { Distribution } from '../distributions/distribution.js';
import { ParameterError } from '../errors.js';
import { describe, shapeText } from '../tensor/checks.js';
import { fixedLaw, type Law, type LawOptions, law, readSetting } from './law.js';
import { argumentDerivative, closedFormDerivatives, parameterDerivatives } from './laws/derivatives.js';
import { detached } from './laws/detached.js';
import { drawsFollow, drawsInside } from './laws/draws.js';
import { invalidParameters } from './laws/invalid.js';
import { leaks } from './laws/leaks.js';
import { moments } from './laws/moments.js';
import { normalization } from './laws/normalization.js';
import { outside } from './laws/outside.js';
import { pathwiseGradient } from './laws/pathwise.js';
import { cdfIsIntegral, cdfIsSum, quantileInverts, quantileOfCounts } from './laws/quantile.js';
import { route } from './laws/route.js';
import { sameBits } from './laws/sameBits.js';
import { shapes } from './laws/shapes.js';
import { logarithmOf, survivalComplements, upperQuantileInverts } from './laws/tails.js';
import { type Factory, type Member, type Subject, subjectOf } from './subject.js';

/** How the laws of a distribution are tried. */
export interface DistributionLawOptions extends LawOptions {
  /** Options that the factory must refuse. */
  readonly invalid?: readonly object[];
}

/**
 * The laws that a distribution must obey, as named checks over random parameters: to be sure of a family of one's
 * own, its density, draws, gradients and closed forms, before inference relies on it. The checks run under any
 * test runner or none.
 *
 * Only laws that apply are returned: closed forms are checked where the family has them, scalar points also have their
 * density integrated or summed and their draws tested against it; a distribution of vectors has its shapes, bits,
 * route, gradients cut and tensors counted.
 *
 * Units: nats. False alarms: every statistic of a run passes its limit once in ten million tries, and the seed is
 * fixed, so that a law that has held holds again. Tolerances stand beside each law; densities are integrated
 * to 1e-4, so a shape parameter whose density piles up where float32 cannot tell points apart (beta near 1) is to be
 * kept above 1/2 there.
 *
 * @param factory - makes the distribution from its options, also from tensors in place of numbers
 * @param arbitraryParameters - a fast-check arbitrary of the options of one member: plain numbers, or nested arrays where
 *   a parameter is a vector
 * @param options - `seed`, `runs`, and `invalid`: options that the factory must refuse
 * @throws ParameterError when an argument is of the wrong type or the parameters make an array of members. Each check
 *   rejects with a {@link LawError} where its law does not hold.
 * @example
 * ```ts
 * import * as fc from 'fast-check';
 * import { logistic } from 'leadline';
 * import { lawsOfDistribution } from 'leadline/conformance';
 * const location = fc.double({ min: -3, max: 3, noNaN: true });
 * const scale = fc.double({ min: 0.2, max: 4, noNaN: true });
 * const laws = lawsOfDistribution(logistic, fc.record({ location, scale }), { invalid: [{ location: 0, scale: 0 }] });
 * for (const { check } of laws) await check();
 * console.log(laws.length, laws[0]!.name);
 * // 21 logistic: the same stream gives the same bits
 * ```
 */
export function lawsOfDistribution<Options extends object>(
  factory: (options: Options) => Distribution,
  arbitraryParameters: fc.Arbitrary<Options>,
  options: DistributionLawOptions = {},
): Law[] {
  const where = 'lawsOfDistribution';
  if (typeof factory !== 'function')
    throw new ParameterError(
      `${where}: factory must be a function; got ${describe(factory)}; pass for example normal`,
    );
  const make = factory as unknown as Factory;
  const sample = sampleOf(where, arbitraryParameters);
  const first = make(sample);
  const setting = readSetting(where, first.family, options, ['invalid']);
  requireOneMember(where, first);
  const one = (name: string, property: (subject: Subject) => void): Law =>
    law(setting, name, arbitraryParameters, (given) => {
      tf.tidy(() => property(subjectOf(make, setting, given)));
    });
  const { discrete } = first.support;
  const scalar = first.pointShape.length === 0;
  const found = [
    one('the same stream gives the same bits', sameBits),
    law(setting, 'shapes broadcast', fc.tuple(arbitraryParameters, arbitraryParameters), ([a, b]) => {
      tf.tidy(() => shapes(subjectOf(make, setting, a), subjectOf(make, setting, b)));
    }),
    one('detached cuts every gradient', detached),
    one('nothing leaks', leaks),
    one('the route is the declared one', route),
  ];
  if (scalar) found.push(...scalarLaws(first, one, discrete));
  const { invalid = [] } = options;
  if (invalid.length > 0)
    found.push(fixedLaw(setting, 'invalid parameters throw', () => invalidParameters(make, invalid)));
  return found;
}

function scalarLaws(
  d: Member,
  one: (name: string, property: (subject: Subject) => void) => Law,
  discrete: boolean,
): Law[] {
  return [
    one(discrete ? 'the masses sum to one' : 'the density integrates to one', normalization),
    one(d.cdf && !discrete ? 'draws follow the cdf' : 'draws follow the density', drawsFollow),
    one('draws lie in the support', drawsInside),
    one('the log density is −∞ outside the support and never NaN', outside),
    ...(discrete ? [] : [one('the derivative in the argument is right', argumentDerivative)]),
    one('the derivatives in the parameters are right', parameterDerivatives),
    ...(d.route === 'pathwise'
      ? [one('the pathwise gradient is that of the expectation', pathwiseGradient)]
      : []),
    ...(d.cdf ? [one('the cdf is the density summed up', discrete ? cdfIsSum : cdfIsIntegral)] : []),
    ...(d.quantile
      ? [one('the quantile inverts the cdf', discrete ? quantileOfCounts : quantileInverts)]
      : []),
    ...(discrete ? [] : tailLaws(d, one)),
    ...(d.mean || d.variance || d.entropy
      ? [
          one('mean, variance and entropy are those of the density', moments),
          one('the derivatives of mean, variance and entropy are right', closedFormDerivatives),
        ]
      : []),
  ];
}

function tailLaws(d: Member, one: (name: string, property: (subject: Subject) => void) => Law): Law[] {
  return [
    ...(d.cdf && d.survival ? [one('the survival function complements the cdf', survivalComplements)] : []),
    ...(d.cdf && d.logCdf ? [one('logCdf is the logarithm of the cdf', logarithmOf('logCdf', 'cdf'))] : []),
    ...(d.survival && d.logSurvival
      ? [one('logSurvival is the logarithm of the survival function', logarithmOf('logSurvival', 'survival'))]
      : []),
    ...(d.survival && d.upperQuantile
      ? [one('the upper quantile inverts the survival function', upperQuantileInverts)]
      : []),
  ];
}

/** One value of the arbitrary, to see what the family has. */
export function sampleOf<T>(where: string, arbitrary: fc.Arbitrary<T>): T {
  if (typeof arbitrary?.generate !== 'function')
    throw new ParameterError(
      `${where}: arbitraryParameters must be a fast-check arbitrary; got ${describe(arbitrary)}; pass for example fc.record({ mean: fc.double(), … })`,
    );
  return fc.sample(arbitrary, { numRuns: 1, seed: 1 })[0]!;
}

/** Refuses an array of members. */
export function requireOneMember(where: string, d: Distribution): void {
  if (d.arrayShape.length === 0) return;
  throw new ParameterError(
    `${where}: arbitraryParameters must make one member; got arrayShape ${shapeText(d.arrayShape)}; generate plain numbers, the laws make arrays of them`,
  );
}
