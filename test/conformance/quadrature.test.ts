import { expect, test } from 'vitest';
import { between, beyond, integrate, type Piece, towards } from '../../src/conformance/quadrature.js';

const over = (f: (x: number) => number, pieces: Piece[], tolerance = 1e-12) =>
  integrate((x) => x.map(f), pieces, tolerance).reduce((a, b) => a + b, 0);

test('one stretch of the rule is exact for polynomials up to degree 22', () => {
  for (let degree = 0; degree <= 22; degree++) {
    // With such a tolerance nothing is halved: this is the bare rule. Doubles leave a few units in the last place.
    expect(
      over((x) => x ** degree, [between(-1, 2)], 1e30) /
        ((2 ** (degree + 1) - (-1) ** (degree + 1)) / (degree + 1)),
    ).toBeCloseTo(1, 13);
  }
  expect(Math.abs(over((x) => x ** 40, [between(-1, 1)], 1e30) * 20.5 - 1)).toBeGreaterThan(1e-10);
});

test('halving where the rules differ resolves jumps, singular ends and tails', () => {
  expect(over((x) => (x > 1 / 3 ? 1 : 0), [between(0, 1)], 1e-9)).toBeCloseTo(2 / 3, 7);
  expect(over((x) => x ** -0.9, [towards(2, 0)], 1e-10)).toBeCloseTo(10 * 2 ** 0.1, 6);
  expect(over((x) => 1 / (1 + x * x), [beyond(0, -1), beyond(0, 1)])).toBeCloseTo(Math.PI, 9);
  expect(over((x) => Math.exp(-x * x), [beyond(1, -3), beyond(1, 3)])).toBeCloseTo(Math.sqrt(Math.PI), 9);
  expect(over((x) => 1 / (2 * x ** 1.5), [beyond(1, 1)], 1e-10)).toBeCloseTo(1, 7);
});

test('a NaN comes through, and noise does not keep it running', () => {
  expect(over(() => Number.NaN, [between(0, 1)])).toBeNaN();
  let evaluations = 0;
  const rough = (x: number) => {
    evaluations++;
    return 1 + 1e-6 * Math.sin(1e9 * x);
  };
  expect(over(rough, [between(0, 1)])).toBeCloseTo(1, 5);
  expect(evaluations).toBeLessThan(200_000);
});
