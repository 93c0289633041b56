// Compiled by AssemblyScript only. Gamma draws with scale 1 and a shape per element (G. Marsaglia and
// W. W. Tsang, A simple method for generating gamma variables, ACM TOMS 26(3), 2000).
import { nextExponential, nextNormal } from './_randomScalars';
import { nextCell } from './_randomWords';

/** Shape ≥ 1. */
function gammaFromOne(state: usize, shape: f64): f64 {
  const d = shape - 1.0 / 3.0;
  const c = 1.0 / Math.sqrt(9.0 * d);
  while (true) {
    const x = nextNormal(state);
    const root = 1.0 + c * x;
    if (root <= 0.0) continue;
    const v = root * root * root;
    const u = nextCell(state);
    if (u < 1.0 - 0.0331 * x * x * x * x) return d * v;
    if (Math.log(u) < 0.5 * x * x + d * (1.0 - v + Math.log(v))) return d * v;
  }
}

/**
 * A gamma draw of shape below 1 is one of shape + 1 times U^(1/shape) (their section 6), and −log U is an
 * exponential draw. The product underflows for small shapes; its logarithm does not.
 */
export function fillGamma(state: usize, out: usize, n: i32, shapes: usize): void {
  for (let i = 0; i < n; i++) {
    const shape = <f64>load<f32>(shapes + 4 * <usize>i);
    let draw: f64;
    if (shape >= 1.0) draw = gammaFromOne(state, shape);
    else draw = gammaFromOne(state, shape + 1.0) * Math.exp(-nextExponential(state) / shape);
    store<f32>(out + 4 * <usize>i, <f32>draw);
  }
}

export function fillLogGamma(state: usize, out: usize, n: i32, shapes: usize): void {
  for (let i = 0; i < n; i++) {
    const shape = <f64>load<f32>(shapes + 4 * <usize>i);
    let draw: f64;
    if (shape >= 1.0) draw = Math.log(gammaFromOne(state, shape));
    else draw = Math.log(gammaFromOne(state, shape + 1.0)) - nextExponential(state) / shape;
    store<f32>(out + 4 * <usize>i, <f32>draw);
  }
}
