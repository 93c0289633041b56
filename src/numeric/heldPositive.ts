/**
 * A draw kept inside the open positive half line once it is rounded: one that underflows float32 becomes its
 * smallest positive number, one that overflows the largest finite one.
 */
export function heldPositive(x: number): number {
  return Math.min(Math.max(x, 1.401298464324817e-45), 3.4028234663852886e38);
}
