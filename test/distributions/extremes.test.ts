import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import { type Distribution, stream } from '../../src/index.js';
import { entries } from '../families/entry.js';
import { andersonDarling, kolmogorov } from '../random/laws.js';

// Draws at extreme parameters. There are at most 400 tests here; each statistic has odds of 2.5e-9 to reach its
// limit when the law is right, so the whole file raises a false alarm with odds of 1e-6 (Bonferroni).
// √n D: 2 exp(−2 · 3.2027²) = 2.5e-9, Kolmogorov's law. A²: √3 erfc(√18.6) = 1.9e-9, Zolotarev's tail.
const ksLimit = 3.203;
const adLimit = 18.6;
const count = 100_000;

beforeAll(async () => {
  await tf.setBackend('cpu');
});

const cases = Object.entries(entries).flatMap(([family, entry]) =>
  entry.extremes.map((options, k) => ({ family, entry, options, k, title: JSON.stringify(options) })),
);

it('there are no more tests than the limits allow for', () => {
  expect(2 * cases.length).toBeGreaterThan(0);
  expect(2 * cases.length).toBeLessThanOrEqual(400);
});

describe.each(cases)('$family $title', ({ entry, options, k }) => {
  it('draws follow the law into its tails (Kolmogorov–Smirnov, Anderson–Darling)', () => {
    const make = entry.factory as (options: object) => Distribution;
    const drawn = tf.tidy(() =>
      make(options)
        .draw(stream(entry.seed + 10_000 + k), count)
        .dataSync(),
    ) as Float32Array;
    const parameters = Object.keys(entry.members).map((name) => options[name]!);
    expect(parameters.every((v) => v !== undefined)).toBe(true);
    const law = {
      lower: (x: number) => entry.cdf(x, ...parameters),
      upper: (x: number) => entry.survival(x, ...parameters),
    };
    // A draw stands for the numbers that round to it. Where many do, one of them stands for it, at random.
    const spread = spreadOut(drawn, law, stream(entry.seed + 20_000 + k));
    expect(kolmogorov(spread, identity)).toBeLessThan(ksLimit);
    expect(andersonDarling(spread, identity)).toBeLessThan(adLimit);
  });
});

/** Each draw's probability, uniform if the law is right: anywhere within the cell of numbers that round to the draw. */
function spreadOut(
  drawn: Float32Array,
  law: { lower: (x: number) => number; upper: (x: number) => number },
  noise: ReturnType<typeof stream>,
): Float32Array {
  const places = tf.tidy(() => noise.uniform([drawn.length]).dataSync());
  // Centered at the median, so that float32 keeps the distance to either end: −log 2F below it, log 2S above.
  return drawn.map((x, i) => {
    const [low, high] = cell(x);
    const u = places[i]!;
    if (law.lower(x) <= 0.5) {
      const [a, b] = [low === Number.NEGATIVE_INFINITY ? 0 : law.lower(low), law.lower(high)];
      return centered(a + (b - a) * u);
    }
    const [a, b] = [law.upper(low), high === Number.POSITIVE_INFINITY ? 0 : law.upper(high)];
    return -centered(a + (b - a) * u);
  });
}

/** A cell may hold the median, so that a share of one side may be above one half. */
const centered = (share: number): number => (share <= 0.5 ? Math.log(2 * share) : -Math.log(2 * (1 - share)));

/** The standard Laplace law, which the centered probabilities follow. */
const identity = {
  lower: (x: number) => (x < 0 ? 0.5 * Math.exp(x) : 1 - 0.5 * Math.exp(-x)),
  upper: (x: number) => (x < 0 ? 1 - 0.5 * Math.exp(x) : 0.5 * Math.exp(-x)),
};

const bits = new DataView(new ArrayBuffer(4));

/** The next float32 above or below. */
function next(x: number, up: boolean): number {
  if (x === 0) return up ? 2 ** -149 : -(2 ** -149);
  bits.setFloat32(0, x);
  bits.setInt32(0, bits.getInt32(0) + (x > 0 === up ? 1 : -1));
  return bits.getFloat32(0);
}

/**
 * The numbers that are stored as this float32; the smallest positive one stands for all down to zero, the largest
 * one below 1 for all up to 1, the largest of all for everything above.
 */
function cell(x: number): [number, number] {
  const [below, above] = [next(x, false), next(x, true)];
  const low = x === 2 ** -149 ? 0 : (x + below) / 2;
  const high = above === 1 ? 1 : Number.isFinite(above) ? (x + above) / 2 : Number.POSITIVE_INFINITY;
  return [low, high];
}
