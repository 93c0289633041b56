// Compiled by AssemblyScript only. The one rounding to float32, kept inside an open support: a positive value
// that underflows becomes the smallest positive float32, one that overflows the largest finite one.

/** The smallest positive and the largest finite float32, and the largest ones below 1 and below π. */
const LEAST: f64 = 1.401298464324817e-45;
const MOST: f64 = 3.4028234663852886e38;
const BELOW_ONE: f64 = 0.999999940395355225;
const BELOW_PI: f64 = 3.1415925025939941;

// @ts-ignore: decorator
@inline
export function storeReal(at: usize, x: f64): void {
  store<f32>(at, <f32>min(max(x, -MOST), MOST));
}

// @ts-ignore: decorator
@inline
export function storePositive(at: usize, x: f64): void {
  store<f32>(at, <f32>min(max(x, LEAST), MOST));
}

// @ts-ignore: decorator
@inline
export function storeNegative(at: usize, x: f64): void {
  store<f32>(at, <f32>min(max(x, -MOST), -LEAST));
}

// @ts-ignore: decorator
@inline
export function storeUnit(at: usize, x: f64): void {
  store<f32>(at, <f32>min(max(x, LEAST), BELOW_ONE));
}

// @ts-ignore: decorator
@inline
export function storeAngle(at: usize, x: f64): void {
  store<f32>(at, <f32>min(max(x, -BELOW_PI), BELOW_PI));
}
