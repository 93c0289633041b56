import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import type { Law } from '../../src/conformance/index.js';
import { LawError } from '../../src/conformance/index.js';
import * as library from '../../src/index.js';

/** The logistic distribution with its closed forms, none of its inner parts. */
export interface Whole extends library.Distribution {
  mean(): tf.Tensor;
  variance(): tf.Tensor;
  entropy(): tf.Tensor;
  cdf(x: tf.Tensor): tf.Tensor;
  survival(x: tf.Tensor): tf.Tensor;
  logCdf(x: tf.Tensor): tf.Tensor;
  logSurvival(x: tf.Tensor): tf.Tensor;
  quantile(p: tf.Tensor): tf.Tensor;
  upperQuantile(p: tf.Tensor): tf.Tensor;
  parameter(name: string): tf.Tensor;
}

export interface Options {
  readonly location: number;
  readonly scale: number;
}

export const arbitrary = fc.record({
  location: fc.double({ min: -2, max: 2, noNaN: true }),
  scale: fc.double({ min: 0.5, max: 2, noNaN: true }),
});

type Base = library.Gumbel | library.Logistic | library.Exponential | library.Poisson;

const tails = ['cdf', 'survival', 'logCdf', 'logSurvival'];

/** A right factory with some parts put in the place of its own. */
export function spoiled<O extends object>(
  factory: (options: O) => Base,
  spoil: (d: Whole) => object,
  keep: readonly string[] = ['mean', 'variance', 'entropy', ...tails, 'quantile', 'upperQuantile'],
): (options: O) => library.Distribution {
  const wrap = (d: Whole): Whole => {
    const forms = Object.fromEntries(
      keep.filter((name) => name in d).map((name) => [name, d[name as 'mean']]),
    );
    const whole = {
      family: 'spoiled',
      route: d.route,
      support: d.support,
      arrayShape: d.arrayShape,
      pointShape: d.pointShape,
      draw: d.draw,
      logDensity: d.logDensity,
      drawScored: (stream: library.Stream, count?: number) => {
        const value = whole.draw(stream, count);
        return { value, logDensity: whole.logDensity(value) };
      },
      detached: () => wrap(d.detached()),
      ...forms,
      ...Object.fromEntries(Object.entries(spoil(d)).map(([name, part]) => [name, tidied(name, part)])),
    } as Whole;
    return whole;
  };
  return (options) => wrap(factory(options) as unknown as Whole);
}

/** What a spoiled part makes on its way is no leak; only what it keeps on purpose is. */
function tidied(name: string, part: unknown): unknown {
  if (typeof part !== 'function' || name === 'detached') return part;
  return (...given: unknown[]) => tf.tidy(() => part(...given));
}

/** The names of the laws that fail, and what they say. */
export async function failing(laws: readonly Law[]): Promise<Map<string, string>> {
  const found = new Map<string, string>();
  for (const { name, check } of laws) {
    try {
      await check();
    } catch (error) {
      if (!(error instanceof LawError)) throw error;
      found.set(name.replace(/^[^:]*: /, ''), error.message);
    }
  }
  return found;
}

/** x + shift, of one operation and nothing left behind. */
export function plus(x: tf.Tensor, shift: number): tf.Tensor {
  return tf.tidy(() => tf.add(x, shift));
}

/** The same numbers, and `factor` times the gradient. */
export function bent(x: tf.Tensor, factor: number): tf.Tensor {
  return tf.tidy(() => {
    const same = tf.add(tf.mul(x, factor), library.detach(tf.mul(x, 1 - factor)));
    return tf.where(tf.isFinite(x), same, x);
  });
}
