import { broadcastStrides, forEachBroadcast, mergeAxes, sizeOf } from './layout.js';
import { kernelModule } from './loader.js';
import { placeOperands, placeUpstream } from './placement.js';

/** One argument of a formula: numbers, their shape, and the compiled transform they pass through first. */
export interface ArrayOperand {
  readonly data: Float32Array;
  readonly shape: readonly number[];
  /** Table index of a one-argument formula, or −1. */
  readonly transform: number;
}

/** An upstream gradient. */
export interface Upstream {
  readonly data: Float32Array;
  readonly strides: readonly number[];
  /** Upstream gradients of one owner hold the same numbers; without one they share nothing. */
  readonly owner?: object;
}

/** What to evaluate, over which shape, into which shape. */
export interface Evaluation {
  /** Table index of the formula or of one of its partial derivatives. */
  readonly formula: number;
  readonly operands: readonly ArrayOperand[];
  /** Evaluations of one owner have the same numbers in their operands; without one they share nothing. */
  readonly owner?: object;
  /** The shape that the operands broadcast to. */
  readonly shape: readonly number[];
  /** The result's strides over `shape`; 0 on every axis that is summed. */
  readonly outStrides: readonly number[];
  readonly outSize: number;
  /** A factor for each element, as in a backward pass; its strides run over `shape`. */
  readonly upstream?: Upstream;
  /** The derivative of an operand's transform, multiplied in: its table index and the operand's position. */
  readonly chain?: { readonly derivative: number; readonly operand: number };
}

const descriptorWords = 12;
const operandWords = 4;

/**
 * Runs one formula over arrays in the compiled module: double precision inside, one rounding at the end. The
 * result lies in the module's memory, to be read before anything else is evaluated.
 */
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
  const pointers = placeOperands(
    module,
    evaluation.owner ?? {},
    operands.map((o) => o.data),
  );
  const upstreamPointer = upstream ? placeUpstream(module, upstream.owner ?? {}, upstream.data) : 0;
  const descriptor = module.reserve(4 * (descriptorWords + operandWords * operands.length));
  const sums = module.reserve(outBytes * outSize);
  const rounded = summed ? module.reserve(4 * outSize) : sums;

  const floats = module.floats;
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
  const run = module.call.run!;
  forEachBroadcast(loops.sizes.slice(0, depth - 2), loops.strides, (_index, offsets) => {
    words[d + 5] = sums + outBytes * offsets[0]!;
    words[d + 7] = upstream ? upstreamPointer + 4 * offsets[1]! : 0;
    for (let k = 0; k < pointers.length; k++) {
      words[d + descriptorWords + operandWords * k] = pointers[k]! + 4 * offsets[k + 2]!;
    }
    run(descriptor);
  });

  if (summed) module.call.round!(outSize, rounded, sums);
  return floats.subarray(rounded >> 2, (rounded >> 2) + outSize) as Float32Array<ArrayBuffer>;
}
