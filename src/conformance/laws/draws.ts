import * as tf from '@tensorflow/tfjs';
import { gammaQ } from '../../numeric/incompleteGamma.js';
import { masses, pieceIntegrals, regionOf } from '../expectation.js';
import { Violation } from '../lawError.js';
import { numbers, type Subject, sortedDraws } from '../subject.js';

const count = 20_000;

// Each statistic passes its limit once in ten million tries where the law holds.
const odds = 1e-7;
const kolmogorovLimit = Math.sqrt(Math.log(2 / odds) / 2); // P(√n D > c) ≈ 2 exp(−2 c²), Kolmogorov (1933)

const look = 'draw: its sampler, the order of its parameters, what it does to the noise';

/** Draws follow the distribution function (Kolmogorov and Smirnov), or the density where there is none. */
export function drawsFollow(subject: Subject): void {
  const draws = sortedDraws(subject, 'draws', count);
  const broken = draws.find((x) => Number.isNaN(x));
  if (broken !== undefined) throw new Violation('draws must be numbers', broken, 'a number', look);
  if (subject.d.support.discrete) followMasses(subject, draws);
  // The distribution function of an angle is not measured from where its numbers begin.
  else if (subject.d.cdf && subject.d.support.name !== 'circle') followCdf(subject, draws);
  else followDensity(subject, draws);
}

function followCdf(subject: Subject, draws: Float64Array): void {
  const f = numbers(() => subject.d.cdf!(tf.tensor1d(Float32Array.from(draws))));
  let most = 0;
  f.forEach((v, i) => {
    most = Math.max(most, v - i / count, (i + 1) / count - v);
  });
  const statistic = Math.sqrt(count) * most;
  if (statistic <= kolmogorovLimit) return;
  throw new Violation(
    'draws must follow the distribution function',
    `√n D = ${statistic.toPrecision(4)} over ${count} draws`,
    `at most ${kolmogorovLimit.toPrecision(4)} (odds 1e-7)`,
    `${look}; or cdf`,
  );
}

function followDensity(subject: Subject, draws: Float64Array): void {
  // The pieces are cut at other draws than those counted, so that the counts are independent of the cuts.
  const levels = Array.from({ length: 49 }, (_, k) => (k + 1) / 50);
  const { cuts, pieces } = regionOf(subject, levels);
  const expected = pieceIntegrals(subject.d, pieces, () => 1, 1e-8).map((p) => p * count);
  const counts = expected.map(() => 0);
  let cell = 0;
  for (const x of draws) {
    while (cell < cuts.length && x > cuts[cell]!) cell++;
    counts[cell]!++;
  }
  chiSquared(counts, expected, 'draws must follow the density');
}

function followMasses(subject: Subject, draws: Float64Array): void {
  const expected = Array.from(masses(subject.d), (v) => Math.exp(v) * count);
  const counts = expected.map(() => 0);
  for (const x of draws) {
    if (x in counts) counts[x]!++;
    else throw new Violation('draws must bear mass', x, 'a point of the support', look);
  }
  chiSquared(counts, expected, 'draws must follow the masses');
}

/** Pearson's statistic, neighbours pooled until each expects ten, so that it is near enough to chi-squared. */
function chiSquared(counts: readonly number[], expected: readonly number[], must: string): void {
  const cells: { seen: number; expected: number }[] = [];
  let open = { seen: 0, expected: 0 };
  counts.forEach((seen, i) => {
    open.seen += seen;
    open.expected += expected[i]!;
    if (open.expected >= 10) {
      cells.push(open);
      open = { seen: 0, expected: 0 };
    }
  });
  const last = cells[cells.length - 1] ?? { seen: 0, expected: 0 };
  last.seen += open.seen;
  last.expected += open.expected;
  const statistic = cells.reduce((sum, c) => sum + (c.seen - c.expected) ** 2 / c.expected, 0);
  const degrees = cells.length - 1;
  // One cell alone: all mass at one point, as far as this many draws can tell.
  const chance = degrees > 0 ? gammaQ(degrees / 2, statistic / 2) : statistic < 30 ? 1 : 0;
  if (chance >= odds) return;
  throw new Violation(
    must,
    `χ² = ${statistic.toPrecision(4)} over ${degrees} degrees of freedom, odds ${chance.toPrecision(2)}`,
    'odds of at least 1e-7',
    `${look}; or logDensity`,
  );
}

const inside: Readonly<Record<string, (x: number) => boolean>> = {
  real: Number.isFinite,
  interval: Number.isFinite,
  ray: Number.isFinite,
  positive: (x) => x >= 0 && x < Number.POSITIVE_INFINITY,
  unitInterval: (x) => x >= 0 && x <= 1,
  circle: (x) => x >= -Math.PI && x <= Math.PI,
  binary: (x) => x === 0 || x === 1,
  count: (x) => Number.isInteger(x) && x >= 0,
  categories: (x) => Number.isInteger(x) && x >= 0,
};

/** Draws lie in the support, where the log density is a number above −∞. */
export function drawsInside(subject: Subject): void {
  const draws = sortedDraws(subject, 'draws', count);
  const { name } = subject.d.support;
  const stray = draws.find((x) => !inside[name]!(x));
  if (stray !== undefined)
    throw new Violation('draws must lie in the support', stray, `a point of ${name}`, `${look}; or support`);
  const scores = numbers(() => subject.d.logDensity(tf.tensor1d(Float32Array.from(draws))));
  const k = scores.findIndex((v) => !(v > Number.NEGATIVE_INFINITY));
  if (k >= 0)
    throw new Violation(
      `the log density of the draw ${draws[k]} must be a number above −∞`,
      scores[k]!,
      'a number',
      `${look}; or logDensity near the ends of the support`,
    );
}
