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

// The words of a stream are a promise to whoever stored a seed or a state: they change with a new StreamState
// version only. The draws that are made of them change only in a release whose changelog says so.

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
  normal: 'bffe31ae 3c8aa320 3f128499 3f4c968a 3ec5d337 bf453cee',
  exponential: '402be1ff 3c8bad83 3f2d412c 3f4e1fa7 3e8f29af 3f29880a',
  laplace: 'c02be1ff 3c8bad83 3f2d412c 3f4e1fa7 3e8f29af bf29880a',
  logistic: 'bdb34509 40a296a1 3fcecea1 3f632c53 3f969195 3f15ebbf',
  gumbel: 'bf7ce8f6 40824a58 3ec7e487 3e5de6f1 3fa31da3 3ed303eb',
  cauchy: 'c2eab0c6 3f375652 bf006188 bed620a6 3e2c07f0 bf026f51',
};
it.each(Object.entries(kinds))('first draws: %s', (kind, expected) => {
  expect(bits(noise(stream('golden'), kind as NoiseKind, 6))).toBe(expected);
});

it('the first ten thousand normals, with their wedges and tails', () => {
  // A sum of words modulo 2^32 stands for them all.
  const words = new Uint32Array(noise(stream('golden'), 'normal', 10_000).buffer);
  expect(words.reduce((sum, word) => (sum * 31 + word) % 4294967296, 0)).toBe(4025922302);
});

it('first integers, order, counts, categories, gammas', () => {
  const s = stream('golden');
  expect([...s.integers(1000, [6]).dataSync()]).toEqual([956, 12, 331, 583, 471, 715]);
  expect([...s.permutation(8).dataSync()]).toEqual([6, 2, 1, 7, 5, 0, 4, 3]);
  expect([...poissonDraws(s, Float32Array.of(0, 1e-3, 0.5, 3, 9.99, 10, 1e3, 1e6, 1e8))]).toEqual([
    0, 0, 2, 3, 14, 10, 1031, 999843, 99986448,
  ]);
  expect([
    ...categoricalDraws(
      s,
      Float32Array.from({ length: 24 }, (_, i) => (i % 3) - 1),
      3,
    ),
  ]).toEqual([2, 1, 0, 2, 0, 1, 2, 2]);
  expect(bits(gammaDraws(s, Float32Array.of(0.1, 1, 2.5, 1e4)))).toBe('3e0be385 3f2b2c14 3fdaf6bf 461ca55e');
  expect(bits(logGammaDraws(s, Float32Array.of(1e-3, 0.1, 1, 2.5, 1e4)))).toBe(
    'c4e09183 c10725bb bf36c920 3f1503d2 41134253',
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
    '69298449 404711dd 406a0964',
    '632423a2 4009babf 3fb91f7f',
    '36f1f2d4 3f73a94d 3a89669e',
    'c1f39268 bc3e5a2d c0c51a64',
    'c200f67e bdf2ff9e c0ae6d82',
    '2b3abe55 42f2b31e 3bcb05d8',
    '427f837f c0c51735 3f23b975 3dd96e8c',
    'c00370b3 bf960a63 bdb36f2d 37fe4283',
    '3adee4d8 3e84303a 41ae45d9 3fffb41e',
  ]);
});
