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

// The loops that move numbers between the formulas take two lanes at a time, and the odd one out alone: the
// same operations on the same numbers, in the same order.

/** Promotes `n` float32 numbers at `from` to doubles at `to`. */
function promote(n: i32, to: usize, from: usize): void {
  for (let end = to + <usize>(8 * (n & ~1)); to < end; to += 16, from += 8) {
    v128.store(to, f64x2.promote_low_f32x4(v128.load64_zero(from)));
  }
  if (n & 1) store<f64>(to, <f64>load<f32>(from));
}

/** Rounds `n` doubles at `from` to float32 at `to`. */
function demote(n: i32, to: usize, from: usize): void {
  for (let end = from + <usize>(8 * (n & ~1)); from < end; from += 16, to += 8) {
    v128.store64_lane(to, f32x4.demote_f64x2_zero(v128.load(from)), 0);
  }
  if (n & 1) store<f32>(to, <f32>load<f64>(from));
}

/** Multiplies `n` doubles at `to` by those at `by`. */
function multiply(n: i32, to: usize, by: usize): void {
  for (let end = to + <usize>(8 * (n & ~1)); to < end; to += 16, by += 16) {
    v128.store(to, f64x2.mul(v128.load(to), v128.load(by)));
  }
  if (n & 1) store<f64>(to, load<f64>(to) * load<f64>(by));
}

/** Multiplies `n` doubles at `to` by one number. */
function multiplyAll(n: i32, to: usize, by: f64): void {
  const both = f64x2.splat(by);
  for (let end = to + <usize>(8 * (n & ~1)); to < end; to += 16) {
    v128.store(to, f64x2.mul(v128.load(to), both));
  }
  if (n & 1) store<f64>(to, load<f64>(to) * by);
}

/** Adds `n` doubles at `from` to those at `to`. */
function accumulate(n: i32, to: usize, from: usize): void {
  for (let end = from + <usize>(8 * (n & ~1)); from < end; from += 16, to += 16) {
    v128.store(to, f64x2.add(v128.load(to), v128.load(from)));
  }
  if (n & 1) store<f64>(to, load<f64>(to) + load<f64>(from));
}

/**
 * Multiplies `n` doubles at `to` by the float32 upstream gradients at `by`. A zero one masks the element,
 * whatever its derivative is there.
 */
function backward(n: i32, to: usize, by: usize): void {
  const zero = f64x2.splat(0.0);
  for (let end = to + <usize>(8 * (n & ~1)); to < end; to += 16, by += 8) {
    const dy = f64x2.promote_low_f32x4(v128.load64_zero(by));
    v128.store(to, v128.and(f64x2.mul(v128.load(to), dy), f64x2.ne(dy, zero)));
  }
  if (n & 1) {
    const dy = <f64>load<f32>(by);
    store<f64>(to, dy == 0 ? 0.0 : load<f64>(to) * dy);
  }
}

/** The same for one upstream gradient. */
function backwardAll(n: i32, to: usize, dy: f64): void {
  if (dy == 0) memory.fill(to, 0, <usize>(8 * n));
  else multiplyAll(n, to, dy);
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
 * 7 upstream gradient (0: none), 8 and 9 its strides (column 0 or 1), 10 formula of the transform's derivative (-1: none),
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
        if (load<i32>(operands + <usize>(16 * chainOperand), 8) == 0) multiplyAll(n, result, load<f64>(chain));
        else multiply(n, result, chain);
      }
      if (upstream != 0) {
        const dy = upstream + 4 * <usize>(i * upstreamRow + start * upstreamColumn);
        if (upstreamColumn == 0) backwardAll(n, result, <f64>load<f32>(dy));
        else backward(n, result, dy);
      }
      if (sink == 0) {
        demote(n, out + 4 * <usize>(i * outStride + start), result);
      } else if (sink == 1) {
        const o = out + 8 * <usize>(i * outStride);
        let sum = load<f64>(o);
        for (let r = result, end = result + <usize>(8 * n); r < end; r += 8) sum += load<f64>(r);
        store<f64>(o, sum);
      } else {
        accumulate(n, out + 8 * <usize>(i * outStride + start), result);
      }
    }
  }
}

/** Rounds `n` doubles at `from` to float32 at `to`. */
export function round(n: i32, to: usize, from: usize): void {
  demote(n, to, from);
}

/** The first byte after the module's own static data. */
export function heapBase(): usize {
  return __heap_base;
}
