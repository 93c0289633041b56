// Test statistics and reference laws, slow and plain, shared by the tests of this folder.

// Limits at which a test raises a false alarm once in a million runs. The seeds are fixed, so this is the
// chance that a change which leaves the law as it is trips the test.

export const ksLimit = 2.694; // √n D; P = 2 exp(−2·2.694²) = 1.0e-6 (Kolmogorov's law, first term)
export const adLimit = 12.5; // A²; P = √3 erfc(√12.5) = 1.0e-6 (Zolotarev's tail of Σ χ²_j / (j(j+1)))
export const oneInAMillion = 1e-6;
export const normalLimit = 4.892; // |z|; P = 1.0e-6, two-sided

export interface Law {
  /** P(X ≤ x) and P(X > x), each to full relative accuracy. */
  lower(x: number): number;
  upper(x: number): number;
}

/** √n times the largest distance between the empirical and the true distribution function. */
export function kolmogorov(draws: Float32Array, law: Law): number {
  const x = draws.slice().sort();
  let most = 0;
  for (let i = 0; i < x.length; i++) {
    const f = law.lower(x[i]!);
    most = Math.max(most, f - i / x.length, (i + 1) / x.length - f);
  }
  return Math.sqrt(x.length) * most;
}

/** Anderson and Darling's A², which weighs the tails up. */
export function andersonDarling(draws: Float32Array, law: Law): number {
  const x = draws.slice().sort();
  const n = x.length;
  let sum = 0;
  for (let i = 0; i < n; i++)
    sum += (2 * i + 1) * Math.log(law.lower(x[i]!)) + (2 * (n - i) - 1) * Math.log(law.upper(x[i]!));
  return -n - sum / n;
}

/** Both statistics in one pass, for laws that take long to evaluate. */
export function distances(draws: Float32Array, law: Law): { kolmogorov: number; andersonDarling: number } {
  const x = draws.slice().sort();
  const n = x.length;
  let most = 0;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    const lower = law.lower(x[i]!);
    most = Math.max(most, lower - i / n, (i + 1) / n - lower);
    sum += (2 * i + 1) * Math.log(lower) + (2 * (n - i) - 1) * Math.log(law.upper(x[i]!));
  }
  return { kolmogorov: Math.sqrt(n) * most, andersonDarling: -n - sum / n };
}

/** P(χ² ≤ x) and P(χ² > x), from the series or the continued fraction of the incomplete gamma function. */
export function chiSquaredTails(x: number, degrees: number): { lower: number; upper: number } {
  const a = degrees / 2;
  const t = x / 2;
  const front = Math.exp(a * Math.log(t) - t - logGamma(a));
  if (t < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let k = 1; term > sum * 1e-15; k++) {
      term *= t / (a + k);
      sum += term;
    }
    return { lower: front * sum, upper: 1 - front * sum };
  }
  let fraction = t + 400 + 401 - a;
  for (let k = 400; k >= 1; k--) fraction = t + 2 * k - 1 - a - (k * (k - a)) / fraction;
  return { lower: 1 - front / fraction, upper: front / fraction };
}

/**
 * Pearson's statistic over cells; neighbours are pooled until each expects at least 10, so that the
 * statistic is near enough to chi-squared.
 */
export function pearson(
  counts: ArrayLike<number>,
  expected: ArrayLike<number>,
): { statistic: number; degrees: number } {
  const observed: number[] = [];
  const wanted: number[] = [];
  let o = 0;
  let e = 0;
  for (let i = 0; i < counts.length; i++) {
    o += counts[i]!;
    e += expected[i]!;
    if (e >= 10) {
      observed.push(o);
      wanted.push(e);
      o = 0;
      e = 0;
    }
  }
  observed[observed.length - 1]! += o;
  wanted[wanted.length - 1]! += e;
  const statistic = observed.reduce((sum, n, i) => sum + (n - wanted[i]!) ** 2 / wanted[i]!, 0);
  return { statistic, degrees: observed.length - 1 };
}

/** The smaller of the two tail probabilities: agreement that is too good is as suspect as none. */
export function chiSquaredOdds(counts: ArrayLike<number>, expected: ArrayLike<number>): number {
  const { statistic, degrees } = pearson(counts, expected);
  const { lower, upper } = chiSquaredTails(statistic, degrees);
  return Math.min(lower, upper);
}

/** log Γ by shifting up to 30 and Stirling's series there. */
export function logGamma(x: number): number {
  let shift = 0;
  let y = x;
  for (; y < 30; y++) shift += Math.log(y);
  const w = 1 / (y * y);
  const series = (1 / 12 - w * (1 / 360 - w * (1 / 1260 - w / 1680))) / y;
  return (y - 0.5) * Math.log(y) - y + 0.5 * Math.log(2 * Math.PI) + series - shift;
}

/** P(N > x) for x ≥ 0, by the power series or Laplace's continued fraction. */
function normalTail(x: number): number {
  const density = Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
  if (x < 2.5) {
    let term = x;
    let sum = x;
    for (let k = 3; term > sum * 1e-16; k += 2) {
      term *= (x * x) / k;
      sum += term;
    }
    return 0.5 - density * sum;
  }
  let fraction = x;
  for (let k = 60; k >= 1; k--) fraction = x + k / fraction;
  return density / fraction;
}

/** P(C > x) = arccot(x)/π, which atan of the reciprocal keeps small for large x. */
const cauchyTail = (x: number): number => (x > 1 ? Math.atan(1 / x) / Math.PI : 0.5 - Math.atan(x) / Math.PI);

export const laws = {
  uniform: { lower: (x) => x, upper: (x) => 1 - x },
  normal: {
    lower: (x) => (x < 0 ? normalTail(-x) : 1 - normalTail(x)),
    upper: (x) => (x > 0 ? normalTail(x) : 1 - normalTail(-x)),
  },
  exponential: { lower: (x) => -Math.expm1(-x), upper: (x) => Math.exp(-x) },
  laplace: {
    lower: (x) => (x < 0 ? 0.5 * Math.exp(x) : 1 - 0.5 * Math.exp(-x)),
    upper: (x) => (x > 0 ? 0.5 * Math.exp(-x) : 1 - 0.5 * Math.exp(x)),
  },
  logistic: { lower: (x) => 1 / (1 + Math.exp(-x)), upper: (x) => 1 / (1 + Math.exp(x)) },
  gumbel: { lower: (x) => Math.exp(-Math.exp(-x)), upper: (x) => -Math.expm1(-Math.exp(-x)) },
  cauchy: { lower: (x) => cauchyTail(-x), upper: cauchyTail },
} satisfies Record<string, Law>;

/** The law of a variable given that it exceeds `bound`. */
export function above(law: Law, bound: number): Law {
  const whole = law.upper(bound);
  return { lower: (x) => 1 - law.upper(x) / whole, upper: (x) => law.upper(x) / whole };
}
