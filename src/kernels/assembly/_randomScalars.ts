// Compiled by AssemblyScript only. One draw at a time, in double precision, from the two laws that the others
// are made of. Of a 64-bit word, bits 0-7 choose the layer, bit 8 the sign, and bits 12-63 the place within
// the layer: no two of the three share a bit.
import { nextCell, nextFine, nextWord } from './_randomWords';
import { EXPONENTIAL_TAIL, exponentialLayers, NORMAL_TAIL, normalLayers } from './_randomZiggurat';

// @ts-ignore: decorator
@inline
export function layerOf(table: usize, word: u64): usize {
  return table + ((<usize>word & 255) << 5);
}

// Odd numbers below 2^53: the middles of cells, so that a draw is never exactly zero.
// @ts-ignore: decorator
@inline
export function cellOf(word: u64): u64 {
  return (word >> 11) | 1;
}

// @ts-ignore: decorator
@inline
export function signed(x: f64, word: u64): f64 {
  return reinterpret<f64>(reinterpret<u64>(x) | ((word & 256) << 55));
}

/** Finishes a half-normal draw whose first word fell outside the inner part of its layer. */
export function normalRest(state: usize, first: u64): f64 {
  let word = first;
  while (true) {
    const layer = layerOf(normalLayers, word);
    const x = <f64>(<i64>cellOf(word)) * load<f64>(layer);
    if (cellOf(word) < load<u64>(layer, 8)) return x;
    if (layer == normalLayers) {
      // G. Marsaglia, Generating a variable from the tail of the normal distribution, Technometrics 6, 1964.
      while (true) {
        const beyond = -Math.log(nextFine(state)) / NORMAL_TAIL;
        const test = -Math.log(nextFine(state));
        if (test + test >= beyond * beyond) return NORMAL_TAIL + beyond;
      }
    }
    const low = load<f64>(layer, 16);
    const high = load<f64>(layer, 24);
    if (low + (high - low) * nextCell(state) < Math.exp(-0.5 * x * x)) return x;
    word = nextWord(state);
  }
}

/** Finishes an exponential draw likewise. Beyond the tail's start the law is itself again, shifted. */
export function exponentialRest(state: usize, first: u64): f64 {
  let word = first;
  let shift = 0.0;
  while (true) {
    const layer = layerOf(exponentialLayers, word);
    const x = <f64>(<i64>cellOf(word)) * load<f64>(layer);
    if (cellOf(word) < load<u64>(layer, 8)) return shift + x;
    if (layer == exponentialLayers) {
      shift += EXPONENTIAL_TAIL;
    } else {
      const low = load<f64>(layer, 16);
      const high = load<f64>(layer, 24);
      if (low + (high - low) * nextCell(state) < Math.exp(-x)) return shift + x;
    }
    word = nextWord(state);
  }
}

// @ts-ignore: decorator
@inline
export function nextNormal(state: usize): f64 {
  const word = nextWord(state);
  const layer = layerOf(normalLayers, word);
  const cell = cellOf(word);
  const x = cell < load<u64>(layer, 8) ? <f64>(<i64>cell) * load<f64>(layer) : normalRest(state, word);
  return signed(x, word);
}

// @ts-ignore: decorator
@inline
export function nextExponential(state: usize): f64 {
  const word = nextWord(state);
  const layer = layerOf(exponentialLayers, word);
  const cell = cellOf(word);
  return cell < load<u64>(layer, 8) ? <f64>(<i64>cell) * load<f64>(layer) : exponentialRest(state, word);
}
