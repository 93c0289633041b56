import { describe, expect, it } from 'vitest';
import { randomWords, type WordSource, wordBlocks } from '../../src/random/randomWords.js';
import { stream } from '../../src/random/stream.js';
import { chiSquaredTails, normalLimit, oneInAMillion } from './laws.js';
import { Xoshiro } from './xoshiro.js';

// A short look at the same words that `dieharder -a` is run on (docs/random-bits.md). Five tests of each of four
// sources, 20 in all at 1e-6 each: a right generator fails one of them with odds of 2e-5, once, when seeds are chosen.

const count = 4_000_000;

function wordsOf(source: WordSource, seed: number): Int32Array {
  const words = new Int32Array(count);
  let filled = 0;
  for (const block of wordBlocks(stream(seed), source)) {
    const part = block.subarray(0, count - filled);
    words.set(part, filled);
    filled += part.length;
    if (filled === count) break;
  }
  return words;
}

function bitsSet(word: number): number {
  let x = word - ((word >>> 1) & 0x55555555);
  x = (x & 0x33333333) + ((x >>> 2) & 0x33333333);
  return Math.imul((x + (x >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
}

function fair(counts: Float64Array): void {
  const expected = counts.reduce((a, b) => a + b) / counts.length;
  const statistic = counts.reduce((sum, c) => sum + (c - expected) ** 2 / expected, 0);
  const { lower, upper } = chiSquaredTails(statistic, counts.length - 1);
  expect(Math.min(lower, upper)).toBeGreaterThan(oneInAMillion / 2); // 1e-6, both tails
}

describe.each([
  ['one stream', 1601],
  ['4 forks', 1602],
  ['8192 forks', 1603],
  ['bit-reversed', 1604],
] as const)('words of %s', (source, seed) => {
  const words = wordsOf(source, seed);

  it('have as many ones as zeros', () => {
    // Binomial(n, 1/2) over n bits.
    const ones = words.reduce((sum, word) => sum + bitsSet(word), 0);
    const bits = 32 * count;
    expect(Math.abs(ones - bits / 2) / Math.sqrt(bits / 4)).toBeLessThan(normalLimit); // 1e-6
  });

  it('have as many changes from bit to bit as not', () => {
    // Over fair bits, changes between neighbors are fair bits themselves, so this counts runs.
    let changes = 0;
    for (let i = 0; i < count; i++) {
      const word = words[i]!;
      const next = i + 1 < count ? words[i + 1]! & 1 : word >>> 31;
      changes += bitsSet(word ^ ((word >>> 1) | (next << 31)));
    }
    const pairs = 32 * count - 1;
    expect(Math.abs(changes - pairs / 2) / Math.sqrt(pairs / 4)).toBeLessThan(normalLimit); // 1e-6
  });

  it('have every byte equally often', () => {
    const counts = new Float64Array(256);
    for (const byte of new Uint8Array(words.buffer)) counts[byte]!++;
    fair(counts);
  });

  it('have every pair of leading bytes of 64-bit neighbors equally often', () => {
    const counts = new Float64Array(65_536);
    // Pairs that do not overlap, so that counts are multinomial: 2^20 of them, 16 expected in each cell.
    for (let i = 1; i + 2 < count; i += 4) counts[((words[i]! >>> 24) << 8) | (words[i + 2]! >>> 24)]!++;
    fair(counts);
  });

  it('have ones at every place of 64 equally often', () => {
    // Sum over the places of the squared standard score: chi-squared with 64 degrees of freedom.
    const ones = new Float64Array(64);
    for (let i = 0; i < count; i++)
      for (let k = 0; k < 32; k++) ones[32 * (i & 1) + k]! += (words[i]! >>> k) & 1;
    const each = count / 2;
    const statistic = ones.reduce((sum, o) => sum + (o - each / 2) ** 2 / (each / 4), 0);
    const { lower, upper } = chiSquaredTails(statistic, 64);
    expect(Math.min(lower, upper)).toBeGreaterThan(oneInAMillion / 2); // 1e-6, both tails
  });
});

describe('the words themselves', () => {
  const take = (source: WordSource, seed: number) =>
    wordBlocks(stream(seed), source).next().value as Int32Array;
  const pairs = (words: Int32Array) =>
    Array.from({ length: words.length / 2 }, (_, i) => {
      return (BigInt(words[2 * i + 1]! >>> 0) << 32n) | BigInt(words[2 * i]! >>> 0);
    });

  it('are those of xoshiro256++, far beyond the first blocks and wherever a call ends', () => {
    const s = stream(1605);
    const reference = Xoshiro.fromHex(s.save().state);
    for (const n of [2, 30, 130, 700, 2046, 3000, 10_000, 2, 5000]) {
      for (const word of pairs(randomWords(s, n)))
        if (word !== reference.next()) expect.fail(`after ${n} words`);
    }
  });

  it('of forks are in turn, 64 bits from each', () => {
    const root = stream(1606);
    const block = pairs(take('4 forks', 1606));
    for (let fork = 0; fork < 4; fork++) {
      const own = pairs(randomWords(root.fork(fork), 200));
      expect(block.filter((_, i) => i % 4 === fork).slice(0, 100)).toEqual(own);
    }
    const many = pairs(take('8192 forks', 1606));
    expect(many[8191]).toBe(pairs(randomWords(root.fork(8191), 2))[0]);
    expect(many[8192 + 5]).toBe(pairs(randomWords(root.fork(5), 4))[1]);
  });

  it('in reverse have each 64 bits turned around', () => {
    const turned = (word: bigint) =>
      BigInt(`0b${[...word.toString(2).padStart(64, '0')].reverse().join('')}`);
    const forward = pairs(randomWords(stream(1607), 200));
    expect(pairs(take('bit-reversed', 1607)).slice(0, 100)).toEqual(forward.map(turned));
  });
});
