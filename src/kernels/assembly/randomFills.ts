// Compiled by AssemblyScript only. Bulk draws from the standard laws: computed in double precision, rounded
// once to float32.
import { cellOf, exponentialRest, layerOf, nextExponential, normalRest, signed } from './_randomScalars';
import { nextWord } from './_randomWords';
import { exponentialLayers, normalLayers } from './_randomZiggurat';

/**
 * Uniforms on (0, 1): 64 random bits, cut to their 24 leading significant ones. So P(U < x) = x for every
 * float32 x from 2^-40 up, and neither 0 nor 1 occurs.
 */
export function fillUniform(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = nextWord(state) | 1;
    const zeros = clz(word);
    store<u32>(out, ((126 - <u32>zeros) << 23) | (<u32>((word << zeros) >> 40) & 0x7fffff));
  }
}

export function fillNormal(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = nextWord(state);
    const layer = layerOf(normalLayers, word);
    const cell = cellOf(word);
    const x = cell < load<u64>(layer, 8) ? <f64>(<i64>cell) * load<f64>(layer) : normalRest(state, word);
    store<f32>(out, <f32>signed(x, word));
  }
}

export function fillExponential(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) store<f32>(out, <f32>nextExponential(state));
}

export function fillLaplace(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = nextWord(state);
    const layer = layerOf(exponentialLayers, word);
    const cell = cellOf(word);
    const x = cell < load<u64>(layer, 8) ? <f64>(<i64>cell) * load<f64>(layer) : exponentialRest(state, word);
    store<f32>(out, <f32>signed(x, word));
  }
}

/**
 * log u − log1p(−u), written for v = min(u, 1 − u), which one word gives with 53 significant bits, and a
 * sign from the bit left over: so both tails are alike and reach to 2^-64.
 */
export function fillLogistic(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) {
    const word = nextWord(state);
    const v = <f64>(<i64>((word >> 1) | 1)) * (1.0 / 18446744073709551616.0);
    const x = Math.log1p((1.0 - 2.0 * v) / v);
    store<f32>(out, <f32>(word & 1 ? -x : x));
  }
}

/** Standard Gumbel, for maxima: −log E, E exponential. */
export function fillGumbel(state: usize, out: usize, n: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) store<f32>(out, <f32>-Math.log(nextExponential(state)));
}
