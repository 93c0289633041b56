import type * as tf from '@tensorflow/tfjs';
import type { Stream } from '../random/stream.js';

/** The pieces of a bound, each `[dataPoints]`, in nats. */
export interface BoundParts<Observed extends string = string, Latent extends string = string> {
  /** The log-likelihood of each observed value, by name. */
  readonly logLikelihood: Readonly<Record<Observed, tf.Tensor1D>>;
  /** The divergence of each latent value, by name. */
  readonly divergence: Readonly<Record<Latent, tf.Tensor1D>>;
}

/** One estimate of a bound. */
export interface BoundEstimate<Observed extends string = string, Latent extends string = string> {
  /** The bound of each data point, `[dataPoints]`, in nats. */
  readonly value: tf.Tensor1D;
  /** The scalar to differentiate: its gradient is the estimator of the objective's, summed over data points. */
  readonly surrogate: tf.Scalar;
  /** What the value is made of. */
  readonly parts: BoundParts<Observed, Latent>;
}

/** A bound on the log evidence, estimated from draws. */
export interface Bound<Data, Observed extends string = string, Latent extends string = string> {
  /** The value, the surrogate and the parts from one set of draws. */
  estimate(data: Data, stream: Stream): BoundEstimate<Observed, Latent>;
  /** Minus the mean surrogate per data point: what an optimizer minimizes. */
  loss(data: Data, stream: Stream): tf.Scalar;
}
