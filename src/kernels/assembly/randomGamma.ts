// Compiled by AssemblyScript only. Gamma draws and their reciprocals, a shape and a scale for each; the same
// words give the draw and its logarithm.
import { expOf, gammaExponent, gammaFactor } from './_randomGammas';
import { storePositive, storeReal } from './_randomRound';

// @ts-ignore: decorator
@inline
function at(array: usize, i: i32): f64 {
  return <f64>load<f32>(array + 4 * <usize>i);
}

export function fillGamma(out: usize, n: i32, shapes: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = gammaFactor(at(shapes, i));
    storePositive(out + 4 * <usize>i, factor * expOf(gammaExponent));
  }
}

export function fillLogGamma(out: usize, n: i32, shapes: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = gammaFactor(at(shapes, i));
    storeReal(out + 4 * <usize>i, Math.log(factor) + gammaExponent);
  }
}

// Products of a float32 scale and a factor stay inside the doubles, so one logarithm does for both.

export function fillScaledGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = at(scales, i) * gammaFactor(at(shapes, i));
    storePositive(out + 4 * <usize>i, factor * expOf(gammaExponent));
  }
}

export function fillLogScaledGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = at(scales, i) * gammaFactor(at(shapes, i));
    storeReal(out + 4 * <usize>i, Math.log(factor) + gammaExponent);
  }
}

export function fillInverseGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = at(scales, i) / gammaFactor(at(shapes, i));
    storePositive(out + 4 * <usize>i, factor * expOf(-gammaExponent));
  }
}

export function fillLogInverseGamma(out: usize, n: i32, shapes: usize, scales: usize): void {
  for (let i = 0; i < n; i++) {
    const factor = at(scales, i) / gammaFactor(at(shapes, i));
    storeReal(out + 4 * <usize>i, Math.log(factor) - gammaExponent);
  }
}
