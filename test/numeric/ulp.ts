/** From here on rounding to float32 gives infinity: halfway between the largest float32 and 2^128. */
export const overflow = 2 ** 128 - 2 ** 103;

/** The spacing of float32 at a value; 2^-149 for subnormals. */
export function ulp32(value: number): number {
  const size = Math.min(Math.abs(value), 2 ** 128 - 2 ** 104);
  if (size < 2 ** -126) return 2 ** -149;
  let exponent = Math.floor(Math.log2(size));
  // Math.log2 may round across a power of two.
  if (2 ** exponent > size) exponent -= 1;
  else if (2 ** (exponent + 1) <= size) exponent += 1;
  return 2 ** (exponent - 23);
}

/**
 * How far a float32 result lies from the exact value, in units of the float32 spacing there. Where the exact
 * value overflows float32, only the infinity of its sign is right (0, else Infinity); NaN scores Infinity.
 */
export function score(got: number, exact: number): number {
  if (Math.abs(exact) >= overflow) return got === Math.sign(exact) * Infinity ? 0 : Infinity;
  const error = Math.abs(got - exact) / ulp32(exact);
  return Number.isNaN(error) ? Infinity : error;
}
