// Compiled by AssemblyScript only. Runs one scalar formula over two nested loops of strided float32
// operands, in blocks that stay in the first-level cache: promote (and transform) each operand to double,
// apply the formula, then store, sum or accumulate. The descriptor is written by ../evaluate.ts.
import { TABLE } from './table';

const BLOCK: i32 = 512;
const MOST_OPERANDS: i32 = 6;

// One double buffer per operand, one for the result and one for a transform's derivative.
const buffers: usize = memory.data((512 * 8) * (6 + 2), 16);
const slots: usize = memory.data(8 * (6 + 1), 16);

// @ts-ignore: decorator
@inline
function bufferOf(k: i32): usize {
  return buffers + <usize>(k * BLOCK * 8);
}

/** Promotes `n` float32 numbers at `from` to doubles at `to`. */
function promote(n: i32, to: usize, from: usize): void {
  for (let i = 0; i < n; i++) {
    store<f64>(to, <f64>load<f32>(from));
    to += 8;
    from += 4;
  }
}

/** Applies the one-argument formula `fn` to `n` doubles. */
function applyUnary(fn: i32, n: i32, to: usize, from: usize, slot: usize): void {
  store<usize>(slot, from);
  store<i32>(slot, 8, 4);
  unchecked(TABLE[fn])(n, to, slot);
}

/**
 * Descriptor, 32-bit words: 0 rows, 1 columns, 2 formula, 3 operand count, 4 sink (0 store float32,
 * 1 sum each row into a double, 2 add to a row of doubles), 5 output, 6 output row stride,
 * 7 upstream gradient (0: none), 8 and 9 its strides, 10 formula of the transform's derivative (-1: none),
 * 11 operand it belongs to; then, per operand: data, row stride, column stride (0 or 1), transform (-1: none).
 */
export function run(descriptor: usize): void {
  const rows = load<i32>(descriptor);
  const columns = load<i32>(descriptor, 4);
  const fn = load<i32>(descriptor, 8);
  const count = load<i32>(descriptor, 12);
  const sink = load<i32>(descriptor, 16);
  const out = load<usize>(descriptor, 20);
  const outStride = load<i32>(descriptor, 24);
  const upstream = load<usize>(descriptor, 28);
  const upstreamRow = load<i32>(descriptor, 32);
  const upstreamColumn = load<i32>(descriptor, 36);
  const chainFn = load<i32>(descriptor, 40);
  const chainOperand = load<i32>(descriptor, 44);
  const operands = descriptor + 48;
  const unarySlot = slots + <usize>(8 * MOST_OPERANDS);
  const result = bufferOf(MOST_OPERANDS);
  const chain = bufferOf(MOST_OPERANDS + 1);

  for (let i = 0; i < rows; i++) {
    for (let start = 0; start < columns; start += BLOCK) {
      const n = min(BLOCK, columns - start);
      for (let k = 0; k < count; k++) {
        const operand = operands + <usize>(16 * k);
        const column = load<i32>(operand, 8);
        const transform = load<i32>(operand, 12);
        // An operand that is constant along the row is promoted once per row.
        const buffer = bufferOf(k);
        const slot = slots + <usize>(8 * k);
        const from = load<usize>(operand) + 4 * <usize>(i * load<i32>(operand, 4) + start * column);
        const length = column == 0 ? 1 : n;
        if (column != 0 || start == 0) {
          promote(length, buffer, from);
          if (k == chainOperand && chainFn >= 0) applyUnary(chainFn, length, chain, buffer, unarySlot);
          if (transform >= 0) applyUnary(transform, length, buffer, buffer, unarySlot);
        }
        store<usize>(slot, buffer);
        store<i32>(slot, column == 0 ? 0 : 8, 4);
      }
      unchecked(TABLE[fn])(n, result, slots);

      if (chainFn >= 0) {
        const step: usize = load<i32>(operands + <usize>(16 * chainOperand), 8) == 0 ? 0 : 8;
        let c = chain;
        for (let r = result, end = result + <usize>(8 * n); r < end; r += 8) {
          store<f64>(r, load<f64>(r) * load<f64>(c));
          c += step;
        }
      }
      if (upstream != 0) {
        let d = upstream + 4 * <usize>(i * upstreamRow + start * upstreamColumn);
        const step = <usize>(4 * upstreamColumn);
        for (let r = result, end = result + <usize>(8 * n); r < end; r += 8) {
          const dy = <f64>load<f32>(d);
          // A zero upstream gradient masks the element, whatever its derivative is there.
          store<f64>(r, dy == 0 ? 0.0 : load<f64>(r) * dy);
          d += step;
        }
      }
      if (sink == 0) {
        let o = out + 4 * <usize>(i * outStride + start);
        for (let r = result, end = result + <usize>(8 * n); r < end; r += 8) {
          store<f32>(o, <f32>load<f64>(r));
          o += 4;
        }
      } else if (sink == 1) {
        const o = out + 8 * <usize>(i * outStride);
        let sum = load<f64>(o);
        for (let r = result, end = result + <usize>(8 * n); r < end; r += 8) sum += load<f64>(r);
        store<f64>(o, sum);
      } else {
        let o = out + 8 * <usize>(i * outStride + start);
        for (let r = result, end = result + <usize>(8 * n); r < end; r += 8) {
          store<f64>(o, load<f64>(o) + load<f64>(r));
          o += 8;
        }
      }
    }
  }
}

/** Rounds `n` doubles at `from` to float32 at `to`. */
export function round(n: i32, to: usize, from: usize): void {
  for (let i = 0; i < n; i++) {
    store<f32>(to, <f32>load<f64>(from));
    to += 4;
    from += 8;
  }
}

/** The first byte after the module's own static data. */
export function heapBase(): usize {
  return __heap_base;
}
