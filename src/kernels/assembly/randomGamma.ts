// Compiled by AssemblyScript only. Gamma draws and their reciprocals, a shape and a scale for each; the same
// words give the draw and its logarithm.
import { drawGammaBlock, expOf, exponentOf, factorOf, GAMMAS } from './_randomGammas';
import { storePositive, storeReal } from './_randomRound';

// @ts-ignore: decorator
@inline
function fillGammas(out: usize, n: i32, shapes: usize, scales: usize, scaled: bool, inverse: bool, log: bool): void {
  for (let start = 0; start < n; start += GAMMAS) {
    const count = min(GAMMAS, n - start);
    const offset = <usize>start << 2;
    drawGammaBlock(count, shapes + offset);
    for (let i = 0; i < count; i++) {
      const at = offset + (<usize>i << 2);
      // A product or quotient of a float32 scale and a factor stays inside the doubles: one logarithm does for both.
      const scale = scaled ? <f64>load<f32>(scales + at) : 1.0;
      const factor = inverse ? scale / factorOf(i) : scaled ? scale * factorOf(i) : factorOf(i);
      const exponent = inverse ? -exponentOf(i) : exponentOf(i);
      if (log) storeReal(out + at, Math.log(factor) + exponent);
      else storePositive(out + at, factor * expOf(exponent));
    }
  }
}

export function fillGamma(out: usize, n: i32, shapes: usize): void {
  fillGammas(out, n, shapes, 0, false, false, false);
}

export function fillLogGamma(out: usize, n: i32, shapes: usize): void {
  fillGammas(out, n, shapes, 0, false, false, true);
}

export function fillScaledGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  fillGammas(out, n, shapes, scales, true, false, false);
}

export function fillLogScaledGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  fillGammas(out, n, shapes, scales, true, false, true);
}

export function fillInverseGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  fillGammas(out, n, shapes, scales, true, true, false);
}

export function fillLogInverseGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  fillGammas(out, n, shapes, scales, true, true, true);
}
