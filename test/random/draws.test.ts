import { describe, expect, it } from 'vitest';
import { erfcx } from '../../src/numeric/errorFunction.js';
import { betaI } from '../../src/numeric/incompleteBeta.js';
import { gammaP, gammaQ } from '../../src/numeric/incompleteGamma.js';
import { logBeta } from '../../src/numeric/logBeta.js';
import {
  betaDraws,
  betaPrimeDraws,
  gammaDraws,
  inverseGammaDraws,
  inverseGaussianDraws,
  logBetaDraws,
  logBetaPrimeDraws,
  logGammaDraws,
  logInverseGammaDraws,
  logOddsBetaDraws,
  logScaledGammaDraws,
  scaledGammaDraws,
  studentTDraws,
  vonMisesDraws,
} from '../../src/random/draws.js';
import { stream } from '../../src/random/stream.js';
import { adLimit, distances, ksLimit, type Law, laws, normalLimit } from './laws.js';

// Each law is tested by two statistics at 1e-6 each, in 55 settings; 9 counts and means are tested at 1e-6 as well.
// So on samplers that are right a test of this file fails by chance with odds of 1.2e-4 at most, once, when its
// seeds are chosen.

const n = 100_000;
const filled = (value: number) => new Float32Array(n).fill(value);

function follows(draws: Float32Array, law: Law): void {
  const { kolmogorov, andersonDarling } = distances(draws, law);
  expect(kolmogorov).toBeLessThan(ksLimit); // false alarm 1e-6
  expect(andersonDarling).toBeLessThan(adLimit); // 1e-6
}

const least = 2 ** -149;
const most = 2 ** 128 - 2 ** 104;
/** What is stored for a positive value. */
const stored = (x: number) => Math.min(Math.max(Math.fround(x), least), most);
/** Half the spacing of float32 at y. */
const half = (y: number) => 2 ** (Math.max(-149, Math.floor(Math.log2(Math.abs(y))) - 23) - 1);

/** Draws that are not the rounded exponential of any number that rounds to their logarithm. */
function disagreements(x: Float32Array, logarithms: Float32Array, store = stored): number {
  return x.filter((value, i) => {
    const y = logarithms[i]!;
    return !(
      value >= store(Math.exp(y - half(y)) * (1 - 1e-12)) &&
      value <= store(Math.exp(y + half(y)) * (1 + 1e-12))
    );
  }).length;
}

const shapes = [1e-3, 1e-2, 0.1, 0.5, 1, 2, 30, 1e4, 1e6];

describe.each(shapes.map((shape, k) => [Math.fround(shape), 1200 + 10 * k] as const))(
  'gamma %f',
  (a, seed) => {
    // Far in the lower tail P(G < x) = x^a / Γ(a + 1), which is its value at e^-50 times a power.
    const floor = gammaP(a, Math.exp(-50));
    const lower = (y: number) => (y < -50 ? floor * Math.exp(a * (y + 50)) : gammaP(a, Math.exp(y)));
    const logLaw: Law = { lower, upper: (y) => (y < -50 ? 1 - lower(y) : gammaQ(a, Math.exp(y))) };

    it('logarithms follow their law', () => {
      follows(logGammaDraws(stream(seed), filled(a)), logLaw);
    });

    it('draws are the exponentials of the logarithms, with and without a scale and as reciprocals', () => {
      const scale = Float32Array.from({ length: n }, (_, i) => 10 ** ((i % 61) - 30));
      for (const [draw, log] of [
        [gammaDraws, logGammaDraws],
        [scaledGammaDraws, logScaledGammaDraws],
        [inverseGammaDraws, logInverseGammaDraws],
      ] as const) {
        const x = draw(stream(seed + 1), filled(a), scale);
        expect(x.every((v) => v >= least && v <= most)).toBe(true);
        expect(disagreements(x, log(stream(seed + 1), filled(a), scale))).toBe(0);
      }
      // The three are functions of one gamma draw.
      const plain = logGammaDraws(stream(seed + 1), filled(a));
      const scaled = logScaledGammaDraws(stream(seed + 1), filled(a), scale);
      const inverse = logInverseGammaDraws(stream(seed + 1), filled(a), scale);
      plain.forEach((y, i) => {
        const s = Math.log(scale[i]!);
        expect(Math.abs(y + s - scaled[i]!)).toBeLessThan(1.01 * (half(y) + half(scaled[i]!)));
        expect(Math.abs(s - y - inverse[i]!)).toBeLessThan(1.01 * (half(y) + half(inverse[i]!)));
      });
    });
  },
);

