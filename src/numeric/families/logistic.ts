// The logistic distribution in double precision, with z = (x − location) / scale.
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 23.

const piSquaredThird = 3.28986813369645287294;

/** Log density, −|z| − 2 log(1 + exp(−|z|)) − log scale; the absolute value is exact by symmetry. @kernel */
export function logisticLogDensity(x: number, location: number, scale: number): number {
  const z = Math.abs(x - location) / scale;
  return -z - 2.0 * Math.log1p(Math.exp(-z)) - Math.log(scale);
}
export function logisticLogDensity_x(x: number, location: number, scale: number): number {
  return -Math.tanh((0.5 * (x - location)) / scale) / scale;
}
export function logisticLogDensity_location(x: number, location: number, scale: number): number {
  return Math.tanh((0.5 * (x - location)) / scale) / scale;
}
export function logisticLogDensity_scale(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  return (z * Math.tanh(0.5 * z) - 1.0) / scale;
}

/** Variance, π² scale² / 3. @kernel */
export function logisticVariance(scale: number): number {
  return piSquaredThird * scale * scale;
}
export function logisticVariance_scale(scale: number): number {
  return 2.0 * piSquaredThird * scale;
}

/** Entropy, log scale + 2. @kernel */
export function logisticEntropy(scale: number): number {
  return Math.log(scale) + 2.0;
}
export function logisticEntropy_scale(scale: number): number {
  return 1.0 / scale;
}

function standardCdf(z: number): number {
  if (z >= 0.0) return 1.0 / (1.0 + Math.exp(-z));
  const e = Math.exp(z);
  return e / (1.0 + e);
}

function standardDensity(z: number): number {
  const e = Math.exp(-Math.abs(z));
  return e / ((1.0 + e) * (1.0 + e));
}

/** Distribution function, 1 / (1 + exp(−z)). @kernel */
export function logisticCdf(x: number, location: number, scale: number): number {
  return standardCdf((x - location) / scale);
}
export function logisticCdf_x(x: number, location: number, scale: number): number {
  return standardDensity((x - location) / scale) / scale;
}
export function logisticCdf_location(x: number, location: number, scale: number): number {
  return -standardDensity((x - location) / scale) / scale;
}
export function logisticCdf_scale(x: number, location: number, scale: number): number {
  const z = (x - location) / scale;
  return (-z * standardDensity(z)) / scale;
}

// Log odds of p; near one half the ratio is near 1, where log1p keeps the accuracy.
function standardQuantile(p: number): number {
  const q = 1.0 - p;
  return p > 0.25 && p < 0.75 ? Math.log1p((p - q) / q) : Math.log(p) - Math.log(q);
}

/** Quantile, location + scale · log(p / (1 − p)). @kernel */
export function logisticQuantile(p: number, location: number, scale: number): number {
  return location + scale * standardQuantile(p);
}
export function logisticQuantile_p(p: number, _location: number, scale: number): number {
  return scale / (p * (1.0 - p));
}
export function logisticQuantile_location(_p: number, _location: number, _scale: number): number {
  return 1.0;
}
export function logisticQuantile_scale(p: number, _location: number, _scale: number): number {
  return standardQuantile(p);
}
