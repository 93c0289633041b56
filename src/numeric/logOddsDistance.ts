import { atanhTail } from './log1pmx.js';
import { lostBits } from './lostBits.js';
import { logOdds } from './transforms.js';

/** log 2 to forty bits, so that its product with an exponent is exact, and the rest. */
const LN2_HEAD = 0.6931471805592082;
const LN2_TAIL = 7.371002565167799e-13;

/**
 * log(x / (1 − x)) − l for float32 x in (0, 1) and l, with relative accuracy also where the two are close.
 *
 * As in `logDistance`: with x / (1 − x) = m 2^e and m near 1, log m = 2 atanh q where q = (n − d) / (n + d) for
 * n = x 2^−e and d = 1 − x, both exact. The large parts cancel without rounding, and the remainder of the quotient,
 * with what its denominator has lost, is put back by Dekker's splitting (Numer. Math. 18, 1971).
 */
export function logOddsDistance(x: number, l: number): number {
  const direct = logOdds(x) - l;
  if (!(Math.abs(direct) < 0.01 * Math.abs(l))) return direct;
  const d = 1.0 - x;
  let n = x;
  let e = 0.0;
  while (n > 1.4142 * d) {
    n *= 0.5;
    e += 1.0;
  }
  while (n < 0.7071 * d) {
    n *= 2.0;
    e -= 1.0;
  }
  const gap = n - d;
  const sum = n + d;
  const lost = lostBits(n, d, sum);
  const q = gap / sum;
  const split = q * 134217729.0;
  const high = split - (split - q);
  const sumSplit = sum * 134217729.0;
  const sumHigh = sumSplit - (sumSplit - sum);
  const sumLow = sum - sumHigh;
  const low = q - high;
  const remainder = (gap - high * sumHigh - high * sumLow - low * sumHigh - low * sumLow - q * lost) / sum;
  const large = e * LN2_HEAD - l + 2.0 * q;
  return large + (e * LN2_TAIL + 2.0 * (remainder + q * atanhTail(q * q)));
}
