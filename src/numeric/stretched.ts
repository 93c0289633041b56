/** scale · exp(y), which neither factor's overflow or underflow spoils. */
export function stretched(scale: number, y: number): number {
  const half = Math.exp(0.5 * y);
  return scale * half * half;
}
