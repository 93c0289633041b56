import { SQRT_HALF } from './constants.js';
import { erfcx } from './errorFunction.js';
import { NODES, WEIGHTS } from './gaussLegendre.js';

/**
 * ∫₀^∞ e^{−yu − u²/2} erfcx(b (y + u) / √2) du with y = √(1 + a²) z and b = a / √(1 + a²), for z, a ≥ 0: the thin
 * tail of the skew normal law without its factor e^{−y²/2} / √(2π (1 + a²)).
 *
 * erfcx varies slowly, and the rest falls on one scale whatever z and a are: 24 nodes up to where the exponent
 * reaches −50 give 1e-12. From the density 2 φ(t) Φ(−at) with Φ(−at) = ½ e^{−a²t²/2} erfcx(at/√2), Azzalini (1985),
 * "A class of distributions which includes the normal ones", equation 1.
 */
export function thinTail(z: number, a: number): number {
  const c = Math.sqrt(1.0 + a * a);
  const y = c * z;
  const slope = (a / c) * SQRT_HALF;
  const half = 50.0 / (y + Math.sqrt(y * y + 100.0));
  let sum = 0.0;
  for (let i = 0; i < 24; i++) {
    const k = i < 12 ? i : i - 12;
    const u = half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    sum += WEIGHTS[k]! * Math.exp(-u * (y + 0.5 * u)) * erfcx(slope * (y + u));
  }
  return half * sum;
}