describe.each(
  [
    [1e-3, 1e-3],
    [1e-3, 1],
    [1e-3, 1e6],
    [1e6, 1e-3],
    [1e-2, 1e-2],
    [0.1, 30],
    [0.3, 0.8],
    [0.5, 0.5],
    [1, 0.5],
    [1, 1],
    [2, 3],
    [3, 0.2],
    [30, 30],
    [1e4, 2],
    [1e4, 1e4],
    [0.5, 1e6],
    [1e6, 1e6],
  ].map(([a, b], k) => [Math.fround(a!), Math.fround(b!), 1300 + 10 * k] as const),
)('beta (%f, %f)', (a, b, seed) => {
  /** P(log odds < y); far below, P(Z < z) = z^a / (a B(a, b)). */
  const below = (p: number, q: number, y: number) =>
    y < -60 ? Math.exp(p * y - Math.log(p) - logBeta(p, q)) : betaI(p, q, 1 / (1 + Math.exp(-y)));
  const lower = (p: number, q: number, y: number) => (y > 0 ? 1 - below(q, p, -y) : below(p, q, y));
  const law: Law = { lower: (y) => lower(a, b, y), upper: (y) => lower(b, a, -y) };
  const x = [filled(a), filled(b)] as const;

  it('log odds follow their law', () => {
    follows(logOddsBetaDraws(stream(seed), ...x), law);
  });

  it('the draw, its logarithm and its odds are functions of one draw', () => {
    const odds = logOddsBetaDraws(stream(seed + 1), ...x);
    const log = logBetaDraws(stream(seed + 1), ...x);
    const z = betaDraws(stream(seed + 1), ...x);
    const oneBelow = 1 - 2 ** -24;
    expect(z.every((v) => v >= least && v <= oneBelow)).toBe(true);
    expect(log.every((v) => v <= -least && v >= -most)).toBe(true);
    expect(disagreements(z, log, (v) => Math.min(Math.max(Math.fround(v), least), oneBelow))).toBe(0);
    const wrong = odds.filter((y, i) => {
      // −log1p(exp(−y)) moves by at most what y does.
      const exact = y > -700 ? Math.min(-Math.log1p(Math.exp(-y)), -least) : y;
      const slack = half(y) * Math.min(1, Math.exp(-y)) + half(log[i]!);
      return !(Math.abs(log[i]! - exact) < 1.01 * slack);
    });
    expect(wrong.length).toBe(0);
    for (const scale of [1e-20, 1, 1e20]) {
      const prime = betaPrimeDraws(stream(seed + 1), ...x, filled(scale));
      const logPrime = logBetaPrimeDraws(stream(seed + 1), ...x, filled(scale));
      expect(disagreements(prime, logPrime)).toBe(0);
      if (scale === 1) expect(logPrime).toEqual(odds);
    }
  });
});

describe.each([
  [0.5, 0.5, 1501],
  [2, 3, 1502],
  [30, 30, 1503],
  [1, 1, 1504],
])('beta (%f, %f) itself', (a, b, seed) => {
  it('follows its law', () => {
    follows(betaDraws(stream(seed), filled(a), filled(b)), {
      lower: (z) => betaI(a, b, z),
      upper: (z) => betaI(b, a, 1 - z),
    });
  });
});

describe.each([0.01, 0.3, 1, 3, 30, 1e6, 1e8].map((nu, k) => [Math.fround(nu), 1510 + k] as const))(
  't with %f degrees of freedom',
  (nu, seed) => {
    // P(T > t) = ½ I(ν/(ν + t²); ν/2, ½), by its complement near the middle.
    const tail = (t: number) =>
      t * t > nu
        ? 0.5 * betaI(nu / 2, 0.5, nu / t / (nu / t + t))
        : 0.5 - 0.5 * betaI(0.5, nu / 2, (t * t) / (nu + t * t));
    const upper = (t: number) => (t > 0 ? tail(t) : 1 - tail(-t));
    // Where float32 ends, draws are stored at the end: with 0.01 degrees of freedom two of five.
    const bound = 1e38;
    const outside = tail(bound);
    const inside: Law = {
      lower: (t) => (upper(-t) - outside) / (1 - 2 * outside),
      upper: (t) => (upper(t) - outside) / (1 - 2 * outside),
    };

    it('follows its law', () => {
      const x = studentTDraws(stream(seed), filled(nu));
      expect(x.every((v) => Number.isFinite(v))).toBe(true);
      follows(
        x.filter((v) => Math.abs(v) < bound),
        inside,
      );
      if (n * outside > 100) {
        for (const count of [x.filter((v) => v >= bound).length, x.filter((v) => v <= -bound).length]) {
          const deviation = Math.sqrt(n * outside * (1 - outside));
          expect(Math.abs(count - n * outside) / deviation).toBeLessThan(normalLimit); // 1e-6
        }
      }
    });
  },
);

