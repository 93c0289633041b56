import { expect, it } from 'vitest';
import { noise } from '../../src/random/noise.js';
import { permutationArray, restoreStream } from '../../src/random/stream.js';
import { Xoshiro } from './xoshiro.js';

const state = '0123456789abcdeffedcba98765432100f1e2d3c4b5a69788796a5b4c3d2e1f0';
const from = (text: string) =>
  restoreStream({ version: 1, generator: 'xoshiro256++', seed: state, state: text });

it('moves its state as the publication says', () => {
  const s = from(state);
  const reference = Xoshiro.fromHex(state);
  for (let i = 0; i < 1000; i++) {
    noise(s, 'uniform', 1);
    reference.next();
    expect(s.save().state).toBe(reference.hex());
  }
});

it('cuts a uniform out of a word: the leading 24 significant bits', () => {
  const s = from(state);
  const reference = Xoshiro.fromHex(state);
  let short = 0;
  let wrong = 0;
  for (const u of noise(s, 'uniform', 100_000)) {
    const word = reference.next() | 1n;
    const excess = BigInt(Math.max(0, word.toString(2).length - 24));
    if (excess < 32n) short++;
    if (u !== Number((word >> excess) << excess) * 2 ** -64) wrong++;
  }
  expect(wrong).toBe(0);
  // Words with nine leading zeros or more took part.
  expect(short).toBeGreaterThan(100);
});

it('cuts a uniform out of the extreme words', () => {
  // With s0 = 0 the word is rotl(s3, 23): any word can be asked for.
  const uniformOf = (word: bigint) => {
    const s3 = ((word >> 23n) | (word << 41n)) & ((1n << 64n) - 1n);
    return noise(from(`${'0'.repeat(47)}1${s3.toString(16).padStart(16, '0')}`), 'uniform', 1)[0]!;
  };
  expect(uniformOf(0n)).toBe(2 ** -64);
  expect(uniformOf(1n)).toBe(2 ** -64);
  expect(uniformOf((1n << 64n) - 1n)).toBe(1 - 2 ** -24);
  expect(uniformOf(1n << 63n)).toBe(0.5);
  expect(uniformOf((1n << 63n) - 1n)).toBe(0.5 - 2 ** -25);
  expect(uniformOf(0xffffffn << 24n)).toBe(0xffffff * 2 ** -40);
  expect(uniformOf((0xffffffn << 24n) + 0xffffffn)).toBe(0xffffff * 2 ** -40);
});

it('takes an integer from the upper half of a word, and another word where that would be unfair', () => {
  for (const below of [1, 6, 1000, 3 * 2 ** 29, 2 ** 31 - 1]) {
    const s = from(state);
    const reference = Xoshiro.fromHex(state);
    const draws = s.integers(below, [2000]).dataSync();
    const unfair = (1n << 32n) % BigInt(below);
    for (const draw of draws) {
      let product = (reference.next() >> 32n) * BigInt(below);
      while ((product & 0xffffffffn) < unfair) product = (reference.next() >> 32n) * BigInt(below);
      expect(draw).toBe(Number(product >> 32n));
    }
    expect(s.save().state).toBe(reference.hex());
  }
});

it('shuffles by inserting each number at a random place', () => {
  const s = from(state);
  const reference = Xoshiro.fromHex(state);
  const order: number[] = [];
  for (let i = 0; i < 500; i++) {
    const bound = BigInt(i + 1);
    let product = (reference.next() >> 32n) * bound;
    while ((product & 0xffffffffn) < (1n << 32n) % bound) product = (reference.next() >> 32n) * bound;
    const j = Number(product >> 32n);
    order.push(i);
    [order[i], order[j]] = [order[j]!, i];
  }
  expect([...permutationArray(s, 500)]).toEqual(order);
});
