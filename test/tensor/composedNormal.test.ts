import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { erf, erfcx, erfcx_x } from '../../src/numeric/errorFunction.js';
import { logNormalCdf, logNormalCdf_x, normalCdf, normalDensity } from '../../src/numeric/normalCdf.js';
import { normalQuantile, normalQuantile_x } from '../../src/numeric/normalQuantile.js';
import {
  composedErf,
  composedErfcx,
  composedLogNormalCdf,
  composedNormalCdf,
  composedNormalDensity,
  composedNormalQuantile,
} from '../../src/tensor/composedNormal.js';

type Scalar = (x: number) => number;
const line = (from: number, to: number, count = 1500): number[] =>
  Array.from({ length: count }, (_, i) => from + ((to - from) * i) / (count - 1));

interface Row {
  readonly name: string;
  readonly composed: (x: tf.Tensor) => tf.Tensor;
  readonly value: Scalar;
  readonly slope: Scalar;
  readonly curvature: Scalar;
  readonly points: readonly number[];
  /** Relative errors: of the value, of the first and of the second derivative. */
  readonly bars: readonly [number, number, number];
}

// The bars are about twice what was measured. A slope through another scale of x rounds x first, which costs
// x² units; a quantile's second derivative contains the square of the first.
const rows: Row[] = [
  {
    name: 'φ',
    composed: composedNormalDensity,
    value: normalDensity,
    slope: (x) => -x * normalDensity(x),
    curvature: (x) => (x * x - 1) * normalDensity(x),
    points: line(-12.5, 12.5),
    bars: [5e-7, 5e-7, 2e-5],
  },
  {
    name: 'Φ',
    composed: composedNormalCdf,
    value: normalCdf,
    slope: normalDensity,
    curvature: (x) => -x * normalDensity(x),
    points: line(-12.9, 9),
    bars: [5e-7, 5e-7, 5e-7],
  },
  {
    name: 'erf',
    composed: composedErf,
    value: erf,
    slope: (x) => (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x),
    curvature: (x) => ((-4 * x) / Math.sqrt(Math.PI)) * Math.exp(-x * x),
    points: [...line(-4, 4), 1e-20, -1e-5],
    bars: [3e-7, 5e-6, 5e-6],
  },
  {
    name: 'erfcx',
    composed: composedErfcx,
    value: erfcx,
    slope: erfcx_x,
    curvature: (x) => 2 * erfcx(x) + 2 * x * erfcx_x(x),
    points: line(-5, 2),
    bars: [5e-6, 1e-5, 2e-4],
  },
  {
    name: 'log Φ',
    composed: composedLogNormalCdf,
    value: logNormalCdf,
    slope: logNormalCdf_x,
    curvature: (x) => -logNormalCdf_x(x) * (x + logNormalCdf_x(x)),
    points: [...line(-4, 8), ...line(-300, -4)],
    bars: [7e-7, 7e-7, Number.NaN],
  },
  {
    name: 'Φ⁻¹',
    composed: composedNormalQuantile,
    value: normalQuantile,
    slope: normalQuantile_x,
    curvature: (p) => normalQuantile(p) * normalQuantile_x(p) ** 2,
    points: [...line(1e-5, 1 - 1e-5), ...line(0.4999, 0.5001), 1e-38, 1e-20, 1e-10, 1 - 2 ** -24],
    bars: [7e-7, 2e-5, 4e-5],
  },
];

function worst(
  got: ArrayLike<number>,
  exact: Scalar,
  points: ArrayLike<number>,
): { error: number; at: number } {
  let result = { error: 0, at: Number.NaN };
  for (let i = 0; i < points.length; i++) {
    const truth = exact(points[i]!);
    // Near a zero of the result, and outside float32, relative accuracy is not asked for.
    if (Math.abs(truth) < 1e-36 || Math.abs(truth) > 1e37) continue;
    const error = Math.abs(got[i]! - truth) / Math.abs(truth);
    if (!(error <= result.error)) result = { error, at: points[i]! };
  }
  return result;
}

describe.each(rows)('$name from tensor operations', ({ composed, value, slope, curvature, points, bars }) => {
  it('keeps relative accuracy, derivatives too', () => {
    tf.tidy(() => {
      const x = tf.tensor1d([...points]);
      const rounded = x.dataSync();
      const first = (t: tf.Tensor): tf.Tensor => tf.grad((u) => composed(u).sum())(t);
      const results = [composed(x), first(x), tf.grad((t) => first(t).sum())(x)];
      [value, slope, curvature].forEach((exact, order) => {
        const bar = bars[order]!;
        if (Number.isNaN(bar)) return;
        const crossing = (v: number): number =>
          Math.abs(exact(v)) < 1e-3 * normalizer(order, v) ? 0 : exact(v);
        const { error, at } = worst(results[order]!.dataSync(), crossing, rounded);
        expect(error, `derivative ${order} at ${at}`).toBeLessThan(bar);
      });
    });
  });

  // The curvature of φ crosses zero at ±1, between terms as large as φ itself.
  function normalizer(order: number, v: number): number {
    return order === 2 && composed === composedNormalDensity ? (v * v + 1) * normalDensity(v) : 0;
  }
});

it('the curvature of log Φ is right where its terms do not cancel', () => {
  tf.tidy(() => {
    const x = tf.tensor1d(line(-3, 5, 200));
    const first = (t: tf.Tensor): tf.Tensor => tf.grad((u) => composedLogNormalCdf(u).sum())(t);
    const got = tf
      .grad((t) => first(t).sum())(x)
      .dataSync();
    const h = logNormalCdf_x;
    expect(worst(got, (v) => -h(v) * (v + h(v)), x.dataSync()).error).toBeLessThan(2e-5);
  });
});

it('the ends of the quantile are infinite, and outside there is none', () => {
  tf.tidy(() => {
    const got = composedNormalQuantile(tf.tensor1d([0, 1, -0.1, 1.1])).dataSync();
    expect(Array.from(got)).toEqual([-Infinity, Infinity, NaN, NaN]);
  });
});
