import * as tf from '@tensorflow/tfjs';
import { expectation, regionOf } from '../expectation.js';
import { copies } from '../gradients.js';
import { Violation } from '../lawError.js';
import {
  type Member,
  memberFrom,
  numbers,
  parameterTensors,
  type Subject,
  scoped,
  sortedDraws,
  streamFor,
} from '../subject.js';

const count = 20_000;
const limit = 5.33; // |z| of a standard normal: P = 1.0e-7, two-sided

const look = 'the derivatives of draw in the parameters, or those of logDensity';

/** Bounded functions of z, so that both estimators have a variance; none of them is symmetric. */
const functions: Readonly<Record<string, { value(u: number): number; slope(u: number): number }>> = {
  'σ(u − ½)': {
    value: (u) => 1 / (1 + Math.exp(0.5 - u)),
    slope: (u) => 1 / (2 + Math.exp(0.5 - u) + Math.exp(u - 0.5)),
  },
  'exp(−(u − 1)²)': {
    value: (u) => Math.exp(-((u - 1) ** 2)),
    slope: (u) => -2 * (u - 1) * Math.exp(-((u - 1) ** 2)),
  },
};

/**
 * The pathwise gradient of E[f(z)] is the gradient: it agrees with the score-function estimate from draws of its own
 * (Williams 1992), the difference over its standard error a standard normal. Where the support moves with the
 * parameters the score misses that, and the mean pathwise gradient is held to differences of the integral.
 */
export function pathwiseGradient(subject: Subject): void {
  const sample = sortedDraws(subject, 'scale', 101);
  const [middle, spread] = [sample[50]!, sample[84]! - sample[16]! || 1];
  const unit = (z: number) => (z - middle) / spread;
  const draws = pathwiseDraws(subject, 'pathwise');
  const scores = ['interval', 'ray'].includes(subject.d.support.name) ? undefined : scoredDraws(subject);
  for (const [title, f] of Object.entries(functions)) {
    const baseline = Array.from(sample, (z) => f.value(unit(z))).reduce((a, b) => a + b, 0) / sample.length;
    draws.slopes.forEach((slope, k) => {
      const each = slope.map(
        (dz, i) => (dz * f.slope(unit(draws.z[Math.floor((i * count) / slope.length)]!))) / spread,
      );
      const other = scores?.slopes[k]?.map(
        (s, i) => s * (f.value(unit(scores.z[Math.floor((i * count) / slope.length)]!)) - baseline),
      );
      compare(subject, k, title, each, other, (z) => f.value(unit(z)));
    });
  }
}

function compare(
  subject: Subject,
  k: number,
  title: string,
  pathwise: Float64Array,
  score: Float64Array | undefined,
  f: (z: number) => number,
): void {
  const name = Object.keys(subject.parameters)[k]!;
  const width = subject.parameters[name]!.data.length;
  for (let coordinate = 0; coordinate < width; coordinate++) {
    const must = `the pathwise gradient of E[${title}], u = z in units of its spread, in ${name}${width > 1 ? `[${coordinate}]` : ''} must be that of the expectation`;
    const a = meanOf(pathwise, coordinate, width);
    if (!score) {
      requireIntegralSlope(subject, k, coordinate, a, must, f);
      continue;
    }
    const b = meanOf(score, coordinate, width);
    const z = (a.mean - b.mean) / Math.hypot(a.error, b.error, 1e-6 * Math.abs(b.mean), 1e-30);
    if (Math.abs(z) <= limit) continue;
    throw new Violation(
      must,
      `${a.mean.toPrecision(5)} ± ${a.error.toPrecision(2)}`,
      `${b.mean.toPrecision(5)} ± ${b.error.toPrecision(2)} by the score function (z = ${z.toPrecision(3)}, limit ${limit})`,
      look,
    );
  }
}

/** Differences of E[f] by quadrature, each allowed for the standard error of the pathwise mean. */
function requireIntegralSlope(
  subject: Subject,
  k: number,
  coordinate: number,
  pathwise: { mean: number; error: number },
  must: string,
  f: (z: number) => number,
): void {
  const { data, shape } = Object.values(subject.parameters)[k]!;
  const region = regionOf(subject);
  const at = (node: number): number =>
    scoped(() => {
      const tensors = parameterTensors(subject);
      tensors[k] = tf.tensor(
        Array.from(data, (v, i) => (i === coordinate ? node : v)),
        [...shape],
      );
      return expectation({ ...subject, d: memberFrom(subject, tensors) }, (x) => f(x), 1e-8, region);
    });
  const centre = data[coordinate]!;
  const step = region.spread / 16;
  const nodes = [-2, -1, 1, 2].map((m) => Math.fround(centre + m * step));
  const [a, b, c, d] = nodes.map(at);
  const wide = (d! - a!) / (nodes[3]! - nodes[0]!);
  const near = (c! - b!) / (nodes[2]! - nodes[1]!);
  const value = near + (near - wide) / 3;
  const error = Math.abs(value - near) / 4 + 1e-5 * Math.abs(value);
  if (Math.abs(pathwise.mean - value) <= limit * pathwise.error + error) return;
  throw new Violation(
    must,
    `${pathwise.mean.toPrecision(5)} ± ${pathwise.error.toPrecision(2)}`,
    `${value.toPrecision(5)} ± ${error.toPrecision(2)} by differences of the integral`,
    look,
  );
}

function meanOf(values: Float64Array, from: number, step: number): { mean: number; error: number } {
  let [n, mean, squares] = [0, 0, 0];
  for (let i = from; i < values.length; i += step) {
    n++;
    const gap = values[i]! - mean;
    mean += gap / n;
    squares += gap * (values[i]! - mean);
  }
  return { mean, error: Math.sqrt(squares / n / (n - 1)) };
}

/** Draws, each of a member of its own, with each one's derivative in its own parameters. */
function pathwiseDraws(subject: Subject, label: string): { z: Float64Array; slopes: Float64Array[] } {
  return perMember(subject, (d) => d.draw(streamFor(subject, label)));
}

/** Draws with the derivative of each one's log density in its own parameters. */
function scoredDraws(subject: Subject): { z: Float64Array; slopes: Float64Array[] } {
  const z = numbers(() => subject.d.draw(streamFor(subject, 'score'), count));
  const { slopes } = perMember(subject, (d) => d.logDensity(tf.tensor1d(Float32Array.from(z))));
  return { z, slopes };
}

function perMember(
  subject: Subject,
  compute: (d: Member) => tf.Tensor,
): { z: Float64Array; slopes: Float64Array[] } {
  return scoped(() => {
    const parameters = copies(subject, count);
    const z = numbers(() => compute(memberFrom(subject, parameters)));
    const total = (...given: tf.Tensor[]) =>
      given.reduce(
        (sum, t) => tf.add(sum, tf.sum(tf.mul(t, 0))),
        tf.sum(compute(memberFrom(subject, given))),
      );
    const slopes = tf.grads(total as (...x: tf.Tensor[]) => tf.Tensor)(parameters);
    return { z, slopes: slopes.map((g) => Float64Array.from(g.dataSync())) };
  });
}
