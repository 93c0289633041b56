import '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs';
import { beforeEach, describe, expect, it } from 'vitest';
import { categorical, multivariateNormal, stream } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import { factoriesOf } from '../conformance/factories.js';
import { entries } from '../families/entry.js';
import { chiSquaredOdds, kolmogorov, ksLimit, laws, normalLimit, oneInAMillion } from '../random/laws.js';
import { call, scalars, vectors } from './samples.js';

type Scalar = (...values: number[]) => number;
const count = 100_000;

// Distribution and quantile functions in double precision, each held to mpmath elsewhere.
const cdfs: Record<string, Scalar> = {
  normal: formulas.normalCdfOf.value,
  logNormal: formulas.logNormalCdfOf.value,
  laplace: formulas.laplaceCdf.value,
  logistic: formulas.logisticCdf.value,
  uniform: formulas.uniformCdf.value,
  exponential: formulas.exponentialCdf.value,
  bernoulli: formulas.bernoulliCdf.value,
  poisson: formulas.poissonCdf.value,
  ...Object.fromEntries(Object.entries(entries).map(([family, { cdf }]) => [family, cdf])),
};
const quantiles: Record<string, Scalar> = {
  normal: formulas.normalQuantileOf.value,
  logNormal: formulas.logNormalQuantileOf.value,
  laplace: formulas.laplaceQuantile.value,
  logistic: formulas.logisticQuantile.value,
  uniform: formulas.uniformQuantile.value,
  exponential: formulas.exponentialQuantile.value,
  ...Object.fromEntries(Object.entries(entries).map(([family, { quantile }]) => [family, quantile])),
};
const seeds: Record<string, number> = {
  normal: 8101,
  logNormal: 8102,
  laplace: 8103,
  logistic: 8104,
  uniform: 8105,
  exponential: 8106,
  bernoulli: 8107,
  poisson: 8108,
  ...Object.fromEntries(Object.entries(entries).map(([family, { seed }]) => [family, seed])),
};

beforeEach(async () => {
  await tf.setBackend('cpu');
});

it('every family that the library exports is drawn from here', () => {
  expect(Object.keys({ ...scalars, ...vectors }).sort()).toEqual(factoriesOf('src/index.ts').sort());
  expect(Object.keys(seeds).sort()).toEqual(Object.keys(scalars).sort());
});

/** Column k of a [rows, columns] array. */
function column(data: ArrayLike<number>, columns: number, k: number): Float32Array {
  return Float32Array.from({ length: data.length / columns }, (_, i) => data[i * columns + k]!);
}

