import { describe, expect, it } from 'vitest';
import { type NoiseKind, noise } from '../../src/random/noise.js';
import { stream } from '../../src/random/stream.js';
import {
  above,
  adLimit,
  andersonDarling,
  chiSquaredTails,
  kolmogorov,
  ksLimit,
  type Law,
  laws,
  normalLimit,
  oneInAMillion,
  pearson,
} from './laws.js';

const seeds: Record<NoiseKind, number> = {
  uniform: 101,
  normal: 102,
  exponential: 103,
  laplace: 104,
  logistic: 105,
  gumbel: 106,
  cauchy: 121,
};

describe.each(Object.keys(seeds) as NoiseKind[])('%s', (kind) => {
  const draws = noise(stream(seeds[kind]), kind, 1_000_000);

  it('follows its law in the bulk', () => {
    expect(kolmogorov(draws, laws[kind])).toBeLessThan(ksLimit); // false alarm 1e-6
  });

  it('follows its law in the tails', () => {
    expect(andersonDarling(draws, laws[kind])).toBeLessThan(adLimit); // false alarm 1e-6
  });

  it('does not repeat itself at small distances', () => {
    // Scores Φ^-1-like by the distribution function, less 1/2: each product has mean 0 and variance 1/144.
    const v = Float64Array.from(draws, (x) => laws[kind].lower(x) - 0.5);
    for (const lag of [1, 2, 3, 4, 8, 64]) {
      let sum = 0;
      for (let i = lag; i < v.length; i++) sum += v[i]! * v[i - lag]!;
      expect(Math.abs(12 * sum) / Math.sqrt(v.length - lag)).toBeLessThan(normalLimit); // false alarm 1e-6
    }
  });
});

/** Draws beyond `bound` among `millions` times a million, folded by `side` so that the tail points up. */
function tail(
  seed: number,
  kind: NoiseKind,
  millions: number,
  bound: number,
  side: (x: number) => number,
): Float32Array {
  const s = stream(seed);
  const found: number[] = [];
  for (let i = 0; i < millions; i++) {
    for (const x of noise(s, kind, 1_000_000)) if (side(x) > bound) found.push(side(x));
  }
  return Float32Array.from(found);
}

/** Standard score of a count whose law is binomial(n, p), n large. */
const binomialScore = (count: number, n: number, p: number) =>
  Math.abs(count - n * p) / Math.sqrt(n * p * (1 - p));

/** Tail probabilities of Pearson's statistic with one more cell that holds everything else. */
function pearsonTails(cells: Float64Array, expected: Float64Array, rest: number) {
  const total = cells.reduce((a, b) => a + b);
  const all = expected.reduce((a, b) => a + b) + rest;
  const { statistic, degrees } = pearson([...cells, all - total], [...expected, rest]);
  return chiSquaredTails(statistic, degrees);
}

describe('1e8 draws', () => {
  const millions = 100;

  it('of normals: the tails beyond 4 and 5 on either side, and the wedges of the ziggurat in between', () => {
    const s = stream(107);
    const count = { below5: 0, below4: 0, above4: 0, above5: 0 };
    const cells = new Float64Array(512);
    for (let i = 0; i < millions; i++) {
      for (const x of noise(s, 'normal', 1_000_000)) {
        if (x < -4) count[x < -5 ? 'below5' : 'below4']++;
        else if (x >= 4) count[x > 5 ? 'above5' : 'above4']++;
        else cells[Math.floor(64 * x) + 256]!++;
      }
    }
    const p5 = laws.normal.upper(5);
    const p4 = laws.normal.upper(4) - p5;
    expect(p5).toBeCloseTo(2.8665157187919333e-7, 20);
    // Expected 3,139 each and 28.7 each. Binomial odds: 4.892 standard deviations, 1e-6, for the first; for the
    // second Poisson(28.7) lies outside 7 … 62 with probability 3e-7 and 2e-8 (the sum of its masses).
    expect(binomialScore(count.below4, 1e8, p4)).toBeLessThan(normalLimit);
    expect(binomialScore(count.above4, 1e8, p4)).toBeLessThan(normalLimit);
    for (const n of [count.below5, count.above5]) {
      expect(n).toBeGreaterThanOrEqual(7);
      expect(n).toBeLessThanOrEqual(62);
    }
    const tails = 2 * laws.normal.upper(4);
    const expected = cells.map((_, i) => {
      const inner = Math.min(Math.abs(i - 256), Math.abs(i - 255)) / 64;
      return 1e8 * (laws.normal.upper(inner) - laws.normal.upper(inner + 1 / 64));
    });
    const { lower, upper } = pearsonTails(cells, expected, 1e8 * tails);
    expect(Math.min(lower, upper)).toBeGreaterThan(oneInAMillion);
  });

  it('of exponentials: the wedges', () => {
    const s = stream(120);
    const cells = new Float64Array(512);
    let rest = 0;
    for (let i = 0; i < millions; i++) {
      for (const x of noise(s, 'exponential', 1_000_000)) {
        if (x < 8) cells[Math.floor(64 * x)]!++;
        else rest++;
      }
    }
    expect(binomialScore(rest, 1e8, Math.exp(-8))).toBeLessThan(normalLimit); // 1e-6
    const expected = cells.map((_, i) => -1e8 * Math.exp(-i / 64) * Math.expm1(-1 / 64));
    const { lower, upper } = pearsonTails(cells, expected, 1e8 * Math.exp(-8));
    expect(Math.min(lower, upper)).toBeGreaterThan(oneInAMillion);
  });
});

