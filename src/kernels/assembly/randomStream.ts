// Compiled by AssemblyScript only. What surrounds the making of draws.
export { closeStream, openStream } from './_randomWords';

/** The place of the first of `n` numbers that is not positive and finite, or −1. */
export function firstNotPositive(numbers: usize, n: i32): i32 {
  let i = 0;
  for (; i + 4 <= n; i += 4) {
    const four = v128.load(numbers + (<usize>i << 2));
    const good = v128.and(f32x4.gt(four, f32x4.splat(0.0)), f32x4.lt(four, f32x4.splat(Infinity)));
    if (!i32x4.all_true(good)) break;
  }
  for (; i < n; i++) {
    const one = load<f32>(numbers + (<usize>i << 2));
    if (!(one > 0.0 && one < Infinity)) return i;
  }
  return -1;
}
