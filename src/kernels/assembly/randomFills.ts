// Compiled by AssemblyScript only. Bulk draws from the standard laws: computed in double precision, rounded
// once to float32.
import { cellOf, exponentialRest, layerOf, nextExponential, normalRest, signed } from './_randomScalars';
import { nextWord } from './_randomWords';
import { exponentialLayers, normalLayers } from './_randomZiggurat';

// The state stays in registers through these loops, which is worth a factor of two: nextWord, written out.

/**
 * Uniforms on (0, 1): 64 random bits, cut to their 24 leading significant ones. So P(U < x) = x for every
 * float32 x from 2^-40 up, and neither 0 nor 1 occurs.
 */
export function fillUniform(state: usize, out: usize, n: i32): void {
  let s0 = load<u64>(state);
  let s1 = load<u64>(state, 8);
  let s2 = load<u64>(state, 16);
  let s3 = load<u64>(state, 24);
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = (rotl(s0 + s3, 23) + s0) | 1;
    const t = s1 << 17;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= t;
    s3 = rotl(s3, 45);
    const zeros = clz(word);
    store<u32>(out, ((126 - <u32>zeros) << 23) | (<u32>((word << zeros) >> 40) & 0x7fffff));
  }
  store<u64>(state, s0);
  store<u64>(state, s1, 8);
  store<u64>(state, s2, 16);
  store<u64>(state, s3, 24);
}

// @ts-ignore: decorator
@inline
function fillZiggurat(state: usize, out: usize, n: i32, table: usize, normal: bool, signs: bool): void {
  let s0 = load<u64>(state);
  let s1 = load<u64>(state, 8);
  let s2 = load<u64>(state, 16);
  let s3 = load<u64>(state, 24);
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = rotl(s0 + s3, 23) + s0;
    const t = s1 << 17;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= t;
    s3 = rotl(s3, 45);
    const layer = layerOf(table, word);
    const cell = cellOf(word);
    let x = <f64>(<i64>cell) * load<f64>(layer);
    if (cell >= load<u64>(layer, 8)) {
      store<u64>(state, s0);
      store<u64>(state, s1, 8);
      store<u64>(state, s2, 16);
      store<u64>(state, s3, 24);
      x = normal ? normalRest(state, word) : exponentialRest(state, word);
      s0 = load<u64>(state);
      s1 = load<u64>(state, 8);
      s2 = load<u64>(state, 16);
      s3 = load<u64>(state, 24);
    }
    store<f32>(out, <f32>(signs ? signed(x, word) : x));
  }
  store<u64>(state, s0);
  store<u64>(state, s1, 8);
  store<u64>(state, s2, 16);
  store<u64>(state, s3, 24);
}

export function fillNormal(state: usize, out: usize, n: i32): void {
  fillZiggurat(state, out, n, normalLayers, true, true);
}

export function fillExponential(state: usize, out: usize, n: i32): void {
  fillZiggurat(state, out, n, exponentialLayers, false, false);
}

/** Standard Laplace: an exponential with a random sign. */
export function fillLaplace(state: usize, out: usize, n: i32): void {
  fillZiggurat(state, out, n, exponentialLayers, false, true);
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
export function fillLogistic(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = nextWord(state);
    const v = <f64>(<i64>((word >> 1) | 1)) * (1.0 / 18446744073709551616.0);
    const x = v > 0.4 ? twiceArtanh(1.0 - 2.0 * v) : Math.log((1.0 - v) / v);
    store<f32>(out, <f32>(word & 1 ? -x : x));
  }
}

/** Standard Gumbel, for maxima: −log E, E exponential. */
export function fillGumbel(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) store<f32>(out, <f32>-Math.log(nextExponential(state)));
}
