import { tetragamma } from './trigamma.js';
import { trigammaDifference } from './trigammaDifference.js';

// Nodes and weights of the 10-point Gauss–Legendre rule, the positive half; by mpmath at 40 digits.
const NODES: number[] = [
  0.9739065285171717, 0.8650633666889845, 0.6794095682990244, 0.4333953941292472, 0.14887433898163122,
];
const WEIGHTS: number[] = [
  0.06667134430868814, 0.1494513491505806, 0.21908636251598204, 0.26926671930999635, 0.29552422471475287,
];

/** The derivatives of `gammaBend`, left by it. */
export let bendS: number = 0.0;
export let bendB: number = 0.0;

/**
 * f(2s) − 2 f(s) + f(0) for f(t) = log Γ(1 + t) − log Γ(1 + t + b), and its derivatives in s and b.
 *
 * As the integral ∫ min(t, 2s − t) f″(t) dt over (0, 2s), whose integrand is positive: written out, the six
 * logarithms cancel. f″(t) = ψ′(1 + t) − ψ′(1 + t + b) behaves like a power of 1 + t, so that ten nodes on each
 * stretch over which 1 + t doubles give 1e-12.
 */
export function gammaBend(s: number, b: number): number {
  let sum = 0.0;
  let sumB = 0.0;
  let sumS = 0.0;
  let from = 0.0;
  while (from < 2.0 * s) {
    let to = 2.0 * from + 1.0;
    if (from < s && to > s) to = s;
    if (to > 2.0 * s) to = 2.0 * s;
    const half = 0.5 * (to - from);
    for (let i = 0; i < 10; i++) {
      const k = i < 5 ? i : i - 5;
      const t = from + half * (i < 5 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
      const weight = half * WEIGHTS[k]!;
      const curve = trigammaDifference(1.0 + t, b);
      const height = t < s ? t : 2.0 * s - t;
      sum += weight * height * curve;
      sumB -= weight * height * tetragamma(1.0 + t + b);
      if (t > s) sumS += 2.0 * weight * curve;
    }
    from = to;
  }
  bendS = sumS;
  bendB = sumB;
  return sum;
}