describe.each(Object.entries(scalars))('%s', (family, { make, members, parametrizations }) => {
  const names = Object.keys(members);
  const parameters = (k: number): number[] => names.map((name) => members[name]![k]!);
  const discrete = make({ ...members }).support.discrete;

  // √n D > 2.694 with odds 1e-6 (Kolmogorov), χ² tails beyond 1e-6 on either side: three members each.
  it(`draws follow the distribution function (${discrete ? 'chi-squared' : 'Kolmogorov–Smirnov'})`, () => {
    const drawn = tf.tidy(() => make({ ...members }).draw(stream(seeds[family]!), count));
    expect(drawn.shape).toEqual([count, 3]);
    expect(drawn.dtype).toBe('float32');
    const data = drawn.dataSync();
    drawn.dispose();
    for (let k = 0; k < 3; k++) {
      const own = column(data, 3, k);
      const below = (x: number): number => cdfs[family]!(x, ...parameters(k));
      if (!discrete) {
        expect(kolmogorov(own, { lower: below, upper: (x) => 1 - below(x) })).toBeLessThan(ksLimit);
        continue;
      }
      const most = own.reduce((a, b) => Math.max(a, b));
      const observed = new Array<number>(most + 2).fill(0);
      for (const x of own) observed[x]!++;
      const expected = observed.map(
        (_, x) => count * ((x > most ? 1 : below(x)) - (x > 0 ? below(x - 1) : 0)),
      );
      expect(chiSquaredOdds(observed, expected)).toBeGreaterThan(oneInAMillion);
    }
  });

  it('draws are the same bits on both backends, one by one or many', async () => {
    const bits: Float32Array[] = [];
    for (const backend of ['cpu', 'wasm']) {
      await tf.setBackend(backend);
      const d = make({ ...members });
      tf.tidy(() => {
        bits.push(Float32Array.from(d.draw(stream(5), 40).dataSync()));
        const { value, logDensity } = d.drawScored(stream(5), 40);
        bits.push(Float32Array.from(value.dataSync()));
        expect(Array.from(logDensity.dataSync())).toEqual(Array.from(d.logDensity(value).dataSync()));
        expect(d.draw(stream(5)).shape).toEqual([3]);
        expect(d.draw(stream(5), 0).shape).toEqual([0, 3]);
      });
    }
    for (const other of bits.slice(1)) expect(other).toEqual(bits[0]);
  });

  if (discrete) {
    it('draws carry no gradient, as the route says', () => {
      const d = make({ ...members });
      expect(d.route).toBe('none');
      tf.tidy(() => {
        const name = names[0]!;
        const draw = (t: tf.Tensor): tf.Tensor =>
          make({ ...members, [name]: t })
            .draw(stream(1))
            .sum();
        expect(() => tf.grad(draw)(tf.tensor1d([...members[name]!]))).toThrow('Cannot compute gradient');
      });
    });
    return;
  }

  // Per draw the gradient of f(z) in the parameter; their mean beside the derivative of E f by quadrature over
  // the quantile function. |z| > 4.892 with odds 1e-6.
  // On a circle the function has to close, or its jump is missed.
  const circular: [string, Scalar, (z: tf.Tensor) => tf.Tensor][] = [
    ['90 sin z', (z) => 90 * Math.sin(z), (z) => tf.mul(90, tf.sin(z))],
    [
      '90 exp(cos(z − 1))',
      (z) => 90 * Math.exp(Math.cos(z - 1)),
      (z) => tf.mul(90, tf.exp(tf.cos(tf.sub(z, 1)))),
    ],
    [
      'cos z + 9 sin 2z',
      (z) => Math.cos(z) + 9 * Math.sin(2 * z),
      (z) => tf.add(tf.cos(z), tf.mul(9, tf.sin(tf.mul(2, z)))),
    ],
  ];
  const linear: [string, Scalar, (z: tf.Tensor) => tf.Tensor][] = [
    entries[family]?.heavyTailed
      ? ['atan(z + 1)', (z) => Math.atan(z + 1), (z) => tf.atan(tf.add(z, 1))]
      : ['sin z + z / 2', (z) => Math.sin(z) + z / 2, (z) => tf.add(tf.sin(z), tf.div(z, 2))],
    ['exp(−z² / 4)', (z) => Math.exp((-z * z) / 4), (z) => tf.exp(tf.div(tf.square(z), -4))],
    ['tanh(z − 1/5)', (z) => Math.tanh(z - 0.2), (z) => tf.tanh(tf.sub(z, 0.2))],
  ];
  const integrands = make({ ...members }).support.name === 'circle' ? circular : linear;
  const first = parametrizations[0] as Record<string, number>;
  it.each(names.flatMap((name) => integrands.map((t) => [name, ...t] as const)))(
    'the pathwise gradient in %s of E[%s] is unbiased',
    (name, _title, f, onTensors) => {
      const expectation = (value: number): number => {
        const cells = 40_000;
        const own = names.map((n) => (n === name ? value : first[n]!));
        let sum = 0;
        for (let i = 0; i < cells; i++) sum += f(quantiles[family]!((i + 0.5) / cells, ...own));
        return sum / cells;
      };
      const h = 1e-4;
      const exact = (expectation(first[name]! + h) - expectation(first[name]! - h)) / (2 * h);
      tf.tidy(() => {
        const objective = (t: tf.Tensor): tf.Tensor =>
          onTensors(make({ ...first, [name]: t }).draw(stream(seeds[family]! + 50))).sum();
        const each = Float32Array.from(
          tf
            .grad(objective)(tf.fill([count], first[name]!))
            .dataSync(),
        );
        const mean = each.reduce((a, b) => a + b, 0) / count;
        const variance = each.reduce((a, b) => a + (b - mean) ** 2, 0) / (count - 1);
        const z = (mean - exact) / Math.sqrt(variance / count + 1e-12);
        expect(Math.abs(z), `mean ${mean}, exact ${exact}`).toBeLessThan(normalLimit);
        expect(Math.abs(exact)).toBeGreaterThan(1e-3);
      });
    },
  );

  it('a detached distribution draws the same numbers without a gradient', () => {
    tf.tidy(() => {
      const d = make({ ...members });
      expect(Array.from(d.detached().draw(stream(3)).dataSync())).toEqual(
        Array.from(d.draw(stream(3)).dataSync()),
      );
      for (const name of names) {
        const draw = (t: tf.Tensor): tf.Tensor =>
          make({ ...members, [name]: t })
            .detached()
            .draw(stream(1))
            .sum();
        expect(() => tf.grad(draw)(tf.tensor1d([...members[name]!]))).toThrow('Cannot compute gradient');
      }
    });
  });
});

