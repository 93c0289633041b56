import { besselRatioComplement } from './bessel.js';
import { PI, PI_LOW } from './constants.js';
import { NODES, WEIGHTS } from './gaussLegendre.js';

/** Which share the last call of `vonMises` computed: 0 between 0 and s, 1 between s and π. */
export let vonMisesSide: number = 0.0;
/** That share divided by the density at s. */
export let vonMisesPart: number = 0.0;
/** ds/dκ at a fixed share, for an angle s that is carried along with the concentration κ. */
export let vonMisesSlope: number = 0.0;

/**
 * The von Mises law about 0, density e^{κ cos t} / (2π I₀(κ)), at an angle 0 ≤ s < π, in units of the density at
 * s: ∫ e^{κ(cos t − cos s)} dt, and ds/dκ = −∫₀ˢ e^{κ(cos t − cos s)} (cos t − A) dt with A = I₁(κ) / I₀(κ).
 *
 * Up to the angle whose cosine is A both integrals run from 0 to s, where their integrands are smooth and
 * positive; beyond it from s to π, where the second one's is negative and its sign changes with the side. So
 * nothing cancels and nothing underflows, at any concentration: 24 nodes give 1e-11. Beyond a fall of the
 * exponent by 50 the second range is cut.
 * Source: Figurnov, Mohamed and Mnih (2018), "Implicit reparameterization gradients", equation 6, with
 * ∂ log p/∂κ = cos t − A, whose integral over the whole circle is zero.
 */
export function vonMises(s: number, concentration: number): void {
  vonMisesBetween(s, PI - s + PI_LOW, concentration);
}

/** The same at s = π − left, both given: each end of the range keeps its own relative accuracy. */
export function vonMisesBetween(s: number, left: number, concentration: number): void {
  const spread = besselRatioComplement(concentration);
  const sinHalf = Math.sin(0.5 * s);
  const cosHalf = Math.cos(0.5 * s);
  let sum = 0.0;
  let slope = 0.0;
  if (2.0 * sinHalf * sinHalf <= spread) {
    const half = 0.5 * s;
    for (let i = 0; i < 24; i++) {
      const k = i < 12 ? i : i - 12;
      const t = half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
      const u = Math.sin(0.5 * t);
      const rise = 2.0 * Math.sin(0.5 * (s + t)) * Math.sin(0.5 * (s - t));
      const weight = WEIGHTS[k]! * Math.exp(concentration * rise);
      sum += weight;
      slope += weight * (spread - 2.0 * u * u);
    }
    vonMisesSide = 0.0;
    vonMisesPart = half * sum;
    vonMisesSlope = -half * slope;
    return;
  }
  const sine = s < 2.0 ? Math.sin(s) : Math.sin(left);
  const cosine = Math.cos(s);
  // Where the exponent has fallen by 50, by its first two derivatives; its third only shortens the range.
  const steep = concentration * sine;
  const square = steep * steep + 100.0 * concentration * cosine;
  const reach = square > 0.0 ? 100.0 / (steep + Math.sqrt(square)) : left;
  const half = 0.5 * Math.min(reach, left);
  for (let i = 0; i < 24; i++) {
    const k = i < 12 ? i : i - 12;
    const v = 0.5 * half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    const sinV = Math.sin(v);
    const cosV = Math.cos(v);
    const u = sinHalf * cosV + cosHalf * sinV;
    const fall = 2.0 * sinV * (sine * cosV + cosine * sinV);
    const weight = WEIGHTS[k]! * Math.exp(-concentration * fall);
    sum += weight;
    slope += weight * (spread - 2.0 * u * u);
  }
  vonMisesSide = 1.0;
  vonMisesPart = half * sum;
  vonMisesSlope = half * slope;
}
