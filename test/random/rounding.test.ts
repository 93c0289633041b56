import { expect, it } from 'vitest';
import { noise } from '../../src/random/noise.js';
import { restoreStream, stream } from '../../src/random/stream.js';
import { Xoshiro } from './xoshiro.js';

// Statistics cannot see an error of a thousandth in a draw. What is computed from a word must be right in
// itself: the laws that are functions of another are held to that function in double precision.

/** Distance of a float32 from a double, in units of the last place at the double. */
function units(got: number, exact: number): number {
  const place = Math.max(-149, Math.floor(Math.log2(Math.abs(exact))) - 23);
  return Math.abs(got - exact) / 2 ** place;
}

it('a logistic draw is log((1 − v)/v) of its word, correctly rounded', () => {
  const s = stream(701);
  const reference = Xoshiro.fromHex(s.save().state);
  let worst = 0;
  let smallest = 1;
  for (const draw of noise(s, 'logistic', 100_000)) {
    const word = reference.next();
    const v = Number((word >> 1n) | 1n) * 2 ** -64;
    const exact = (word & 1n ? -1 : 1) * Math.log1p((1 - 2 * v) / v);
    worst = Math.max(worst, units(draw, exact));
    smallest = Math.min(smallest, Math.abs(exact));
  }
  expect(worst).toBeLessThan(0.5001);
  // Draws close to the median took part.
  expect(smallest).toBeLessThan(1e-3);
});

it('a logistic draw keeps its accuracy at the median and at the ends', () => {
  // With s0 = 0 the word is rotl(s3, 23): any word can be asked for.
  const draw = (word: bigint) => {
    const s3 = ((word >> 23n) | (word << 41n)) & ((1n << 64n) - 1n);
    const state = `${'0'.repeat(47)}1${s3.toString(16).padStart(16, '0')}`;
    const { seed } = stream(1).save();
    return noise(restoreStream({ version: 1, generator: 'xoshiro256++', seed, state }), 'logistic', 1)[0]!;
  };
  expect(units(draw(0n), 64 * Math.LN2)).toBeLessThan(0.5001);
  expect(units(draw(1n), -64 * Math.LN2)).toBeLessThan(0.5001);
  for (const power of [20, 40, 50]) {
    // v = 1/2 − 2^-power, so the draw is log((1/2 + d)/(1/2 − d)) = 4d (1 + 4d²/3 + …).
    const d = 2 ** -power;
    const word = (1n << 64n) - (1n << BigInt(65 - power));
    expect(units(draw(word), 4 * d * (1 + (4 * d * d) / 3))).toBeLessThan(0.5001);
  }
});

it('a Laplace draw is an exponential one with a sign', () => {
  const size = noise(stream(702), 'exponential', 100_000);
  const signed = noise(stream(702), 'laplace', 100_000);
  expect(signed.map(Math.abs)).toEqual(size);
});

it('a Gumbel draw is −log of an exponential one', () => {
  const e = noise(stream(703), 'exponential', 100_000);
  const g = noise(stream(703), 'gumbel', 100_000);
  let worst = 0;
  for (let i = 0; i < g.length; i++) {
    // The exponential that the test sees is rounded, by up to 2^-24 of itself.
    const place = 2 ** (Math.floor(Math.log2(Math.abs(g[i]!))) - 24);
    worst = Math.max(worst, Math.abs(g[i]! + Math.log(e[i]!)) / (2 ** -24 + place));
  }
  expect(worst).toBeLessThan(1.0001);
});