describe('categorical', () => {
  // χ² tails beyond 1e-6 on either side.
  it('draws follow the probabilities (chi-squared)', () => {
    tf.tidy(() => {
      const rows = [
        [0.1, 0.2, 0.3, 0.4],
        [0.97, 0.01, 0, 0.02],
      ];
      const drawn = categorical({ probabilities: rows }).draw(stream(8109), count);
      expect(drawn.shape).toEqual([count, 2]);
      expect(drawn.dtype).toBe('int32');
      rows.forEach((row, k) => {
        const observed = [0, 0, 0, 0];
        for (const x of column(drawn.dataSync(), 2, k)) observed[x]!++;
        row.forEach((p, label) => {
          if (p === 0) expect(observed[label]).toBe(0);
        });
        const possible = row.flatMap((p, label) => (p > 0 ? [label] : []));
        const odds = chiSquaredOdds(
          possible.map((label) => observed[label]!),
          possible.map((label) => count * row[label]!),
        );
        expect(odds).toBeGreaterThan(oneInAMillion);
      });
    });
  });

  it('draws carry no gradient', () => {
    tf.tidy(() => {
      const draw = (t: tf.Tensor): tf.Tensor => categorical({ logits: t }).draw(stream(1)).toFloat().sum();
      expect(() => tf.grad(draw)(tf.tensor1d([0, 1]))).toThrow('Cannot compute gradient');
    });
  });
});

describe('multivariate normal', () => {
  const mean = [1, -2, 0.5];
  const factor = [
    [1, 0, 0],
    [0.8, 0.5, 0],
    [-2, 1, 3],
  ];

  // Whitened coordinates, and their sum, whose law is normal only if they do not depend on each other.
  it('draws follow the law (Kolmogorov–Smirnov of whitened coordinates and of sums)', () => {
    tf.tidy(() => {
      const drawn = multivariateNormal({ mean, covarianceFactor: factor }).draw(stream(8110), count);
      expect(drawn.shape).toEqual([count, 3]);
      const data = drawn.dataSync();
      const white = [0, 1, 2].map(() => new Float32Array(count));
      const sums = [0, 1, 2].map(() => new Float32Array(count));
      for (let i = 0; i < count; i++) {
        const y: number[] = [];
        for (let r = 0; r < 3; r++) {
          let rest = data[3 * i + r]! - mean[r]!;
          for (let c = 0; c < r; c++) rest -= factor[r]![c]! * y[c]!;
          y.push(rest / factor[r]![r]!);
          white[r]![i] = y[r]!;
        }
        [
          [0, 1],
          [0, 2],
          [1, 2],
        ].forEach(([a, b], k) => {
          sums[k]![i] = (y[a!]! + y[b!]!) * Math.SQRT1_2;
        });
      }
      for (const sample of [...white, ...sums]) expect(kolmogorov(sample, laws.normal)).toBeLessThan(ksLimit);
    });
  });

  // E[(a·x)²] has the exact gradient 2 a (a·mean) in the mean and 2 a (Lᵀa)ᵀ in the factor. |z| < 4.892 each.
  it('the pathwise gradient is unbiased', () => {
    const n = 50_000;
    const a = [0.5, -1, 0.25];
    const dot = a.reduce((s, v, i) => s + v * mean[i]!, 0);
    const projected = [0, 1, 2].map((c) => a.reduce((s, v, r) => s + v * (factor[r]![c] ?? 0), 0));
    tf.tidy(() => {
      const objective = (m: tf.Tensor, l: tf.Tensor): tf.Tensor =>
        tf
          .square(
            tf.sum(tf.mul(multivariateNormal({ mean: m, covarianceFactor: l }).draw(stream(8111)), a), -1),
          )
          .sum();
      const means = tf.tile(tf.tensor2d([mean]), [n, 1]);
      const factors = tf.tile(tf.tensor3d([factor]), [n, 1, 1]);
      const [gm, gl] = tf.grads(objective)([means, factors]);
      const check = (all: ArrayLike<number>, width: number, at: number, exact: number): void => {
        const each = column(all, width, at);
        const average = each.reduce((s, v) => s + v, 0) / n;
        const variance = each.reduce((s, v) => s + (v - average) ** 2, 0) / (n - 1);
        expect(Math.abs(average - exact) / Math.sqrt(variance / n)).toBeLessThan(normalLimit);
      };
      a.forEach((v, i) => {
        check(gm!.dataSync(), 3, i, 2 * v * dot);
      });
      a.forEach((v, r) => {
        for (let c = 0; c <= r; c++) check(gl!.dataSync(), 9, 3 * r + c, 2 * v * projected[c]!);
      });
    });
  });

  it('nothing above the diagonal is drawn with', () => {
    tf.tidy(() => {
      const filled = factor.map((row, r) => row.map((v, c) => (c > r ? 99 : v)));
      const [one, other] = [factor, filled].map((covarianceFactor) =>
        multivariateNormal({ mean, covarianceFactor }).draw(stream(2), 5).dataSync(),
      );
      expect(other).toEqual(one);
      expect(
        call(multivariateNormal({ mean, covarianceFactor: filled }), 'variance').dataSync()[2],
      ).toBeCloseTo(14, 5);
    });
  });
});
