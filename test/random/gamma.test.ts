import { describe, expect, it } from 'vitest';
import { gammaDraws, logGammaDraws } from '../../src/random/noise.js';
import { stream } from '../../src/random/stream.js';
import {
  adLimit,
  andersonDarling,
  chiSquaredTails,
  kolmogorov,
  ksLimit,
  type Law,
  logGamma,
} from './laws.js';

const draws = 200_000;

/** A gamma variable is half a chi-squared one; far in the lower tail, the first terms of its series. */
function gammaLaw(shape: number): Law {
  return {
    lower: (x) => chiSquaredTails(2 * x, 2 * shape).lower,
    upper: (x) => chiSquaredTails(2 * x, 2 * shape).upper,
  };
}

function logGammaLaw(shape: number): Law {
  const law = gammaLaw(shape);
  const lower = (y: number) => (y < -30 ? Math.exp(shape * y - logGamma(shape + 1)) : law.lower(Math.exp(y)));
  return { lower, upper: (y) => (y < -30 ? 1 - lower(y) : law.upper(Math.exp(y))) };
}

describe.each([
  [0.5, 401],
  [1, 402],
  [2, 403],
  [30, 404],
])('gamma of shape %f', (shape, seed) => {
  const x = gammaDraws(stream(seed), new Float32Array(draws).fill(shape));
  it('follows its law', () => {
    expect(kolmogorov(x, gammaLaw(shape))).toBeLessThan(ksLimit); // false alarm 1e-6
    expect(andersonDarling(x, gammaLaw(shape))).toBeLessThan(adLimit); // 1e-6
  });
});

describe.each([
  [1e-3, 411],
  [1e-2, 412],
  [0.1, 413],
  [0.5, 414],
  [1, 415],
  [2, 416],
  [30, 417],
])('log gamma of shape %f', (shape, seed) => {
  const exact = Math.fround(shape);
  const y = logGammaDraws(stream(seed), new Float32Array(draws).fill(shape));
  it('follows its law, where the draw itself would be 0 as well', () => {
    expect(y.every((v) => Number.isFinite(v))).toBe(true);
    expect(kolmogorov(y, logGammaLaw(exact))).toBeLessThan(ksLimit); // false alarm 1e-6
    expect(andersonDarling(y, logGammaLaw(exact))).toBeLessThan(adLimit); // 1e-6
  });
});

it('gamma of shape 1e4 and 1e7: mean and variance', () => {
  for (const [shape, seed] of [
    [1e4, 421],
    [1e7, 422],
  ] as const) {
    const x = gammaDraws(stream(seed), new Float32Array(draws).fill(shape));
    const z = Float64Array.from(x, (v) => (v - shape) / Math.sqrt(shape));
    const mean = z.reduce((a, b) => a + b) / draws;
    const square = z.reduce((a, b) => a + b * b, 0) / draws;
    // Nearly standard normal: variances 1/n and 2/n; 4.892 standard deviations, 1e-6. float32 spacing at 1e7 is
    // 1, which adds 1/12 of a unit to a variance of 1e7.
    expect(Math.abs(mean) * Math.sqrt(draws)).toBeLessThan(4.892);
    expect((Math.abs(square - 1) * Math.sqrt(draws)) / Math.SQRT2).toBeLessThan(4.92);
  }
});

it('refuses what is not a shape', () => {
  for (const shape of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
    expect(() => gammaDraws(stream(1), Float32Array.of(1, shape))).toThrow(
      `gammaDraws: shape must be positive and finite; got ${shape} at element 1; check what computes the shape`,
    );
    expect(() => logGammaDraws(stream(1), Float32Array.of(shape))).toThrow(
      `logGammaDraws: shape must be positive and finite; got ${shape} at element 0; check what computes the shape`,
    );
  }
});
