/**
 * exp(x) − 1 − x, to full relative accuracy; cancels to nothing near zero when written out.
 * Taylor series below 0.5 in magnitude, where twenty terms reach the last place; direct above.
 */
export function exponentialRemainder(x: number): number {
  if (x === Infinity) return x;
  if (!(Math.abs(x) <= 0.5)) return Math.expm1(x) - x;
  let term = 0.5 * x * x;
  let sum = 0.0;
  let n = 3.0;
  while (Math.abs(term) > 1e-18 * Math.abs(sum)) {
    sum += term;
    term *= x / n;
    n += 1.0;
    if (n > 25.0) break;
  }
  return sum;
}
