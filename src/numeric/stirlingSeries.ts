/**
 * 1/(12x) − 1/(360x³) + …: Stirling's series, what log Γ(x) exceeds (x − ½) log x − x + ½ log 2π by, for x ≥ 6.
 *
 * Nine terms leave less than 1e-15 at x = 6. Source: DLMF 5.11.1.
 */
export function stirlingSeries(x: number): number {
  const r = 1.0 / x;
  const s = r * r;
  let p = 43867.0 / 244188.0;
  p = -3617.0 / 122400.0 + s * p;
  p = 1.0 / 156.0 + s * p;
  p = -691.0 / 360360.0 + s * p;
  p = 1.0 / 1188.0 + s * p;
  p = -1.0 / 1680.0 + s * p;
  p = 1.0 / 1260.0 + s * p;
  p = -1.0 / 360.0 + s * p;
  p = 1.0 / 12.0 + s * p;
  return r * p;
}

/** log x − 1/(2x) − ψ(x) = 1/(12x²) − 1/(120x⁴) + …, for x ≥ 6: minus the series' derivative. DLMF 5.11.2. */
export function digammaSeries(x: number): number {
  const r = 1.0 / x;
  const s = r * r;
  let p = 43867.0 / 14364.0;
  p = -3617.0 / 8160.0 + s * p;
  p = 1.0 / 12.0 + s * p;
  p = -691.0 / 32760.0 + s * p;
  p = 1.0 / 132.0 + s * p;
  p = -1.0 / 240.0 + s * p;
  p = 1.0 / 252.0 + s * p;
  p = -1.0 / 120.0 + s * p;
  p = 1.0 / 12.0 + s * p;
  return s * p;
}
