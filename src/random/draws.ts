import { ParameterError, ShapeError } from '../errors.js';
import { type FillName, fill } from './fill.js';
import { type Stream, wordsOf } from './stream.js';

// One draw for each element of the parameters, exact, computed in double precision and rounded once, and kept
// inside the open support: a positive draw that underflows float32 is stored as the smallest positive float32,
// one that overflows as the largest finite one, one that rounds to the upper end of a bounded support as the
// largest float32 below it. Functions of one draw (its logarithm, its log odds) take the same words of the stream.

/** One gamma draw with scale 1 per shape. Below shape 0.1 it often underflows: use {@link logGammaDraws}. */
export function gammaDraws(stream: Stream, shapes: Float32Array): Float32Array {
  return draws(stream, 'gammaDraws', 'fillGamma', { shape: shapes });
}

/** The logarithm of the draw that {@link gammaDraws} makes; does not underflow, however small the shape. */
export function logGammaDraws(stream: Stream, shapes: Float32Array): Float32Array {
  return draws(stream, 'logGammaDraws', 'fillLogGamma', { shape: shapes });
}

/** Gamma draws times a scale; the product is formed in double precision, so neither factor underflows alone. */
export function scaledGammaDraws(stream: Stream, shapes: Float32Array, scales: Float32Array): Float32Array {
  return draws(stream, 'scaledGammaDraws', 'fillScaledGamma', { shape: shapes, scale: scales });
}

/** The logarithm of the draw that {@link scaledGammaDraws} makes. */
export function logScaledGammaDraws(
  stream: Stream,
  shapes: Float32Array,
  scales: Float32Array,
): Float32Array {
  return draws(stream, 'logScaledGammaDraws', 'fillLogScaledGamma', { shape: shapes, scale: scales });
}

/** A scale over a gamma draw. */
export function inverseGammaDraws(stream: Stream, shapes: Float32Array, scales: Float32Array): Float32Array {
  return draws(stream, 'inverseGammaDraws', 'fillInverseGamma', { shape: shapes, scale: scales });
}

/** The logarithm of the draw that {@link inverseGammaDraws} makes. */
export function logInverseGammaDraws(
  stream: Stream,
  shapes: Float32Array,
  scales: Float32Array,
): Float32Array {
  return draws(stream, 'logInverseGammaDraws', 'fillLogInverseGamma', { shape: shapes, scale: scales });
}

/** One beta draw z per pair of shapes, strictly between 0 and 1. */
export function betaDraws(stream: Stream, a: Float32Array, b: Float32Array): Float32Array {
  return draws(stream, 'betaDraws', 'fillBeta', { a, b });
}

/** log z of the draw that {@link betaDraws} makes: exact where z underflows, and strictly below 0. */
export function logBetaDraws(stream: Stream, a: Float32Array, b: Float32Array): Float32Array {
  return draws(stream, 'logBetaDraws', 'fillLogBeta', { a, b });
}

/** log z − log(1 − z) of the draw that {@link betaDraws} makes: exact at both ends. */
export function logOddsBetaDraws(stream: Stream, a: Float32Array, b: Float32Array): Float32Array {
  return draws(stream, 'logOddsBetaDraws', 'fillLogOddsBeta', { a, b });
}

/** A scale times the odds z / (1 − z) of a beta draw, a ratio of gamma draws of shapes a and b. */
export function betaPrimeDraws(
  stream: Stream,
  a: Float32Array,
  b: Float32Array,
  scales: Float32Array,
): Float32Array {
  return draws(stream, 'betaPrimeDraws', 'fillBetaPrime', { a, b, scale: scales });
}

/** The logarithm of the draw that {@link betaPrimeDraws} makes. */
export function logBetaPrimeDraws(
  stream: Stream,
  a: Float32Array,
  b: Float32Array,
  scales: Float32Array,
): Float32Array {
  return draws(stream, 'logBetaPrimeDraws', 'fillLogBetaPrime', { a, b, scale: scales });
}

/** One draw from Student's t, location 0 and scale 1, per number of degrees of freedom. */
export function studentTDraws(stream: Stream, degreesOfFreedom: Float32Array): Float32Array {
  return draws(stream, 'studentTDraws', 'fillStudentT', { 'degrees of freedom': degreesOfFreedom });
}

/** One von Mises draw per concentration, location 0, strictly between −π and π. */
export function vonMisesDraws(stream: Stream, concentrations: Float32Array): Float32Array {
  return draws(stream, 'vonMisesDraws', 'fillVonMises', { concentration: concentrations });
}

/** One inverse Gaussian draw per mean and shape. */
export function inverseGaussianDraws(
  stream: Stream,
  means: Float32Array,
  shapes: Float32Array,
): Float32Array {
  return draws(stream, 'inverseGaussianDraws', 'fillInverseGaussian', { mean: means, shape: shapes });
}

function draws(
  stream: Stream,
  caller: string,
  name: FillName,
  positive: Readonly<Record<string, Float32Array>>,
): Float32Array {
  const state = wordsOf(caller, stream);
  const words = Object.keys(positive);
  const parameters = Object.values(positive);
  const { length } = parameters[0]!;
  if (parameters.some((values) => values.length !== length)) {
    throw new ShapeError(
      `${caller}: parameters must have one element per draw each; got ${parameters.map((p) => p.length).join(' and ')}; broadcast them first`,
    );
  }
  const refuse = (k: number, i: number): never => {
    throw new ParameterError(
      `${caller}: ${words[k]} must be positive and finite; got ${parameters[k]![i]} at element ${i}; check what computes the ${words[k]}`,
    );
  };
  const out = new Float32Array(length);
  fill(state, name, out, { parameters, refuse });
  return out;
}
