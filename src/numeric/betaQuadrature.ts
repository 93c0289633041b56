import { exponentialRemainder } from './exponentialRemainder.js';
import { NODES, WEIGHTS } from './gaussLegendre.js';
import { log1pmx } from './log1pmx.js';

/** ∫ e^φ dv, left by `betaQuadrature`. */
export let quadratureSum: number = 0.0;
/** The derivatives of its logarithm's numerator: ∫ log(t/x) e^φ dv and ∫ log((1−t)/(1−x)) e^φ dv. */
export let quadratureA: number = 0.0;
export let quadratureB: number = 0.0;

/**
 * The lower tail of a beta law in units of its density: I_x(a, b) = D ∫₀^∞ e^{φ(v)} dv with D = x^a y^b / B(a, b),
 * y = 1 − x, and t moving left from x by v in log odds: φ = a log(t/x) + b log((1−t)/y). φ is concave, and at x
 * below the mean it falls from the start: 24 nodes on the stretch where it falls to about −60 give 1e-13 once
 * min(a, b) ≥ 30. Every part of φ is written so that nothing of the size of a or b cancels; `lambda` is
 * a y − b x ≥ 0, minus the slope of φ at 0.
 */
export function betaQuadrature(a: number, b: number, x: number, y: number, lambda: number): void {
  const n = a + b;
  const curvature = n * x * y;
  // Where −λv − ½ curvature v² reaches −60.
  const end = 120.0 / (lambda + Math.sqrt(lambda * lambda + 120.0 * curvature));
  const half = 0.5 * end;
  let sum = 0.0;
  let sumA = 0.0;
  let sumB = 0.0;
  for (let i = 0; i < 24; i++) {
    const k = i < 12 ? i : i - 12;
    const v = half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    // For x ≤ ½, (1 − t) / y = 1 / (1 + m) and t / x = e^−v / (1 + m) with m = x (e^−v − 1). For y small the same
    // with e^−v taken out of 1 + m: 1 + m = e^−v (1 + y (e^v − 1)).
    const u = x <= 0.5 ? -v : v;
    const share = x <= 0.5 ? x : y;
    const bend = share * exponentialRemainder(u);
    const m = share * u + bend;
    const rest = log1pmx(m);
    const phi = -v * lambda - n * (bend + rest);
    const logY = (x <= 0.5 ? 0.0 : v) - (m + rest);
    const weight = WEIGHTS[k]! * Math.exp(phi);
    sum += weight;
    sumA += weight * (logY - v);
    sumB += weight * logY;
  }
  quadratureSum = half * sum;
  quadratureA = half * sumA;
  quadratureB = half * sumB;
}
