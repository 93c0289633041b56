import type { KernelModule } from './loader.js';

/** Where arrays were copied to, and on whose behalf, until the memory is laid out anew. */
interface Placed {
  readonly owner: object;
  readonly pointers: readonly number[];
  readonly end: number;
}

let layout = -1;
let operands: Placed | undefined;
let upstream: Placed | undefined;

/**
 * Copies operands into the module's memory, unless they still stand there on behalf of the same owner: the
 * gradients of one operation, asked for one after the other, read the same numbers.
 */
export function placeOperands(
  module: KernelModule,
  owner: object,
  arrays: readonly Float32Array[],
): readonly number[] {
  if (operands?.owner === owner && layout === module.layout) {
    module.rewind(operands.end);
    return operands.pointers;
  }
  module.begin();
  operands = { owner, pointers: copyIn(module, arrays), end: module.end };
  layout = module.layout;
  upstream = undefined;
  return operands.pointers;
}

/** The same for the upstream gradient, behind the operands; its owner is the backward pass. */
export function placeUpstream(module: KernelModule, owner: object, array: Float32Array): number {
  if (upstream?.owner === owner) {
    module.rewind(upstream.end);
  } else {
    upstream = { owner, pointers: copyIn(module, [array]), end: module.end };
  }
  return upstream.pointers[0]!;
}

function copyIn(module: KernelModule, arrays: readonly Float32Array[]): number[] {
  const pointers = arrays.map((array) => module.reserve(4 * array.length));
  const floats = module.floats;
  for (let k = 0; k < arrays.length; k++) floats.set(arrays[k]!, pointers[k]! >> 2);
  return pointers;
}
