import { between, beyond, integrate, type Piece, towards } from './quadrature.js';
import { logDensityAt, type Member, type Subject, sortedDraws } from './subject.js';

/** Where a density is integrated: pieces of the support, with the points that part them. */
export interface Region {
  /** Ascending points inside the support; `pieces[k]` ends at `cuts[k]`, the last goes beyond. */
  readonly cuts: readonly number[];
  readonly pieces: readonly Piece[];
  /** Where most of the mass lies. */
  readonly middle: number;
  readonly spread: number;
}

const levels = [0, 0.001, 0.01, 0.1, 0.25, 0.5, 0.75, 0.9, 0.99, 0.999, 1];
const ends: Readonly<Record<string, readonly [number, number]>> = {
  positive: [0, Number.POSITIVE_INFINITY],
  unitInterval: [0, 1],
  circle: [-Math.PI, Math.PI],
};

/**
 * The support in pieces. Draws only say where to look first: every point of the support is covered whatever
 * they are, so that a wrong sampler does not spoil an integral.
 */
export function regionOf(subject: Subject, at: readonly number[] = levels): Region {
  const [low, high] = ends[subject.d.support.name] ?? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  const draws = sortedDraws(subject, 'pieces', 2000).filter((x) => x > low && x < high && Number.isFinite(x));
  const inner = at.map((p) => draws[Math.round(p * (draws.length - 1))] ?? 0.5);
  const [first, last] = [Math.min(...inner), Math.max(...inner)];
  const spread = last - first || 1;
  // A density may end anywhere beyond the draws: close steps there make sure that no rule steps over its last part.
  const fringe = Array.from({ length: 17 }, (_, k) => spread * 2 ** -k).flatMap((gap) => [
    first - gap,
    last + gap,
  ]);
  const cuts = [...new Set([...inner, ...fringe.filter((x) => x > low && x < high)])].sort((a, b) => a - b);
  const [lowest, highest] = [cuts[0]!, cuts[cuts.length - 1]!];
  return {
    cuts,
    pieces: [
      low === Number.NEGATIVE_INFINITY ? beyond(lowest, -spread) : towards(lowest, low),
      ...cuts.slice(1).map((cut, k) => between(cuts[k]!, cut)),
      high === Number.POSITIVE_INFINITY ? beyond(highest, spread) : towards(highest, high),
    ],
    middle: inner[Math.floor(inner.length / 2)]!,
    spread,
  };
}

/** The integral of g(x, log p(x)) p(x) over each piece; densities are float32, sums double. */
export function pieceIntegrals(
  d: Member,
  pieces: readonly Piece[],
  g: (x: number, logP: number) => number,
  tolerance: number,
): number[] {
  return integrate(
    (x) => {
      const points = Float32Array.from(x);
      // Infinity is no point, and a density that is infinite at one point has no mass there.
      const finite = points.map((v) => (Number.isFinite(v) ? v : 0));
      return logDensityAt(d, finite).map((logP, i) => {
        if (!Number.isFinite(points[i]!) || logP === Number.POSITIVE_INFINITY) return 0;
        const p = Math.exp(logP);
        return p === 0 ? 0 : g(points[i]!, logP) * p;
      });
    },
    pieces,
    tolerance,
  );
}

/** The whole numbers from zero as far as they bear mass, with their log masses. */
export function masses(d: Member): Float64Array {
  for (let n = 64; ; n *= 2) {
    const logP = logDensityAt(
      d,
      Float32Array.from({ length: n }, (_, k) => k),
    );
    const late = logP.subarray(n / 2).reduce((sum, v) => sum + Math.exp(v), 0);
    const early = logP.subarray(0, n / 2).reduce((sum, v) => sum + Math.exp(v), 0);
    // The far half must add nothing once the near half bears mass; beyond 2²⁰ whatever is missing is missing.
    if ((early > 0 && late < 1e-9) || n >= 1 << 20) return logP;
  }
}

/** E[g(x, log p(x))]: a sum for counted points, an integral for measured ones. */
export function expectation(
  subject: Subject,
  g: (x: number, logP: number) => number,
  tolerance = 1e-7,
  region?: Region,
): number {
  const { d } = subject;
  if (d.support.discrete)
    return masses(d).reduce(
      (sum, v, k) => (v === Number.NEGATIVE_INFINITY ? sum : sum + g(k, v) * Math.exp(v)),
      0,
    );
  const { pieces } = region ?? regionOf(subject);
  return pieceIntegrals(d, pieces, g, tolerance).reduce((a, b) => a + b, 0);
}
