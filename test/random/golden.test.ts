import { expect, it } from 'vitest';
import {
  betaDraws,
  betaPrimeDraws,
  categoricalDraws,
  gammaDraws,
  inverseGammaDraws,
  inverseGaussianDraws,
  logBetaDraws,
  logGammaDraws,
  logOddsBetaDraws,
  type NoiseKind,
  noise,
  poissonDraws,
  scaledGammaDraws,
  studentTDraws,
  vonMisesDraws,
} from '../../src/random/noise.js';
import { stream } from '../../src/random/stream.js';

// The words of a stream, and with them every draw, are a promise to whoever stored a seed: these bits were
// written down at the first release and change with a new StreamState version only.

const bits = (draws: Float32Array) =>
  [...new Uint32Array(draws.buffer)].map((word) => word.toString(16).padStart(8, '0')).join(' ');

it.each<[string, () => string, string]>([
  [
    'the number 1',
    () => stream(1).save().seed,
    'c585d000eada5ce55cade8c3f7c377827201ca5ff0b0298a57807eb1006b5c6a',
  ],
  [
    "the text '1'",
    () => stream('1').save().seed,
    '1bac9d0197b9e46eeab85b9bcd49166d35aeb864b02482a5414c64926ff01c75',
  ],
  [
    'a fork',
    () => stream(1).fork('weights').save().seed,
    'd548437b62a9207e4760fefd4a7ca9758b5ae6da325d2e9efefe8c966cb02952',
  ],
  [
    'a path of forks with odd labels',
    () => stream(-0.1).fork(1e21).fork('η#\\\u0000').save().seed,
    '2e18ac646c14e2599627b00919a95bc816c2bab63109a0d23fadc0878a5409e1',
  ],
  [
    'a label in several pieces',
    () => stream('a'.repeat(1000)).save().seed,
    'bcd5bf1d0999f83b58a6fc1c9b49c26a2a9cb9f1741dbf95fbe13afb8d8552ae',
  ],
])('seed of %s', (_, seed, expected) => {
  expect(seed()).toBe(expected);
});

const kinds: Record<NoiseKind, string> = {
  uniform: '3f74cd83 3c4a6023 3ea9c7d7 3f1552d8 3ef15f3f 3f371c65',
  normal: '3f2b8623 3caf3c78 beede0f6 3f814c7a bf3607eb c0013994',
  exponential: '3edfb1c1 3ccf8e7e 3ef2f24a 3f99257f 3f439a98 405d3db3',
  laplace: '3edfb1c1 3ccf8e7e bef2f24a 3f99257f bf439a98 c05d3db3',
  logistic: 'bdb34509 40a296a1 3fcecea1 3f632c53 3f969195 3f15ebbf',
  gumbel: '3f53fab1 406b3b8b 3f3ed803 be37ab57 3e89c5a0 bf9ec46e',
  cauchy: '41fa93ad beeb7d48 3eb44e33 3ea4021a 3e3f2bea 3e9677bd',
};
it.each(Object.entries(kinds))('first draws: %s', (kind, expected) => {
  expect(bits(noise(stream('golden'), kind as NoiseKind, 6))).toBe(expected);
});

it('the first ten thousand normals, with their wedges and tails', () => {
  // A sum of words modulo 2^32 stands for them all.
  const words = new Uint32Array(noise(stream('golden'), 'normal', 10_000).buffer);
  expect(words.reduce((sum, word) => (sum * 31 + word) % 4294967296, 0)).toBe(1965149690);
});

it('first integers, order, counts, categories, gammas', () => {
  const s = stream('golden');
  expect([...s.integers(1000, [6]).dataSync()]).toEqual([956, 12, 331, 583, 471, 715]);
  expect([...s.permutation(8).dataSync()]).toEqual([6, 2, 1, 7, 5, 0, 4, 3]);
  expect([...poissonDraws(s, Float32Array.of(0, 1e-3, 0.5, 3, 9.99, 10, 1e3, 1e6, 1e8))]).toEqual([
    0, 0, 2, 2, 15, 10, 1031, 999843, 99986448,
  ]);
  expect([
    ...categoricalDraws(
      s,
      Float32Array.from({ length: 24 }, (_, i) => (i % 3) - 1),
      3,
    ),
  ]).toEqual([2, 1, 0, 2, 0, 1, 2, 2]);
  expect(bits(gammaDraws(s, Float32Array.of(0.1, 1, 2.5, 1e4)))).toBe('3d894c55 400e3944 400ac2f0 461b1263');
  expect(bits(logGammaDraws(s, Float32Array.of(1e-3, 0.1, 1, 2.5, 1e4)))).toBe(
    'c402d2cc c06397be c07cd268 3ee1f53b 4113633a',
  );
});

it('first draws of the laws with parameters', () => {
  const s = stream('golden');
  const f = (...values: number[]) => Float32Array.from(values);
  expect([
    bits(scaledGammaDraws(s, f(0.1, 1, 2.5), f(1e30, 2, 3))),
    bits(inverseGammaDraws(s, f(0.1, 1, 2.5), f(1, 2, 3))),
    ...[betaDraws, logBetaDraws, logOddsBetaDraws].map((d) => bits(d(s, f(0.01, 0.5, 3), f(1, 0.5, 2e3)))),
    bits(betaPrimeDraws(s, f(0.01, 0.5, 3), f(1, 0.5, 2e3), f(1, 2, 3))),
    bits(studentTDraws(s, f(0.1, 1, 30, 1e8))),
    bits(vonMisesDraws(s, f(1e-6, 1, 30, 1e8))),
    bits(inverseGaussianDraws(s, f(1, 1, 1e3, 2), f(1e-3, 1, 30, 1e6))),
  ]).toEqual([
    '6e2a53b2 40706d4b 3f850684',
    '58e8c4cd 408ccc1f 3fa7390f',
    '3b14587d 3f325161 3ae866e9',
    'c2af34ce baf2cebf c0db7d16',
    'c05418d9 be7641c5 c0baccc6',
    '403ebaf0 414071ae 3b5ce17a',
    '3e12827e bfb092e0 bf806c58 bf6a6cac',
    '3fcd1408 3fa87811 bcbc5f48 37b82b33',
    '3b5f873d 3eb6fa83 41900b6a 3fffd088',
  ]);
});
