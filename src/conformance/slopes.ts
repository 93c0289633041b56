import { LeadlineError } from '../errors.js';
import { Violation } from './lawError.js';

/** A difference quotient with a bound on its own error. */
interface Quotient {
  readonly value: number;
  readonly error: number;
}

/** Values of a function at float32 nodes around each of several points, one row of nodes for each point. */
export interface Sampled {
  readonly nodes: readonly ArrayLike<number>[];
  readonly values: readonly ArrayLike<number>[];
}

// Multiples of the step: the first five make the wide stencil, the last four with zero the narrow one.
const offsets = [0, -2, 2, -1, 1, -0.5, 0.5];
const wide = [0, 1, 2, 3, 4];
const narrow = [0, 3, 4, 5, 6];

/**
 * Holds derivatives to central differences of fourth order, taken in double precision from float32 values at
 * float32 nodes, the rounding of the nodes allowed for. The error of each step size is how far it differs from half
 * of it, and the rounding of the values; a step that smaller ones contradict has stepped over a kink or a jump
 * and does not count. Of the others the surest is the reference, to twice its error and 1e-4 of itself.
 *
 * Returns whether there was a step to compare with: none stays inside the domain of a parameter that is bound to
 * others.
 *
 * @param sample - evaluates the function at offsets from every point
 * @param sizes - the sizes of the points, which set the range of steps
 */
export function requireSlopes(
  sample: (offsets: readonly number[]) => Sampled,
  slopes: ArrayLike<number>,
  sizes: readonly number[],
  must: (point: number) => string,
  look: string,
): boolean {
  const size = Math.max(...sizes.map(Math.abs)) || 1;
  const top = Math.max(1, Math.ceil(Math.log2(size)) + 1);
  const bottom = Math.min(0, Math.floor(Math.log2(size))) - 14;
  const tried: Quotient[][] = Array.from(slopes, () => []);
  for (let j = top; j >= bottom; j--) {
    const sampled = tolerant(() => sample(offsets.map((k) => k * 2 ** j)));
    if (!sampled) continue;
    tried.forEach((list, i) => {
      const quotient = quotientOf(sampled.nodes[i]!, sampled.values[i]!);
      if (quotient) list.push(quotient);
    });
  }
  if (tried.some((list) => list.length === 0)) return false;
  tried.forEach((list, i) => {
    const slope = slopes[i]!;
    const best = surest(list);
    const tolerance = 2 * best.error + 1e-4 * Math.abs(best.value);
    if (Math.abs(slope - best.value) <= tolerance) return;
    throw new Violation(must(i), slope, `${best.value} ± ${tolerance.toPrecision(2)}`, look);
  });
  return true;
}

/** The quotient of least error among those that no smaller step contradicts; steps descend. */
function surest(list: readonly Quotient[]): Quotient {
  const confirmed = list.filter(({ value, error }, i) =>
    list.slice(i + 1).every((finer) => Math.abs(finer.value - value) <= 3 * (finer.error + error)),
  );
  return confirmed.reduce((a, b) => (b.error < a.error ? b : a));
}

/** A step that leaves a parameter's domain is refused by the factory, and no step to use. */
function tolerant(sample: () => Sampled): Sampled | undefined {
  try {
    return sample();
  } catch (error) {
    if (error instanceof LeadlineError) return undefined;
    throw error;
  }
}

function quotientOf(nodes: ArrayLike<number>, values: ArrayLike<number>): Quotient | undefined {
  const [a, b] = [wide, narrow].map((stencil) => {
    const t = stencil.map((k) => nodes[k]! - nodes[0]!);
    const weights = slopeWeights(t);
    let [value, noise] = [0, 0];
    stencil.forEach((k, j) => {
      value += weights[j]! * values[k]!;
      // Two roundings of a float32: one of the result, one inside.
      noise += Math.abs(weights[j]! * values[k]!) * 2 ** -23;
    });
    return { value, noise };
  });
  const error = Math.abs(a!.value - b!.value) + b!.noise;
  return Number.isFinite(error) ? { value: b!.value, error } : undefined;
}

/** Weights of the derivative at t[0] = 0 of the polynomial through the nodes t (Lagrange's form). */
function slopeWeights(t: readonly number[]): number[] {
  const weights = t.map((own, j) => {
    if (j === 0) return 0;
    let product = 1 / own;
    t.forEach((other, k) => {
      if (k !== 0 && k !== j) product *= other / (other - own);
    });
    return product;
  });
  weights[0] = -weights.reduce((a, b) => a + b, 0);
  return weights;
}
