// Compiled by AssemblyScript only. Beta draws by their odds z/(1 − z) = g1/g2, a ratio of gamma draws: the odds
// keep what z loses next to 0 and to 1. The same words give the draw, its logarithm and its log odds.
import { expOf, gammaExponent, gammaFactor } from './_randomGammas';
import { storeNegative, storePositive, storeReal, storeUnit } from './_randomRound';

/** The odds are the factor that `oddsFactor` returned last, times exp(oddsExponent). */
let oddsExponent: f64 = 0.0;

function oddsFactor(a: f64, b: f64): f64 {
  const first = gammaFactor(a);
  oddsExponent = gammaExponent;
  const second = gammaFactor(b);
  oddsExponent -= gammaExponent;
  return first / second;
}

// @ts-ignore: decorator
@inline
function at(array: usize, i: i32): f64 {
  return <f64>load<f32>(array + 4 * <usize>i);
}

export function fillBeta(out: usize, n: i32, a: usize, b: usize): void {
  for (let i = 0; i < n; i++) {
    const odds = oddsFactor(at(a, i), at(b, i)) * expOf(oddsExponent);
    storeUnit(out + 4 * <usize>i, odds == Infinity ? 1.0 : odds / (1.0 + odds));
  }
}

/** log z = −log1p(1/odds): where the odds are below 1, log odds − log1p(odds). */
export function fillLogBeta(out: usize, n: i32, a: usize, b: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = oddsFactor(at(a, i), at(b, i));
    const odds = factor * expOf(oddsExponent);
    const value = odds < 1.0 ? Math.log(factor) + oddsExponent - Math.log1p(odds) : -Math.log1p(1.0 / odds);
    storeNegative(out + 4 * <usize>i, value);
  }
}

export function fillLogOddsBeta(out: usize, n: i32, a: usize, b: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = oddsFactor(at(a, i), at(b, i));
    storeReal(out + 4 * <usize>i, Math.log(factor) + oddsExponent);
  }
}

/** A beta draw's odds, scaled: with a and b half the degrees of freedom and scale b/a, an F draw. */
export function fillBetaPrime(out: usize, n: i32, a: usize, b: usize, scales: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = at(scales, i) * oddsFactor(at(a, i), at(b, i));
    storePositive(out + 4 * <usize>i, factor * expOf(oddsExponent));
  }
}

export function fillLogBetaPrime(out: usize, n: i32, a: usize, b: usize, scales: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = at(scales, i) * oddsFactor(at(a, i), at(b, i));
    storeReal(out + 4 * <usize>i, Math.log(factor) + oddsExponent);
  }
}