// Where each sampler has code or arithmetic of its own for the tail: the law of what lies beyond, given that.
it.each<[string, number, NoiseKind, number, number, (x: number) => number, Law]>([
  ['normal beyond r', 108, 'normal', 60, 4.038849846109504, (x) => x, laws.normal],
  ['normal beyond −r', 109, 'normal', 60, 4.038849846109504, (x) => -x, laws.normal],
  ['exponential beyond r', 110, 'exponential', 20, 9.256164544265545, (x) => x, laws.exponential],
  ['Laplace beyond −r', 111, 'laplace', 40, 9.256164544265545, (x) => -x, laws.exponential],
  ['logistic beyond 8', 112, 'logistic', 10, 8, (x) => x, laws.logistic],
  ['logistic beyond −8', 113, 'logistic', 10, 8, (x) => -x, laws.logistic],
  ['Gumbel beyond 7', 114, 'gumbel', 5, 7, (x) => x, laws.gumbel],
  [
    'Gumbel below −2',
    115,
    'gumbel',
    5,
    2,
    (x) => -x,
    { lower: (x) => laws.gumbel.upper(-x), upper: (x) => laws.gumbel.lower(-x) },
  ],
  ['Cauchy beyond 1000', 122, 'cauchy', 5, 1000, (x) => x, laws.cauchy],
  ['Cauchy beyond −1000', 123, 'cauchy', 5, 1000, (x) => -x, laws.cauchy],
  [
    'Cauchy within 1/1000',
    124,
    'cauchy',
    5,
    1000,
    (x) => Math.abs(1 / x),
    { lower: (x) => 1 - 2 * laws.cauchy.upper(x), upper: (x) => 2 * laws.cauchy.upper(x) },
  ],
  ['uniform below 1/1000', 116, 'uniform', 5, -0.001, (x) => -x, { lower: (x) => 1 + x, upper: (x) => -x }],
])('%s', (_, seed, kind, millions, bound, side, law) => {
  const found = tail(seed, kind, millions, bound, side);
  const share = kind === 'laplace' ? law.upper(bound) / 2 : law.upper(bound);
  expect(found.length).toBeGreaterThan(1000);
  expect(binomialScore(found.length, millions * 1e6, share)).toBeLessThan(normalLimit); // false alarm 1e-6
  expect(kolmogorov(found, above(law, bound))).toBeLessThan(ksLimit); // 1e-6
  expect(andersonDarling(found, above(law, bound))).toBeLessThan(adLimit); // 1e-6
});

it('gives normals and Laplaces a fair sign, independent of their size', () => {
  for (const [kind, seed] of [
    ['normal', 117],
    ['laplace', 118],
  ] as const) {
    const median = kind === 'normal' ? 0.6744897501960817 : Math.LN2;
    const counts = [0, 0, 0, 0];
    for (const x of noise(stream(seed), kind, 1_000_000))
      counts[(x > 0 ? 2 : 0) + (Math.abs(x) > median ? 1 : 0)]!++;
    for (const count of counts) expect(binomialScore(count, 1e6, 0.25)).toBeLessThan(normalLimit); // 1e-6 each
  }
});

it('never returns a uniform of 0 or 1, nor an exponential of 0, in 1e8', () => {
  const s = stream(119);
  let wrong = 0;
  for (let i = 0; i < 100; i++) {
    for (const u of noise(s, 'uniform', 500_000)) if (!(u > 0 && u < 1)) wrong++;
    for (const e of noise(s, 'exponential', 500_000)) if (!(e > 0 && e < Number.POSITIVE_INFINITY)) wrong++;
  }
  expect(wrong).toBe(0);
});

it('closes both ziggurats: 1,024 layers of equal area end at the mode', () => {
  // Layer by layer, f(x[i+1]) = f(x[i]) + area / x[i]; the last must reach f(0) = 1.
  const top = (r: number, area: number, f: (x: number) => number, inverse: (y: number) => number) => {
    let x = r;
    for (let i = 1; i < 1023; i++) x = inverse(f(x) + area / x);
    return f(x) + area / x;
  };
  const f = (x: number) => Math.exp(-0.5 * x * x);
  const r = 4.038849846109504;
  const area = r * f(r) + Math.sqrt(2 * Math.PI) * laws.normal.upper(r);
  expect(Math.abs(top(r, area, f, (y) => Math.sqrt(-2 * Math.log(y))) - 1)).toBeLessThan(1e-12);
  const e = 9.256164544265545;
  expect(
    Math.abs(
      top(
        e,
        (e + 1) * Math.exp(-e),
        (x) => Math.exp(-x),
        (y) => -Math.log(y),
      ) - 1,
    ),
  ).toBeLessThan(1e-12);
});
