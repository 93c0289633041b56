import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import type { Distribution } from '../distributions/distribution.js';
import { closedKl } from '../divergence/closedForms.js';
import { DivergenceError } from '../errors.js';
import { type Law, type LawOptions, law, readSetting } from './law.js';
import { closedKlOf, klIsNonNegative, klIsSampled, klOfEquals, klSlopes } from './laws/divergence.js';
import { requireOneMember, sampleOf } from './lawsOfDistribution.js';
import { type Factory, type Subject, subjectOf } from './subject.js';

/** One side of a divergence: a factory with random options for it. */
export interface KlSide<Options extends object> {
  /** Makes the distribution. */
  readonly factory: (options: Options) => Distribution;
  /** A fast-check arbitrary of the options of one member. */
  readonly arbitraryParameters: fc.Arbitrary<Options>;
}

/**
 * The laws of a closed-form divergence: it is never negative, zero for equals, the mean log ratio of the
 * densities over draws, and its derivatives in both sides' parameters are those of its values.
 *
 * Units: nats. False alarms: the sampled law passes its limit, 5.33 standard errors, once in ten million tries. A
 * divergence of +∞ (p without mass where q has some) is taken as it is if the sampled one is +∞ too.
 *
 * @param q - the side that the average is over
 * @param p - the side it is compared with
 * @param options - `seed` and `runs`
 * @throws DivergenceError when the pair has no closed form; each check rejects with a {@link LawError} where its law
 *   does not hold.
 * @example
 * ```ts
 * import * as fc from 'fast-check';
 * import { exponential } from 'leadline';
 * import { lawsOfKl } from 'leadline/conformance';
 * const rate = fc.double({ min: 0.2, max: 5, noNaN: true });
 * const side = { factory: exponential, arbitraryParameters: fc.record({ rate }) };
 * const laws = lawsOfKl(side, side);
 * for (const { check } of laws) await check();
 * console.log(laws.map(({ name }) => name).join('\n'));
 * // kl(exponential, exponential): it is never negative
 * // kl(exponential, exponential): it is zero for equals
 * // kl(exponential, exponential): it is the mean log ratio over draws
 * // kl(exponential, exponential): its derivatives are right
 * // kl(exponential, exponential): nothing leaks
 * ```
 */
export function lawsOfKl<Q extends object, P extends object>(
  q: KlSide<Q>,
  p: KlSide<P>,
  options: LawOptions = {},
): Law[] {
  const where = 'lawsOfKl';
  const [makeQ, makeP] = [q.factory, p.factory] as unknown as [Factory, Factory];
  const [a, b] = [
    makeQ(sampleOf(where, q.arbitraryParameters)),
    makeP(sampleOf(where, p.arbitraryParameters)),
  ];
  requireOneMember(where, a);
  requireOneMember(where, b);
  const setting = readSetting(where, `kl(${a.family}, ${b.family})`, options, []);
  if (!closedKl(a, b))
    throw new DivergenceError(
      `${where}: the pair must have a closed form; got (${a.family}, ${b.family}); registerKl('${a.family}', '${b.family}', …) one first`,
    );
  const pair = (name: string, property: (q: Subject, p: Subject) => void): Law =>
    law(setting, name, fc.tuple(q.arbitraryParameters, p.arbitraryParameters), ([one, other]) => {
      tf.tidy(() => property(subjectOf(makeQ, setting, one), subjectOf(makeP, setting, other)));
    });
  const equals =
    a.family === b.family
      ? [
          law(setting, 'it is zero for equals', q.arbitraryParameters, (one) => {
            tf.tidy(() => klOfEquals(subjectOf(makeQ, setting, one)));
          }),
        ]
      : [];
  return [
    pair('it is never negative', klIsNonNegative),
    ...equals,
    pair('it is the mean log ratio over draws', klIsSampled),
    pair('its derivatives are right', klSlopes),
    pair('nothing leaks', (one, other) => closedKlOf(one.d, other.d, true)),
  ];
}
