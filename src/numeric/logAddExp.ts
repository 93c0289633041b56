import { LN2, LN2_LOW } from './constants.js';
import { log1mexp } from './log1mexp.js';
import { sigmoid } from './sigmoid.js';

/** log(e^a + e^b): adds two numbers that are given by their logarithms. */
export function logAddExp(a: number, b: number): number {
  if (a === b) return a + LN2 + LN2_LOW;
  return Math.max(a, b) + Math.log1p(Math.exp(-Math.abs(a - b)));
}
export function logAddExp_a(a: number, b: number): number {
  return a === b ? 0.5 : sigmoid(a - b);
}
export function logAddExp_b(a: number, b: number): number {
  return a === b ? 0.5 : sigmoid(b - a);
}

/** log(e^a − e^b) for a ≥ b: subtracts two numbers that are given by their logarithms; NaN for a < b. */
export function logSubExp(a: number, b: number): number {
  if (b === -Infinity) return a;
  return a + log1mexp(b - a);
}
export function logSubExp_a(a: number, b: number): number {
  return a < b ? NaN : -1.0 / Math.expm1(b - a);
}
export function logSubExp_b(a: number, b: number): number {
  return a < b ? NaN : -1.0 / Math.expm1(a - b);
}
