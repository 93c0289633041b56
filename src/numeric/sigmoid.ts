import { softplus } from './softplus.js';

/** 1 / (1 + e^−x), the logistic function; relative accuracy is kept in the left tail. @kernel */
export function sigmoid(x: number): number {
  // e^−|x| never overflows, and the left tail is e^x itself instead of 1 minus something near 1.
  if (x >= 0.0) return 1.0 / (1.0 + Math.exp(-x));
  const e = Math.exp(x);
  return e / (1.0 + e);
}
export function sigmoid_x(x: number): number {
  const e = Math.exp(-Math.abs(x));
  return e / ((1.0 + e) * (1.0 + e));
}

/** log(1 / (1 + e^−x)) = −softplus(−x). @kernel */
export function logSigmoid(x: number): number {
  return -softplus(-x);
}
export function logSigmoid_x(x: number): number {
  return sigmoid(-x);
}
