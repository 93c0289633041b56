import * as tf from '@tensorflow/tfjs';
import type { Distribution, HasMoments, HasQuantiles, HasTails } from '../distributions/distribution.js';
import { stream as makeStream, type Stream } from '../random/stream.js';
import { flatten, type NestedNumbers } from '../tensor/checks.js';
import type { Setting } from './law.js';

/** A distribution with whichever closed forms it has. */
export type Member = Distribution & Partial<HasMoments & HasTails & HasQuantiles>;

/** A factory and what it makes, as laws see it. */
export type Factory = (options: object) => Member;

/** One parameter's numbers, as float32. */
export interface ParameterNumbers {
  readonly data: Float32Array;
  readonly shape: readonly number[];
}

/** A member of a family with the parameters that it was made of. */
export interface Subject {
  readonly factory: Factory;
  readonly setting: Setting;
  readonly options: object;
  /** The options that are numbers, by name: the ones that gradients are taken in. */
  readonly parameters: Readonly<Record<string, ParameterNumbers>>;
  readonly d: Member;
}

/** Makes the member that `options` describe. */
export function subjectOf(factory: Factory, setting: Setting, options: object): Subject {
  const parameters: Record<string, ParameterNumbers> = {};
  for (const [name, value] of Object.entries(options)) {
    if (typeof value === 'number') parameters[name] = { data: Float32Array.of(value), shape: [] };
    else if (value instanceof tf.Tensor)
      parameters[name] = { data: Float32Array.from(value.dataSync()), shape: value.shape };
    else if (ArrayBuffer.isView(value)) {
      const data = Float32Array.from(value as Float32Array);
      parameters[name] = { data, shape: [data.length] };
    } else if (Array.isArray(value)) parameters[name] = flatten(setting.title, name, value as NestedNumbers);
  }
  const rounded = Object.fromEntries(
    Object.entries(parameters).map(([name, { data, shape }]) => [name, nested(data, shape)]),
  );
  return { factory, setting, options, parameters, d: factory({ ...options, ...rounded }) };
}

function nested(data: ArrayLike<number>, shape: readonly number[]): number | NestedNumbers {
  if (shape.length === 0) return data[0]!;
  const [first, ...rest] = shape;
  const size = rest.reduce((a, b) => a * b, 1);
  return Array.from({ length: first! }, (_, i) =>
    nested(Array.from(data).slice(i * size, (i + 1) * size), rest),
  );
}

/** The parameters as tensors, in order. */
export function parameterTensors(subject: Subject): tf.Tensor[] {
  return Object.values(subject.parameters).map(({ data, shape }) => tf.tensor(data, [...shape]));
}

/** The member again, from tensors in the order of {@link parameterTensors}. */
export function memberFrom(subject: Subject, tensors: readonly tf.Tensor[]): Member {
  const given = Object.fromEntries(Object.keys(subject.parameters).map((name, k) => [name, tensors[k]!]));
  return subject.factory({ ...subject.options, ...given });
}

/** A stream of one law's own. */
export function streamFor(subject: Subject, label: string): Stream {
  return makeStream(subject.setting.seed).fork(label);
}

/** Runs `compute`, which keeps no tensor, and disposes of all that it made. */
export function scoped<T>(compute: () => T): T {
  const engine = tf.engine();
  engine.startScope();
  try {
    return compute();
  } finally {
    engine.endScope();
  }
}

/** The numbers of a tensor that `compute` makes, nothing left behind. */
export function numbers(compute: () => tf.Tensor): Float64Array {
  return scoped(() => Float64Array.from(compute().dataSync()));
}

/** The log density at points, for a member with scalar points and no array axes. */
export function logDensityAt(d: Member, x: ArrayLike<number>): Float64Array {
  return numbers(() => d.logDensity(tf.tensor1d(Float32Array.from(x))));
}

/** Random draws in ascending order. */
export function sortedDraws(subject: Subject, label: string, count: number): Float64Array {
  return numbers(() => subject.d.draw(streamFor(subject, label), count)).sort();
}
