import { describe, expect, it } from 'vitest';
import { permutationArray, type Stream, stream } from '../../src/random/stream.js';
import { chiSquaredOdds, chiSquaredTails, oneInAMillion } from './laws.js';

const even = (cells: number, total: number) => new Float64Array(cells).fill(total / cells);

function integers(s: Stream, below: number, count: number): Int32Array {
  const tensor = s.integers(below, [count]);
  const values = tensor.dataSync() as Int32Array;
  tensor.dispose();
  return values;
}

describe('integers', () => {
  // Chi-squared over all values; a false alarm once in 5e5 runs each, both sides counted.
  it.each([
    [2, 201],
    [6, 202],
    [10, 203],
    [1000, 204],
    [4096, 205],
  ])('below %i are equally likely', (below, seed) => {
    const counts = new Float64Array(below);
    for (const value of integers(stream(seed), below, 1_000_000)) counts[value]!++;
    expect(chiSquaredOdds(counts, even(below, 1e6))).toBeGreaterThan(oneInAMillion);
  });

  it('below 1 are all 0', () => {
    expect(integers(stream(206), 1, 1000).every((value) => value === 0)).toBe(true);
  });

  it('below 3·2^29 are unbiased, where plain scaling would give a third of them half as often again', () => {
    // 2^32 / (3·2^29) = 2⅔, so without rejection values ≡ 2 (mod 3) or so would have 2 words for the others' 3.
    const counts = new Float64Array(3);
    for (const value of integers(stream(207), 3 * 2 ** 29, 1_000_000)) counts[value % 3]!++;
    expect(chiSquaredOdds(counts, even(3, 1e6))).toBeGreaterThan(oneInAMillion);
  });

  it('below 2147483647 fill the range, in the leading and in the trailing digits', () => {
    const leading = new Float64Array(1024);
    const trailing = new Float64Array(1024);
    let wrong = 0;
    for (const value of integers(stream(208), 2147483647, 1_000_000)) {
      if (!(value >= 0 && value < 2147483647)) wrong++;
      leading[Math.floor(value / 2 ** 21)]!++;
      trailing[value % 1024]!++;
    }
    expect(wrong).toBe(0);
    expect(chiSquaredOdds(leading, even(1024, 1e6))).toBeGreaterThan(oneInAMillion);
    expect(chiSquaredOdds(trailing, even(1024, 1e6))).toBeGreaterThan(oneInAMillion);
  });
});

describe('permutation', () => {
  it('of 4 and of 5 takes each order equally often', () => {
    for (const [n, orders, seed] of [
      [4, 24, 209],
      [5, 120, 210],
    ] as const) {
      const counts = new Map<string, number>();
      const s = stream(seed);
      for (let i = 0; i < 120_000; i++) {
        const order = permutationArray(s, n).join();
        counts.set(order, (counts.get(order) ?? 0) + 1);
      }
      expect(counts.size).toBe(orders);
      expect(chiSquaredOdds([...counts.values()], even(orders, 120_000))).toBeGreaterThan(oneInAMillion);
    }
  });

  it('of 12 sends each number to each place equally often', () => {
    const n = 12;
    const runs = 100_000;
    const counts = new Float64Array(n * n);
    const s = stream(211);
    for (let i = 0; i < runs; i++) {
      for (const [place, value] of permutationArray(s, n).entries()) counts[n * place + value]!++;
    }
    // Rows and columns have fixed sums: X² (n − 1)/n is chi-squared with (n − 1)² degrees.
    const x = counts.reduce((sum, count) => sum + (count - runs / n) ** 2 / (runs / n), 0);
    const { lower, upper } = chiSquaredTails((x * (n - 1)) / n, (n - 1) ** 2);
    expect(Math.min(lower, upper)).toBeGreaterThan(oneInAMillion);
  });

  it('of 60 leaves a Poisson number of places as they were', () => {
    // The number of fixed points differs from Poisson(1) by less than 2^60/60! in total variation.
    const runs = 50_000;
    const counts = new Float64Array(12);
    const s = stream(212);
    for (let i = 0; i < runs; i++) {
      const fixed = permutationArray(s, 60).reduce((n, value, place) => n + (value === place ? 1 : 0), 0);
      counts[Math.min(11, fixed)]!++;
    }
    let mass = runs * Math.exp(-1);
    const expected = counts.map((_, k) => (mass /= Math.max(1, k)));
    expect(chiSquaredOdds(counts, expected)).toBeGreaterThan(oneInAMillion);
  });

  it('of 0, 1 and 300,000 holds each number once', () => {
    for (const n of [0, 1, 300_000]) {
      const sorted = permutationArray(stream(213), n).sort();
      expect(sorted.length).toBe(n);
      expect(sorted.every((value, i) => value === i)).toBe(true);
    }
  });
});