/** Von Mises by quadrature: three-point Gauss over 20,000 cells of the angles that are reached at all. */
function vonMisesLaw(kappa: number): Law {
  const cells = 20_000;
  const end = Math.min(Math.PI, 14 / Math.sqrt(kappa));
  const width = (2 * end) / cells;
  const density = (t: number) => Math.exp(-2 * kappa * Math.sin(t / 2) ** 2);
  const over = (from: number, w: number) => {
    const middle = from + w / 2;
    const arm = (w / 2) * Math.sqrt(0.6);
    return (w / 18) * (5 * density(middle - arm) + 8 * density(middle) + 5 * density(middle + arm));
  };
  const cumulated = new Float64Array(cells + 1);
  for (let i = 0; i < cells; i++) cumulated[i + 1] = cumulated[i]! + over(i * width - end, width);
  const lower = (t: number) => {
    const i = Math.min(cells - 1, Math.max(0, Math.floor((t + end) / width)));
    const from = i * width - end;
    return (cumulated[i]! + over(from, t - from)) / cumulated[cells]!;
  };
  return { lower, upper: (t) => lower(-t) };
}

describe.each(
  [1e-6, 0.1, 0.7, 2, 10, 100, 1e4, 1e8].map((kappa, k) => [Math.fround(kappa), 1520 + k] as const),
)('von Mises with concentration %f', (kappa, seed) => {
  it('follows its law', () => {
    const x = vonMisesDraws(stream(seed), filled(kappa));
    expect(x.every((v) => Math.abs(v) < Math.PI)).toBe(true);
    follows(x, vonMisesLaw(kappa));
  });
});

it('von Mises draws of any concentration stay inside the open interval', () => {
  for (const kappa of [1e-45, 1e-30, 1e30, 3e38]) {
    const x = vonMisesDraws(stream(1530), filled(kappa));
    expect(x.every((v) => Math.abs(v) < Math.PI)).toBe(true);
    // Near uniform, or near normal of variance 1/κ: the mean square with 4.892 deviations of room, 1e-6 each.
    const squares = Float64Array.from(x, (v) => v * v).reduce((s, v) => s + v, 0) / n;
    const [mean, deviation] =
      kappa < 1 ? [Math.PI ** 2 / 3, Math.PI ** 2 * Math.sqrt(4 / 45)] : [1 / kappa, Math.SQRT2 / kappa];
    expect((Math.abs(squares - mean) * Math.sqrt(n)) / deviation).toBeLessThan(normalLimit);
  }
});

/** Shuster 1968, the exponential merged into the scaled complementary error function. */
function inverseGaussianLaw(mean: number, shape: number): Law {
  const arms = (x: number) => {
    const root = Math.sqrt(shape / x / 2);
    return [root * (x / mean - 1), root * (x / mean + 1)] as const;
  };
  const lower = (x: number) => {
    const [a, b] = arms(x);
    return a < 0 ? 0.5 * Math.exp(-a * a) * (erfcx(-a) + erfcx(b)) : 1 - upper(x);
  };
  const upper = (x: number): number => {
    const [a, b] = arms(x);
    return a < 0 ? 1 - lower(x) : 0.5 * Math.exp(-a * a) * (erfcx(a) - erfcx(b));
  };
  return { lower, upper };
}

describe.each(
  [
    [1, 1e-3],
    [1e3, 1],
    [1, 0.1],
    [1, 1],
    [0.01, 0.3],
    [1, 30],
    [1, 1e6],
    [1e-6, 1],
  ].map(([mean, shape], k) => [Math.fround(mean!), Math.fround(shape!), 1540 + k] as const),
)('inverse Gaussian of mean %f and shape %f', (mean, shape, seed) => {
  it('follows its law', () => {
    follows(inverseGaussianDraws(stream(seed), filled(mean), filled(shape)), inverseGaussianLaw(mean, shape));
  });
});

describe('F of (3, 7) degrees of freedom, as odds of a beta draw, and inverse gamma', () => {
  it('follow their laws', () => {
    const f = betaPrimeDraws(stream(1560), filled(1.5), filled(3.5), filled(7 / 3));
    const scale = Math.fround(7 / 3);
    follows(f, {
      lower: (x) => betaI(1.5, 3.5, x / (x + scale)),
      upper: (x) => betaI(3.5, 1.5, scale / (x + scale)),
    });
    follows(inverseGammaDraws(stream(1561), filled(0.5), filled(2.5)), {
      lower: (x) => gammaQ(0.5, 2.5 / x),
      upper: (x) => gammaP(0.5, 2.5 / x),
    });
  });
});

