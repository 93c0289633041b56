import * as tf from '@tensorflow/tfjs';
import * as library from '../src/index.js';
import { compare, interleave } from './measure.js';
import type { Row } from './row.js';

const points = 100_000;

type Parameters = Readonly<Record<string, number>>;
type Factory = (parameters: Readonly<Record<string, tf.Tensor>>) => library.Distribution;

/** Every scalar family with moderate parameters. */
const families: readonly [name: string, factory: unknown, parameters: Parameters][] = [
  ['asymmetricLaplace', library.asymmetricLaplace, { location: 0.5, scale: 1.2, asymmetry: 1.5 }],
  ['bernoulli', library.bernoulli, { logit: 0.3 }],
  ['beta', library.beta, { alpha: 2, beta: 3 }],
  ['cauchy', library.cauchy, { location: 0.5, scale: 1.2 }],
  ['chiSquared', library.chiSquared, { degreesOfFreedom: 4 }],
  ['continuousBernoulli', library.continuousBernoulli, { logit: 0.7 }],
  ['exponential', library.exponential, { rate: 2 }],
  ['gamma', library.gamma, { shape: 3, rate: 2 }],
  ['gompertz', library.gompertz, { shape: 0.5, rate: 1.3 }],
  ['gumbel', library.gumbel, { location: 0.5, scale: 1.2 }],
  ['halfCauchy', library.halfCauchy, { scale: 1.2 }],
  ['halfNormal', library.halfNormal, { scale: 1.2 }],
  ['inverseGamma', library.inverseGamma, { shape: 3, scale: 2 }],
  ['inverseGaussian', library.inverseGaussian, { mean: 1.2, shape: 2 }],
  ['kumaraswamy', library.kumaraswamy, { alpha: 2, beta: 3 }],
  ['laplace', library.laplace, { location: 0.5, scale: 1.2 }],
  ['logLogistic', library.logLogistic, { scale: 1.2, shape: 3 }],
  ['logNormal', library.logNormal, { location: 0.5, scale: 0.7 }],
  ['logitNormal', library.logitNormal, { location: 0.5, scale: 0.7 }],
  ['logistic', library.logistic, { location: 0.5, scale: 1.2 }],
  ['pareto', library.pareto, { scale: 1.2, shape: 3 }],
  ['poisson', library.poisson, { rate: 3 }],
  ['rayleigh', library.rayleigh, { scale: 1.2 }],
  ['reciprocal', library.reciprocal, { lower: 0.1, upper: 9 }],
  ['studentT', library.studentT, { degreesOfFreedom: 4, location: 0.5, scale: 1.2 }],
  ['triangular', library.triangular, { lower: -1, peak: 0.5, upper: 3 }],
  ['uniform', library.uniform, { lower: -1, upper: 2 }],
  ['vonMises', library.vonMises, { location: 0.5, concentration: 2 }],
  ['weibull', library.weibull, { scale: 1.2, shape: 3 }],
];

/** Draws, and log densities with the gradient in every parameter, of full-size parameters, beside the normal's. */
export function* familyCosts(): Iterable<Row> {
  for (const [name, factory, parameters] of families) {
    const own = work(factory as Factory, parameters);
    const normal = work(library.normal as unknown as Factory, { mean: 0.5, sd: 1.2 });
    const row = (part: string, comparison: Row['comparison']): Row => ({
      section: 'Families beside the normal',
      what: `${name}: ${part}`,
      peer: 'normal',
      backend: tf.getBackend(),
      comparison,
    });
    const [a, b, c, d] = interleave([own.draws, normal.draws, own.score, normal.score], { rounds: 7 });
    own.dispose();
    normal.dispose();
    yield row('draws', compare(a!, b!));
    yield row('log density and gradient', compare(c!, d!));
  }
}

function work(factory: Factory, parameters: Parameters) {
  const names = Object.keys(parameters);
  const tensors = names.map((name) => tf.fill([points], parameters[name]!));
  const make = (given: readonly tf.Tensor[]): library.Distribution =>
    factory(Object.fromEntries(names.map((name, k) => [name, given[k]!])));
  const d = make(tensors);
  const stream = library.stream('bench families');
  const x = d.draw(stream);
  const gradient = tf.grads((...given: tf.Tensor[]) => make(given).logDensity(x));
  return {
    draws: () => tf.tidy(() => void d.draw(stream)),
    score: () => tf.tidy(() => void gradient(tensors)),
    dispose: () => tf.dispose([...tensors, x]),
  };
}
