// Compiled by AssemblyScript only. Bulk draws from the standard laws: computed in double precision, rounded
// once to float32.
import { nextExponential, nextLaplace, nextNormal, ONE, TO_MIDDLE } from './_randomScalars';
import { nextWord, takeUpTo, wordsAhead, wordsEnd } from './_randomWords';
import { exponentialLayers, normalLayers } from './_randomZiggurat';

/**
 * Uniforms on (0, 1): 64 random bits, cut to their 24 leading significant ones. So P(U < x) = x for every
 * float32 x from 2^-40 up, and neither 0 nor 1 occurs.
 */
export function fillUniform(out: usize, n: i32): void {
  for (const last = out + 4 * <usize>n; out < last; ) {
    let words = wordsAhead();
    const stop = min(wordsEnd(), words + 2 * (last - out));
    for (; words < stop; words += 8, out += 4) {
      const word = load<u64>(words) | 1;
      const zeros = clz(word);
      store<u32>(out, ((126 - <u32>zeros) << 23) | (<u32>((word << zeros) >> 40) & 0x7fffff));
    }
    takeUpTo(words);
  }
}

// @ts-ignore: decorator
@inline
function placesOf(words: v128): v128 {
  return f64x2.sub(v128.or(i64x2.shr_u(words, 12), i64x2.splat(ONE)), f64x2.splat(TO_MIDDLE));
}

// @ts-ignore: decorator
@inline
function layerAt(layers: usize, word: usize): v128 {
  return v128.load(layers + ((<usize>load<u16>(word) & 1023) << 4));
}

/**
 * Four ziggurat draws at a time, the same as one by one: where a draw falls outside the inner part of its layer,
 * those before it count, it is drawn alone, which may take more words, and the next four start behind it.
 */
// @ts-ignore: decorator
@inline
function fillZiggurat(out: usize, n: i32, layers: usize, signs: bool, one: i32): void {
  const last = out + 4 * <usize>n;
  while (out < last) {
    let words = wordsAhead();
    const stop = min(wordsEnd(), words + 2 * (last - out));
    for (; words + 32 <= stop; words += 32, out += 16) {
      const word0 = v128.load(words);
      const word2 = v128.load(words, 16);
      const layer0 = layerAt(layers, words);
      const layer1 = layerAt(layers, words + 8);
      const layer2 = layerAt(layers, words + 16);
      const layer3 = layerAt(layers, words + 24);
      const place0 = placesOf(word0);
      const place2 = placesOf(word2);
      const x0 = f64x2.mul(place0, v128.shuffle<f64>(layer0, layer1, 0, 2));
      const x2 = f64x2.mul(place2, v128.shuffle<f64>(layer2, layer3, 0, 2));
      let x = v128.shuffle<f64>(f32x4.demote_f64x2_zero(x0), f32x4.demote_f64x2_zero(x2), 0, 2);
      if (signs) {
        const bits = v128.shuffle<i32>(word0, word2, 0, 2, 4, 6);
        x = v128.or(x, v128.and(i32x4.shl(bits, 21), i32x4.splat(0x80000000)));
      }
      v128.store(out, x);
      const outside0 = f64x2.ge(place0, v128.shuffle<f64>(layer0, layer1, 1, 3));
      const outside2 = f64x2.ge(place2, v128.shuffle<f64>(layer2, layer3, 1, 3));
      if (v128.any_true(v128.or(outside0, outside2))) {
        const good = <usize>ctz(i64x2.bitmask(outside0) | (i64x2.bitmask(outside2) << 2));
        words += good << 3;
        out += good << 2;
        break;
      }
    }
    takeUpTo(words);
    if (out < last) {
      store<f32>(out, <f32>(one == 0 ? nextNormal() : one == 1 ? nextExponential() : nextLaplace()));
      out += 4;
    }
  }
}

export function fillNormal(out: usize, n: i32): void {
  fillZiggurat(out, n, normalLayers, true, 0);
}

export function fillExponential(out: usize, n: i32): void {
  fillZiggurat(out, n, exponentialLayers, false, 1);
}

/** Standard Laplace: an exponential with a random sign. */
export function fillLaplace(out: usize, n: i32): void {
  fillZiggurat(out, n, exponentialLayers, true, 2);
}

/** 2 artanh z by its power series: below |z| = 1/5 the first term left out is 2e-14 of the whole. */
// @ts-ignore: decorator
@inline
function twiceArtanh(z: f64): f64 {
  const s = z * z;
  let sum = 1.0 / 17.0;
  sum = sum * s + 1.0 / 15.0;
  sum = sum * s + 1.0 / 13.0;
  sum = sum * s + 1.0 / 11.0;
  sum = sum * s + 1.0 / 9.0;
  sum = sum * s + 1.0 / 7.0;
  sum = sum * s + 1.0 / 5.0;
  sum = sum * s + 1.0 / 3.0;
  return 2.0 * z * (1.0 + s * sum);
}

/**
 * log u − log1p(−u), written for v = min(u, 1 − u), which one word gives with 53 significant bits, and a
 * sign from the bit left over: so both tails are alike and reach to probability 2^-64. Near the median the
 * quotient loses what the difference 1 − 2v keeps.
 */
export function fillLogistic(out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = nextWord();
    const v = <f64>(<i64>((word >> 1) | 1)) * (1.0 / 18446744073709551616.0);
    const x = v > 0.4 ? twiceArtanh(1.0 - 2.0 * v) : Math.log((1.0 - v) / v);
    store<f32>(out, <f32>(word & 1 ? -x : x));
  }
}

/** Standard Gumbel, for maxima: −log E, E exponential. */
export function fillGumbel(out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    store<f32>(out, <f32>-Math.log(nextExponential()));
  }
}
