import * as tf from '@tensorflow/tfjs';
import { StreamError } from '../errors.js';
import { checkBelow, checkCount, sizeOf } from './checks.js';
import { type FillName, fill, withStream } from './fill.js';
import { fromHex, seedWords, toHex } from './seedWords.js';

/**
 * A {@link Stream}'s position as plain data, to be written as JSON and handed to {@link restoreStream}: the
 * seed, which its forks descend from, and the state, where its next draw starts, as 64 hexadecimal digits
 * each.
 *
 * @example
 * ```ts
 * import { stream, type StreamState } from 'leadline';
 * const state: StreamState = stream('trial').save();
 * console.log(state.version, state.generator, state.seed === state.state);
 * // 1 xoshiro256++ true
 * ```
 */
export interface StreamState {
  readonly version: 1;
  readonly generator: 'xoshiro256++';
  readonly seed: string;
  readonly state: string;
}

let make: (seed: string, words: Int32Array) => Stream;
let wordsInside: (candidate: unknown) => Int32Array | undefined;

/**
 * A source of random draws with a state of its own. Everything that draws takes one, so that a result
 * depends on nothing but its arguments: same seed, same calls, same bits, on every backend and engine. Made
 * by {@link stream}, {@link Stream.fork} and {@link restoreStream}.
 *
 * Drawing advances it. A fork depends on the parent's seed and the label alone, never on how far the parent
 * has advanced: give each part of a program its own fork, and adding draws to one leaves the others as they
 * were. Two forks with one label are the same stream twice.
 *
 * Method: xoshiro256++ (Blackman and Vigna 2021), run in a compiled module; seeds by seedrandom from the
 * path of labels, so that streams are told apart by 256-bit states. Not for secrets.
 *
 * @example
 * ```ts
 * import { stream } from 'leadline';
 * const root = stream(7);
 * const early = root.fork('weights').integers(100, [3]);
 * root.normal([1000]);
 * const late = root.fork('weights').integers(100, [3]);
 * console.log(early.dataSync().join() === late.dataSync().join());
 * // true
 * ```
 */
export class Stream {
  readonly #seed: string;
  readonly #words: Int32Array;

  private constructor(seed: string, words: Int32Array) {
    this.#seed = seed;
    this.#words = words;
  }

  static {
    make = (seed, words) => new Stream(seed, words);
    wordsInside = (candidate) =>
      typeof candidate === 'object' && candidate !== null && #words in candidate
        ? candidate.#words
        : undefined;
  }

  /**
   * Uniforms on the open interval (0, 1), float32: 64 random bits cut to 24 significant ones, so that
   * P(U < x) = x for every float32 x from 2^-40 up, and neither 0 nor 1 occurs. Throws a `ShapeError` unless
   * `shape` is an array of whole numbers.
   *
   * @example
   * ```ts
   * import { stream } from 'leadline';
   * const u = stream(1).uniform([2, 3]);
   * console.log(u.shape, u.dataSync().every((x) => x > 0 && x < 1));
   * // [ 2, 3 ] true
   * ```
   */
  uniform(shape: readonly number[]): tf.Tensor {
    return this.#floats('uniform', 'fillUniform', shape);
  }

  /**
   * Standard normals, float32, by a 1024-layer ziggurat in double precision with an exact tail (Marsaglia and
   * Tsang 2000). Throws a `ShapeError` unless `shape` is an array of whole numbers.
   *
   * @example
   * ```ts
   * import { stream } from 'leadline';
   * const x = stream(1).normal([100000]).dataSync();
   * console.log((x.filter((v) => Math.abs(v) < 1).length / 100000).toFixed(2));
   * // 0.68
   * ```
   */
  normal(shape: readonly number[]): tf.Tensor {
    return this.#floats('normal', 'fillNormal', shape);
  }

  /**
   * Standard exponentials (rate 1), float32, never 0, by a 1024-layer ziggurat in double precision with an
   * exact tail. Throws a `ShapeError` unless `shape` is an array of whole numbers.
   *
   * @example
   * ```ts
   * import { stream } from 'leadline';
   * const x = stream(1).exponential([100000]).dataSync();
   * console.log((x.filter((v) => v > 1).length / 100000).toFixed(2));
   * // 0.37
   * ```
   */
  exponential(shape: readonly number[]): tf.Tensor {
    return this.#floats('exponential', 'fillExponential', shape);
  }

