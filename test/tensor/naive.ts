// Broadcasting the slow and obvious way: every element of the result looks its arguments up by position.

/** An array with a shape, row-major. */
export interface NaiveArray {
  readonly shape: readonly number[];
  readonly data: ArrayLike<number>;
}

type Scalar = (...values: number[]) => number;

export function sizeOf(shape: readonly number[]): number {
  return shape.reduce((a, b) => a * b, 1);
}

/** All positions of a shape in row-major order. */
export function positions(shape: readonly number[]): number[][] {
  if (shape.length === 0) return [[]];
  const [first, ...rest] = shape as [number, ...number[]];
  const inner = positions(rest);
  return Array.from({ length: first }, (_, i) => inner.map((p) => [i, ...p])).flat();
}

/** The flat index at which an array of `shape` meets a position of a larger shape. */
export function indexAt(shape: readonly number[], position: readonly number[]): number {
  const own = position.slice(position.length - shape.length);
  return shape.reduce((at, size, axis) => at * size + (size === 1 ? 0 : own[axis]!), 0);
}

export function broadcast(shapes: readonly (readonly number[])[]): number[] {
  const rank = Math.max(...shapes.map((s) => s.length));
  return Array.from({ length: rank }, (_, axis) => {
    const sizes = shapes.map((s) => s[axis - rank + s.length] ?? 1);
    return sizes.find((size) => size !== 1) ?? 1;
  });
}

/** The formula at every position, summed over the last `fold` axes: doubles. */
export function naiveValue(f: Scalar, arrays: readonly NaiveArray[], fold: number): NaiveArray {
  const shape = broadcast(arrays.map((a) => a.shape));
  const outShape = shape.slice(0, shape.length - fold);
  const data = new Float64Array(sizeOf(outShape));
  for (const position of positions(shape)) {
    const args = arrays.map((a) => a.data[indexAt(a.shape, position)]!);
    data[indexAt(outShape, position.slice(0, outShape.length))]! += f(...args);
  }
  return { shape: outShape, data };
}

/** The gradient of one argument: its partial times the upstream gradient, summed over its broadcast axes. */
export function naiveGradient(
  partial: Scalar,
  arrays: readonly NaiveArray[],
  which: number,
  upstream: NaiveArray,
): NaiveArray {
  const shape = broadcast(arrays.map((a) => a.shape));
  const own = arrays[which]!.shape;
  const data = new Float64Array(sizeOf(own));
  for (const position of positions(shape)) {
    const args = arrays.map((a) => a.data[indexAt(a.shape, position)]!);
    const dy = upstream.data[indexAt(upstream.shape, position.slice(0, upstream.shape.length))]!;
    data[indexAt(own, position)]! += partial(...args) * dy;
  }
  return { shape: own, data };
}
