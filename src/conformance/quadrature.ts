/** A stretch of the line, run through by t from 0 to 1. */
export interface Piece {
  x(t: number): number;
  /** dx/dt, never negative. */
  rate(t: number): number;
}

// The 15-point Kronrod rule on [−1, 1] and the 7-point Gauss rule on every second of its points; source:
// Piessens, de Doncker-Kapenga, Überhuber and Kahaner, QUADPACK (1983). Values from memory; the tests hold them
// to the degrees that the rules are exact for.
const nodes = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
];
const kronrod = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
];
const gauss = [0, 0.1294849661688697, 0, 0.27970539148927664, 0, 0.3818300505051189, 0, 0.4179591836734694];
const all = nodes.flatMap((node, k) =>
  node === 0
    ? [{ node, k: kronrod[k]!, g: gauss[k]! }]
    : [-1, 1].map((sign) => ({ node: sign * node, k: kronrod[k]!, g: gauss[k]! })),
);

/** Stretches beyond which an integrand too rough to resolve is taken as it is. */
const mostStretches = 4000;

/**
 * Adaptive quadrature over pieces, one value for each: stretches whose two rules differ by more than
 * `tolerance` are halved. `f` is asked for many points at a time.
 */
export function integrate(
  f: (x: Float64Array) => ArrayLike<number>,
  pieces: readonly Piece[],
  tolerance: number,
): number[] {
  const sums = pieces.map(() => 0);
  let pending = pieces.map((_, piece) => ({ piece, from: 0, to: 1 }));
  let stretches = 0;
  for (let depth = 0; pending.length > 0; depth++) {
    stretches += pending.length;
    const times = pending.flatMap(({ from, to }) =>
      all.map(({ node }) => (from + to) / 2 + ((to - from) / 2) * node),
    );
    const owner = (i: number) => pieces[pending[Math.floor(i / all.length)]!.piece]!;
    const values = f(Float64Array.from(times, (t, i) => owner(i).x(t)));
    const next: typeof pending = [];
    pending.forEach(({ piece, from, to }, i) => {
      let [fine, coarse] = [0, 0];
      all.forEach(({ k, g }, j) => {
        const at = i * all.length + j;
        const value = values[at]!;
        const rate = pieces[piece]!.rate(times[at]!);
        // Far out one of the two may overflow where the other has long vanished.
        const term = value === 0 || rate === 0 ? 0 : value * rate;
        fine += k * term;
        coarse += g * term;
      });
      const half = (to - from) / 2;
      if (Math.abs(fine - coarse) * half > tolerance && depth < 40 && stretches < mostStretches) {
        const middle = (from + to) / 2;
        next.push({ piece, from, to: middle }, { piece, from: middle, to });
      } else sums[piece]! += fine * half;
    });
    pending = next;
  }
  return sums;
}

/** From a to b. */
export function between(a: number, b: number): Piece {
  return { x: (t) => a + (b - a) * t, rate: () => b - a };
}

/** From b to infinity, on the side of the sign of `scale`; steps grow exponentially, for heavy tails. */
export function beyond(b: number, scale: number): Piece {
  const u = (t: number) => t / (1 - t);
  return {
    x: (t) => b + scale * Math.expm1(u(t)),
    rate: (t) => (Math.abs(scale) * Math.exp(u(t))) / (1 - t) ** 2,
  };
}

/** From b to the end e of a support, on a logarithmic scale of the distance: a density may be infinite there. */
export function towards(b: number, e: number): Piece {
  const u = (t: number) => t / (1 - t);
  return {
    x: (t) => e + (b - e) * Math.exp(-u(t)),
    rate: (t) => (Math.abs(b - e) * Math.exp(-u(t))) / (1 - t) ** 2,
  };
}
