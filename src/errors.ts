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
  | 'environment';

/**
 * The base of every error this library throws on purpose. Its message reads
 * *function: parameter must …; got …; fix*.
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

/** A parameter has the wrong type or a value outside its domain. */
export class ParameterError extends kind('parameter') {}
/** Shapes do not match or do not broadcast. */
export class ShapeError extends kind('shape') {}
/** A directed model is put together or fed wrongly. */
export class ModelError extends kind('model') {}
/** A gradient was asked for that does not exist or would be wrong. */
export class GradientError extends kind('gradient') {}
/** A closed-form divergence was asked for that is not registered. */
export class DivergenceError extends kind('divergence') {}
/** A stream is seeded, drawn from or restored wrongly. */
export class StreamError extends kind('stream') {}
/** A training step is refused, or training is set up wrongly. */
export class TrainingError extends kind('training') {}
/** A checkpoint file is damaged or made for something else. */
export class CheckpointError extends kind('checkpoint') {}
/** The engine or page lacks or forbids something the library needs. */
export class EnvironmentError extends kind('environment') {}
