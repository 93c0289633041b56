import type * as tf from '@tensorflow/tfjs';
import { vonMisesDraws } from '../random/noise.js';
import { circle } from '../support/support.js';
import type { ParameterValue } from '../tensor/checks.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import { exponentiated } from '../tensor/transforms.js';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from './distribution.js';
import { locationItself } from './locationScale.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, type Domain, finite, runaway } from './parameters.js';
import { implicitRoute } from './routes.js';

/** Parameters of {@link vonMises}. */
export type VonMisesOptions = { readonly location: ParameterValue } & OneOf<
  'concentration' | 'logConcentration'
>;

/** An array of von Mises distributions. */
export interface VonMises extends Distribution<'vonMises', 'pathwise'>, HasMoments, HasTails, HasQuantiles {
  /** A parameter as the formulas read it, differentiable. */
  parameter(name: 'location' | 'concentration'): tf.Tensor;
}

/** Beyond these the law is uniform, or narrower than any angle that is not zero. */
const ofConcentration: Domain = { words: 'between -80 and 80', above: -80, below: 80 };
/** The largest float32 below π. */
const belowPi = 3.1415925025939941;

/** The angle in [−π, π] that differs from `x` by whole turns, as a float32 inside. */
function wrapped(x: number): number {
  const turn = Math.abs(x) <= Math.PI ? x : x - 2 * Math.PI * Math.round(x / (2 * Math.PI));
  return Math.max(-belowPi, Math.min(belowPi, turn));
}

const make = implicitRoute({
  family: 'vonMises',
  support: circle,
  parameters: {
    location: { location: { domain: finite } },
    concentration: {
      concentration: {
        domain: aboveZero,
        fix: 'pass logConcentration if your network can produce negative values',
      },
      logConcentration: { domain: ofConcentration, fix: runaway, transform: exponentiated },
    },
  },
  sampler: (stream, { location, concentration }) =>
    vonMisesDraws(stream, concentration!).map((z, i) => wrapped(location![i]! + z)),
  logDensity: noComposedForm('vonMises.logDensity'),
  forms: {
    mean: locationItself,
    mode: locationItself,
    variance: noComposedForm('vonMises.variance'),
    entropy: noComposedForm('vonMises.entropy'),
    cdf: noComposedForm('vonMises.cdf'),
    survival: noComposedForm('vonMises.survival'),
    logCdf: noComposedForm('vonMises.logCdf'),
    logSurvival: noComposedForm('vonMises.logSurvival'),
    quantile: noComposedForm('vonMises.quantile'),
    upperQuantile: noComposedForm('vonMises.upperQuantile'),
  },
});

/**
 * The von Mises distribution: a bell on the circle, for directions, times of day and phases.
 *
 * Log density: concentration · cos(x − location) − log(2π I₀(concentration)), in nats; of period 2π, so that an
 * angle may be given in any turn. Draws lie between −π and π.
 * `mean` is the mean direction, `variance` the circular variance 1 − I₁(concentration) / I₀(concentration), between
 * 0 and 1. The distribution function and its kin are measured along the arc that starts at location − π: `cdf` is the
 * share between there and x, 0.5 at the location; `quantile` runs from location − π to location + π.
 * Shapes: the parameters broadcast from the right to `arrayShape`; points are scalars.
 * Gradient route: pathwise, by implicit differentiation of an exact sampler. A draw jumps from π to −π as the
 * location grows, so the gradient of a mean holds for functions of period 2π. Everything but the mean and mode is
 * evaluated by kernels and differentiable once.
 *
 * @param options - `location`, and one of `concentration`, `logConcentration`
 * @throws ParameterError when a parameter is missing, given twice, not finite, the concentration is not positive, or
 *   logConcentration lies beyond ±80.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { vonMises } from 'leadline';
 * const d = vonMises({ location: 0, concentration: 2 });
 * console.log(d.cdf(tf.tensor1d([0, 1])).arraySync());
 * // [ 0.5, 0.8895777463912964 ]
 * ```
 * Source: Mardia and Jupp, Directional Statistics (2000), section 3.5.4; draws by Best and Fisher, Applied Statistics
 * 28 (1979); their gradient from Figurnov, Mohamed and Mnih (2018), "Implicit reparameterization gradients".
 */
export function vonMises(options: VonMisesOptions): VonMises {
  return make(options) as unknown as VonMises;
}
