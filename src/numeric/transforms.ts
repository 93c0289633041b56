// Changes of parametrisation, in double precision: each turns a parameter as the user gave it into the one
// that a family's formulas read.

/** exp(v / 2): a log variance to a standard deviation. @kernel */
export function expHalf(v: number): number {
  return Math.exp(0.5 * v);
}
export function expHalf_v(v: number): number {
  return 0.5 * Math.exp(0.5 * v);
}

/** exp(v): a logarithm to what it is the logarithm of. @kernel */
export function exponential(v: number): number {
  return Math.exp(v);
}
export function exponential_v(v: number): number {
  return Math.exp(v);
}

/** √v: a variance to a standard deviation. @kernel */
export function squareRoot(v: number): number {
  return Math.sqrt(v);
}
export function squareRoot_v(v: number): number {
  return 0.5 / Math.sqrt(v);
}

/** 1 / √v: a precision to a standard deviation. @kernel */
export function inverseSquareRoot(v: number): number {
  return 1.0 / Math.sqrt(v);
}
export function inverseSquareRoot_v(v: number): number {
  return -0.5 / (v * Math.sqrt(v));
}

/** 1 / v: a scale to a rate, or a rate to a scale. @kernel */
export function reciprocal(v: number): number {
  return 1.0 / v;
}
export function reciprocal_v(v: number): number {
  return -1.0 / (v * v);
}

/** exp(−v): a log rate to a scale, or a log scale to a rate. @kernel */
export function exponentialReciprocal(v: number): number {
  return Math.exp(-v);
}
export function exponentialReciprocal_v(v: number): number {
  return -Math.exp(-v);
}

/** v / 2: degrees of freedom to a gamma's shape. @kernel */
export function half(v: number): number {
  return 0.5 * v;
}
export function half_v(_v: number): number {
  return 0.5;
}

/** log v: for parameters that a formula reads as logarithms. @kernel */
export function logarithm(v: number): number {
  return Math.log(v);
}
export function logarithm_v(v: number): number {
  return 1.0 / v;
}

/** log(v / (1 − v)): a probability to its log odds; by log1p near one half, where it crosses zero. @kernel */
export function logOdds(v: number): number {
  const w = 1.0 - v;
  return v > 0.25 && v < 0.75 ? Math.log1p((v - w) / w) : Math.log(v / w);
}
export function logOdds_v(v: number): number {
  return 1.0 / (v * (1.0 - v));
}
