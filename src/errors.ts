/** Why a {@link LeadlineError} was thrown, for programs that branch on it. */
export type ErrorCode =
  | 'parameter'
  | 'shape'
  | 'model'
  | 'gradient'
  | 'divergence'
  | 'stream'
  | 'training'
  | 'checkpoint'
  | 'law'
  | 'environment';

/**
 * The base of every error this library throws on purpose. Its message reads
 * *function: parameter must …; got …; fix*.
 *
 * @example
 * ```ts
 * import { LeadlineError, stream } from 'leadline';
 * try {
 *   stream(1).integers(0, [3]);
 * } catch (error) {
 *   if (error instanceof LeadlineError) console.log(error.code, error.name);
 *   // parameter ParameterError
 * }
 * ```
 */
export class LeadlineError extends Error {
  /** The kind of mistake, stable across releases. */
  readonly code: ErrorCode;

  constructor(code: ErrorCode, message: string, options?: { cause?: unknown }) {
    super(message, options);
    this.name = new.target.name;
    this.code = code;
  }
}

function kind(code: ErrorCode) {
  return class extends LeadlineError {
    constructor(message: string, options?: { cause?: unknown }) {
      super(code, message, options);
    }
  };
}

/**
 * A parameter has the wrong type or a value outside its domain.
 *
 * @example
 * ```ts
 * import { normal, ParameterError } from 'leadline';
 * try {
 *   normal({ mean: 0, sd: [1, -2] });
 * } catch (error) {
 *   if (error instanceof ParameterError) console.log(error.message);
 *   // normal: sd must be positive; got -2 at [1] (shape [2]); pass logVariance if your network can produce negative values
 * }
 * ```
 */
export class ParameterError extends kind('parameter') {}

/**
 * Shapes do not match or do not broadcast.
 *
 * @example
 * ```ts
 * import { normal, product, ShapeError } from 'leadline';
 * try {
 *   product(normal({ mean: 0, sd: 1 }));
 * } catch (error) {
 *   if (error instanceof ShapeError) console.log(error.message);
 *   // product: axes must be at most the number of array axes, 0; got 1 for arrayShape []; give a parameter the missing axes, for example mean: tf.zeros([8])
 * }
 * ```
 */
export class ShapeError extends kind('shape') {}

/**
 * A directed model is put together or fed wrongly.
 *
 * @example
 * ```ts
 * import { directed, elbo, ModelError } from 'leadline';
 * try {
 *   elbo(directed() as never, 3 as never);
 * } catch (error) {
 *   if (error instanceof ModelError) console.log(error.message);
 *   // elbo: recognizer must be a directed model; got 3; build one with directed()
 * }
 * ```
 */
export class ModelError extends kind('model') {}

/**
 * A gradient was asked for that does not exist or would be wrong.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { GradientError, normal } from 'leadline';
 * const slope = tf.grad((x) => normal({ mean: 0, sd: 1 }).logDensity(x).sum());
 * try {
 *   tf.grad((x) => slope(x).sum())(tf.tensor1d([1]));
 * } catch (error) {
 *   if (error instanceof GradientError) console.log(error.message);
 *   // normal.logDensity: a kernel must be differentiated once only; got a second derivative; wrap the computation in composed(() => …)
 * }
 * ```
 */
export class GradientError extends kind('gradient') {}

/**
 * A closed-form divergence was asked for that is not registered.
 *
 * @example
 * ```ts
 * import { DivergenceError, kl, logistic, normal } from 'leadline';
 * try {
 *   kl(normal({ mean: 0, sd: 1 }), logistic({ location: 0, scale: 1 }) as never);
 * } catch (error) {
 *   if (error instanceof DivergenceError) console.log(error.message);
 *   // kl: the pair must have a closed form; got (normal, logistic); use sampledKl(q, p, stream), or registerKl('normal', 'logistic', …)
 * }
 * ```
 */
export class DivergenceError extends kind('divergence') {}

/**
 * A stream is seeded, drawn from or restored wrongly.
 *
 * @example
 * ```ts
 * import { stream, StreamError } from 'leadline';
 * try {
 *   stream(Number.NaN);
 * } catch (error) {
 *   if (error instanceof StreamError) console.log(error.message);
 *   // stream: seed must be a finite number or a text that is not empty; got NaN; pass for example 1 or 'weights'
 * }
 * ```
 */
export class StreamError extends kind('stream') {}

/**
 * A training step is refused, or training is set up wrongly.
 *
 * @example
 * ```ts
 * import { snapshot, TrainingError } from 'leadline';
 * try {
 *   snapshot({});
 * } catch (error) {
 *   if (error instanceof TrainingError) console.log(error.message);
 *   // snapshot: variables must hold at least one variable; got none; pass your model's
 * }
 * ```
 */
export class TrainingError extends kind('training') {}

/**
 * A checkpoint file is damaged or made for something else.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { CheckpointError, decodeCheckpoint } from 'leadline';
 * try {
 *   await decodeCheckpoint(new Uint8Array(3), { variables: tf.variable(tf.scalar(0)) });
 * } catch (error) {
 *   if (error instanceof CheckpointError) console.log(error.message);
 *   // decodeCheckpoint: the file must be a whole safetensors file; got 3 bytes, too few for a header; use an earlier checkpoint
 * }
 * ```
 */
export class CheckpointError extends kind('checkpoint') {}

/**
 * The engine or page lacks or forbids something the library needs.
 *
 * @example
 * ```ts
 * import { EnvironmentError, LeadlineError } from 'leadline';
 * const error = new EnvironmentError('kernels: the page must allow WebAssembly');
 * console.log(error.code, error instanceof LeadlineError);
 * // environment true
 * ```
 */
export class EnvironmentError extends kind('environment') {}
