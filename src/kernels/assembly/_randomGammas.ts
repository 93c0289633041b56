// Compiled by AssemblyScript only. One gamma draw of scale 1 (G. Marsaglia and W. W. Tsang, A simple method for
// generating gamma variables, ACM TOMS 26(3), 2000), as the product of a factor that neither underflows nor
// overflows a double and an exponential whose exponent is kept: below shape 1 the draw underflows, its
// logarithm does not.
import { nextExponential, nextNormal } from './_randomScalars';
import { nextCell } from './_randomWords';

/** The exponent that belongs to the factor that `gammaFactor` returned last. */
export let gammaExponent: f64 = 0.0;

/** Shape ≥ 1. */
function gammaFromOne(shape: f64): f64 {
  const d = shape - 1.0 / 3.0;
  const c = 1.0 / Math.sqrt(9.0 * d);
  while (true) {
    const x = nextNormal();
    const root = 1.0 + c * x;
    if (root <= 0.0) continue;
    const v = root * root * root;
    const u = nextCell();
    if (u < 1.0 - 0.0331 * x * x * x * x) return d * v;
    if (Math.log(u) < 0.5 * x * x + d * (1.0 - v + Math.log(v))) return d * v;
  }
}

/**
 * The draw is the factor times exp(gammaExponent). One of shape below 1 is one of shape + 1 times U^(1/shape)
 * (their section 6), and −log U is an exponential draw.
 */
export function gammaFactor(shape: f64): f64 {
  if (shape >= 1.0) {
    gammaExponent = 0.0;
    return gammaFromOne(shape);
  }
  const factor = gammaFromOne(shape + 1.0);
  gammaExponent = -nextExponential() / shape;
  return factor;
}

/** exp, spared for the exponent that most draws have. */
// @ts-ignore: decorator
@inline
export function expOf(exponent: f64): f64 {
  return exponent == 0.0 ? 1.0 : Math.exp(exponent);
}
