// Compiled by AssemblyScript only. One draw at a time, in double precision, from the two laws that the others
// are made of. Of a 64-bit word, bits 0-9 choose the layer, bit 10 the sign, and bits 12-63 the place within
// the layer: no two of the three share a bit.
import { nextCell, nextFine, nextWord } from './_randomWords';
import {
  EXPONENTIAL_TAIL,
  exponentialHeights,
  exponentialLayers,
  NORMAL_TAIL,
  normalHeights,
  normalLayers,
} from './_randomZiggurat';

/** The exponent bits of 1, and what turns 52 bits behind them into the middle of their cell of (0, 1). */
export const ONE: u64 = 0x3ff0000000000000;
export const TO_MIDDLE: f64 = 1.0 - 1.0 / 9007199254740992.0;

// Middles of cells, so that a draw is never exactly zero.
// @ts-ignore: decorator
@inline
function placeOf(word: u64): f64 {
  return reinterpret<f64>((word >> 12) | ONE) - TO_MIDDLE;
}

// @ts-ignore: decorator
@inline
function layerOf(table: usize, word: u64): usize {
  return table + ((<usize>word & 1023) << 4);
}

// @ts-ignore: decorator
@inline
function heightOf(table: usize, word: u64): usize {
  return table + ((<usize>word & 1023) << 3);
}

// @ts-ignore: decorator
@inline
export function signed(x: f64, word: u64): f64 {
  return reinterpret<f64>(reinterpret<u64>(x) | ((word & 1024) << 53));
}

// For loops that keep their place among the words themselves: a draw that its first word decides, or −1 where more
// words are needed, to be had from nextNormal and nextExponential.
// @ts-ignore: decorator
@inline
export function quickHalfNormal(word: u64): f64 {
  const layer = layerOf(normalLayers, word);
  const place = placeOf(word);
  return place < load<f64>(layer, 8) ? place * load<f64>(layer) : -1.0;
}

// @ts-ignore: decorator
@inline
export function quickExponential(word: u64): f64 {
  const layer = layerOf(exponentialLayers, word);
  const place = placeOf(word);
  return place < load<f64>(layer, 8) ? place * load<f64>(layer) : -1.0;
}

/** Finishes a half-normal draw whose first word fell outside the inner part of its layer. */
function normalRest(first: u64): f64 {
  let word = first;
  while (true) {
    const layer = layerOf(normalLayers, word);
    const place = placeOf(word);
    const x = place * load<f64>(layer);
    if (place < load<f64>(layer, 8)) return x;
    if (layer == normalLayers) {
      // G. Marsaglia, Generating a variable from the tail of the normal distribution, Technometrics 6, 1964.
      while (true) {
        const beyond = -Math.log(nextFine()) / NORMAL_TAIL;
        const test = -Math.log(nextFine());
        if (test + test >= beyond * beyond) return NORMAL_TAIL + beyond;
      }
    }
    const height = heightOf(normalHeights, word);
    const low = load<f64>(height);
    if (low + (load<f64>(height, 8) - low) * nextCell() < Math.exp(-0.5 * x * x)) return x;
    word = nextWord();
  }
}

/** Finishes an exponential draw likewise. Beyond the tail's start the law is itself again, shifted. */
function exponentialRest(first: u64): f64 {
  let word = first;
  let shift = 0.0;
  while (true) {
    const layer = layerOf(exponentialLayers, word);
    const place = placeOf(word);
    const x = place * load<f64>(layer);
    if (place < load<f64>(layer, 8)) return shift + x;
    if (layer == exponentialLayers) {
      shift += EXPONENTIAL_TAIL;
    } else {
      const height = heightOf(exponentialHeights, word);
      const low = load<f64>(height);
      if (low + (load<f64>(height, 8) - low) * nextCell() < Math.exp(-x)) return shift + x;
    }
    word = nextWord();
  }
}

// @ts-ignore: decorator
@inline
export function nextNormal(): f64 {
  const word = nextWord();
  const layer = layerOf(normalLayers, word);
  const place = placeOf(word);
  const x = place < load<f64>(layer, 8) ? place * load<f64>(layer) : normalRest(word);
  return signed(x, word);
}

// @ts-ignore: decorator
@inline
export function nextExponential(): f64 {
  const word = nextWord();
  const layer = layerOf(exponentialLayers, word);
  const place = placeOf(word);
  return place < load<f64>(layer, 8) ? place * load<f64>(layer) : exponentialRest(word);
}

/** An exponential with a random sign: standard Laplace. */
// @ts-ignore: decorator
@inline
export function nextLaplace(): f64 {
  const word = nextWord();
  const layer = layerOf(exponentialLayers, word);
  const place = placeOf(word);
  return signed(place < load<f64>(layer, 8) ? place * load<f64>(layer) : exponentialRest(word), word);
}
