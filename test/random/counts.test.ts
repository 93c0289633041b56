import { describe, expect, it } from 'vitest';
import { categoricalDraws, poissonDraws } from '../../src/random/noise.js';
import { stream } from '../../src/random/stream.js';
import { chiSquaredOdds, chiSquaredTails, ksLimit, logGamma, normalLimit, oneInAMillion } from './laws.js';

const draws = 1_000_000;

/** Expected counts of the cells lo … hi, the first and last holding the tails. */
function poissonCells(rate: number, lo: number, hi: number): Float64Array {
  const mass = (k: number) => Math.exp(k * Math.log(rate) - rate - logGamma(k + 1));
  const cells = Float64Array.from({ length: hi - lo + 1 }, (_, i) => mass(lo + i));
  for (let k = lo - 1; k >= Math.max(0, lo - 200_000); k--) cells[0]! += mass(k);
  for (let k = hi + 1; k <= hi + 200_000; k++) {
    const m = mass(k);
    cells[hi - lo]! += m;
    if (m < 1e-30) break;
  }
  return cells.map((p) => p * draws);
}

describe('Poisson', () => {
  // Chi-squared over single counts (tails pooled); a false alarm once in 5e5 runs each.
  it.each([
    [Math.fround(1e-3), 301],
    [Math.fround(0.1), 302],
    [1, 303],
    [3, 304],
    [Math.fround(9.99), 305],
    [10, 306],
    [Math.fround(10.5), 307],
    [30, 308],
    [1e3, 309],
    [1e6, 310],
  ])('rate %f', (rate, seed) => {
    const spread = 5.5 * Math.sqrt(rate) + 6;
    const lo = Math.max(0, Math.floor(rate - spread));
    const hi = Math.ceil(rate + spread);
    const counts = new Float64Array(hi - lo + 1);
    let wrong = 0;
    for (const k of poissonDraws(stream(seed), new Float32Array(draws).fill(rate))) {
      if (!(Number.isInteger(k) && k >= 0)) wrong++;
      counts[Math.min(hi, Math.max(lo, k)) - lo]!++;
    }
    expect(wrong).toBe(0);
    expect(chiSquaredOdds(counts, poissonCells(rate, lo, hi))).toBeGreaterThan(oneInAMillion);
  });

  it('rate 1e8: the counts, rounded to float32 neighbors 8 apart, follow the normal law with skewness', () => {
    // Cornish and Fisher to second order: the distribution function within 1e-8, far below 1/√draws.
    const rate = 1e8;
    const x = poissonDraws(stream(311), new Float32Array(draws).fill(rate));
    const normal = (z: number) => 0.5 * erfc(-z / Math.SQRT2);
    const lower = (k: number) => {
      const z = (k + 4 - rate) / Math.sqrt(rate);
      return normal(z) + ((1 - z * z) * Math.exp(-0.5 * z * z)) / (6 * Math.sqrt(2 * Math.PI * rate));
    };
    // A count half-way between neighbors goes to either, which is worth one mass, 4e-5: 0.04 of the limit.
    expect(kolmogorovOnGrid(x, lower)).toBeLessThan(ksLimit); // false alarm below 1e-6
  });

  it('takes a rate per draw', () => {
    const rates = Float32Array.from({ length: 300_000 }, (_, i) => [0, 0.5, 12, 12, 400, 0.01][i % 6]!);
    const k = poissonDraws(stream(312), rates);
    const sums = new Float64Array(6);
    for (const [i, value] of k.entries()) sums[i % 6]! += value;
    expect(sums[0]).toBe(0);
    // A sum of n Poisson draws is Poisson(n rate): standard score, false alarm 1e-6 each.
    [0.5, 12, 12, 400, Math.fround(0.01)].forEach((rate, i) => {
      expect(Math.abs(sums[i + 1]! - 50_000 * rate) / Math.sqrt(50_000 * rate)).toBeLessThan(normalLimit);
    });
  });

  it('draws the rare count of a rate of 1e-5 as often as it should', () => {
    const s = stream(313);
    let ones = 0;
    for (let i = 0; i < 5; i++) {
      for (const k of poissonDraws(s, new Float32Array(draws).fill(1e-5))) ones += k;
    }
    // Poisson(50) lies in 20 … 89 but for 5e-7 and 2e-7.
    expect(ones).toBeGreaterThanOrEqual(20);
    expect(ones).toBeLessThanOrEqual(89);
  });

  it('refuses what is not a rate', () => {
    for (const [rate, text] of [
      [-1, '-1'],
      [Number.NaN, 'NaN'],
      [Number.POSITIVE_INFINITY, 'Infinity'],
      [2e15, '1999999973982208'],
    ] as const) {
      expect(() => poissonDraws(stream(1), Float32Array.of(1, rate))).toThrow(
        `poissonDraws: rate must lie in [0, 1000000000000000]; got ${text} at element 1; check what computes the rate`,
      );
    }
  });
});

