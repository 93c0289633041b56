/** The log density outside a support: −∞; but NaN at NaN, which is no point at all. */
export function outside(x: number): number {
  return isNaN(x) ? NaN : -Infinity;
}
