import { broadcastStrides, forEachBroadcast, mergeAxes, sizeOf } from './layout.js';
import { type KernelModule, kernelModule } from './loader.js';

/** One argument of a formula: numbers, their shape, and the compiled transform they pass through first. */
export interface ArrayOperand {
  readonly data: Float32Array;
  readonly shape: readonly number[];
  /** Table index of a one-argument formula, or −1. */
  readonly transform: number;
}

/** What to evaluate, over which shape, into which shape. */
export interface Evaluation {
  /** Table index of the formula or of one of its partial derivatives. */
  readonly formula: number;
  readonly operands: readonly ArrayOperand[];
  /** The shape that the operands broadcast to. */
  readonly shape: readonly number[];
  /** The result's strides over `shape`; 0 on every axis that is summed. */
  readonly outStrides: readonly number[];
  readonly outSize: number;
  /** A factor for each element, as in a backward pass; its strides run over `shape`. */
  readonly upstream?: { readonly data: Float32Array; readonly strides: readonly number[] };
  /** The derivative of an operand's transform, multiplied in: its table index and the operand's position. */
  readonly chain?: { readonly derivative: number; readonly operand: number };
}

const descriptorWords = 12;
const operandWords = 4;

/** Runs one formula over arrays in the compiled module: double precision inside, one rounding at the end. */
export function evaluateCompiled(evaluation: Evaluation): Float32Array<ArrayBuffer> {
  const { operands, shape, outSize, upstream, chain } = evaluation;
  if (sizeOf(shape) === 0) return new Float32Array(outSize);

  const strides = [
    evaluation.outStrides,
    upstream?.strides ?? shape.map(() => 0),
    ...operands.map((o) => broadcastStrides(o.shape, shape)),
  ];
  const loops = mergeAxes(shape, strides);
  const depth = loops.sizes.length;
  const [outLoops, upstreamLoops, ...operandLoops] = loops.strides as [number[], number[], ...number[][]];
  const summed = loops.sizes.some((size, axis) => size > 1 && outLoops[axis] === 0);
  const sink = !summed ? 0 : outLoops[depth - 1] === 0 ? 1 : 2;
  const outBytes = summed ? 8 : 4;

  const module = kernelModule();
  module.begin();
  const descriptor = module.reserve(4 * (descriptorWords + operandWords * operands.length));
  const pointers = operands.map((o) => module.reserve(4 * o.data.length));
  const upstreamPointer = upstream ? module.reserve(4 * upstream.data.length) : 0;
  const sums = module.reserve(outBytes * outSize);
  const rounded = summed ? module.reserve(4 * outSize) : sums;

  const floats = module.floats;
  operands.forEach((o, k) => {
    floats.set(o.data, pointers[k]! >> 2);
  });
  if (upstream) floats.set(upstream.data, upstreamPointer >> 2);
  if (summed) floats.fill(0, sums >> 2, (sums + 8 * outSize) >> 2);

  const d = descriptor >> 2;
  const words = module.words;
  words[d] = loops.sizes[depth - 2]!;
  words[d + 1] = loops.sizes[depth - 1]!;
  words[d + 2] = evaluation.formula;
  words[d + 3] = operands.length;
  words[d + 4] = sink;
  words[d + 6] = outLoops[depth - 2]!;
  words[d + 8] = upstreamLoops[depth - 2]!;
  words[d + 9] = upstreamLoops[depth - 1]!;
  words[d + 10] = chain?.derivative ?? -1;
  words[d + 11] = chain?.operand ?? -1;
  operands.forEach((o, k) => {
    const at = d + descriptorWords + operandWords * k;
    words[at + 1] = operandLoops[k]![depth - 2]!;
    words[at + 2] = operandLoops[k]![depth - 1]!;
    words[at + 3] = o.transform;
  });
  forEachBroadcast(loops.sizes.slice(0, depth - 2), loops.strides, (_index, offsets) => {
    words[d + 5] = sums + outBytes * offsets[0]!;
    words[d + 7] = upstream ? upstreamPointer + 4 * offsets[1]! : 0;
    pointers.forEach((pointer, k) => {
      words[d + descriptorWords + operandWords * k] = pointer + 4 * offsets[k + 2]!;
    });
    module.call.run!(descriptor);
  });

  if (summed) module.call.round!(outSize, rounded, sums);
  return copyOut(module, rounded, outSize);
}

function copyOut(module: KernelModule, pointer: number, size: number): Float32Array<ArrayBuffer> {
  return module.floats.slice(pointer >> 2, (pointer >> 2) + size) as Float32Array<ArrayBuffer>;
}
