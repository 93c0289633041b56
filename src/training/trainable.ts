import type * as tf from '@tensorflow/tfjs';
import type { Stream } from '../random/stream.js';

/** Per-point terms of a bound, by the node they belong to, in nats. */
export interface Parts<Term> {
  /** The log-likelihood of each observed node. */
  readonly logLikelihood: Readonly<Record<string, Term>>;
  /** The divergence of each latent. */
  readonly divergence: Readonly<Record<string, Term>>;
}

/** What training needs of a bound: any object with such an `estimate` can be trained. */
export interface Trainable<Data> {
  /** The bound and its surrogate from one set of draws. */
  estimate(
    data: Data,
    stream: Stream,
  ): {
    /** The bound of each data point, in nats: `[dataPoints]`. */
    readonly value: tf.Tensor;
    /** A scalar, summed over data points, whose gradient is the estimator. */
    readonly surrogate: tf.Tensor;
    readonly parts: Parts<tf.Tensor>;
  };
}

/** A part with the name that messages give it. */
export interface NamedPart<Term> {
  readonly kind: 'logLikelihood' | 'divergence';
  readonly node: string;
  readonly label: string;
  readonly term: Term;
}

/** The parts of a bound as a list, log-likelihoods first. */
export function listParts<Term>(parts: Parts<Term>): NamedPart<Term>[] {
  const list: NamedPart<Term>[] = [];
  for (const [node, term] of Object.entries(parts.logLikelihood)) {
    list.push({ kind: 'logLikelihood', node, label: `log-likelihood of ${node}`, term });
  }
  for (const [node, term] of Object.entries(parts.divergence)) {
    list.push({ kind: 'divergence', node, label: `divergence of ${node}`, term });
  }
  return list;
}

/** The same parts as records, with one number for each. */
export function partsOf(list: readonly NamedPart<unknown>[], values: ArrayLike<number>): Parts<number> {
  const parts = { logLikelihood: {} as Record<string, number>, divergence: {} as Record<string, number> };
  for (const [i, { kind, node }] of list.entries()) parts[kind][node] = values[i]!;
  return parts;
}
