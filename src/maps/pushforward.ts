import * as tf from '@tensorflow/tfjs';
import type {
  Distribution,
  HasCdf,
  HasLogCdf,
  HasLogSurvival,
  HasQuantile,
  HasQuantiles,
  HasSurvival,
  HasTails,
  HasUpperQuantile,
  Route,
} from '../distributions/distribution.js';
import { sumTrailing } from '../distributions/fold.js';
import { ParameterError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import { describe, requireTensor } from '../tensor/checks.js';
import { choose, when } from '../tensor/composedMath.js';
import { requireMap, type SmoothMap } from './smoothMap.js';

/** The tail and quantile functions that a pushforward has because its base has them. */
export type PushedForms<Base> = (Base extends HasTails ? HasTails : unknown) &
  (Base extends HasQuantiles ? HasQuantiles : unknown) &
  (Base extends HasCdf ? (Base extends HasSurvival ? HasCdf & HasSurvival : unknown) : unknown);

/** The distribution of a map's image of a base distribution's point. */
export type Pushforward<Base extends Distribution<string, Route>, Name extends string> = Distribution<
  `pushforward<${Base['family']}, ${Name}>`,
  Base['route']
> &
  PushedForms<Base> & {
    /** The distribution of the point before the map. */
    readonly base: Base;
    /** The map. */
    readonly map: SmoothMap<Name>;
  };

type Tails = Partial<HasCdf & HasSurvival & HasLogCdf & HasLogSurvival & HasQuantile & HasUpperQuantile>;
type TailName = keyof Tails;

const functions = ['cdf', 'survival', 'logCdf', 'logSurvival'] as const;
const inverses = ['quantile', 'upperQuantile'] as const;
const otherTail: Record<TailName, TailName> = {
  cdf: 'survival',
  survival: 'cdf',
  logCdf: 'logSurvival',
  logSurvival: 'logCdf',
  quantile: 'upperQuantile',
  upperQuantile: 'quantile',
};

/** Where points lie relative to the map's image: a test, and a point inside to stand for those outside. */
function image(map: SmoothMap, x: tf.Tensor): { inside: tf.Tensor; held: tf.Tensor } {
  const { name } = map.onto;
  const finite = tf.isFinite(x);
  const inside =
    name === 'positive'
      ? tf.logicalAnd(tf.greater(x, 0), finite)
      : name === 'unitInterval'
        ? tf.logicalAnd(tf.greater(x, 0), tf.less(x, 1))
        : finite;
  return { inside, held: when(inside, x, tf.fill(x.shape, 0.5)) };
}

/**
 * The distribution of `map(z)` for z from a base distribution: what an unconstrained posterior becomes on the set
 * where the quantity lives.
 *
 * Formula: log density log p(z) − log |dx/dz| with z the inverse of x; −∞ outside the map's image. Shapes: those
 * of the base. Gradient route: that of the base, through the map. The tail and quantile functions of the base are
 * carried along; a map that falls swaps the tails. The map is the caller's: its own parameters' gradients flow
 * where it has any.
 *
 * @param base - a distribution over the set that the map starts from; of points with axes, each number is mapped
 * @param map - a {@link SmoothMap}
 * @throws ParameterError when `base` is no distribution, is counted rather than measured, or `map` is no map.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { normal, pushforward, softplusMap } from 'leadline';
 * const d = pushforward(normal({ mean: 0, sd: 1 }), softplusMap());
 * console.log(d.route, d.quantile(tf.scalar(0.5)).dataSync()[0]!.toFixed(6));
 * // pathwise 0.693147
 * console.log(d.logDensity(tf.tensor1d([-1, 0])).arraySync());
 * // [ -Infinity, -Infinity ]
 * ```
 * Source: change of variables; Billingsley, Probability and Measure (1995), section 17.
 */
export function pushforward<const Base extends Distribution<string, Route>, const Name extends string>(
  base: Base,
  map: SmoothMap<Name>,
): Pushforward<Base, Name> {
  if (typeof base?.logDensity !== 'function' || typeof base.draw !== 'function') {
    throw new ParameterError(
      `pushforward: base must be a distribution; got ${describe(base)}; pass for example normal({ mean: 0, sd: 1 })`,
    );
  }
  if (base.support.discrete) {
    throw new ParameterError(
      `pushforward: base must have a density; got ${base.family}, which is counted; map its draws instead`,
    );
  }
  requireMap('pushforward', map);
  const family = `pushforward<${base.family}, ${map.name}>`;
  const rank = base.pointShape.length;
  const volume = (z: tf.Tensor): tf.Tensor => sumTrailing(map.logVolume(z), rank);
  const allInside = (inside: tf.Tensor): tf.Tensor =>
    rank === 0
      ? inside
      : tf.all(
          inside,
          Array.from({ length: rank }, (_, k) => inside.rank - rank + k),
        );
  const methods: Record<string, unknown> = {};
  const from = base as unknown as Tails;
  for (const name of functions) {
    const own = map.rising ? name : otherTail[name];
    if (typeof from[own] !== 'function' || rank > 0) continue;
    methods[name] = (x: tf.Tensor) => {
      requireTensor(`${family}.${name}`, 'x', x);
      return tf.tidy(() => {
        const { inside, held } = image(map, x);
        const value = from[own]!(map.invert(held));
        return tails(map, name, x, inside, value);
      });
    };
  }
  for (const name of inverses) {
    const own = map.rising ? name : otherTail[name];
    if (typeof from[own] !== 'function' || rank > 0) continue;
    methods[name] = (p: tf.Tensor) => tf.tidy(() => map.apply(from[own]!(p)));
  }
  return Object.freeze({
    family,
    route: base.route,
    support: rank === 0 ? map.onto : base.support,
    arrayShape: base.arrayShape,
    pointShape: base.pointShape,
    base,
    map,
    draw: (stream: Stream, count?: number) => tf.tidy(() => map.apply(base.draw(stream, count))),
    drawScored: (stream: Stream, count?: number) =>
      tf.tidy(() => {
        const { value: z, logDensity } = base.drawScored(stream, count);
        return { value: map.apply(z), logDensity: tf.sub(logDensity, volume(z)) };
      }),
    logDensity: (x: tf.Tensor) => {
      requireTensor(`${family}.logDensity`, 'x', x);
      return tf.tidy(() => {
        const { inside, held } = image(map, x);
        const z = map.invert(held);
        const value = tf.sub(base.logDensity(z), volume(z));
        return choose(broadcastTest(allInside(inside), value), value, Number.NEGATIVE_INFINITY);
      });
    },
    detached: () => pushforward(base.detached(), map),
    ...methods,
  }) as unknown as Pushforward<Base, Name>;
}

function broadcastTest(test: tf.Tensor, like: tf.Tensor): tf.Tensor {
  return tf.logicalAnd(test, tf.onesLike(like).cast('bool'));
}

/** A tail function beyond the map's image: all or nothing lies on one side there. */
function tails(
  map: SmoothMap,
  name: (typeof functions)[number],
  x: tf.Tensor,
  inside: tf.Tensor,
  value: tf.Tensor,
): tf.Tensor {
  const log = name === 'logCdf' || name === 'logSurvival';
  const upper = name === 'survival' || name === 'logSurvival';
  const low = map.onto.name === 'real' ? 0 : map.onto.name === 'unitInterval' ? 0.5 : 1e-30;
  const above = broadcastTest(tf.greater(x, low), value);
  const ends = (atLow: number, atHigh: number): tf.Tensor =>
    when(above, tf.fill(value.shape, atHigh), tf.fill(value.shape, atLow));
  const [none, all] = log ? [Number.NEGATIVE_INFINITY, 0] : [0, 1];
  const end = upper ? ends(all, none) : ends(none, all);
  const invalid = broadcastTest(tf.isNaN(x), value);
  const found = when(broadcastTest(inside, value), value, end);
  return when(invalid, tf.fill(value.shape, Number.NaN), found);
}
