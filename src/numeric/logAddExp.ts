import { LN2, LN2_LOW } from './constants.js';
import { log1mexp } from './log1mexp.js';
import { sigmoid } from './sigmoid.js';

/**
 * log(e^a + e^b): adds two numbers that are given by their logarithms. @kernel
 * @example
 * ```ts
 * import { logAddExp } from 'leadline/numeric';
 * console.log(logAddExp(-1000, -1001).toPrecision(6));
 * // -999.687
 * ```
 */
export function logAddExp(a: number, b: number): number {
  if (a === b) return a + LN2 + LN2_LOW;
  return Math.max(a, b) + Math.log1p(Math.exp(-Math.abs(a - b)));
}
/**
 * The partial derivative of `logAddExp` in `a`.
 * @example
 * ```ts
 * import { logAddExp_a } from 'leadline/numeric';
 * console.log(logAddExp_a(-1000, -1001).toPrecision(6));
 * // 0.731059
 * ```
 */
export function logAddExp_a(a: number, b: number): number {
  return a === b ? 0.5 : sigmoid(a - b);
}
/**
 * The partial derivative of `logAddExp` in `b`.
 * @example
 * ```ts
 * import { logAddExp_b } from 'leadline/numeric';
 * console.log(logAddExp_b(-1000, -1001).toPrecision(6));
 * // 0.268941
 * ```
 */
export function logAddExp_b(a: number, b: number): number {
  return a === b ? 0.5 : sigmoid(b - a);
}

/**
 * log(e^a − e^b) for a ≥ b: subtracts two numbers that are given by their logarithms; NaN for a < b. @kernel
 * @example
 * ```ts
 * import { logSubExp } from 'leadline/numeric';
 * console.log(logSubExp(-1000, -1001).toPrecision(6));
 * // -1000.46
 * ```
 */
export function logSubExp(a: number, b: number): number {
  if (b === -Infinity) return a;
  return a + log1mexp(b - a);
}
/**
 * The partial derivative of `logSubExp` in `a`.
 * @example
 * ```ts
 * import { logSubExp_a } from 'leadline/numeric';
 * console.log(logSubExp_a(-1000, -1001).toPrecision(6));
 * // 1.58198
 * ```
 */
export function logSubExp_a(a: number, b: number): number {
  return a < b ? NaN : -1.0 / Math.expm1(b - a);
}
/**
 * The partial derivative of `logSubExp` in `b`.
 * @example
 * ```ts
 * import { logSubExp_b } from 'leadline/numeric';
 * console.log(logSubExp_b(-1000, -1001).toPrecision(6));
 * // -0.581977
 * ```
 */
export function logSubExp_b(a: number, b: number): number {
  return a < b ? NaN : -1.0 / Math.expm1(a - b);
}
