import * as tf from '@tensorflow/tfjs';
import type { SmoothMap } from '../../maps/smoothMap.js';
import { requireClose, Violation } from '../lawError.js';
import { requireSlopes } from '../slopes.js';
import { numbers } from '../subject.js';

type Points = readonly number[];

const at = (f: (v: tf.Tensor) => tf.Tensor, points: ArrayLike<number>): Float64Array =>
  numbers(() => f(tf.tensor1d(Float32Array.from(points))));

const slopesOf = (f: (v: tf.Tensor) => tf.Tensor, points: ArrayLike<number>): Float64Array =>
  numbers(() => tf.grad((v) => tf.sum(f(v)))(tf.tensor1d(Float32Array.from(points))));

/** Images lie in the set that the map says it maps onto. */
export function imagesInside(map: SmoothMap, points: Points): void {
  const { name } = map.onto;
  at(map.apply, points).forEach((x, i) => {
    const inside =
      name === 'positive' ? x >= 0 : name === 'unitInterval' ? x >= 0 && x <= 1 : !Number.isNaN(x);
    if (inside && Number.isFinite(x)) return;
    throw new Violation(`the image of ${points[i]} must lie in '${name}'`, x, `a ${name} number`, 'apply');
  });
}

/**
 * `invert` undoes `apply`, to what the rounding of the image leaves: the image's own rounding divided by the slope
 * there, a few times, and a few roundings of the point.
 */
export function inverseUndoes(map: SmoothMap, points: Points): void {
  const z = Float32Array.from(points);
  const x = at(map.apply, z);
  const slope = at(map.logVolume, z).map(Math.exp);
  const back = at(map.invert, x);
  z.forEach((point, i) => {
    const lost = (2 ** -22 * Math.abs(x[i]!) + 2 ** -149) / slope[i]!;
    // Where the image is rounded to an end of the set, the point is lost.
    if (!(lost < 0.1 * (1 + Math.abs(point)))) return;
    requireClose(
      back[i]!,
      point,
      lost + 2 ** -20 * (Math.abs(point) + 2 ** -20),
      `invert(apply(${point})) must give the point back`,
      'invert, or apply',
    );
  });
}

/** The log volume is the logarithm of the slope of `apply`, whose own slope is that of its values. */
export function volumeIsSlope(map: SmoothMap, points: Points): void {
  const slopes = slopesOf(map.apply, points);
  const volume = at(map.logVolume, points);
  points.forEach((point, i) => {
    const exact = Math.log(Math.abs(slopes[i]!));
    // A slope that underflows has no logarithm to compare with.
    if (!Number.isFinite(exact) || exact < -80) return;
    requireClose(
      volume[i]!,
      exact,
      1e-5 * (1 + Math.abs(exact)),
      `the log volume at ${point} must be the logarithm of the derivative of apply`,
      'logVolume, or the gradient of apply',
    );
  });
}

/** The derivatives of `apply`, `invert` and `logVolume` are those of their values. */
export function mapSlopes(map: SmoothMap, points: Points): void {
  const held = (what: string, f: (v: tf.Tensor) => tf.Tensor, where: ArrayLike<number>): void => {
    const slopes = slopesOf(f, where);
    Array.from(where).forEach((point, i) => {
      requireSlopes(
        (offsets) => {
          const nodes = Float32Array.from(offsets, (k) => point + k);
          return { nodes: [nodes], values: [at(f, nodes)] };
        },
        [slopes[i]!],
        [point],
        () => `the derivative of ${what} at ${point} must be that of its values`,
        `the gradient of ${what}`,
      );
    });
  };
  held('apply', map.apply, points);
  held('logVolume', map.logVolume, points);
  held('invert', map.invert, at(map.apply, points));
}

/** The map rises, or falls, as it says. */
export function direction(map: SmoothMap, points: Points): void {
  const z = Float32Array.from(points).sort();
  const x = at(map.apply, z);
  for (let i = 1; i < z.length; i++) {
    const step = x[i]! - x[i - 1]!;
    if (map.rising ? step >= 0 : step <= 0) continue;
    throw new Violation(
      `apply must ${map.rising ? 'rise' : 'fall'} from ${z[i - 1]} to ${z[i]}, as rising says`,
      step,
      map.rising ? 'a rise' : 'a fall',
      'rising, or apply',
    );
  }
}

/** Every step keeps the shape of what it is given. */
export function mapShapes(map: SmoothMap, points: Points): void {
  for (const shape of [[], [0], [2], [2, 1, 3]]) {
    for (const name of ['apply', 'invert', 'logVolume'] as const) {
      tf.tidy(() => {
        const got = map[name](map.apply(tf.fill(shape, points[0]!))).shape;
        if (got.length === shape.length && got.every((n, i) => n === shape[i])) return;
        throw new Violation(`${name} of shape [${shape}] must keep it`, `[${got}]`, `[${shape}]`, name);
      });
    }
  }
}

/** Every step leaves exactly its result alive. */
export function mapLeaks(map: SmoothMap, points: Points): void {
  const z = tf.tensor1d([...points]);
  const x = map.apply(z);
  try {
    for (const name of ['apply', 'invert', 'logVolume'] as const) {
      const before = tf.memory().numTensors;
      const made = map[name](name === 'invert' ? x : z);
      const left = tf.memory().numTensors - before;
      made.dispose();
      if (left === 1) continue;
      throw new Violation(
        `${name} must leave exactly its result alive`,
        `${left} tensors`,
        '1',
        `${name}: wrap its work in tf.tidy(() => …), and return a new tensor`,
      );
    }
  } finally {
    tf.dispose([z, x]);
  }
}
