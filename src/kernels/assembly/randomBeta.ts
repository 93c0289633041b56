// Compiled by AssemblyScript only. Beta draws by their odds z/(1 − z) = g1/g2, a ratio of gamma draws: the odds
// keep what z loses next to 0 and to 1. The same words give the draw, its logarithm and its log odds.
import { drawGammaPairs, expOf, exponentOf, factorOf, GAMMAS } from './_randomGammas';
import { storeNegative, storePositive, storeReal, storeUnit } from './_randomRound';

const VALUE: i32 = 0;
const LOG: i32 = 1;
const LOG_ODDS: i32 = 2;
const ODDS: i32 = 3;

// @ts-ignore: decorator
@inline
function fillOdds(out: usize, n: i32, a: usize, b: usize, scales: usize, scaled: bool, what: i32): void {
  for (let start = 0; start < n; start += GAMMAS / 2) {
    const count = min(GAMMAS / 2, n - start);
    const offset = <usize>start << 2;
    drawGammaPairs(count, a + offset, b + offset);
    for (let i = 0; i < count; i++) {
      const at = offset + (<usize>i << 2);
      // The odds are the factor times exp(exponent).
      const first = factorOf(2 * i);
      const second = factorOf(2 * i + 1);
      const exponent = exponentOf(2 * i) - exponentOf(2 * i + 1);
      if (what == VALUE) {
        // Whichever exponential does not overflow: the odds' or their reciprocal's.
        const small = expOf(-Math.abs(exponent));
        const above = exponent > 0.0 ? first : first * small;
        storeUnit(out + at, above / (above + (exponent > 0.0 ? second * small : second)));
        continue;
      }
      const factor = (scaled ? <f64>load<f32>(scales + at) : 1.0) * (first / second);
      if (what == ODDS) storePositive(out + at, factor * expOf(exponent));
      else if (what == LOG_ODDS) storeReal(out + at, Math.log(factor) + exponent);
      else {
        // log z = −log1p(1/odds) = log odds − log1p(odds).
        const odds = factor * expOf(exponent);
        const small = odds < 1.0;
        storeNegative(
          out + at,
          small ? Math.log(factor) + exponent - Math.log1p(odds) : -Math.log1p(1.0 / odds),
        );
      }
    }
  }
}

export function fillBeta(out: usize, n: i32, a: usize, b: usize): void {
  fillOdds(out, n, a, b, 0, false, VALUE);
}

export function fillLogBeta(out: usize, n: i32, a: usize, b: usize): void {
  fillOdds(out, n, a, b, 0, false, LOG);
}

export function fillLogOddsBeta(out: usize, n: i32, a: usize, b: usize): void {
  fillOdds(out, n, a, b, 0, false, LOG_ODDS);
}

/** A beta draw's odds, scaled: with a and b half the degrees of freedom and scale b/a, an F draw. */
export function fillBetaPrime(out: usize, n: i32, a: usize, b: usize, scales: usize): void {
  fillOdds(out, n, a, b, scales, true, ODDS);
}

export function fillLogBetaPrime(out: usize, n: i32, a: usize, b: usize, scales: usize): void {
  fillOdds(out, n, a, b, scales, true, LOG_ODDS);
}
