import * as tf from '@tensorflow/tfjs';
import { masses, pieceIntegrals, regionOf } from '../expectation.js';
import { requireClose, Violation } from '../lawError.js';
import { between, beyond, towards } from '../quadrature.js';
import { logDensityAt, numbers, type Subject } from '../subject.js';

const probabilities = Float32Array.of(1e-4, 0.01, 0.1, 0.25, 0.5, 0.75, 0.9, 0.99, 0.9999);

/** The distribution function rises by the integral of the density. Within 1e-4, as for the integral of it all. */
export function cdfIsIntegral(subject: Subject): void {
  const { d } = subject;
  const { cuts, pieces } = regionOf(subject);
  const f = numbers(() => d.cdf!(tf.tensor1d(Float32Array.from(cuts))));
  let sum = 0;
  pieceIntegrals(d, pieces.slice(0, -1), () => 1, 1e-7).forEach((p, k) => {
    sum += p;
    requireClose(
      f[k]!,
      sum,
      1e-4,
      `the distribution function at ${cuts[k]} must be the integral of the density up to there`,
      'cdf, where the density integrates to one',
    );
  });
}

/** The distribution function at whole numbers, and between them, is the sum of the masses so far. */
export function cdfIsSum(subject: Subject): void {
  const { d } = subject;
  const logP = logDensityAt(
    d,
    Array.from({ length: 40 }, (_, k) => k),
  );
  const f = numbers(() =>
    d.cdf!(tf.tensor1d([-1, -0.5, ...Array.from(logP, (_, k) => [k, k + 0.5]).flat()])),
  );
  let sum = 0;
  const must = (x: number) => `the distribution function at ${x} must be the sum of the masses up to there`;
  requireClose(f[0]!, 0, 0, must(-1), 'cdf below zero');
  requireClose(f[1]!, 0, 0, must(-0.5), 'cdf below zero');
  logP.forEach((v, k) => {
    sum += Math.exp(v);
    requireClose(f[2 + 2 * k]!, sum, 1e-5, must(k), 'cdf: whether it counts the point itself');
    requireClose(f[3 + 2 * k]!, sum, 1e-5, must(k + 0.5), 'cdf between whole numbers');
  });
}

/**
 * The quantile inverts the distribution function, or the integral of the density where there is none. Within the
 * rounding of p, of the cdf, and of x to float32: 2⁻²² (1 + |x| p(x)), or 1e-4 for an integral.
 */
export function quantileInverts(subject: Subject): void {
  const { d } = subject;
  const x = numbers(() => d.quantile!(tf.tensor1d(probabilities)));
  const density = logDensityAt(d, x).map(Math.exp);
  const back = d.cdf ? numbers(() => d.cdf!(tf.tensor1d(Float32Array.from(x)))) : integralsUpTo(subject, x);
  probabilities.forEach((p, k) => {
    requireClose(
      back[k]!,
      p,
      d.cdf ? 2 ** -22 * (1 + Math.abs(x[k]! * density[k]!)) : 1e-4,
      `the probability below quantile(${p}) = ${x[k]} must be ${p}`,
      d.cdf ? 'quantile, or cdf' : 'quantile, where the density integrates to one',
    );
  });
}

/** The quantile of a counted distribution is the least point with at least that probability up to it. */
export function quantileOfCounts(subject: Subject): void {
  const { d } = subject;
  const x = numbers(() => d.quantile!(tf.tensor1d(probabilities)));
  const upTo = (shift: number) =>
    d.cdf
      ? numbers(() => d.cdf!(tf.tensor1d(Float32Array.from(x, (v) => v - shift))))
      : x.map((v) => sumUpTo(subject, v - shift));
  const [at, before] = [upTo(0), upTo(1)];
  probabilities.forEach((p, k) => {
    if (at[k]! >= p - 1e-6 && before[k]! < p + 1e-6) return;
    throw new Violation(
      `quantile(${p}) must be the least point with at least that probability up to it`,
      `${x[k]}, with ${at[k]} up to it and ${before[k]} before it`,
      `${p} between the two`,
      'quantile, or cdf',
    );
  });
}

function sumUpTo(subject: Subject, x: number): number {
  return masses(subject.d).reduce((sum, v, k) => (k <= x ? sum + Math.exp(v) : sum), 0);
}

/** The integral of the density up to each of ascending points. */
function integralsUpTo(subject: Subject, x: Float64Array): number[] {
  const { d } = subject;
  const { spread } = regionOf(subject);
  const start = x[0]!;
  const lowest =
    d.support.name === 'positive' || d.support.name === 'unitInterval'
      ? towards(start, 0)
      : beyond(start, -spread);
  const pieces = [lowest, ...Array.from(x.subarray(1), (end, k) => between(x[k]!, end))];
  let sum = 0;
  return pieceIntegrals(d, pieces, () => 1, 1e-7).map((p) => {
    sum += p;
    return sum;
  });
}
