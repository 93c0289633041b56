import { besselI0e, logBesselI0e } from './bessel.js';
import { PI, PI_LOW } from './constants.js';
import { normalQuantile } from './normalQuantile.js';
import { vonMises, vonMisesBetween, vonMisesPart, vonMisesSide, vonMisesSlope } from './vonMisesCore.js';

// The von Mises law about 0 on [−π, π]: a circular bell of concentration κ > 0, whose distribution function is
// measured from −π. The integrals stand in vonMisesCore.ts.

const LOG_2PI: number = 1.8378770664093453;

/** The density e^{κ cos x} / (2π I₀(κ)). */
function density(x: number, concentration: number): number {
  const u = Math.sin(0.5 * x);
  return Math.exp(-2.0 * concentration * u * u) / (2.0 * PI * besselI0e(concentration));
}

/** The share between −π and −s, s ≥ 0, after a call of `vonMises` at s. */
function lowerShare(s: number, concentration: number): number {
  const part = density(s, concentration) * vonMisesPart;
  return vonMisesSide === 0.0 ? 0.5 - part : part;
}

/**
 * F(x) = ∫_{−π}^x e^{κ cos t} dt / (2π I₀(κ)), the distribution function on [−π, π], with relative accuracy in the
 * lower tail; 0 and 1 beyond the ends. F(x) = 1 − F(−x).
 * @example
 * ```ts
 * import { vonMisesCdf } from 'leadline/numeric';
 * console.log(vonMisesCdf(-1, 2).toPrecision(6));
 * // 0.110422
 * ```
 */
export function vonMisesCdf(x: number, concentration: number): number {
  if (!(x > -PI && x < PI)) return x <= -PI ? 0.0 : x >= PI ? 1.0 : NaN;
  vonMises(Math.abs(x), concentration);
  const lower = lowerShare(Math.abs(x), concentration);
  return x <= 0.0 ? lower : 1.0 - lower;
}
/**
 * The partial derivative of `vonMisesCdf` in `x`.
 * @example
 * ```ts
 * import { vonMisesCdf_x } from 'leadline/numeric';
 * console.log(vonMisesCdf_x(-1, 2).toPrecision(6));
 * // 0.205714
 * ```
 */
export function vonMisesCdf_x(x: number, concentration: number): number {
  if (!(x >= -PI && x <= PI)) return x < -PI || x > PI ? 0.0 : NaN;
  return density(x, concentration);
}
/**
 * The partial derivative of `vonMisesCdf` in `concentration`.
 * @example
 * ```ts
 * import { vonMisesCdf_concentration } from 'leadline/numeric';
 * console.log(vonMisesCdf_concentration(-1, 2).toPrecision(6));
 * // -0.0696286
 * ```
 */
export function vonMisesCdf_concentration(x: number, concentration: number): number {
  if (!(x > -PI && x < PI)) return x <= -PI || x >= PI ? 0.0 : NaN;
  return -density(x, concentration) * vonMisesDrawDerivative(x, concentration);
}

/**
 * log F(x), right also where F underflows.
 * @example
 * ```ts
 * import { vonMisesLogCdf } from 'leadline/numeric';
 * console.log(vonMisesLogCdf(-3, 400).toPrecision(6));
 * // -797.768
 * ```
 */
export function vonMisesLogCdf(x: number, concentration: number): number {
  if (!(x > -PI && x < PI)) return x <= -PI ? -Infinity : x >= PI ? 0.0 : NaN;
  const s = Math.abs(x);
  vonMises(s, concentration);
  if (x > 0.0) return Math.log1p(-lowerShare(s, concentration));
  if (vonMisesSide === 0.0) return Math.log(lowerShare(s, concentration));
  const u = Math.sin(0.5 * s);
  return Math.log(vonMisesPart) - 2.0 * concentration * u * u - LOG_2PI - logBesselI0e(concentration);
}
/**
 * The partial derivative of `vonMisesLogCdf` in `x`.
 * @example
 * ```ts
 * import { vonMisesLogCdf_x } from 'leadline/numeric';
 * console.log(vonMisesLogCdf_x(-3, 400).toPrecision(6));
 * // 46.8719
 * ```
 */
export function vonMisesLogCdf_x(x: number, concentration: number): number {
  if (!(x > -PI && x < PI)) return x <= -PI ? Infinity : x >= PI ? density(PI, concentration) : NaN;
  const s = Math.abs(x);
  vonMises(s, concentration);
  if (x <= 0.0 && vonMisesSide === 1.0) return 1.0 / vonMisesPart;
  const lower = lowerShare(s, concentration);
  return density(s, concentration) / (x <= 0.0 ? lower : 1.0 - lower);
}
/**
 * The partial derivative of `vonMisesLogCdf` in `concentration`.
 * @example
 * ```ts
 * import { vonMisesLogCdf_concentration } from 'leadline/numeric';
 * console.log(vonMisesLogCdf_concentration(-3, 400).toPrecision(6));
 * // -1.99169
 * ```
 */
