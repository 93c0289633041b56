import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import { requireMap, type SmoothMap } from '../maps/smoothMap.js';
import { type Law, type LawOptions, law, readSetting } from './law.js';
import {
  direction,
  imagesInside,
  inverseUndoes,
  mapLeaks,
  mapShapes,
  mapSlopes,
  volumeIsSlope,
} from './laws/map.js';

/** How the laws of a map are tried. */
export interface MapLawOptions extends LawOptions {
  /** Random points that the map takes; numbers from −12 to 12, mostly moderate, unless given. */
  readonly points?: fc.Arbitrary<number>;
}

const number = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const usual = fc.oneof(number(-3, 3), number(-12, 12));

/**
 * The laws of a smooth map: images lie where the map says, the inverse undoes it, the log volume is the logarithm
 * of its slope, derivatives are those of the values, it rises or falls as it says, shapes are kept and nothing
 * leaks.
 *
 * Shapes: the map acts on each number by itself. Units: log volumes in nats.
 *
 * @param map - the map
 * @param options - `seed`, `runs` and `points`
 * @throws ParameterError when `map` is no map; each check rejects with a {@link LawError} where its law does not
 *   hold.
 * @example
 * ```ts
 * import { softplusMap } from 'leadline';
 * import { lawsOfMap } from 'leadline/conformance';
 * const laws = lawsOfMap(softplusMap());
 * for (const { check } of laws) await check();
 * console.log(laws.map(({ name }) => name).join('\n'));
 * // softplusMap: images lie in the set that it maps onto
 * // softplusMap: invert undoes apply
 * // softplusMap: the log volume is the logarithm of the slope
 * // softplusMap: its derivatives are right
 * // softplusMap: it rises or falls as it says
 * // softplusMap: shapes are kept
 * // softplusMap: nothing leaks
 * ```
 */
export function lawsOfMap(map: SmoothMap, options: MapLawOptions = {}): Law[] {
  const where = 'lawsOfMap';
  requireMap(where, map);
  const setting = readSetting(where, map.name, options, ['points']);
  const points = fc.array(options.points ?? usual, { minLength: 4, maxLength: 8 });
  const one = (name: string, property: (map: SmoothMap, points: readonly number[]) => void): Law =>
    law(setting, name, points, (given) => {
      tf.tidy(() => property(map, Array.from(Float32Array.from(given))));
    });
  return [
    one('images lie in the set that it maps onto', imagesInside),
    one('invert undoes apply', inverseUndoes),
    one('the log volume is the logarithm of the slope', volumeIsSlope),
    one('its derivatives are right', mapSlopes),
    one('it rises or falls as it says', direction),
    one('shapes are kept', mapShapes),
    one('nothing leaks', mapLeaks),
  ];
}
