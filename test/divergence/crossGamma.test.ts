import * as tf from '@tensorflow/tfjs';
import { expect, it } from 'vitest';
import { beta, chiSquared, exponential, gamma, kl, uniform } from '../../src/index.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import * as g from '../../src/numeric/families/gammaKl.js';

type Numbers = (x: number) => number;

/**
 * E[f(x)] over the law with these quantiles, by the trapezoidal rule in the log odds t of the share, whose weight falls
 * exponentially: the error is far below 1e-8. Either tail has its own quantile.
 */
function expectation(lower: Numbers, upper: Numbers, f: Numbers): number {
  const h = 0.05;
  let sum = 0;
  for (let k = -1600; k <= 1600; k++) {
    const t = k * h;
    const p = 1 / (1 + Math.exp(Math.abs(t)));
    sum += p * (1 - p) * f(t < 0 ? lower(p) : upper(p));
  }
  return sum * h;
}

// Random numbers in (0, 1) from their index: the golden-ratio sequence.
const spot = (k: number): number => (k * 0.6180339887498949) % 1;
const between = (k: number, low: number, high: number): number => Math.fround(low * (high / low) ** spot(k));
const cases = Array.from({ length: 48 }, (_, k) => [
  between(k + 1, 0.4, 30),
  between(3 * k + 2, 0.2, 5),
  between(7 * k + 3, 0.3, 20),
  between(11 * k + 5, 0.1, 8),
]) as [number, number, number, number][];

const f = formulas;
const gammaExpectation = (a: number, s: number, g: Numbers): number =>
  expectation(
    (p) => f.gammaQuantile.value(p, a, s),
    (p) => f.gammaUpperQuantile.value(p, a, s),
    g,
  );
const weibullLog = (x: number, k: number, l: number): number =>
  Math.log(k / l) + (k - 1) * Math.log(x / l) - (x / l) ** k;
const weibullExpectation = (k: number, l: number, g: Numbers): number =>
  expectation(
    (p) => l * (-Math.log1p(-p)) ** (1 / k),
    (p) => l * (-Math.log(p)) ** (1 / k),
    g,
  );

function close(got: number, exact: number, what: string): void {
  expect(Math.abs(got - exact), `${what}: ${got}, ${exact}`).toBeLessThan(1e-8 * (1 + Math.abs(exact)));
}

/** Partial derivatives against central differences of the value. */
function slopes(
  kernel: { value: (...v: number[]) => number; partials: readonly unknown[] },
  at: readonly number[],
): void {
  at.forEach((v, k) => {
    const h = 1e-5 * v;
    const moved = (step: number) => kernel.value(...at.map((w, j) => (j === k ? w + step : w)));
    const exact = (moved(h) - moved(-h)) / (2 * h);
    const got = (kernel.partials[k] as (...v: number[]) => number)(...at);
    expect(Math.abs(got - exact), `partial ${k} at ${at}: ${got}, ${exact}`).toBeLessThan(
      1e-4 * Math.abs(exact) + 1e-5 * (Math.abs(moved(0) / v) + 1 / v),
    );
  });
}

it.each(cases)('gamma and Weibull, parameters %d %d %d %d', (a, s, b, t) => {
  const k = 0.5 + spot(Math.round(1e4 * a)) * 3;
  const own = gammaExpectation(a, s, (x) => f.gammaLogDensity.value(x, a, s) - weibullLog(x, k, t));
  close(gammaWeibull.value(a, s, k, t), own, 'gamma|weibull');
  slopes(gammaWeibull, [a, s, k, t]);
  const other = weibullExpectation(k, t, (x) => weibullLog(x, k, t) - f.gammaLogDensity.value(x, b, s));
  close(weibullGamma.value(k, t, b, s), other, 'weibull|gamma');
  slopes(weibullGamma, [k, t, b, s]);
});

it.each(cases)('gamma and exponential, parameters %d %d %d %d', (a, s, b, t) => {
  const rate = 1 / t;
  const own = gammaExpectation(a, s, (x) => f.gammaLogDensity.value(x, a, s) - (Math.log(rate) - rate * x));
  close(f.gammaExponentialKl.value(a, s, rate), own, 'gamma|exponential');
  slopes(f.gammaExponentialKl, [a, s, rate]);
  const other = gammaExpectation(1, t, (x) => Math.log(rate) - rate * x - f.gammaLogDensity.value(x, b, s));
  close(f.exponentialGammaKl.value(rate, b, s), other, 'exponential|gamma');
  slopes(f.exponentialGammaKl, [rate, b, s]);
});

it.each(cases)('uniform and beta, parameters %d %d %d %d', (a, _s, b, t) => {
  const lower = Math.fround(0.6 * spot(Math.round(1e5 * a)));
  const upper = Math.fround(lower + (1 - lower) * Math.min(1, t / 8));
  const [from, width] = [lower, upper - lower];
  const exact = expectation(
    (p) => from + p * width,
    (p) => upper - p * width,
    (x) => -Math.log(width) - f.betaLogDensity.value(Math.min(x, 1 - 2 ** -53), a, b),
  );
  const got = f.uniformBetaKl.value(lower, upper, a, b);
  expect(Math.abs(got - exact), `${got}, ${exact}`).toBeLessThan(1e-7 * (1 + a + b + Math.abs(exact)));
  if (upper < 0.99 && lower > 0.01) slopes(f.uniformBetaKl, [lower, upper, a, b]);
});

// Formulas that no pair of families uses yet.
const gammaWeibull = {
  value: g.gammaWeibullKl,
  partials: [
    g.gammaWeibullKl_shape,
    g.gammaWeibullKl_scale,
    g.gammaWeibullKl_otherShape,
    g.gammaWeibullKl_otherScale,
  ],
};
const weibullGamma = {
  value: g.weibullGammaKl,
  partials: [
    g.weibullGammaKl_shape,
    g.weibullGammaKl_scale,
    g.weibullGammaKl_otherShape,
    g.weibullGammaKl_otherScale,
  ],
};

it('through the public function: pairs of gammas by another name, and what has no divergence', () => {
  tf.tidy(() => {
    const value = (t: tf.Tensor): number => t.dataSync()[0]!;
    const q = gamma({ shape: 1.5, scale: 2 });
    const p = gamma({ shape: 4, scale: 0.5 });
    expect(value(kl(chiSquared({ degreesOfFreedom: 3 }), p))).toBe(value(kl(q, p)));
    expect(value(kl(p, chiSquared({ degreesOfFreedom: 3 })))).toBe(value(kl(p, q)));
    expect(value(kl(exponential({ rate: 2 }), p))).toBe(value(kl(gamma({ shape: 1, scale: 0.5 }), p)));
    expect(value(kl(p, exponential({ rate: 2 })))).toBe(value(kl(p, gamma({ shape: 1, scale: 0.5 }))));
    expect(value(kl(gamma({ mean: 3, dispersion: 0.5 }), p))).toBe(
      value(kl(gamma({ shape: 2, scale: 1.5 }), p)),
    );
    const inside = beta({ alpha: 2, beta: 3 });
    expect(value(kl(uniform({ lower: -0.5, upper: 1 }), inside))).toBe(Number.POSITIVE_INFINITY);
    // −log B⁻¹: E log x = E log(1 − x) = −1, B(2, 3) = 1/12.
    expect(value(kl(uniform({ lower: 0, upper: 1 }), inside))).toBeCloseTo(3 - Math.log(12), 6);
  });
});
