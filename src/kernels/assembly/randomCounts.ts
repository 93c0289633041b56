// Compiled by AssemblyScript only. Draws of counts and of categories, with parameters per element.
import { poissonLogDensity } from '../../numeric/families/poisson';
import { nextExponential } from './_randomScalars';
import { nextCell } from './_randomWords';

/** Counts unit-rate arrivals before `rate`: exact, and accurate for the smallest rates. */
function countArrivals(rate: f64): f64 {
  let count = 0.0;
  for (let time = nextExponential(); time < rate; time += nextExponential()) count += 1.0;
  return count;
}

/**
 * Poisson draws, one per rate. From rate 10 on, algorithm PTRS (W. Hörmann, The transformed rejection method
 * for generating Poisson random variables, Insurance: Mathematics and Economics 12, 1993).
 */
export function fillPoisson(out: usize, n: i32, rates: usize): void {
  let rate = -1.0;
  let a = 0.0;
  let b = 0.0;
  let inverseAlpha = 0.0;
  let squeeze = 0.0;
  for (let i = 0; i < n; i++) {
    const here = <f64>load<f32>(rates + 4 * <usize>i);
    const to = out + 4 * <usize>i;
    if (here < 10.0) {
      store<f32>(to, <f32>countArrivals(here));
      continue;
    }
    if (here != rate) {
      rate = here;
      b = 0.931 + 2.53 * Math.sqrt(rate);
      a = -0.059 + 0.02483 * b;
      inverseAlpha = 1.1239 + 1.1328 / (b - 3.4);
      squeeze = 0.9277 - 3.6224 / (b - 2.0);
    }
    while (true) {
      const u = nextCell() - 0.5;
      const v = nextCell();
      const us = 0.5 - Math.abs(u);
      const k = Math.floor((2.0 * a / us + b) * u + rate + 0.43);
      if (!(us >= 0.07 && v <= squeeze)) {
        if (k < 0.0 || (us < 0.013 && v > us)) continue;
        if (Math.log((v * inverseAlpha) / (a / (us * us) + b)) > poissonLogDensity(k, rate)) continue;
      }
      store<f32>(to, <f32>k);
      break;
    }
  }
}

/**
 * One category per row of `k` logits, by inversion of the cumulated softmax weights with one uniform a row.
 * A logit of −∞ has weight zero, which no uniform strictly inside (0, 1) can hit. `weights` holds k doubles.
 */
export function fillCategorical(out: usize, rows: i32, logits: usize, k: i32, weights: usize): void {
  for (let row = 0; row < rows; row++) {
    const from = logits + 4 * <usize>row * <usize>k;
    let most: f32 = load<f32>(from);
    for (let j = 1; j < k; j++) most = max(most, load<f32>(from + 4 * <usize>j));
    let total = 0.0;
    for (let j = 0; j < k; j++) {
      total += Math.exp(<f64>load<f32>(from + 4 * <usize>j) - <f64>most);
      store<f64>(weights + 8 * <usize>j, total);
    }
    const target = nextCell() * total;
    let j = 0;
    while (j < k - 1 && load<f64>(weights + 8 * <usize>j) <= target) j++;
    store<i32>(out + 4 * <usize>row, j);
  }
}