describe('at the ends of float32', () => {
  it('draws that underflow or overflow are as many as they should be, and stay inside', () => {
    const x = scaledGammaDraws(stream(1570), filled(0.01), filled(1e30));
    // Below 1.5 times the least float32 lies what is stored as that.
    const p = gammaP(Math.fround(0.01), (1.5 * least) / Math.fround(1e30));
    const count = x.filter((v) => v === least).length;
    expect(Math.abs(count - n * p) / Math.sqrt(n * p * (1 - p))).toBeLessThan(normalLimit); // 1e-6
    const y = inverseGammaDraws(stream(1571), filled(0.01), filled(1e-30));
    const q = gammaP(Math.fround(0.01), Math.fround(1e-30) / most);
    const above = y.filter((v) => v === most).length;
    expect(Math.abs(above - n * q) / Math.sqrt(n * q * (1 - q))).toBeLessThan(normalLimit); // 1e-6
    for (const draws of [
      gammaDraws(stream(1572), filled(1e-30)),
      inverseGammaDraws(stream(1573), filled(1e-30), filled(1)),
    ])
      expect(draws.every((v) => v === least || v === most)).toBe(true);
    // e^(-1e40) is out of reach even for the logarithm.
    expect(logGammaDraws(stream(1574), filled(1e-40)).filter((v) => v === -most).length).toBeGreaterThan(
      n / 2,
    );
  });
});

it('t with many degrees of freedom is the normal draw of the same words', () => {
  const t = studentTDraws(stream(1580), filled(3e38));
  expect(distances(t, laws.normal).kolmogorov).toBeLessThan(ksLimit); // 1e-6
});

const positive = [
  ['scaledGammaDraws', scaledGammaDraws, 'shape', 'scale'],
  ['logScaledGammaDraws', logScaledGammaDraws, 'shape', 'scale'],
  ['inverseGammaDraws', inverseGammaDraws, 'shape', 'scale'],
  ['logInverseGammaDraws', logInverseGammaDraws, 'shape', 'scale'],
  ['betaDraws', betaDraws, 'a', 'b'],
  ['logBetaDraws', logBetaDraws, 'a', 'b'],
  ['logOddsBetaDraws', logOddsBetaDraws, 'a', 'b'],
  ['inverseGaussianDraws', inverseGaussianDraws, 'mean', 'shape'],
] as const;
it.each(positive)('%s refuses what is not positive and finite', (name, draw, first, second) => {
  for (const wrong of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
    const one = Float32Array.of(1, 1);
    expect(() => draw(stream(1), Float32Array.of(1, wrong), one)).toThrow(
      `${name}: ${first} must be positive and finite; got ${wrong} at element 1; check what computes the ${first}`,
    );
    expect(() => draw(stream(1), one, Float32Array.of(wrong, 1))).toThrow(
      `${name}: ${second} must be positive and finite; got ${wrong} at element 0; check what computes the ${second}`,
    );
  }
  expect(() => draw(stream(1), new Float32Array(2).fill(1), new Float32Array(3).fill(1))).toThrow(
    `${name}: parameters must have one element per draw each; got 2 and 3; broadcast them first`,
  );
});

it('finds a wrong parameter anywhere, and leaves the stream where it was', () => {
  const s = stream(1590);
  const before = JSON.stringify(s.save());
  for (const [length, place] of [
    [3, 2],
    [4, 0],
    [9, 8],
    [200_003, 131_077],
    [200_003, 200_002],
  ] as const) {
    const shapes = new Float32Array(length).fill(1);
    shapes[place] = Number.NaN;
    expect(() => gammaDraws(s, shapes)).toThrow(
      `gammaDraws: shape must be positive and finite; got NaN at element ${place}; check what computes the shape`,
    );
  }
  expect(JSON.stringify(s.save())).toBe(before);
});

it('the laws of one or three parameters refuse likewise', () => {
  const one = Float32Array.of(1);
  const wrong = Float32Array.of(-2);
  const told = (name: string, word: string) =>
    `${name}: ${word} must be positive and finite; got -2 at element 0; check what computes the ${word}`;
  expect(() => studentTDraws(stream(1), wrong)).toThrow(told('studentTDraws', 'degrees of freedom'));
  expect(() => vonMisesDraws(stream(1), wrong)).toThrow(told('vonMisesDraws', 'concentration'));
  for (const [name, draw] of [
    ['betaPrimeDraws', betaPrimeDraws],
    ['logBetaPrimeDraws', logBetaPrimeDraws],
  ] as const) {
    expect(() => draw(stream(1), wrong, one, one)).toThrow(told(name, 'a'));
    expect(() => draw(stream(1), one, wrong, one)).toThrow(told(name, 'b'));
    expect(() => draw(stream(1), one, one, wrong)).toThrow(told(name, 'scale'));
  }
});
