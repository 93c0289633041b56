import { atanhTail } from './log1pmx.js';

/** log 2 to forty bits, so that its product with an exponent is exact, and the rest. */
const LN2_HEAD = 0.6931471805592082;
const LN2_TAIL = 7.371002565167799e-13;

/**
 * log x − l for float32 x > 0 and l, with relative accuracy also where the two are close, where the rounding of
 * log x alone would be left over.
 *
 * There x = m 2^e with m near 1 and log m = 2 atanh q, q = (m − 1) / (m + 1). The large parts cancel without
 * rounding: e log 2 to forty bits less a float32 l of like size fits a double, and so does its sum with 2q where
 * little is left of it. The small parts are the rest of log 2, the remainder of the quotient by Dekker's splitting
 * (Numer. Math. 18, 1971), and the series of atanh after its first term (DLMF 4.38.1).
 */
export function logDistance(x: number, l: number): number {
  const direct = Math.log(x) - l;
  if (!(Math.abs(direct) < 0.01 * Math.abs(l))) return direct;
  let m = x;
  let e = 0.0;
  while (m > 1.4142) {
    m *= 0.5;
    e += 1.0;
  }
  while (m < 0.7071) {
    m *= 2.0;
    e -= 1.0;
  }
  const n = m - 1.0;
  const d = m + 1.0;
  const q = n / d;
  const split = q * 134217729.0;
  const high = split - (split - q);
  const remainder = (n - high * d - (q - high) * d) / d;
  const large = e * LN2_HEAD - l + 2.0 * q;
  return large + (e * LN2_TAIL + 2.0 * (remainder + q * atanhTail(q * q)));
}
