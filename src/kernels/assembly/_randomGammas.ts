// Compiled by AssemblyScript only. Gamma draws of scale 1 (G. Marsaglia and W. W. Tsang, A simple method for
// generating gamma variables, ACM TOMS 26(3), 2000), each as the product of a factor that neither underflows nor
// overflows a double and an exponential whose exponent is kept: below shape 1 the draw underflows, its logarithm
// does not. One of shape below 1 is one of shape + 1 times U^(1/shape) (their section 6), and −log U is an
// exponential draw.
import { nextExponential, nextNormal, quickExponential, quickHalfNormal, signed } from './_randomScalars';
import { cellOf, nextCell, takeUpTo, wordsAhead, wordsEnd } from './_randomWords';

/** Most draws of one block. */
export const GAMMAS: i32 = 256;
const factors: usize = memory.data(256 * 8, 16);
const exponents: usize = memory.data(256 * 8, 16);

/** The draws of the last block: the factor times exp(the exponent). */
// @ts-ignore: decorator
@inline
export function factorOf(i: i32): f64 {
  return load<f64>(factors + (<usize>i << 3));
}
// @ts-ignore: decorator
@inline
export function exponentOf(i: i32): f64 {
  return load<f64>(exponents + (<usize>i << 3));
}

// What follows from a shape, kept since one shape is often drawn from many times: the shape, their d and c for the
// shape or shape + 1, −1/shape or 0. One set for the draws of even number, one for the odd.
const derived: usize = memory.data(2 * 32, 16);

function derive(set: usize, shape: f64): void {
  const d = (shape >= 1.0 ? shape : shape + 1.0) - 1.0 / 3.0;
  store<f64>(set, shape);
  store<f64>(set, d, 8);
  store<f64>(set, 1.0 / Math.sqrt(9.0 * d), 16);
  store<f64>(set, shape >= 1.0 ? 0.0 : -1.0 / shape, 24);
}

/** Below this, u is accepted without a logarithm (their section 5). */
// @ts-ignore: decorator
@inline
function squeeze(x: f64): f64 {
  const square = x * x;
  return 1.0 - 0.0331 * square * square;
}

function gammaFromOne(d: f64, c: f64): f64 {
  while (true) {
    const x = nextNormal();
    const root = 1.0 + c * x;
    if (root <= 0.0) continue;
    const v = root * root * root;
    const u = nextCell();
    if (u < squeeze(x) || Math.log(u) < 0.5 * x * x + d * (1.0 - v + Math.log(v))) return d * v;
  }
}

/** One draw, as the first of a block. */
export function drawGamma(shape: f64): void {
  if (shape != load<f64>(derived)) derive(derived, shape);
  const slope = load<f64>(derived, 24);
  store<f64>(factors, gammaFromOne(load<f64>(derived, 8), load<f64>(derived, 16)));
  store<f64>(exponents, slope == 0.0 ? 0.0 : nextExponential() * slope);
}

/** Draws a block of gammas, the even ones of shapes from one array, the odd ones of shapes from another. */
// @ts-ignore: decorator
@inline
function drawGammas(n: i32, even: usize, odd: usize, pairs: bool): void {
  let words = wordsAhead();
  let end = wordsEnd();
  for (let i = 0; i < n; i++) {
    const array = pairs ? ((i & 1) == 0 ? even : odd) : even;
    const set = pairs ? derived + (<usize>(i & 1) << 5) : derived;
    const shape = <f64>load<f32>(array + (<usize>(pairs ? i >> 1 : i) << 2));
    if (shape != load<f64>(set)) derive(set, shape);
    const d = load<f64>(set, 8);
    const c = load<f64>(set, 16);
    const slope = load<f64>(set, 24);
    const at = <usize>i << 3;
    // Nearly always the first two words settle the draw, or three.
    if (words + 24 <= end) {
      const word = load<u64>(words);
      const size = quickHalfNormal(word);
      const x = signed(size, word);
      const root = 1.0 + c * x;
      if (size >= 0.0 && root > 0.0 && cellOf(load<u64>(words, 8)) < squeeze(x)) {
        store<f64>(factors + at, d * (root * root * root));
        if (slope == 0.0) {
          store<f64>(exponents + at, 0.0);
          words += 16;
          continue;
        }
        const exponential = quickExponential(load<u64>(words, 16));
        if (exponential >= 0.0) {
          store<f64>(exponents + at, exponential * slope);
          words += 24;
          continue;
        }
      }
    }
    takeUpTo(words);
    store<f64>(factors + at, gammaFromOne(d, c));
    store<f64>(exponents + at, slope == 0.0 ? 0.0 : nextExponential() * slope);
    words = wordsAhead();
    end = wordsEnd();
  }
  takeUpTo(words);
}

/** At most GAMMAS draws, read by factorOf and exponentOf. */
export function drawGammaBlock(n: i32, shapes: usize): void {
  drawGammas(n, shapes, shapes, false);
}

/** At most GAMMAS / 2 pairs of draws. */
export function drawGammaPairs(n: i32, first: usize, second: usize): void {
  drawGammas(2 * n, first, second, true);
}

/** exp, spared for the exponent that most draws have. */
// @ts-ignore: decorator
@inline
export function expOf(exponent: f64): f64 {
  return exponent == 0.0 ? 1.0 : Math.exp(exponent);
}
