import { expect, it } from 'vitest';
import { noise } from '../../src/random/noise.js';
import { seedWords } from '../../src/random/seedWords.js';
import { type Stream, stream } from '../../src/random/stream.js';
import {
  adLimit,
  andersonDarling,
  chiSquaredOdds,
  chiSquaredTails,
  kolmogorov,
  ksLimit,
  laws,
  normalLimit,
  oneInAMillion,
} from './laws.js';

const seedOf = (s: Stream) => s.save().seed;

it('a fork depends on seed and label, not on what was drawn or forked before', () => {
  const parent = stream(501);
  const before = parent.fork('child').save();
  noise(parent, 'normal', 12_345);
  parent.permutation(10).dispose();
  parent.fork('other');
  expect(parent.fork('child').save()).toEqual(before);
  expect(stream(501).fork('child').save()).toEqual(before);
});

it('forking does not advance the parent', () => {
  const parent = stream(502);
  const before = parent.save();
  parent.fork('child').normal([3]).dispose();
  expect(parent.save()).toEqual(before);
});

it('tells apart what looks alike', () => {
  const root = stream(1);
  const long = 'x'.repeat(127);
  const seeds = [
    stream(1),
    stream('1'),
    stream('n1'),
    stream('s1'),
    root.fork(1),
    root.fork('1'),
    root.fork('11'),
    root.fork('111'),
    root.fork('1').fork('1'),
    root.fork('1.s1'),
    root.fork('\u0131'), // the code of '1' but for the eighth bit and up
    root.fork('\\0131'),
    root.fork('#'),
    root.fork('\\0023'),
    root.fork('\ud800'),
    root.fork('\udc00'),
    root.fork(`${long}a`),
    root.fork(`${long}`).fork('a'),
    root.fork(`${long}b`),
    root.fork(`${long}ab`),
    root.fork(`${long}${long}`),
    root.fork('y'.repeat(100_000)),
    root.fork(`${'y'.repeat(99_999)}z`),
    root.fork(`z${'y'.repeat(99_999)}`),
    root.fork(0.1),
    root.fork(0.1 + 2 ** -56),
    root.fork(-1),
    stream(seedOf(root)),
  ].map(seedOf);
  expect(new Set(seeds).size).toBe(seeds.length);
});

it('takes 0 and −0 for the same number', () => {
  expect(seedOf(stream(-0))).toBe(seedOf(stream(0)));
});

/** `rounds` draws from each of `count` forks, taken in turn. */
function interleaved(
  root: Stream,
  count: number,
  rounds: number,
  label: (i: number) => string | number,
): Float32Array {
  const out = new Float32Array(count * rounds);
  for (let i = 0; i < count; i++) {
    const draws = noise(root.fork(label(i)), 'uniform', rounds);
    for (let round = 0; round < rounds; round++) out[round * count + i] = draws[round]!;
  }
  return out;
}

