import * as tf from '@tensorflow/tfjs';
import { type Formula, isKernel, kernel } from '../tensor/formula.js';

// What follows from a family's standard member, the one with location 0 and scale 1: the formulas of every
// other member, whose z is (x − location) / scale.

type Scalar = (...values: number[]) => number;
type Composed = (...values: tf.Tensor[]) => tf.Tensor | number;

/**
 * How a standard formula is carried to any member: a log density loses log scale; a probability is that at z; a
 * point (a quantile, a draw made of noise) and a center (a mean, a mode) move and stretch; a spread grows with
 * the scale's square; an entropy by log scale.
 */
export type PlacedKind = 'density' | 'probability' | 'point' | 'center' | 'spread' | 'entropy';

/** The kinds of a family's formulas, by their names. */
export const placedKinds: Readonly<Record<string, PlacedKind>> = {
  logDensity: 'density',
  cdf: 'probability',
  survival: 'probability',
  logCdf: 'probability',
  logSurvival: 'probability',
  quantile: 'point',
  upperQuantile: 'point',
  draw: 'point',
  mean: 'center',
  mode: 'center',
  variance: 'spread',
  entropy: 'entropy',
};

/** The standard member's formula as plain numbers: its value and its derivative in z or p, where it has one. */
export interface StandardNumbers {
  value(z: number): number;
  derivative(z: number): number;
}

/** The composed form of any member, from that of the standard one. */
function composedPlaced(
  kind: PlacedKind,
  located: boolean,
  standard: Composed,
): (...v: tf.Tensor[]) => tf.Tensor {
  const lead = kind === 'density' || kind === 'probability' || kind === 'point' ? 1 : 0;
  const reads = located && kind !== 'spread' && kind !== 'entropy' ? 1 : 0;
  return (...values) => {
    const given = values.slice(0, lead);
    const location = reads ? values[lead]! : undefined;
    const scale = values[lead + reads]!;
    const shapes = values.slice(lead + reads + 1);
    if (kind === 'density' || kind === 'probability') {
      const z = tf.div(location ? tf.sub(given[0]!, location) : given[0]!, scale);
      const value = standard(z, ...shapes);
      return kind === 'density' ? tf.sub(value, tf.log(scale)) : tf.mul(value, tf.onesLike(scale));
    }
    const value = standard(...given, ...shapes);
    if (kind === 'spread') return tf.mul(value, tf.square(scale));
    if (kind === 'entropy') return tf.add(value, tf.log(scale));
    const stretched = tf.mul(value, scale);
    return location ? tf.add(location, stretched) : stretched;
  };
}

/** A compiled formula of a family with a scale, and a location where it is `located`, its composed form derived. */
export function placedKernel(name: string, kind: PlacedKind, located: boolean, standard: Composed): Formula {
  return kernelNamed(name, composedPlaced(kind, located, standard));
}

/** The name of a family's kernel: `gumbel` and `logDensity` make `gumbelLogDensity`. */
export function kernelName(front: string, name: string): string {
  return front + name[0]!.toUpperCase() + name.slice(1);
}

/** A compiled kernel by a name put together from a family's and a formula's. */
export function kernelNamed(name: string, composed: (...values: tf.Tensor[]) => tf.Tensor): Formula {
  if (!isKernel(name)) throw new TypeError(`there is no kernel ${name}`);
  return kernel(name, composed);
}

/** The same from plain numbers, for a family with location and scale and no shapes. */
export function placedNumbers(
  name: string,
  kind: PlacedKind,
  standard: StandardNumbers,
  composed: Composed,
): Formula {
  const { parameters, value, partials } = numbers[kind](standard);
  return { name, parameters, value, partials, composed: composedPlaced(kind, true, composed) };
}

interface Numbers {
  readonly parameters: readonly string[];
  readonly value: Scalar;
  readonly partials: readonly Scalar[];
}

const numbers: Record<PlacedKind, (f: StandardNumbers) => Numbers> = {
  density: (f) => ({
    parameters: ['x', 'location', 'scale'],
    value: (x, l, s) => f.value((x! - l!) / s!) - Math.log(s!),
    partials: [
      (x, l, s) => f.derivative((x! - l!) / s!) / s!,
      (x, l, s) => -f.derivative((x! - l!) / s!) / s!,
      (x, l, s) => {
        const z = (x! - l!) / s!;
        return -(z * f.derivative(z) + 1) / s!;
      },
    ],
  }),
  probability: (f) => ({
    parameters: ['x', 'location', 'scale'],
    value: (x, l, s) => f.value((x! - l!) / s!),
    partials: [
      (x, l, s) => f.derivative((x! - l!) / s!) / s!,
      (x, l, s) => -f.derivative((x! - l!) / s!) / s!,
      (x, l, s) => (-((x! - l!) / s!) * f.derivative((x! - l!) / s!)) / s!,
    ],
  }),
  point: (f) => ({
    parameters: ['p', 'location', 'scale'],
    value: (p, l, s) => l! + s! * f.value(p!),
    partials: [(p, _l, s) => s! * f.derivative(p!), () => 1, (p) => f.value(p!)],
  }),
  center: (f) => ({
    parameters: ['location', 'scale'],
    value: (l, s) => l! + s! * f.value(0),
    partials: [() => 1, () => f.value(0)],
  }),
  spread: (f) => ({
    parameters: ['scale'],
    value: (s) => f.value(0) * s! * s!,
    partials: [(s) => 2 * f.value(0) * s!],
  }),
  entropy: (f) => ({
    parameters: ['scale'],
    value: (s) => f.value(0) + Math.log(s!),
    partials: [(s) => 1 / s!],
  }),
};
