/**
 * ψ′(x) − ψ′(x + b) for x > 0 and b ≥ 0, with relative accuracy also where b ≪ x.
 *
 * Below 8 the recurrence moves both up, a sum of positive terms; above, the asymptotic series of each subtracted
 * term by term, which leaves a factor b in every term: with r = 1/x and s = 1/(x + b), r − s = b r s, and the series
 * r U(r²) by the divided difference of U. DLMF 5.15.5, 5.15.8.
 */
export function trigammaDifference(x: number, b: number): number {
  // Outside the domain the recurrence would climb for ever.
  if (!(x >= 0.0 && b >= 0.0)) return NaN;
  let sum = 0.0;
  let y = x;
  while (y < 8.0) {
    const z = y + b;
    sum += ((b / y) * (1.0 / y + 1.0 / z)) / z;
    y += 1.0;
  }
  const r = 1.0 / y;
  const s = 1.0 / (y + b);
  const first = b * r * s;
  const u = r * r;
  const v = s * s;
  // p runs through Horner's rule at u, q through the divided difference of the same polynomial between u and v.
  let q = 0.0;
  let p = -3617.0 / 510.0;
  q = p + v * q;
  p = 7.0 / 6.0 + u * p;
  q = p + v * q;
  p = -691.0 / 2730.0 + u * p;
  q = p + v * q;
  p = 5.0 / 66.0 + u * p;
  q = p + v * q;
  p = -1.0 / 30.0 + u * p;
  q = p + v * q;
  p = 1.0 / 42.0 + u * p;
  q = p + v * q;
  p = -1.0 / 30.0 + u * p;
  q = p + v * q;
  p = 1.0 / 6.0 + u * p;
  q = p + v * q;
  p = u * p;
  return sum + first * (1.0 + 0.5 * (r + s) + p + s * (r + s) * q);
}