it.each<[number, number, string, (i: number) => string | number, number]>([
  [4, 262_144, 'numbers', (i) => i, 511],
  [4, 262_144, 'texts', (i) => `part ${i}`, 512],
  [8192, 128, 'numbers', (i) => i, 513],
  [8192, 128, 'texts', (i) => `layer/${i}/weights`, 514],
])(
  '%i forks, %i draws of each in turn, labelled by %s, look like one stream',
  (count, rounds, _, label, seed) => {
    const u = interleaved(stream(seed), count, rounds, label);
    const n = u.length;
    expect(kolmogorov(u, laws.uniform)).toBeLessThan(ksLimit); // false alarm 1e-6
    expect(andersonDarling(u, laws.uniform)).toBeLessThan(adLimit); // 1e-6

    // Serial chi-squared on non-overlapping pairs and triples, and on the pairs of one fork's successive draws.
    const pairs = new Float64Array(32 * 32);
    const triples = new Float64Array(1000);
    const strided = new Float64Array(32 * 32);
    for (let i = 0; i + 1 < n; i += 2) pairs[32 * Math.floor(32 * u[i]!) + Math.floor(32 * u[i + 1]!)]!++;
    for (let i = 0; i + 2 < n; i += 3) {
      triples[100 * Math.floor(10 * u[i]!) + 10 * Math.floor(10 * u[i + 1]!) + Math.floor(10 * u[i + 2]!)]!++;
    }
    for (let i = 0; i + count < n; i++) {
      if (Math.floor(i / count) % 2 === 0)
        strided[32 * Math.floor(32 * u[i]!) + Math.floor(32 * u[i + count]!)]!++;
    }
    for (const cells of [pairs, triples, strided]) {
      const total = cells.reduce((a, b) => a + b);
      const odds = chiSquaredOdds(cells, new Float64Array(cells.length).fill(total / cells.length));
      expect(odds).toBeGreaterThan(oneInAMillion); // false alarm 2e-6
    }

    // Correlation at the distances where structure between forks would show.
    for (const lag of [1, 2, count - 1, count, count + 1]) {
      let sum = 0;
      for (let i = lag; i < n; i++) sum += (u[i]! - 0.5) * (u[i - lag]! - 0.5);
      expect(Math.abs(12 * sum) / Math.sqrt(n - lag)).toBeLessThan(normalLimit); // 1e-6
    }
  },
);

it('the first draws of 8192 forks are uniform by themselves, and so are the second', () => {
  const u = interleaved(stream(515), 8192, 2, (i) => i);
  for (const draws of [u.slice(0, 8192), u.slice(8192)]) {
    expect(kolmogorov(draws, laws.uniform)).toBeLessThan(ksLimit); // 1e-6
    expect(andersonDarling(draws, laws.uniform)).toBeLessThan(adLimit); // 1e-6
  }
});

it('sibling forks, parent and child are uncorrelated', () => {
  const n = 4096;
  const root = stream(516);
  const streams = Array.from({ length: 200 }, (_, i) => noise(root.fork(i), 'normal', n));
  streams.push(noise(root, 'normal', n), noise(root.fork(0).fork(0), 'normal', n));
  let squares = 0;
  let pairs = 0;
  let most = 0;
  for (let i = 0; i < streams.length; i++) {
    for (let j = i + 1; j < streams.length; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += streams[i]![k]! * streams[j]![k]!;
      // The sum over √n is nearly standard normal, independent from pair to pair to second order.
      const z = sum / Math.sqrt(n);
      squares += z * z;
      pairs++;
      most = Math.max(most, Math.abs(z));
    }
  }
  expect(pairs).toBe((202 * 201) / 2);
  // 20,301 pairs at 5e-11 each: 6.57 standard deviations, 1e-6 over all.
  expect(most).toBeLessThan(6.57);
  // Mean of z² is 1; its variance is 2/pairs and, as rows share their lengths, as much as 8/(202 n) more.
  expect(Math.abs(squares / pairs - 1)).toBeLessThan(normalLimit * Math.sqrt(2 / pairs + 8 / (202 * n)));
});

// Numbers hold many pairs such as 126519 and 126564, one sign up and another as much down: RC4 alone makes one
// seed of some five such pairs among 200,000 numbers.
it.each<[string, number, (i: number) => string | number]>([
  ['numbers', 517, (i) => i],
  ['texts', 518, (i) => `layer/${i}/weights`],
])(
  '200,000 forks labelled by %s start with words that collide as rarely as random ones',
  (_, seed, label) => {
    const root = seedOf(stream(seed));
    const n = 200_000;
    const first = new Set<number>();
    const whole = new Set<string>();
    for (let i = 0; i < n; i++) {
      const words = seedWords('test', 'label', label(i), root);
      first.add(words[0]!);
      whole.add(`${words[0]},${words[1]}`);
    }
    expect(whole.size).toBe(n); // 64 bits: a collision with probability 1e-9
    // 32 bits: Poisson with mean n²/2^33 = 4.66, above 17 with probability 2e-6.
    expect(n - first.size).toBeLessThanOrEqual(17);
  },
);

function ones(word: number): number {
  let n = 0;
  for (let w = word >>> 0; w !== 0; w &= w - 1) n++;
  return n;
}

