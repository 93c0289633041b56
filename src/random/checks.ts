import { ParameterError, ShapeError } from '../errors.js';

/** The most draws that one call hands out: a float32 array of them still fits every engine. */
const most = 2 ** 30;

function told(value: unknown): string {
  if (value === null || value === undefined || typeof value === 'number') return String(value);
  return typeof value === 'string' ? `'${value}'` : `a value of type ${typeof value}`;
}

/** The number of elements of `shape`, or a {@link ShapeError}. */
export function sizeOf(caller: string, shape: readonly number[]): number {
  if (!Array.isArray(shape)) {
    throw new ShapeError(
      `${caller}: shape must be an array of whole numbers; got ${told(shape)}; pass [] for one draw or [n] for n`,
    );
  }
  let size = 1;
  for (const [axis, length] of shape.entries()) {
    if (!(Number.isInteger(length) && length >= 0)) {
      throw new ShapeError(
        `${caller}: shape must hold whole numbers from 0 up; got ${told(length)} at axis ${axis}; pass lengths such as [100, 8]`,
      );
    }
    size *= length;
  }
  if (!(size <= most)) {
    throw new ShapeError(
      `${caller}: shape must have at most ${most} elements; got [${shape.join(', ')}]; draw in several calls`,
    );
  }
  return size;
}

/** A count of draws, or a {@link ParameterError}. */
export function checkCount(caller: string, word: string, count: number): void {
  if (!(Number.isInteger(count) && count >= 0 && count <= most)) {
    throw new ParameterError(
      `${caller}: ${word} must be a whole number from 0 to ${most}; got ${told(count)}; round it or draw in several calls`,
    );
  }
}

/** The exclusive bound of {@link Stream.integers}, or a {@link ParameterError}. */
export function checkBelow(caller: string, below: number): void {
  if (!(Number.isInteger(below) && below >= 1 && below <= 2147483647)) {
    throw new ParameterError(
      `${caller}: below must be a whole number from 1 to 2147483647; got ${told(below)}; results run from 0 to below − 1`,
    );
  }
}