function kolmogorovOnGrid(draws: Float32Array, lower: (k: number) => number): number {
  const x = draws.slice().sort();
  let most = 0;
  for (let i = 0; i < x.length; i++) {
    if (x[i] !== x[i + 1]) most = Math.max(most, Math.abs((i + 1) / x.length - lower(x[i]!)));
  }
  return Math.sqrt(x.length) * most;
}

function erfc(z: number): number {
  const { lower, upper } = chiSquaredTails(2 * z * z, 1);
  return z > 0 ? upper : 1 + lower;
}

describe('categorical', () => {
  it.each<[string, number[], number]>([
    ['two', [0.3, -0.2], 321],
    ['one impossible', [0, Number.NEGATIVE_INFINITY, 1, -2], 322],
    ['impossible at both ends', [Number.NEGATIVE_INFINITY, 3, 2, Number.NEGATIVE_INFINITY], 323],
    ['large logits', [3e38, 3e38, 1e38], 324],
    ['far below zero', [-1000, -1001, -1003], 325],
    ['forty', Array.from({ length: 40 }, (_, i) => Math.sin(i) * 3), 326],
  ])('%s', (_, row, seed) => {
    const logits = Float32Array.from(row);
    const rows = 400_000;
    const all = new Float32Array(rows * row.length);
    for (let i = 0; i < rows; i++) all.set(logits, i * row.length);
    const counts = new Float64Array(row.length);
    for (const j of categoricalDraws(stream(seed), all, row.length)) counts[j]!++;
    const most = Math.max(...logits);
    const weights = Float64Array.from(logits, (l) => Math.exp(l - most));
    const total = weights.reduce((a, b) => a + b);
    const possible = [...weights.keys()].filter((j) => weights[j]! > 0);
    for (const j of counts.keys()) if (!possible.includes(j)) expect(counts[j]).toBe(0);
    const odds = chiSquaredOdds(
      possible.map((j) => counts[j]!),
      possible.map((j) => (rows * weights[j]!) / total),
    );
    expect(odds).toBeGreaterThan(oneInAMillion);
  });

  it('gives each row its own law', () => {
    const logits = Float32Array.from({ length: 3 * 200_000 }, (_, i) =>
      Math.floor(i / 3) % 3 === i % 3 ? 30 : -30,
    );
    // The wrong categories together have probability 2 e^-60.
    expect(categoricalDraws(stream(327), logits, 3).every((j, row) => j === row % 3)).toBe(true);
  });

  it('takes more categories than fit a block', () => {
    const k = 70_000;
    const rows = 300;
    const counts = new Float64Array(10);
    for (const j of categoricalDraws(stream(328), new Float32Array(k * rows), k))
      counts[Math.floor(j / 7000)]!++;
    expect(chiSquaredOdds(counts, new Float64Array(10).fill(30))).toBeGreaterThan(oneInAMillion);
  });

  it('refuses what is not a distribution', () => {
    const infinite = Number.POSITIVE_INFINITY;
    expect(() => categoricalDraws(stream(1), Float32Array.of(0, 1, 0, Number.NaN), 2)).toThrow(
      'categoricalDraws: logits must be below +∞ and not NaN; got NaN at row 1, category 1; check what computes the logits',
    );
    expect(() => categoricalDraws(stream(1), Float32Array.of(infinite, 1), 2)).toThrow(
      'categoricalDraws: logits must be below +∞ and not NaN; got Infinity at row 0, category 0; check what computes the logits',
    );
    expect(() => categoricalDraws(stream(1), Float32Array.of(-infinite, -infinite), 2)).toThrow(
      'categoricalDraws: logits must leave at least one category possible; got −∞ throughout row 0; give one category a finite logit',
    );
    expect(() => categoricalDraws(stream(1), new Float32Array(5), 2)).toThrow(
      'categoricalDraws: logits must hold whole rows of k ≥ 1; got 5 logits and k 2; pass a row-major [rows, k] array',
    );
  });
});