it.each<[string, number, number, (base: Int32Array, bit: number) => [string | number, string | number]]>([
  ['numbers below 2^20', 521, 20, (base, bit) => [base[0]! & 0xfffff, (base[0]! & 0xfffff) ^ (1 << bit)]],
  [
    'texts of eight signs',
    522,
    48,
    (base, bit) => {
      const codes = Array.from({ length: 8 }, (_, i) => 0x40 + (base[i]! & 0x3f));
      const changed = codes.map((code, i) => (i === bit >> 3 ? code ^ (1 << (bit & 7)) : code));
      return [String.fromCharCode(...codes), String.fromCharCode(...changed)];
    },
  ],
  [
    'texts of 300 signs, in three pieces',
    523,
    48,
    (base, bit) => {
      const codes = Array.from({ length: 300 }, (_, i) => 0x40 + ((base[i & 7]! >> (i & 15)) & 0x3f));
      const changed = codes.map((code, i) => (i === 6 * bit ? code ^ (1 << (bit % 6)) : code));
      return [String.fromCharCode(...codes), String.fromCharCode(...changed)];
    },
  ],
])('each bit of a label changes half of the seed: %s', (_, seed, bits, change) => {
  const source = stream(seed);
  const parent = seedOf(source.fork('parent'));
  const labels = 300;
  const perOutput = new Float64Array(256);
  let least = 256;
  let pairs = 0;
  for (let bit = 0; bit < bits; bit++) {
    if (bits === 48 && seed === 522 && (bit & 7) > 5) continue;
    let flips = 0;
    for (let k = 0; k < labels; k++) {
      const tensor = source.integers(2 ** 31 - 1, [8]);
      const [a, b] = change(tensor.dataSync() as Int32Array, bit);
      tensor.dispose();
      const one = seedWords('test', 'label', a, parent);
      const other = seedWords('test', 'label', b, parent);
      let here = 0;
      for (let w = 0; w < 8; w++) {
        const difference = one[w]! ^ other[w]!;
        here += ones(difference);
        for (let i = 0; i < 32; i++) perOutput[32 * w + i]! += (difference >>> i) & 1;
      }
      flips += here;
      least = Math.min(least, here);
      pairs++;
    }
    // 76,800 bits: standard deviation 0.18 %; 1 % is 5.5 of them, 3e-8 for each bit of the label.
    expect(Math.abs(flips / (256 * labels) - 0.5)).toBeLessThan(0.01);
  }
  // Each bit of the seed flips half the time: its count is binomial(pairs, 1/2).
  const x = perOutput.reduce((sum, count) => sum + (count - pairs / 2) ** 2 / (pairs / 4), 0);
  const { lower, upper } = chiSquaredTails(x, 256);
  expect(Math.min(lower, upper)).toBeGreaterThan(oneInAMillion);
  // binomial(256, 1/2) falls below 71 with probability 2e-13, so over all pairs with less than 1e-8.
  expect(least).toBeGreaterThan(70);
});

it('labels with one sign up and the next as much down give unlike seeds', () => {
  const source = stream(524);
  const parent = seedOf(source);
  let sum = 0;
  let least = 256;
  const pairs = 5000;
  for (let k = 0; k < pairs; k++) {
    const tensor = source.integers(8, [9]);
    const digits = [...tensor.dataSync()].map((d) => d + 1);
    tensor.dispose();
    const place = digits.pop()! % 7;
    const other = digits.map((d, i) => d + (i === place ? 1 : i === place + 1 ? -1 : 0));
    const a = seedWords('test', 'label', digits.join(''), parent);
    const b = seedWords('test', 'label', other.join(''), parent);
    const flips = a.reduce((n, word, i) => n + ones(word ^ b[i]!), 0);
    sum += flips;
    least = Math.min(least, flips);
  }
  expect(Math.abs(sum / pairs - 128)).toBeLessThan((normalLimit * 8) / Math.sqrt(pairs)); // 1e-6
  expect(least).toBeGreaterThan(70); // 2e-13 a pair
});