export function vonMisesLogCdf_concentration(x: number, concentration: number): number {
  // At −π the share is a constant times the distance to it, and so is its derivative.
  if (!(x > -PI && x < PI)) return x >= PI ? 0.0 : NaN;
  return -vonMisesLogCdf_x(x, concentration) * vonMisesDrawDerivative(x, concentration);
}

/**
 * dx/dκ of a von Mises draw x at a fixed uniform, −(∂F/∂κ) / p(x; κ): odd in x, 0 at both ends and at 0.
 * @example
 * ```ts
 * import { vonMisesDrawDerivative } from 'leadline/numeric';
 * console.log(vonMisesDrawDerivative(1, 2).toPrecision(6));
 * // -0.338472
 * ```
 */
export function vonMisesDrawDerivative(x: number, concentration: number): number {
  if (!(x > -PI && x < PI)) return x <= -PI || x >= PI ? 0.0 : NaN;
  vonMises(Math.abs(x), concentration);
  return x < 0.0 ? -vonMisesSlope : vonMisesSlope;
}

/** The angle that `findAngle` found, and what it leaves to π. */
let angle: number = 0.0;
let left: number = 0.0;

/**
 * The angle s ≥ 0 with share p ≤ ½ between s and π.
 *
 * Newton's method, on the logarithm of the share beyond s where the core gives that, else on the share between 0
 * and s, which is concave; steps that leave the bracket are replaced by halving it. Beyond 2 the unknown is what
 * is left to π.
 */
function findAngle(p: number, concentration: number): void {
  let low = 0.0;
  let high = PI;
  const start = Math.abs(normalQuantile(p)) / Math.sqrt(concentration + 0.5);
  angle = Math.min(start, PI * (1.0 - 2.0 * p));
  left = PI - angle + PI_LOW;
  for (let i = 0; i < 200; i++) {
    vonMisesBetween(angle, left, concentration);
    const height = density(angle, concentration);
    let step = 0.0;
    if (vonMisesSide === 0.0) step = (0.5 - p) / height - vonMisesPart;
    else step = vonMisesPart * (Math.log(height) + Math.log(vonMisesPart) - Math.log(p));
    const last = Math.abs(step) <= 1e-9 * Math.min(angle, left);
    if (step > 0.0) low = angle;
    else high = angle;
    if (angle < 2.0) {
      const next = angle + step;
      angle = last || (next > low && next < high) ? next : 0.5 * (low + high);
      left = PI - angle + PI_LOW;
    } else {
      const next = left - step;
      const inside = next > 0.0 && PI - next >= low && PI - next <= high;
      left = last || inside ? next : left - step < 0.0 ? 0.1 * left : PI - 0.5 * (low + high);
      angle = PI - left;
    }
    if (last) break;
  }
}

/**
 * The x with F(x) = p, the quantile function: from −π at 0 to π at 1.
 * @example
 * ```ts
 * import { vonMisesQuantile } from 'leadline/numeric';
 * console.log(vonMisesQuantile(0.1, 2).toPrecision(6));
 * // -1.05298
 * ```
 */
export function vonMisesQuantile(p: number, concentration: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 ? -PI : p === 1.0 ? PI : NaN;
  if (p === 0.5) return 0.0;
  findAngle(Math.min(p, 1.0 - p), concentration);
  return p < 0.5 ? -angle : angle;
}
/**
 * The partial derivative of `vonMisesQuantile` in `p`.
 * @example
 * ```ts
 * import { vonMisesQuantile_p } from 'leadline/numeric';
 * console.log(vonMisesQuantile_p(0.1, 2).toPrecision(6));
 * // 5.32230
 * ```
 */
export function vonMisesQuantile_p(p: number, concentration: number): number {
  const x = vonMisesQuantile(p, concentration);
  return 1.0 / density(x, concentration);
}
/**
 * The partial derivative of `vonMisesQuantile` in `concentration`.
 * @example
 * ```ts
 * import { vonMisesQuantile_concentration } from 'leadline/numeric';
 * console.log(vonMisesQuantile_concentration(0.1, 2).toPrecision(6));
 * // 0.360618
 * ```
 */
export function vonMisesQuantile_concentration(p: number, concentration: number): number {
  if (!(p > 0.0 && p < 1.0)) return p === 0.0 || p === 1.0 ? 0.0 : NaN;
  findAngle(Math.min(p, 1.0 - p), concentration);
  vonMisesBetween(angle, left, concentration);
  return p < 0.5 ? -vonMisesSlope : vonMisesSlope;
}
