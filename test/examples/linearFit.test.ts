import { expect, it } from 'vitest';
import { explained, leastSquares } from '../../docs/examples/orchard/linearFit.js';

const rows = [
  [0, 1],
  [1, 0],
  [2, 5],
  [3, 1],
  [5, 2],
];

it('finds the coefficients of an exact relation', () => {
  const y = rows.map(([a, b]) => 3 - 2 * a! + 0.5 * b!);
  const coefficients = leastSquares(rows, y);
  for (const [k, expected] of [3, -2, 0.5].entries()) expect(coefficients[k]).toBeCloseTo(expected, 10);
  expect(explained(coefficients, rows, y)).toBeCloseTo(1, 12);
});

it('leaves a residual that is orthogonal to every regressor', () => {
  const y = [4, -1, 2, 2, 7];
  const c = leastSquares(rows, y);
  const left = rows.map(([a, b], i) => y[i]! - (c[0]! + c[1]! * a! + c[2]! * b!));
  for (const column of [() => 1, (i: number) => rows[i]![0]!, (i: number) => rows[i]![1]!]) {
    expect(left.reduce((sum, r, i) => sum + r * column(i), 0)).toBeCloseTo(0, 10);
  }
});

it('passes over a regressor that says nothing new', () => {
  const y = [1, 2, 4, 5];
  const coefficients = leastSquares(
    y.map((v) => [3, v, 2 * v + 3]),
    y,
  );
  for (const [k, expected] of [0, 0, 1, 0].entries()) expect(coefficients[k]).toBeCloseTo(expected, 10);
});

it('is the mean without regressors, and explains nothing', () => {
  const coefficients = leastSquares([[], [], []], [1, 2, 6]);
  expect(coefficients).toEqual([3]);
  expect(explained(coefficients, [[], [], []], [1, 2, 6])).toBe(0);
});