  /**
   * Integers from 0 to `below` − 1, each equally likely (Lemire 2019), int32. Throws a `ParameterError`
   * unless `below` is a whole number from 1 to 2147483647, a `ShapeError` unless `shape` is an array of
   * whole numbers.
   *
   * @example
   * ```ts
   * import { stream } from 'leadline';
   * const dice = stream(1).integers(6, [1000]);
   * console.log(dice.dtype, new Set(dice.dataSync()).size);
   * // int32 6
   * ```
   */
  integers(below: number, shape: readonly number[]): tf.Tensor {
    checkBelow('Stream.integers', below);
    const out = new Int32Array(sizeOf('Stream.integers', shape));
    fill(this.#words, 'fillIntegers', out, { values: [below] });
    return tf.tensor(out, [...shape], 'int32');
  }

  /**
   * The whole numbers 0 … `n` − 1 in random order, each order equally likely (Fisher and Yates), int32.
   * Throws a `ParameterError` unless `n` is a whole number from 0 up.
   *
   * @example
   * ```ts
   * import { stream } from 'leadline';
   * const order = stream(1).permutation(5).dataSync();
   * console.log([...order].sort());
   * // [ 0, 1, 2, 3, 4 ]
   * ```
   */
  permutation(n: number): tf.Tensor1D {
    return tf.tensor1d(permutationArray(this, n, 'Stream.permutation'), 'int32');
  }

  /**
   * The stream that `label` names below this one. It depends on this stream's seed and the label, not on
   * what has been drawn; 1 and '1' are different labels. Throws a `StreamError` unless the label is a finite
   * number or a text that is not empty.
   *
   * @example
   * ```ts
   * import { stream } from 'leadline';
   * const root = stream('trial');
   * console.log(root.fork('a').save().seed === root.fork('a').save().seed);
   * // true
   * console.log(root.fork('a').save().seed === root.fork('b').save().seed);
   * // false
   * ```
   */
  fork(label: string | number): Stream {
    const words = seedWords('Stream.fork', 'label', label, this.#seed);
    return make(toHex(words), words);
  }

  /**
   * Where this stream stands, as plain data for JSON; {@link restoreStream} continues from it bit for bit.
   *
   * @example
   * ```ts
   * import { restoreStream, stream } from 'leadline';
   * const s = stream('trial');
   * s.normal([5]);
   * const text = JSON.stringify(s.save());
   * const next = s.normal([1]).dataSync();
   * console.log(next[0] === restoreStream(JSON.parse(text)).normal([1]).dataSync()[0]);
   * // true
   * ```
   */
  save(): StreamState {
    return { version: 1, generator: 'xoshiro256++', seed: this.#seed, state: toHex(this.#words) };
  }

  #floats(method: string, name: FillName, shape: readonly number[]): tf.Tensor {
    const out = new Float32Array(sizeOf(`Stream.${method}`, shape));
    fill(this.#words, name, out);
    return tf.tensor(out, [...shape], 'float32');
  }
}

/**
 * A new stream of random draws, and the only way to begin one: seeds are explicit, so a run can be repeated.
 * The number 1 and the text '1' are different seeds. Throws a `StreamError` unless the seed is a finite
 * number or a text that is not empty.
 *
 * @example
 * ```ts
 * import { stream } from 'leadline';
 * const s = stream('trial 3');
 * console.log(s.normal([2, 3]).shape);
 * // [ 2, 3 ]
 * ```
 */
export function stream(seed: number | string): Stream {
  const words = seedWords('stream', 'seed', seed);
  return make(toHex(words), words);
}

/**
 * The stream that {@link Stream.save} wrote down: it continues with the next draw, and has the same forks.
 * Throws a `StreamError` for anything else.
 *
 * @example
 * ```ts
 * import { restoreStream, stream } from 'leadline';
 * const s = stream(5);
 * const state = s.save();
 * console.log(s.integers(1000, [2]).toString() === restoreStream(state).integers(1000, [2]).toString());
 * // true
 * ```
 */
export function restoreStream(state: StreamState): Stream {
  const refuse = (what: string, got: unknown): never => {
    throw new StreamError(
      `restoreStream: ${what}; got ${typeof got === 'string' ? `'${got}'` : JSON.stringify(got)}; pass what save() returned, unchanged`,
    );
  };
  if (typeof state !== 'object' || state === null) return refuse('state must be an object', state);
  if (state.version !== 1) return refuse('state.version must be 1', state.version);
  if (state.generator !== 'xoshiro256++')
    return refuse("state.generator must be 'xoshiro256++'", state.generator);
  const digits = 'must be 64 hexadecimal digits, not all of them 0';
  const seed = fromHex(state.seed);
  if (!seed?.some((word) => word !== 0)) return refuse(`state.seed ${digits}`, state.seed);
  const words = fromHex(state.state);
  if (!words?.some((word) => word !== 0)) return refuse(`state.state ${digits}`, state.state);
  return make(state.seed, words);
}

/** Throws a {@link StreamError} for anything that is not a stream. */
export function requireStream(caller: string, candidate: unknown): asserts candidate is Stream {
  if (wordsInside(candidate) === undefined) {
    const got = candidate === null ? 'null' : `a value of type ${typeof candidate}`;
    throw new StreamError(
      `${caller}: stream must be a Stream; got ${got}; pass stream(seed) or a fork of one`,
    );
  }
}

/** The state of a stream, to be advanced in place. */
export function wordsOf(caller: string, candidate: Stream): Int32Array {
  requireStream(caller, candidate);
  return wordsInside(candidate)!;
}

/** The whole numbers 0 … n − 1 in random order. */
export function permutationArray(source: Stream, n: number, caller = 'permutation'): Int32Array {
  checkCount(caller, 'n', n);
  const out = new Int32Array(n);
  withStream(wordsOf(caller, source), (module) => {
    const at = module.reserve(4 * n);
    module.call.fillPermutation!(at, n);
    out.set(module.words.subarray(at >> 2, (at >> 2) + n));
  });
  return out;
}
