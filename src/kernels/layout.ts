import { ShapeError } from '../errors.js';

/** The shape that `shapes` broadcast to, from the right; the error names the caller and whose shapes they are. */
export function broadcastShapes(
  where: string,
  shapes: readonly (readonly number[])[],
  whose = 'shapes',
): number[] {
  const rank = Math.max(0, ...shapes.map((s) => s.length));
  const result: number[] = new Array(rank).fill(1);
  for (const shape of shapes) {
    for (let i = 0; i < shape.length; i++) {
      const at = rank - shape.length + i;
      const size = shape[i]!;
      if (size === 1 || size === result[at]) continue;
      if (result[at] !== 1) {
        throw new ShapeError(
          `${where}: ${whose} must broadcast from the right; got ${shapes.map((s) => `[${s.join(', ')}]`).join(' and ')}; make the sizes of each axis equal, or 1`,
        );
      }
      result[at] = size;
    }
  }
  return result;
}

/** Whether two shapes are equal. */
export function sameShape(a: readonly number[], b: readonly number[]): boolean {
  return a.length === b.length && a.every((size, i) => size === b[i]);
}

/** Number of elements of a shape. */
export function sizeOf(shape: readonly number[]): number {
  return shape.reduce((product, size) => product * size, 1);
}

/** Strides of a contiguous array of `shape` over the axes of `target`; 0 where it is broadcast. */
export function broadcastStrides(shape: readonly number[], target: readonly number[]): number[] {
  const strides: number[] = new Array(target.length).fill(0);
  let stride = 1;
  for (let i = shape.length - 1; i >= 0; i--) {
    if (shape[i] !== 1) strides[target.length - shape.length + i] = stride;
    stride *= shape[i]!;
  }
  return strides;
}

/** Loop sizes, and for each array that takes part its strides over those loops. */
export interface Loops {
  readonly sizes: number[];
  readonly strides: number[][];
}

/**
 * Merges neighbouring axes that every array walks through as one and drops axes of size 1, so that most
 * calls end up with one or two loops. At least two remain.
 */
export function mergeAxes(shape: readonly number[], strides: readonly (readonly number[])[]): Loops {
  const sizes: number[] = [];
  const merged: number[][] = strides.map(() => []);
  for (let axis = 0; axis < shape.length; axis++) {
    const size = shape[axis]!;
    if (size === 1) continue;
    const last = sizes.length - 1;
    const joins = last >= 0 && strides.every((s, k) => merged[k]![last] === s[axis]! * size);
    if (joins) {
      sizes[last]! *= size;
      strides.forEach((s, k) => {
        merged[k]![last] = s[axis]!;
      });
    } else {
      sizes.push(size);
      strides.forEach((s, k) => {
        merged[k]!.push(s[axis]!);
      });
    }
  }
  while (sizes.length < 2) {
    sizes.unshift(1);
    for (const s of merged) s.unshift(0);
  }
  return { sizes, strides: merged };
}

/** Visits each element of `shape` in order, with the offset of every strided array there. */
export function forEachBroadcast(
  shape: readonly number[],
  strides: readonly (readonly number[])[],
  visit: (index: number, offsets: readonly number[]) => void,
): void {
  const total = sizeOf(shape);
  const counters: number[] = shape.map(() => 0);
  const offsets: number[] = strides.map(() => 0);
  for (let index = 0; index < total; index++) {
    visit(index, offsets);
    for (let axis = shape.length - 1; axis >= 0; axis--) {
      counters[axis]!++;
      const done = counters[axis] === shape[axis];
      for (let k = 0; k < strides.length; k++) {
        offsets[k]! += done ? -strides[k]![axis]! * (shape[axis]! - 1) : strides[k]![axis]!;
      }
      if (!done) break;
      counters[axis] = 0;
    }
  }
}
