import { describe, expect, it } from 'vitest';
import { besselRatio, besselRatioComplement } from '../../src/numeric/bessel.js';
import { betaI, betaIComplement } from '../../src/numeric/incompleteBeta.js';
import { betaIInverse } from '../../src/numeric/incompleteBetaInverse.js';
import {
  gammaP,
  gammaP_a,
  gammaP_x,
  gammaQ,
  logGammaP,
  logGammaQ,
} from '../../src/numeric/incompleteGamma.js';
import { gammaPInverse, gammaQInverse, logGammaPInverse } from '../../src/numeric/incompleteGammaInverse.js';
import { normalCdf } from '../../src/numeric/normalCdf.js';
import { normalQuantile } from '../../src/numeric/normalQuantile.js';

const shapes = [1e-30, 1e-3, 0.3, 0.9999, 1, 2.5, 20, 59.9, 60, 1e3, 1e6, 1e12];

/** n points from low to high, evenly in the logarithm. */
function sweep(low: number, high: number, n: number): number[] {
  return Array.from({ length: n }, (_, i) => low * (high / low) ** (i / (n - 1)));
}

function expectRising(values: number[], where: string) {
  // A few units in the last place of a double near 1, and 1e-13 of a small value: a switch may step back by that.
  for (let i = 1; i < values.length; i++) {
    expect(values[i]! - values[i - 1]!, `${where}, step ${i}`).toBeGreaterThanOrEqual(
      -1e-15 - 1e-13 * Math.abs(values[i]!),
    );
  }
}

describe('incomplete gamma functions', () => {
  it('P + Q = 1, and both are monotone over all branch switches', () => {
    for (const a of shapes) {
      const points = sweep(Math.max(a / 20, 1e-30), 20 * a + 50, 700);
      for (const x of points) expect(Math.abs(gammaP(a, x) + gammaQ(a, x) - 1)).toBeLessThan(1e-15);
      expectRising(
        points.map((x) => gammaP(a, x)),
        `P(${a}, x)`,
      );
      expectRising(
        points.map((x) => -gammaQ(a, x)),
        `-Q(${a}, x)`,
      );
    }
  });

  it("P(1, x) = 1 - exp(-x), and P(a + 1, x) = P(a, x) - x P'(a, x) / a", () => {
    for (const x of sweep(1e-10, 600, 200)) {
      expect(gammaP(1, x)).toBeCloseTo(-Math.expm1(-x), 14);
      expect(logGammaQ(1, x)).toBeCloseTo(-x, 12);
      for (const a of [0.2, 3.3, 59.5, 200]) {
        expect(gammaP(a + 1, x)).toBeCloseTo(gammaP(a, x) - (x * gammaP_x(a, x)) / a, 13);
      }
    }
  });

  it('the inverses undo the functions', () => {
    for (const a of shapes.filter((a) => a > 1e-30)) {
      for (const p of [1e-30, 1e-5, 0.2, 0.5, 0.8]) {
        if (gammaPInverse(a, p) > 1e-290) {
          // The law of a large shape is narrower than the spacing of x: allow for the rounding of x.
          const slack = 1e-12 + 4 * 2 ** -52 * Math.sqrt(a) * 20;
          expect(Math.abs(gammaP(a, gammaPInverse(a, p)) / p - 1)).toBeLessThan(slack);
        }
        if (gammaQInverse(a, p) > 1e-290) {
          expect(Math.abs(gammaQ(a, gammaQInverse(a, p)) / p - 1)).toBeLessThan(1e-12 + 2e-14 * Math.sqrt(a));
        }
      }
    }
    expect(logGammaP(0.01, Math.exp(logGammaPInverse(0.01, -6.5)))).toBeCloseTo(-6.5, 12);
    expect(logGammaPInverse(1e-3, -5)).toBeCloseTo(-5000.5767, 3);
  });

  it('ends of the domain', () => {
    expect([gammaP(2, 0), gammaQ(2, 0), gammaP(2, Infinity), gammaQ(2, Infinity)]).toEqual([0, 1, 1, 0]);
    expect([gammaP_a(2, 0), gammaP_a(2, Infinity)]).toEqual([0, 0]);
    expect([gammaP_x(0.5, 0), gammaP_x(1, 0), gammaP_x(2, 0)]).toEqual([Infinity, 1, 0]);
    expect([gammaPInverse(2, 0), gammaPInverse(2, 1), gammaQInverse(2, 0), gammaQInverse(2, 1)]).toEqual([
      0,
      Infinity,
      Infinity,
      0,
    ]);
    expect([gammaP(2, -1), gammaQ(2, NaN), gammaPInverse(2, 1.5)]).toEqual([NaN, NaN, NaN]);
    // The largest float32 shape ends quickly, and its median lies at the shape.
    expect(gammaP(3e38, 3e38)).toBeCloseTo(0.5, 9);
  });
});

describe('incomplete beta function', () => {
  it('I and its complement sum to 1, I_x(a, b) = 1 - I_{1-x}(b, a), and it rises', () => {
    for (const a of shapes) {
      for (const b of shapes) {
        const points = Array.from({ length: 99 }, (_, i) => (i + 1) / 128);
        for (const x of points) {
          expect(Math.abs(betaI(a, b, x) + betaIComplement(a, b, x) - 1)).toBeLessThan(1e-15);
          expect(Math.abs(betaI(a, b, x) - betaIComplement(b, a, 1 - x))).toBeLessThan(1e-11);
        }
        expectRising(
          points.map((x) => betaI(a, b, x)),
          `I_x(${a}, ${b})`,
        );
      }
    }
  });

  it('I_x(a, 1) = x^a, and the inverse undoes the function', () => {
    for (const a of [0.01, 0.7, 3, 29, 31, 1e4]) {
      for (const x of [1e-4, 0.2, 0.9, 0.9999]) {
        expect(Math.abs(betaI(a, 1, x) - x ** a)).toBeLessThanOrEqual(1e-12 * x ** a);
      }
      for (const b of [0.3, 1, 8, 500]) {
        for (const p of [1e-20, 0.1, 0.5]) {
          const x = betaIInverse(a, b, p);
          if (x > 1e-290 && x < 0.999) expect(Math.abs(betaI(a, b, x) / p - 1)).toBeLessThan(1e-11);
        }
      }
    }
    expect([betaIInverse(2, 3, 0), betaIInverse(2, 3, 1), betaIInverse(2, 3, -1)]).toEqual([0, 1, NaN]);
    expect([betaI(2, 3, 0), betaI(2, 3, 1), betaI(2, 3, 1.1)]).toEqual([0, 1, NaN]);
  });
});

describe('other identities', () => {
  it('A and 1 - A sum to 1', () => {
    for (const x of sweep(1e-20, 1e20, 300)) {
      expect(Math.abs(besselRatio(x) + besselRatioComplement(x) - 1)).toBeLessThan(3e-16);
    }
  });

  it('the normal quantile undoes the distribution function', () => {
    for (const x of sweep(1e-9, 30, 300)) {
      expect(Math.abs(normalQuantile(normalCdf(-x)) / -x - 1)).toBeLessThan(x < 1e-3 ? 1e-6 : 1e-12);
    }
  });
});
