import { EULER } from './constants.js';

/** 1 − T of the fraction e^x E₁(x) = 1 / (x + 1 − T), T = 1 / (x + 3 − 4 / (x + 5 − …)); DLMF 6.9.1, even part. */
function tail(x: number): number {
  // From behind: at 1, where the most are needed, a hundred levels leave 1e-15.
  const levels = Math.ceil(12.0 + 100.0 / x);
  let t = 0.0;
  for (let k = levels; k > 0.0; k -= 1.0) t = (k * k) / (x + 2.0 * k + 1.0 - t);
  return t;
}

/**
 * e^x E₁(x) for x > 0, E₁(x) = ∫_x^∞ e^{−t} / t dt: about −log x near zero, 1/x far out.
 *
 * Up to 1 the series E₁(x) = −γ − log x − Σ (−x)^k / (k k!), DLMF 6.6.2; from there a continued fraction.
 */
export function scaledExponentialIntegral(x: number): number {
  if (x > 1.0) return x === Infinity ? 0.0 : 1.0 / (x + 1.0 - tail(x));
  let term = 1.0;
  let sum = 0.0;
  for (let k = 1.0; k < 22.0; k += 1.0) {
    term *= -x / k;
    sum += term / k;
  }
  return Math.exp(x) * (-EULER - Math.log(x) - sum);
}
